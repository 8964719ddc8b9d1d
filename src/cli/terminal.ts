/** Lines to people go to standard error, except the answers themselves. */
import type { CaseProblem } from "../case/types.ts";

export const tell = (line: string): void => {
  process.stderr.write(`${line}\n`);
};

/** One line a fault: field path, what is wrong, how to mend it. */
export const problemLine = ({ path, message, mend }: CaseProblem): string =>
  `${path === "" ? "case" : path}: ${oneLine(message)}; ${oneLine(mend)}`;

export function tellProblems(problems: readonly CaseProblem[]): void {
  for (const problem of problems) tell(problemLine(problem));
}

/** What a document says may hold line ends and control characters; a terminal line must not. */
// eslint-disable-next-line no-control-regex
export const oneLine = (text: string): string =>
  text.replaceAll(/[\u0000-\u001f\u007f-\u009f\u2028\u2029]+/g, " ").trim();

/** A progress line that overwrites itself; silent where standard error is not a terminal. */
export function progressLine(): { show(doing: string, fraction: number): void; clear(): void } {
  const live = process.stderr.isTTY;
  let last = 0;
  let width = 0;
  return {
    show(doing, fraction) {
      if (!live || Date.now() - last < 100) return;
      last = Date.now();
      const line = `${oneLine(doing)}: ${Math.round(100 * fraction)} %`;
      process.stderr.write(`\r${line.padEnd(width)}`);
      width = line.length;
    },
    clear() {
      if (live && width > 0) process.stderr.write(`\r${" ".repeat(width)}\r`);
    },
  };
}

export const isPipeClosed = (error: NodeJS.ErrnoException): boolean => error.code === "EPIPE";
