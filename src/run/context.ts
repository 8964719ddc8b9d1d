/** What the host of a run (worker, command line, test) supplies: cancel, progress, pauses. */
import type { KeptWork } from "./kept.ts";
import type { CaseResult } from "./result.ts";

export interface RunContext {
  /** true once the run should end; asked between steps */
  cancelled(): boolean;
  /** what is being worked on, in plain words, and the share of it that is done, 0 to 1 */
  progress(doing: string, fraction: number): void;
  /** a pause that lets a cancel or a message in; absent: the run does not pause */
  breathe?(): Promise<void>;
  /** the answers of a mesh that will still be refined */
  preview?(result: CaseResult): void;
  /** work kept from earlier runs, for a host that runs many; without it the run keeps its own and gives it back */
  readonly kept?: KeptWork;
  /** wall clock [s], for information only */
  clock(): number;
}

/** Thrown through the run to end it; solveCase turns it into a result, so no caller sees it. */
export class Cancelled extends Error {
  constructor() {
    super("cancelled");
    this.name = "Cancelled";
  }
}

/** Lets the host in, and ends the run when it asks for that. */
export async function pause(context: RunContext): Promise<void> {
  await context.breathe?.();
  if (context.cancelled()) throw new Cancelled();
}
