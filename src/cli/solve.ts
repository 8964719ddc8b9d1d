/** corelag solve: run a case, print a summary, write the files asked for. */
import { LIBRARY } from "../../presets/materials/index.ts";
import { parseQuantity } from "../case/units.ts";
import type { CaseResult } from "../run/result.ts";
import { solveCase } from "../solveCase.ts";
import type { RunContext, SolveOptions } from "../solveCase.ts";
import { EXIT } from "./exit.ts";
import { summaryText } from "../report/summary.ts";
import { oneLine } from "../report/plainText.ts";
import { progressLine, tell, tellProblems } from "./terminal.ts";
import { writeOutputs } from "./outputs.ts";

export interface SolveFlags {
  readonly out?: string;
  readonly at?: readonly string[];
  readonly nodes?: number;
  readonly accuracy?: number;
  readonly scheme?: SolveOptions["scheme"];
  readonly element?: 3 | 6;
  readonly snapshots?: readonly string[];
}

/** Longest stretch without letting an interrupt in [ms]. */
const STRETCH = 25;

/** @returns the exit code */
export async function solve(text: string, flags: SolveFlags): Promise<number> {
  const at = readTimes(flags.at ?? []);
  if (!at) return EXIT.wrong;
  if (flags.snapshots && flags.out === undefined) {
    tell("--snapshots: there is nowhere to write them; add --out DIR");
    return EXIT.wrong;
  }
  const progress = progressLine();
  const interrupt = listenForInterrupt();
  const { nodes, accuracy, scheme, element } = flags;
  const options = { at, ...given({ nodes, accuracy, scheme, element }) };
  const outcome = await solveCase(text, LIBRARY, options, contextFor(interrupt, progress.show));
  interrupt.stop();
  progress.clear();
  switch (outcome.kind) {
    case "refused":
      tellProblems(outcome.problems);
      return EXIT.wrong;
    case "solved":
      return deliver(outcome.result, flags, at) ? EXIT.solved : EXIT.wrong;
    case "failed":
      tell(`not solved: ${oneLine(outcome.failure.message)}; ${outcome.failure.mend}`);
      return kept(outcome.result, flags, at, EXIT.unsolved);
    case "cancelled":
      tell("interrupted");
      return kept(outcome.result, flags, at, EXIT.interrupted);
  }
}

/** The flags that were given: an absent one must not stand as undefined. */
const given = <T extends object>(flags: T): Partial<T> =>
  Object.fromEntries(Object.entries(flags).filter(([, value]) => value !== undefined)) as Partial<T>;

function kept(
  result: CaseResult | undefined,
  flags: SolveFlags,
  at: readonly number[],
  code: number,
): number {
  if (result) {
    tell("What was reached so far follows; it is not the whole case.");
    deliver(result, flags, at);
  }
  return code;
}

/** Prints the summary and writes the files. @returns false where a file could not be written */
function deliver(result: CaseResult, flags: SolveFlags, at: readonly number[]): boolean {
  process.stdout.write(summaryText(result));
  if (flags.out === undefined) return true;
  try {
    writeOutputs(result, flags.out, flags.snapshots ?? [], at);
    return true;
  } catch (error) {
    tell(
      `--out ${flags.out}: cannot be written (${(error as NodeJS.ErrnoException).code ?? String(error)}); choose another folder`,
    );
    return false;
  }
}

function readTimes(texts: readonly string[]): number[] | null {
  const times: number[] = [];
  for (const text of texts) {
    const bare = Number(text);
    const read = parseQuantity(text !== "" && Number.isFinite(bare) ? bare : text, "time");
    if ("fault" in read || read.value < 0) {
      tell(
        `--at: ${"fault" in read ? read.fault.message : `found ${text}`}; give times in s, or with a unit, not negative: 600,30 min,2 h`,
      );
      return null;
    }
    times.push(read.value);
  }
  return times.sort((a, b) => a - b);
}

interface Interrupt {
  asked(): boolean;
  stop(): void;
}

function listenForInterrupt(): Interrupt {
  let asked = false;
  const onSignal = (): void => {
    asked = true;
  };
  process.on("SIGINT", onSignal);
  process.on("SIGTERM", onSignal);
  return {
    asked: () => asked,
    stop() {
      process.off("SIGINT", onSignal);
      process.off("SIGTERM", onSignal);
    },
  };
}

function contextFor(interrupt: Interrupt, show: (doing: string, fraction: number) => void): RunContext {
  let paused = performance.now();
  return {
    cancelled: interrupt.asked,
    progress: show,
    breathe: async () => {
      if (performance.now() - paused < STRETCH) return;
      await new Promise((resolve) => setImmediate(resolve));
      paused = performance.now();
    },
    clock: () => performance.now() / 1000,
  };
}
