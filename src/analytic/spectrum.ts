/** Eigenvalues of one shape at one Biot number, with everything a series needs of each, found as far as needed. */
import { findRoot } from "./findRoot.ts";
import { GEOMETRIES } from "./geometry.ts";
import type { Geometry, GeometryFunctions } from "./geometry.ts";

/** One term of a series. */
export interface Mode {
  /** eigenvalue, 0 only for an insulated surface */
  readonly zeta: number;
  /** C_n: share of this term in a uniform start, so that theta = sum C_n exp(-zeta_n^2 Fo) S(zeta_n xi) */
  readonly coefficient: number;
  /** volume mean of its eigenfunction; coefficient times this is D_n, the coefficient of the mean */
  readonly mean: number;
  /** S(1) and S'(1) */
  readonly surface: number;
  readonly surfaceSlope: number;
  /** integral of w S^2 over 0..1 */
  readonly norm: number;
}

/**
 * The modes of one shape at one Biot number (0: insulated, Infinity: held surface). Holds those found so far; asking
 * for more finds more.
 */
export class Spectrum {
  readonly geometry: Geometry;
  readonly biot: number;
  private readonly found: Mode[] = [];
  private readonly functions: GeometryFunctions;

  constructor(geometry: Geometry, biot: number) {
    if (!(biot >= 0)) throw new RangeError(`No eigenvalues for a Biot number of ${biot}`);
    this.geometry = geometry;
    this.biot = biot;
    this.functions = GEOMETRIES[geometry];
  }

  /** Mode n, from 1. */
  mode(n: number): Mode {
    while (this.found.length < n) this.found.push(this.find(this.found.length + 1));
    return this.found[n - 1]!;
  }

  /** The first `count` modes. */
  modes(count: number): readonly Mode[] {
    this.mode(count);
    return this.found.slice(0, count);
  }

  private find(n: number): Mode {
    const { geometry, biot, functions } = this;
    const zeta = eigenvalue(geometry, biot, n);
    const [mean, norm] = [functions.mean(zeta), functions.norm(zeta)];
    const held = biot === Infinity;
    const surface = held ? 0 : functions.shape(zeta);
    const surfaceSlope = held ? -zeta * functions.steepness(zeta) : -biot * surface;
    // a uniform insulated body stays uniform: only its first mode takes part, and rounding must not say otherwise
    const coefficient = biot === 0 && n > 1 ? 0 : mean / (functions.dimension * norm);
    return { zeta, coefficient, mean, surface, surfaceSlope, norm };
  }
}

/**
 * Eigenvalue zeta_n of a shape.
 *
 * Found to rounding for Biot numbers from 0 (insulated: the first is 0) over 1e-12 to 1e12 and Infinity (held).
 *
 * @param n  1, 2, 3, ...
 * @throws RangeError for a Biot number below 0 or NaN
 */
export function eigenvalue(geometry: Geometry, biot: number, n: number): number {
  if (!(biot >= 0)) throw new RangeError(`No eigenvalue for a Biot number of ${biot}`);
  const { characteristic, bracket, heldBracket, shape, steepness } = GEOMETRIES[geometry];
  if (biot === Infinity) return findRoot(shape, ...heldBracket(n));
  if (biot > 0) return findRoot((zeta) => characteristic(zeta, biot), ...bracket(n));
  if (n === 1) return 0;
  if (geometry === "slab") return (n - 1) * Math.PI;
  // zeros of S': J1 or tan zeta = zeta, number n - 1, in the lower half of the bracket of root n
  return findRoot(steepness, (n - 1) * Math.PI, (n - 0.5) * Math.PI);
}

/** Spectra of the last few shapes and Biot numbers asked for: many instants and places share one. */
const recent = new Map<string, Spectrum>();
const RECENT_SPECTRA = 24;

/** The spectrum of a shape at a Biot number, from the last few used where it is among them. */
export function spectrumOf(geometry: Geometry, biot: number): Spectrum {
  const key = `${geometry} ${biot}`;
  const spectrum = recent.get(key) ?? new Spectrum(geometry, biot);
  recent.delete(key);
  recent.set(key, spectrum);
  if (recent.size > RECENT_SPECTRA) recent.delete(recent.keys().next().value!);
  return spectrum;
}
