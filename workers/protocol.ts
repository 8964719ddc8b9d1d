/** What page and worker say to each other: plain data only, so that nothing is lost on the way. */
import type { CaseResult, SolveOutcome } from "../src/run/result.ts";

export interface SolveRequest {
  /** newer jobs replace older ones: the worker ends an older job as soon as it can */
  readonly job: number;
  /** the case document, as edited */
  readonly document: unknown;
  /** "preview": coarse mesh only, for a moving hand; "settle": preview first, then refined until the accuracy is met */
  readonly depth: "preview" | "settle";
}

export type SolveEvent =
  | {
      readonly kind: "progress";
      readonly job: number;
      /** name of the stage of the treatment, or of the step of the work, in plain words */
      readonly doing: string;
      /** share done, 0 to 1 */
      readonly fraction: number;
    }
  | { readonly kind: "preview"; readonly job: number; readonly result: CaseResult };

/** What the worker exposes through Comlink. */
export interface Solver {
  /** compiles the kernels and runs one small case, so that the first edit is answered quickly */
  warm(): Promise<void>;
  solve(request: SolveRequest, onEvent: (event: SolveEvent) => void): Promise<SolveOutcome>;
  /** ends the job within some tens of milliseconds; its solve() resolves as cancelled */
  cancel(job: number): void;
}
