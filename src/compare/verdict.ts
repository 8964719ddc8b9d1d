/** The verdict on the quick (one-temperature) estimate, in words that lead with what to do. */
import { formatPercent, formatRange } from "../case/format.ts";
import type { Question } from "../case/types.ts";
import { VERDICT_TOLERANCE } from "./defaults.ts";
import type { Comparison, Verdict } from "./types.ts";

/** An answer with its comparisons, as far as the verdict reads it. */
export interface ComparedAnswer {
  readonly question: Question;
  readonly value: number | null;
  readonly comparison: { readonly lumped: Comparison | null; readonly series: Comparison | null };
}

interface Miss {
  readonly answer: ComparedAnswer;
  readonly comparison: Comparison;
  readonly share: number;
}

/**
 * Whether the one-temperature estimate may be used for these questions.
 *
 * "bad": some answer is out by more than the tolerance on the unsafe side; "care": out, but on the safe side only, or
 * nothing to compare; "good": all within the tolerance.
 *
 * @param tolerance  share, 0.05 for 5 %
 */
export function verdict(answers: readonly ComparedAnswer[], tolerance: number = VERDICT_TOLERANCE): Verdict {
  const misses = missesOf(answers, "lumped");
  if (misses.length === 0) {
    const headline = "Go by the answers: there is no quick estimate to hold beside them.";
    return { tone: "care", headline, detail: seriesDetail(answers), worst: null };
  }
  const worst = Math.max(...misses.map((miss) => miss.share));
  const out = misses.filter((miss) => miss.share > tolerance && miss.comparison.side !== "agrees");
  const unsafe = out.filter((miss) => miss.comparison.side === "unsafe");
  const detail = [`It was held beside ${counted(misses.length)}.`, seriesDetail(answers)]
    .filter(Boolean)
    .join(" ");
  if (unsafe.length > 0)
    return {
      tone: "bad",
      headline: `Do not use the quick estimate here. ${spoken(unsafe)}, on the unsafe side.`,
      detail,
      worst,
    };
  if (out.length > 0)
    return {
      tone: "care",
      headline: `Use the quick estimate only as a bound. ${spoken(out)}, on the safe side.`,
      detail,
      worst,
    };
  return {
    tone: "good",
    headline: `The quick estimate will do for this part: ${goodWords(misses, worst)}.`,
    detail,
    worst,
  };
}

function missesOf(answers: readonly ComparedAnswer[], estimate: "lumped" | "series"): Miss[] {
  return answers.flatMap((answer) => {
    const comparison = answer.comparison[estimate];
    if (comparison === null || answer.value === null) return [];
    const share = comparison.share ?? Math.abs(comparison.difference / answer.value);
    return [{ answer, comparison, share }];
  });
}

/** "It comes 53 to 64 min early": by the times where any are out, else by the kind of the worst. */
function spoken(misses: readonly Miss[]): string {
  const times = misses.filter(({ answer }) => answer.question.ask === "when");
  if (times.length > 0) return timeWords(times);
  const worst = misses.reduce((a, b) => (b.share > a.share ? b : a));
  const { difference } = worst.comparison;
  const size = Math.abs(difference);
  const percent = Number.isFinite(worst.share) ? formatPercent(worst.share) : "altogether";
  switch (worst.answer.question.ask) {
    case "reading":
      return `It reads ${formatRange(size, size, "temperatureDifference")} ${worst.comparison.side === "safe" ? "behind" : "ahead of"} the part`;
    case "spread":
      return `It misses ${formatRange(size, size, "temperatureDifference")} between the hottest and the coldest place`;
    case "passage":
      return `It takes ${formatRange(size, size, "time")} too ${difference < 0 ? "little" : "much"} for the passage`;
    case "rate":
      return `It is ${percent} too ${worst.comparison.side === "unsafe" ? "fast" : "slow"}`;
    case "held-above":
    case "held-below":
      return `It promises ${formatRange(size, size, "time")} too ${difference > 0 ? "much" : "little"} at temperature`;
    case "dose":
      return `It promises a dose ${percent} too ${difference > 0 ? "large" : "small"}`;
    default:
      return `It is ${percent} out`;
  }
}

function timeWords(misses: readonly Miss[]): string {
  const seconds = misses.map(({ comparison }) => comparison.difference);
  const sizes = seconds.map(Math.abs).sort((a, b) => a - b);
  return `It comes ${formatRange(sizes[0]!, sizes.at(-1)!, "time")} ${seconds[0]! < 0 ? "early" : "late"}`;
}

/** "0.7 % out, late rather than early" */
function goodWords(misses: readonly Miss[], share: number): string {
  const worst = misses.reduce((a, b) => (b.share > a.share ? b : a));
  const size = `${formatPercent(share)} out`;
  if (worst.comparison.side === "agrees") return `${size} at most`;
  if (worst.answer.question.ask !== "when") return `${size} at most, on the ${worst.comparison.side} side`;
  return worst.comparison.difference < 0
    ? `${size}, early rather than late`
    : `${size}, late rather than early`;
}

function seriesDetail(answers: readonly ComparedAnswer[]): string {
  const misses = missesOf(answers, "series");
  if (misses.length === 0) return "";
  const worst = misses.reduce((a, b) => (b.share > a.share ? b : a));
  if (worst.comparison.side === "agrees") return "The series agrees.";
  return `The series is ${formatPercent(worst.share)} out at most, on the ${worst.comparison.side} side.`;
}

function counted(count: number): string {
  return count === 1 ? "one answer" : `${count} answers`;
}
