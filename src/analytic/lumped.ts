/**
 * The one-temperature (lumped) estimate: the part is taken to have one temperature, all resistance lies in the films.
 *
 *   C dT/dt = sum over sides of A (h (Tamb(t) - T) + q(t)) + S(t),      C = rho c V.
 *
 * With ambients, fluxes and sources piecewise linear in time this is solved exactly: on a straight piece with
 * G = sum h A and input P(t) = P0 + P1 t,
 *
 *   T(t) = T0 + [(P0 - G T0) t f1(-G t / C) + P1 t^2 f2(-G t / C)] / C,
 *   f1(z) = (e^z - 1) / z,   f2(z) = (f1(z) - 1) / z,
 *
 * which also holds where nothing is lost (G = 0).
 */
import type { Curve } from "../case/types.ts";
import { addCurves, straightPieces } from "../heat/signal.ts";
import type { Piece } from "../heat/signal.ts";

/** A side as the one-temperature estimate sees it; curves are over the time of the stage. */
export interface LumpedSide {
  /** m2 */
  readonly area: number;
  /** film coefficient [W/(m2 K)], 0 when nothing passes by a film */
  readonly film: number;
  /** degC */
  readonly ambient: Curve;
  /** W/m2 into the part */
  readonly flux: Curve;
}

export interface LumpedStage {
  /** s */
  readonly duration: number;
  readonly sides: readonly LumpedSide[];
  /** W released inside the part */
  readonly source: Curve;
}

export interface LumpedBody {
  /** rho c V [J/K], positive */
  readonly heatCapacity: number;
  /** degC */
  readonly start: number;
}

/**
 * Temperature of the part [degC] at given times, through all stages one after the other. Exact to rounding for
 * constant films and heat capacity; the last stage goes on beyond its end when times ask for it.
 *
 * @param times  [s] from the start of the first stage, ascending, 0 or more
 * @throws RangeError for a heat capacity that is not positive, an infinite film, or no stage
 */
export function lumpedHistory(
  body: LumpedBody,
  stages: readonly LumpedStage[],
  times: Float64Array,
): Float64Array {
  if (!(body.heatCapacity > 0) || stages.length === 0)
    throw new RangeError(`Nothing to march: heat capacity ${body.heatCapacity}, ${stages.length} stages`);
  const out = new Float64Array(times.length);
  let [temperature, began, next] = [body.start, 0, 0];
  stages.forEach((stage, s) => {
    const conductance = filmConductance(stage);
    for (const piece of straightPieces(heatInput(stage), stage.duration)) {
      const advance = (time: number) =>
        advanceLumped(body.heatCapacity, conductance, piece, temperature, time);
      const last = s === stages.length - 1 && piece.to === stage.duration;
      while (next < times.length && (last || times[next]! <= began + piece.to)) {
        out[next] = advance(times[next]! - began - piece.from);
        next++;
      }
      temperature = advance(piece.to - piece.from);
    }
    began += stage.duration;
  });
  return out;
}

/** Sum of film times area [W/K]. */
export function filmConductance(stage: LumpedStage): number {
  const sum = stage.sides.reduce((total, side) => total + side.film * side.area, 0);
  if (!Number.isFinite(sum)) throw new RangeError("A film of the one-temperature estimate must be finite");
  return sum;
}

/** What would flow in if the part were at 0 degC [W], over the time of the stage. */
function heatInput(stage: LumpedStage): Curve {
  return addCurves([
    ...stage.sides.map((side) => ({ weight: side.film * side.area, curve: side.ambient })),
    ...stage.sides.map((side) => ({ weight: side.area, curve: side.flux })),
    { weight: 1, curve: stage.source },
  ]);
}

function advanceLumped(
  heatCapacity: number,
  conductance: number,
  input: Piece,
  start: number,
  time: number,
): number {
  const z = (-conductance * time) / heatCapacity;
  const steady = (input.value - conductance * start) * time * firstPhi(z);
  return start + (steady + input.slope * time * time * secondPhi(z)) / heatCapacity;
}

/** (e^z - 1) / z */
export function firstPhi(z: number): number {
  return z === 0 ? 1 : Math.expm1(z) / z;
}

/** (f1(z) - 1) / z, by its power series where the closed form would cancel */
export function secondPhi(z: number): number {
  if (Math.abs(z) > 0.1) return (firstPhi(z) - 1) / z;
  return 1 / 2 + (z / 6) * (1 + (z / 4) * (1 + (z / 5) * (1 + (z / 6) * (1 + (z / 7) * (1 + z / 8)))));
}
