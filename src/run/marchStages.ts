/** The stages one after the other, each from the field before. */
import type { Case, Stage } from "../case/types.ts";
import { chooseScheme } from "../march/chooseScheme.ts";
import type { MarchProgress, SchemeName, Signal, StageHistory } from "../march/types.ts";
import type { NamedSide } from "./conditions.ts";
import { Cancelled, pause } from "./context.ts";
import type { RunContext } from "./context.ts";
import { firstReached, reached } from "../heat/crossings.ts";
import type { Going } from "../heat/crossings.ts";
import { FIRST_INSTANT_SHARE } from "./defaults.ts";
import type { KeptWork } from "./kept.ts";
import { keptInstants } from "./instants.ts";
import { buildStage } from "./stageSystem.ts";
import type { PartSystem } from "./partSystem.ts";
import type { StageSystem } from "./stageSystem.ts";
import type { StageRun, Timeline } from "./timeline.ts";
import { trackFor } from "./tracks.ts";
import type { Tracks } from "./tracks.ts";

export interface MarchSettings {
  readonly scheme: SchemeName | undefined;
  /** error in time aimed at [K] */
  readonly tolerance: number;
  /** instants that questions name [s from the start of the case] */
  readonly asked: readonly number[];
}

export interface MarchedCase {
  readonly timeline: Timeline;
  readonly warnings: readonly string[];
  /** false when the host ended the run before the last stage was through */
  readonly complete: boolean;
}

/** Marches all stages. When the host cancels, what was reached so far comes back as an incomplete case. */
export async function marchStages(
  input: Case,
  sides: readonly NamedSide[],
  part: PartSystem,
  tracks: Tracks,
  settings: MarchSettings,
  context: RunContext,
  kept: KeptWork,
): Promise<MarchedCase> {
  const stages: StageRun[] = [];
  const warnings: string[] = [];
  let field = part.start;
  let began = 0;
  let complete = true;
  for (const stage of input.stages) {
    const system = buildStage(input, sides, part, stage, kept);
    const asked = settings.asked.map((time) => time - began);
    const marched = await marchStage(stage, system, field, { ...settings, asked }, context, kept);
    if (!marched) {
      complete = false;
      break;
    }
    const { history } = marched;
    complete = marched.complete;
    const span = endOf(stage, system, history, tracks, warnings);
    stages.push({ name: stage.name, began, ended: began + span, system, start: field, history });
    if (!complete) break;
    field = history.at(span, new Float64Array(field.length));
    began += span;
  }
  return {
    timeline: { stages, ended: stages.at(-1)?.ended ?? 0, size: part.start.length },
    warnings,
    complete,
  };
}

async function marchStage(
  stage: Stage,
  system: StageSystem,
  start: Float64Array,
  settings: MarchSettings,
  context: RunContext,
  kept: KeptWork,
): Promise<{ history: StageHistory; complete: boolean } | null> {
  const earliest = settings.asked.filter((time) => time > 0).map((time) => time / 2);
  const march = chooseScheme(settings.scheme)(system.linear, start, {
    duration: stage.lasts,
    tolerance: settings.tolerance,
    workspace: kept.workspace,
    firstInstant: Math.min(FIRST_INSTANT_SHARE * stage.lasts, ...earliest),
  });
  let last: MarchProgress | undefined;
  try {
    for (;;) {
      const step = march.next();
      if (step.done) return { history: step.value, complete: true };
      last = step.value;
      context.progress(stage.name, step.value.fraction);
      await pause(context);
    }
  } catch (error) {
    if (!(error instanceof Cancelled)) throw error;
    march.return(undefined as never);
    const history = last?.soFar?.();
    return history ? { history, complete: false } : null;
  }
}

/** How long the stage lasts: to the end of what was marched, or until its condition is met. */
function endOf(
  stage: Stage,
  system: StageSystem,
  history: StageHistory,
  tracks: Tracks,
  warnings: string[],
): number {
  const longest = history.times[history.times.length - 1]!;
  if (!stage.until) return longest;
  const { where, reaches } = stage.until;
  const field = new Float64Array(system.filmWeights.length);
  const going = stage.until.going ?? goingFrom(tracks.mean.of(history.at(0, field)), reaches);
  const track = trackFor(tracks, where, going);
  const at = (time: number): number => track.of(history.at(time, field));
  const times = keptInstants(longest, signalsOf(system), []);
  const values = times.map(at);
  const met = firstReached({ times, values, at }, reaches, going);
  if (met === null) {
    warnings.push(
      `Stage "${stage.name}" ran to its longest, ${longest} s, and ${where} had not reached ${reaches} degC: it was at ${values.at(-1)!.toFixed(1)}.`,
    );
    return longest;
  }
  if (met === 0 && reached(values[0]!, reaches, going))
    warnings.push(
      `Stage "${stage.name}" was over at once: ${where} was already at ${values[0]!.toFixed(1)} degC.`,
    );
  return met;
}

export const signalsOf = (system: StageSystem): Signal[] => [
  ...system.linear.loads.map((load) => load.signal),
  ...system.linear.held.map((held) => held.signal),
];

/** From where the part is, which way a level lies. */
export const goingFrom = (value: number, level: number): Going => (value > level ? "down" : "up");
