/**
 * Temperatures of a simple body through several stages, by its eigenfunctions (modalState.ts). Surroundings that are
 * piecewise linear in time are followed exactly; a stage with other films starts from the field before, projected onto
 * its own eigenfunctions.
 *
 * What is cut off: modes beyond those carried, which matter only in the first instants after a change. There a uniform
 * start uses the response with its own bound (response.ts); later stages are bridged from their start to the first
 * instant that their modes carry, and the share of the stage that was bridged is returned.
 */
import type { Curve } from "../case/types.ts";
import { isConstant } from "../heat/curve.ts";
import { biotNumber, fourierNumber, thermalDiffusivity } from "../heat/groups.ts";
import { straightPieces } from "../heat/signal.ts";
import type { Piece } from "../heat/signal.ts";
import {
  FEWEST_MODES,
  MOST_MODES,
  MOST_MODES_PER_DIRECTION,
  RAMP_MODES,
  STAGED_TOLERANCE,
} from "./defaults.ts";
import type { Geometry } from "./geometry.ts";
import {
  NO_DIRECTION,
  modalDirection,
  projectState,
  readAlong,
  stateAfter,
  straightRun,
  uniformState,
} from "./modalState.ts";
import type { ModalDirection, ModalState, Readings, StraightRun } from "./modalState.ts";
import { oneTermResponse, productResponse } from "./response.ts";
import type { Position } from "./response.ts";

/** One direction of a simple body: a slab by its half thickness, cylinder and sphere by their radius [m]. */
export interface Direction {
  readonly geometry: Geometry;
  readonly length: number;
}

export interface SeriesBody {
  /** one direction; or a cylinder and a slab, in this order, for the finite cylinder */
  readonly directions: readonly Direction[];
  /** W/(m K) */
  readonly conductivity: number;
  /** rho c [J/(m3 K)] */
  readonly volumetricHeatCapacity: number;
  /** degC */
  readonly start: number;
}

export interface SeriesStage {
  /** s */
  readonly duration: number;
  /** film coefficient of each direction [W/(m2 K)]; Infinity: held at the ambient, 0: insulated */
  readonly films: readonly number[];
  /** degC over the time of the stage, the same for all directions */
  readonly ambient: Curve;
}

/** degC; all of the length of the times asked for. */
export interface SeriesHistory {
  readonly core: Float64Array;
  readonly mean: Float64Array;
  /** mean of the surface; of a finite cylinder over wall and ends */
  readonly surface: Float64Array;
  /** what follows the surroundings first: the edge of a finite cylinder, else the surface */
  readonly edge: Float64Array;
  /** first term of each direction alone, at the core */
  readonly oneTermCore: Float64Array;
  /** longest share of a later stage, from its start, whose readings were bridged instead of summed; 0 when none was */
  readonly bridgedShare: number;
}

const PLACES = ["core", "mean", "surface", "edge", "oneTermCore"] as const;
type Reading = Record<(typeof PLACES)[number], number>;

/**
 * Temperatures of a simple body at given times, through all stages one after the other; exact but for rounding and a
 * cut-off below 1e-8 of the change (1e-5 where a stage ends before its modes carry it, or in the first instants of a
 * round), for constant properties, one temperature of the surroundings at a time and films that do not change within
 * a stage. The last stage goes on beyond its end when times ask for it.
 *
 * @param times  [s] from the start of the first stage, ascending, 0 or more
 * @throws RangeError for sizes or properties that are not positive, or no stage
 */
export function seriesHistory(
  body: SeriesBody,
  stages: readonly SeriesStage[],
  times: Float64Array,
): SeriesHistory {
  if (stages.length === 0) throw new RangeError("No stage to follow");
  const columns = PLACES.map(() => new Float64Array(times.length));
  let state: ModalState | null = null;
  let [began, next, bridgedShare] = [0, 0, 0];
  stages.forEach((stage, s) => {
    const end = s === stages.length - 1 ? Infinity : began + stage.duration;
    const delays = times.filter((time, i) => i >= next && time <= end).map((time) => time - began);
    const run = new StageRun(body, stage, state, delays.find((delay) => delay > 0) ?? Infinity);
    for (const delay of delays) {
      const reading = run.read(delay);
      PLACES.forEach((place, i) => (columns[i]![next] = reading[place]));
      next++;
    }
    bridgedShare = Math.max(bridgedShare, run.bridged / Math.max(stage.duration, delays.at(-1) ?? 0));
    state = run.last();
    began += stage.duration;
  });
  const [core, mean, surface, edge, oneTermCore] = columns;
  return {
    core: core!,
    mean: mean!,
    surface: surface!,
    edge: edge!,
    oneTermCore: oneTermCore!,
    bridgedShare,
  };
}

/** One stage on its way: the field at the start of each straight piece of its surroundings. */
class StageRun {
  /** [s] up to where readings were bridged; 0 when none was */
  bridged = 0;
  private readonly runs: readonly StraightRun[];
  private readonly pieces: readonly Piece[];
  /** what the stage before ended with; null when the stage starts from a uniform body */
  private readonly entry: Reading | null;
  /** [s] from here on the modes carried are enough */
  private readonly resolved: number;
  private readonly body: SeriesBody;
  private readonly stage: SeriesStage;

  constructor(body: SeriesBody, stage: SeriesStage, before: ModalState | null, firstDelay: number) {
    this.body = body;
    this.stage = stage;
    this.pieces = straightPieces(stage.ambient, stage.duration);
    const ambient = this.pieces[0]!.value;
    const [first, second] = directionsOf(body, stage, Math.min(firstDelay, stage.duration));
    const initial =
      before === null
        ? uniformState(first, second, body.start - ambient, ambient)
        : projectState(before, first, second, ambient);
    this.entry = before && readingOf(body, readAlong(straightRun(before, 0), 0));
    this.resolved = Math.max(resolvedAfter(first), resolvedAfter(second));
    this.runs = runsOf(initial, this.pieces);
  }

  /** The reading `time` [s] into the stage. */
  read(time: number): Reading {
    if (time >= this.resolved) return this.sum(time);
    if (this.entry === null) return uniformReading(this.body, this.stage, this.pieces[0]!, time);
    this.bridged = this.resolved;
    return bridge(this.entry, this.sum(this.resolved), time / this.resolved);
  }

  /** The field at the end of the stage. */
  last(): ModalState {
    const [run, piece] = [this.runs.at(-1)!, this.pieces.at(-1)!];
    return stateAfter(run.state, run.slope, piece.to - piece.from);
  }

  private sum(time: number): Reading {
    const found = this.pieces.findIndex((piece) => time <= piece.to);
    const i = found < 0 ? this.pieces.length - 1 : found;
    return readingOf(this.body, readAlong(this.runs[i]!, time - this.pieces[i]!.from));
  }
}

function runsOf(initial: ModalState, pieces: readonly Piece[]): StraightRun[] {
  const runs = [straightRun(initial, pieces[0]!.slope)];
  pieces.slice(1).forEach((piece, i) => {
    const before = pieces[i]!;
    runs.push(straightRun(stateAfter(runs[i]!.state, before.slope, before.to - before.from), piece.slope));
  });
  return runs;
}

/** The modes of both directions that a stage needs for readings from `delay` [s] on. */
function directionsOf(body: SeriesBody, stage: SeriesStage, delay: number): [ModalDirection, ModalDirection] {
  const diffusivity = thermalDiffusivity(body.conductivity, body.volumetricHeatCapacity);
  const most = body.directions.length > 1 ? MOST_MODES_PER_DIRECTION : MOST_MODES;
  const fewest = isConstant(stage.ambient) ? FEWEST_MODES : RAMP_MODES;
  const directions = body.directions.map(({ geometry, length }, d) => {
    const needed =
      Math.sqrt(-Math.log(STAGED_TOLERANCE) / fourierNumber(diffusivity, delay, length)) / Math.PI;
    const count = Math.min(most, Math.max(fewest, Math.ceil(needed) + 2));
    const biot = biotNumber(stage.films[d]!, length, body.conductivity);
    return modalDirection(geometry, biot, fourierNumber(diffusivity, 1, length), count);
  });
  return [directions[0]!, directions[1] ?? NO_DIRECTION];
}

/** [s] when the highest mode carried has decayed to the tolerance. */
function resolvedAfter({ modes, rate }: ModalDirection): number {
  return rate === 0 ? 0 : -Math.log(STAGED_TOLERANCE) / (rate * modes.at(-1)!.zeta ** 2);
}

function readingOf(body: SeriesBody, sums: Readings): Reading {
  const [first, second] = body.directions;
  if (second === undefined) {
    return {
      core: sums.core,
      mean: sums.mean,
      surface: sums.wall,
      edge: sums.wall,
      oneTermCore: sums.firstMode,
    };
  }
  const surface = meanOfSurface(first!.length, second.length, sums.wall, sums.end);
  return { core: sums.core, mean: sums.mean, surface, edge: sums.edge, oneTermCore: sums.firstMode };
}

/** Mean over wall and ends of a round: areas 2 pi R 2 H and 2 pi R^2. */
function meanOfSurface(radius: number, halfHeight: number, wall: number, end: number): number {
  return (2 * halfHeight * wall + radius * end) / (2 * halfHeight + radius);
}

/**
 * The first instants from a uniform start, by the response to a sudden change with its own bound. A ramp that goes with
 * it adds what the body has followed of it: two thirds of the last response, as for a loss that grows with sqrt(t).
 */
function uniformReading(body: SeriesBody, stage: SeriesStage, piece: Piece, time: number): Reading {
  const diffusivity = thermalDiffusivity(body.conductivity, body.volumetricHeatCapacity);
  const factors = body.directions.map(({ geometry, length }, d) => ({
    geometry,
    biot: biotNumber(stage.films[d]!, length, body.conductivity),
    fourier: fourierNumber(diffusivity, time, length),
  }));
  const toDegrees = (theta: number) =>
    piece.value + (body.start - piece.value) * theta + (2 / 3) * piece.slope * time * (1 - theta);
  const at = (...places: Position[]) =>
    toDegrees(productResponse(factors.map((factor, d) => ({ ...factor, position: places[d]! }))).theta);
  const oneTerm = factors.reduce((theta, f) => theta * oneTermResponse(f.geometry, f.biot, f.fourier, 0), 1);
  return readingOf(body, {
    core: at(0, 0),
    mean: at("mean", "mean"),
    wall: at(1, "mean"),
    end: at("mean", 1),
    edge: at(1, 1),
    firstMode: toDegrees(oneTerm),
  });
}

/** Between two readings: the core runs straight, the rest with the square root of time, as a change of film acts. */
function bridge(from: Reading, to: Reading, share: number): Reading {
  const between = (place: keyof Reading, weight: number) => from[place] + (to[place] - from[place]) * weight;
  const root = Math.sqrt(share);
  return {
    core: between("core", share),
    mean: between("mean", share),
    surface: between("surface", root),
    edge: between("edge", root),
    oneTermCore: between("oneTermCore", share),
  };
}
