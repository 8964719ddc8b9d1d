/** Curves and fields of a run at its kept instants: what charts, files and the first look at answers read. */
import { FRAME_COUNT } from "./defaults.ts";
import { keptInstants } from "./instants.ts";
import { heatWeights } from "./ledger.ts";
import { signalsOf } from "./marchStages.ts";
import type { Frames, History } from "./result.ts";
import type { PartSystem } from "./stageSystem.ts";
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
  const lag = new LagSum(part.start);
  for (let i = 0; i < time.length; i++) {
    fieldAt(timeline, time[i]!, field);
    coldest[i] = tracks.coldest.of(field);
    hottest[i] = tracks.hottest.of(field);
    mean[i] = tracks.mean.of(field);
    surfaceMean[i] = tracks.surfaceMean.of(field);
    heat[i] = dot(weights, field) - startHeat;
    for (const [name, values] of probes) values[i] = tracks.probes.get(name)!.of(field);
    if (time[i]! <= timeline.stages[0]!.ended) lag.add(time[i]!, field);
    if (i % every === 0 || i === time.length - 1 || wanted.has(time[i]!)) {
      frameTimes.push(time[i]!);
      temperatures.push(Float32Array.from(field));
    }
  }
  const core = lag.slowest(part);
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
        temperature: Float64Array.from(time, (instant) => fieldAt(timeline, instant, field)[core]!),
      },
    },
    frames: { times: Float64Array.from(frameTimes), temperatures },
  };
}

/**
 * Finds the slowest point: the unknown whose temperature, integrated over the first stage, has moved least in the
 * direction in which the part as a whole moved. Found, not assumed.
 */
class LagSum {
  readonly #moved: Float64Array;
  readonly #start: Float64Array;
  #last: Float64Array;
  #time = 0;

  constructor(start: Float64Array) {
    this.#start = start;
    this.#moved = new Float64Array(start.length);
    this.#last = start.slice();
  }

  /** trapezoidal rule from the instant added before */
  add(time: number, field: Float64Array): void {
    const half = (time - this.#time) / 2;
    for (let i = 0; i < field.length; i++)
      this.#moved[i]! += half * (field[i]! + this.#last[i]! - 2 * this.#start[i]!);
    this.#last.set(field);
    this.#time = time;
  }

  slowest(part: PartSystem): number {
    const direction = Math.sign(dot(part.interior.volumes, this.#moved)) || 1;
    let best = 0;
    for (let i = 1; i < this.#moved.length; i++)
      if (direction * this.#moved[i]! < direction * this.#moved[best]!) best = i;
    return best;
  }
}
