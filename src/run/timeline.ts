/** The stages of a run laid end to end: the field at any instant of the case. */
import type { StageHistory } from "../march/types.ts";
import type { StageSystem } from "./stageSystem.ts";

export interface StageRun {
  readonly name: string;
  /** s from the start of the case */
  readonly began: number;
  readonly ended: number;
  readonly system: StageSystem;
  /** the field before the stage, before held unknowns jump [degC] */
  readonly start: Float64Array;
  readonly history: StageHistory;
}

export interface Timeline {
  readonly stages: readonly StageRun[];
  /** s from the start of the case */
  readonly ended: number;
  /** number of unknowns */
  readonly size: number;
}

/** The stage that holds an instant; the later one at a joint. */
export function stageAt(timeline: Timeline, time: number): StageRun {
  const { stages } = timeline;
  let i = 0;
  while (i < stages.length - 1 && time >= stages[i + 1]!.began) i++;
  return stages[i]!;
}

/** The field at an instant of the case, degC per unknown, into `out`. */
export function fieldAt(timeline: Timeline, time: number, out: Float64Array): Float64Array {
  const stage = stageAt(timeline, time);
  return stage.history.at(Math.min(Math.max(time - stage.began, 0), stage.ended - stage.began), out);
}
