/** One mesh, the whole case on it: the unit of work that refinement repeats. */
import type { TriangleMesh } from "../../mesh/types.ts";
import type { Case } from "../case/types.ts";
import type { ElementOrder } from "../fem/elementMesh.ts";
import type { NamedSide } from "./conditions.ts";
import type { RunContext } from "./context.ts";
import { heatLedger } from "./ledger.ts";
import type { Ledger } from "./ledger.ts";
import { marchStages } from "./marchStages.ts";
import type { MarchSettings } from "./marchStages.ts";
import { answerQuestion } from "./questions.ts";
import type { FieldAnswer } from "./questions.ts";
import { recordRun } from "./record.ts";
import type { Recording } from "./record.ts";
import type { KeptWork } from "./kept.ts";
import { buildPart } from "./partSystem.ts";
import type { PartSystem } from "./partSystem.ts";
import { fieldAt } from "./timeline.ts";
import type { Timeline } from "./timeline.ts";
import { buildTracks } from "./tracks.ts";
import type { Tracks } from "./tracks.ts";

export interface Level {
  readonly mesh: TriangleMesh;
  readonly part: PartSystem;
  readonly timeline: Timeline;
  readonly recording: Recording;
  readonly ledger: Ledger;
  readonly answers: readonly FieldAnswer[];
  /** temperatures of all tracks at a few instants, to see how far the field as a whole still moves [degC] */
  readonly soundings: readonly number[];
  readonly warnings: readonly string[];
  /** false: the host ended the run; what was reached is here */
  readonly complete: boolean;
}

/** Shares of the run at which soundings are taken: from its first twentieth on. */
export const SOUNDING_SHARES = [0.05, 0.1, 0.2, 0.4, 0.7, 1];

/** Solves the case on one mesh. null when the host ended the run before anything was reached. */
export async function solveLevel(
  input: Case,
  sides: readonly NamedSide[],
  mesh: TriangleMesh,
  element: ElementOrder,
  settings: MarchSettings,
  context: RunContext,
  kept: KeptWork,
): Promise<Level | null> {
  const part = buildPart(input, sides, mesh, element, kept);
  const probeNodes = new Map(input.probes.map((probe, i) => [probe.name, mesh.pointNodes[i]!]));
  const tracks = buildTracks(part, probeNodes);
  const { timeline, warnings, complete } = await marchStages(
    input,
    sides,
    part,
    tracks,
    settings,
    context,
    kept,
  );
  if (timeline.stages.length === 0) return null;
  const recording = recordRun(part, tracks, timeline, settings.asked);
  const asked = { part, tracks, timeline, history: recording.history };
  return {
    mesh,
    part,
    timeline,
    recording,
    ledger: heatLedger(part, timeline),
    answers: input.questions.map((question) => answerQuestion(question, asked)),
    soundings: soundField(timeline, tracks),
    warnings,
    complete,
  };
}

function soundField(timeline: Timeline, tracks: Tracks): number[] {
  const field = new Float64Array(timeline.size);
  const all = [tracks.coldest, tracks.hottest, tracks.mean, tracks.surfaceMean, ...tracks.probes.values()];
  return SOUNDING_SHARES.flatMap((share) => {
    fieldAt(timeline, share * timeline.ended, field);
    return all.map((track) => track.of(field));
  });
}
