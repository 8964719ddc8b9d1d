/** Lines to people go to standard error, except the answers themselves. */
import type { CaseProblem } from "../case/types.ts";
import { oneLine } from "../report/plainText.ts";

export const tell = (line: string): void => {
  process.stderr.write(`${line}\n`);
};

/** One line a fault: field path, what is wrong, how to mend it. */
export const problemLine = ({ path, message, mend }: CaseProblem): string =>
  `${path === "" ? "case" : path}: ${oneLine(message)}; ${oneLine(mend)}`;

export function tellProblems(problems: readonly CaseProblem[]): void {
  for (const problem of problems) tell(problemLine(problem));
}

/** Between two looks at the progress [ms]: a line that overwrites itself on a terminal, a line of its own elsewhere. */
const LIVE_EVERY = 100;
const LOGGED_EVERY = 5000;
/** Runs shorter than this say nothing where there is no terminal [ms]. */
const LOGGED_AFTER = 1000;

/** Progress on standard error. */
export function progressLine(): { show(doing: string, fraction: number): void; clear(): void } {
  const live = process.stderr.isTTY;
  let next = Date.now() + (live ? 0 : LOGGED_AFTER);
  let width = 0;
  return {
    show(doing, fraction) {
      if (Date.now() < next) return;
      next = Date.now() + (live ? LIVE_EVERY : LOGGED_EVERY);
      const line = `${oneLine(doing)}: ${Math.round(100 * fraction)} %`;
      process.stderr.write(live ? `\r${line.padEnd(width)}` : `${line}\n`);
      width = line.length;
    },
    clear() {
      if (live && width > 0) process.stderr.write(`\r${" ".repeat(width)}\r`);
    },
  };
}

export const isPipeClosed = (error: NodeJS.ErrnoException): boolean => error.code === "EPIPE";
