/** Curves and fields of a run at its kept instants: what charts, files and the first look at answers read. */
import { FRAME_COUNT } from "./defaults.ts";
import { keptInstants } from "./instants.ts";
import { heatWeights } from "./ledger.ts";
import { signalsOf } from "./marchStages.ts";
import type { Frames, History } from "./result.ts";
import type { PartSystem } from "./partSystem.ts";
import { fieldAt } from "./timeline.ts";
import type { Timeline } from "./timeline.ts";
import { dot } from "./tracks.ts";
import type { Tracks } from "./tracks.ts";

export interface Recording {
  readonly history: History;
  readonly frames: Frames;
}

/** All kept instants of the case, ascending, each once; a joint of stages is one instant. */
export function caseInstants(timeline: Timeline, asked: readonly number[]): Float64Array {
  const instants: number[] = [];
  for (const stage of timeline.stages) {
    const inStage = asked.map((time) => time - stage.began);
    for (const time of keptInstants(stage.ended - stage.began, signalsOf(stage.system), inStage)) {
      const instant = stage.began + time;
      if (instants.length === 0 || instant > instants.at(-1)!) instants.push(instant);
    }
  }
  return Float64Array.from(instants);
}

/** Walks once through the kept instants: curves from every field, and some of the fields themselves. */
export function recordRun(
  part: PartSystem,
  tracks: Tracks,
  timeline: Timeline,
  asked: readonly number[],
): Recording {
  const time = caseInstants(timeline, asked);
  const curve = (): Float64Array => new Float64Array(time.length);
  const [coldest, hottest, mean, surfaceMean, heat] = [curve(), curve(), curve(), curve(), curve()];
  const probes = new Map([...tracks.probes.keys()].map((name) => [name, curve()]));
  const weights = heatWeights(part);
  const startHeat = dot(weights, part.start);
  const field = new Float64Array(timeline.size);
  const every = Math.max(1, Math.ceil(time.length / FRAME_COUNT));
  const wanted = new Set(asked);
  const frameTimes: number[] = [];
  const temperatures: Float32Array[] = [];
  const core = slowestPoint(part, timeline, time);
  const coreTemperature = curve();
  for (let i = 0; i < time.length; i++) {
    fieldAt(timeline, time[i]!, field);
    coldest[i] = tracks.coldest.of(field);
    hottest[i] = tracks.hottest.of(field);
    mean[i] = tracks.mean.of(field);
    surfaceMean[i] = tracks.surfaceMean.of(field);
    heat[i] = dot(weights, field) - startHeat;
    for (const [name, values] of probes) values[i] = tracks.probes.get(name)!.of(field);
    coreTemperature[i] = field[core]!;
    if (i % every === 0 || i === time.length - 1 || wanted.has(time[i]!)) {
      frameTimes.push(time[i]!);
      temperatures.push(Float32Array.from(field));
    }
  }
  return {
    history: {
      time,
      coldest,
      hottest,
      mean,
      surfaceMean,
      heat,
      probes: Object.fromEntries(probes),
      core: {
        place: [part.mesh.nodes[2 * core]!, part.mesh.nodes[2 * core + 1]!],
        temperature: coreTemperature,
      },
    },
    frames: { times: Float64Array.from(frameTimes), temperatures },
  };
}

/** Instants of the first stage from which the slowest point is told: it lies where the field is flat, so few will do. */
const LAG_INSTANTS = 24;

/**
 * The slowest point: the unknown whose temperature, integrated over the first stage, has moved least in the direction in
 * which the part as a whole moved. Found, not assumed.
 */
function slowestPoint(part: PartSystem, timeline: Timeline, time: Float64Array): number {
  const first = time.filter((instant) => instant <= timeline.stages[0]!.ended);
  const every = Math.max(1, Math.floor(first.length / LAG_INSTANTS));
  const moved = new Float64Array(timeline.size);
  const field = new Float64Array(timeline.size);
  let last = 0;
  for (let i = every; i < first.length; i += every) {
    fieldAt(timeline, first[i]!, field);
    for (let j = 0; j < field.length; j++) moved[j]! += (first[i]! - last) * (field[j]! - part.start[j]!);
    last = first[i]!;
  }
  const direction = Math.sign(dot(part.interior.volumes, moved)) || 1;
  let slowest = 0;
  for (let i = 1; i < moved.length; i++) if (direction * moved[i]! < direction * moved[slowest]!) slowest = i;
  return slowest;
}
