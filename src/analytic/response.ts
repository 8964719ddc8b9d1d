/**
 * Response of a uniform body to a sudden change of its surroundings: theta is the excess over the new surroundings as
 * a share of the starting excess, 1 at first and 0 in the end.
 */
import { MAX_SERIES_TERMS, SERIES_TOLERANCE, SKIN_LAYER_FOURIER } from "./defaults.ts";
import { GEOMETRIES } from "./geometry.ts";
import type { Geometry } from "./geometry.ts";
import { skinLayerResponse } from "./skinLayer.ts";
import { spectrumOf } from "./spectrum.ts";
import type { Mode } from "./spectrum.ts";

export interface SeriesValue {
  /** 0..1 */
  readonly theta: number;
  /** theta is within this of the exact value, rounding apart */
  readonly errorBound: number;
  /** terms summed; 0 when the skin layer form answered */
  readonly terms: number;
}

/** Place in a body: xi = x / half thickness or r / radius, 0..1, or the volume mean. */
export type Position = number | "mean";

/**
 * Theta by the full eigenfunction series, as many terms as the instant needs; in the first instants, where that
 * would be too many, by the layer under the skin. Either way with a bound on its error.
 *
 * The bound of the series: its terms fall faster than a geometric progression after the first neglected one.
 *
 * @param biot     h L / k on the half thickness or radius, 0 to Infinity
 * @param fourier  a t / L^2 on the same length, 0 or more
 * @throws RangeError for values outside these ranges
 */
export function seriesResponse(
  geometry: Geometry,
  biot: number,
  fourier: number,
  position: Position,
): SeriesValue {
  checkPlace(fourier, position);
  const exactEarly = geometry !== "cylinder" && fourier < SKIN_LAYER_FOURIER;
  if (exactEarly || fourier * (MAX_SERIES_TERMS * Math.PI) ** 2 < -Math.log(SERIES_TOLERANCE))
    return { ...skinLayerResponse(geometry, biot, fourier, position), terms: 0 };
  const spectrum = spectrumOf(geometry, biot);
  let sum = 0;
  for (let n = 1; n < MAX_SERIES_TERMS; n++) {
    sum += termOf(geometry, spectrum.mode(n), fourier, position);
    const errorBound = tailBound(spectrum.mode(n), spectrum.mode(n + 1), fourier);
    if (errorBound <= SERIES_TOLERANCE) return { theta: sum, errorBound, terms: n };
  }
  const [last, next] = [spectrum.mode(MAX_SERIES_TERMS - 1), spectrum.mode(MAX_SERIES_TERMS)];
  return { theta: sum, errorBound: tailBound(last, next, fourier), terms: MAX_SERIES_TERMS - 1 };
}

/**
 * Theta by the first term alone, as charts and hand calculations take it; meant for Fourier numbers above 0.2
 * (ONE_TERM_FOURIER), where it is within 2 % at the centre and for the mean, 4 % at the skin of a slab. Earlier it
 * overshoots 1 at the centre; nothing is clipped here.
 */
export function oneTermResponse(
  geometry: Geometry,
  biot: number,
  fourier: number,
  position: Position,
): number {
  checkPlace(fourier, position);
  return termOf(geometry, spectrumOf(geometry, biot).mode(1), fourier, position);
}

/** A direction of a product solution. */
export interface ProductFactor {
  readonly geometry: Geometry;
  readonly biot: number;
  readonly fourier: number;
  readonly position: Position;
}

/**
 * Theta of a body that is the intersection of simple ones, by the product of their thetas: a finite cylinder is a long
 * cylinder cut by a slab. Holds for a uniform start and one temperature of the surroundings; each direction may have
 * its own film. The volume mean is the product of the means.
 *
 * Source: Carslaw & Jaeger 2nd ed. 1959, secs. 1.15, 8.4.
 */
export function productResponse(factors: readonly ProductFactor[]): SeriesValue {
  let [theta, upper, terms] = [1, 1, 0];
  for (const factor of factors) {
    const value = seriesResponse(factor.geometry, factor.biot, factor.fourier, factor.position);
    theta *= value.theta;
    upper *= value.theta + value.errorBound;
    terms = Math.max(terms, value.terms);
  }
  return { theta, errorBound: upper - theta, terms };
}

/**
 * Theta of a body at one temperature throughout: exp(-Bi Fo), both numbers on volume over exposed area.
 * Within about 2 % of the starting excess for the mean at Bi = 0.1, up to 8 % at the centre of a sphere
 * (tests/data/lumped_error.csv).
 */
export function lumpedResponse(biot: number, fourier: number): number {
  return Math.exp(-biot * fourier);
}

function termOf(geometry: Geometry, mode: Mode, fourier: number, position: Position): number {
  const place = position === "mean" ? mode.mean : GEOMETRIES[geometry].shape(mode.zeta * position);
  return mode.coefficient * Math.exp(-mode.zeta * mode.zeta * fourier) * place;
}

/**
 * What all terms after `last` can add up to: |S| <= 1, |C_n| falls with n and the steps of zeta_n^2 grow with n, so
 * they stay below a geometric progression that starts with the first neglected term.
 */
function tailBound(last: Mode, next: Mode, fourier: number): number {
  const ratio = Math.exp((last.zeta * last.zeta - next.zeta * next.zeta) * fourier);
  return (Math.abs(next.coefficient) * Math.exp(-next.zeta * next.zeta * fourier)) / (1 - ratio);
}

function checkPlace(fourier: number, position: Position): void {
  if (!(fourier >= 0)) throw new RangeError(`No response at a Fourier number of ${fourier}`);
  if (position !== "mean" && !(position >= 0 && position <= 1))
    throw new RangeError(`Position ${position} is not between 0 and 1`);
}
