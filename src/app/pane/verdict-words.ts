/** The verdict as the band shows it: a heading that says what to do, and the rest below it. */
import type { Verdict } from "../../compare/types.ts";
import type { RunFailure } from "../../run/result.ts";
import type { CaseProblem } from "../../case/types.ts";

export interface Band {
  readonly tone: "bad" | "care" | "good" | "stale";
  readonly heading: string;
  readonly text: string;
}

/** "Do not use the quick estimate here. It comes ..." parts behind its first sentence, or behind a colon. */
export function bandOf(verdict: Verdict): Band {
  const { heading, rest } = parted(verdict.headline);
  return { tone: verdict.tone, heading, text: unbroken([rest, verdict.detail].filter(Boolean).join(" ")) };
}

function parted(headline: string): { heading: string; rest: string } {
  const match = /^(.+?)(?:\.\s+|:\s+)(.+)$/s.exec(headline);
  if (match === null) return { heading: headline.replace(/\.$/, ""), rest: "" };
  const rest = match[2]!;
  return { heading: match[1]!, rest: `${rest[0]!.toUpperCase()}${rest.slice(1)}` };
}

const unbroken = (text: string): string => text.replaceAll("\u2009", "\u00a0");

/** The band over answers that are not for what stands on the sheet. */
export const KEPT: Band = {
  tone: "stale",
  heading: "From the case before the last change",
  text: "These answers are kept to look at. They are not for what stands on the sheet and cannot be handed over.",
};

export function failureBand(failure: RunFailure): Band {
  return { tone: "bad", heading: "It could not be worked out", text: `${failure.message} ${failure.mend}` };
}

/**
 * Faults to be told in the pane: the first stands on its card over the section, those of questions at their blanks;
 * all others without a place of their own are listed here.
 */
export function faultsToTell(problems: readonly CaseProblem[]): CaseProblem[] {
  return problems
    .slice(1)
    .filter(({ places = [], path }) => places.length === 0 && !path.startsWith("questions["));
}

/** Fault of one field of one question, by its path "questions[2].reaches". */
export function faultOf(problems: readonly CaseProblem[], index: number, field: string): CaseProblem | null {
  return problems.find(({ path }) => path === `questions[${index}].${field}`) ?? null;
}
