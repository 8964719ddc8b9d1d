/**
 * The first instants, when the change has only reached a layer under the skin and a series would need thousands of
 * terms. With depth x = 1 - xi, H = Bi - m and m = 0, 1/2, 1 for slab, cylinder, sphere:
 *
 *   1 - theta = xi^(-m) (Bi/H) exp(-eta^2) [e(eta) - e(eta + H sqrt(Fo))],   eta = x / (2 sqrt(Fo)),
 *
 * where e(x) = exp(x^2) erfc(x). This is the semi-infinite solid with convection (Carslaw & Jaeger 2nd ed. 1959,
 * sec. 2.7, eq. 1) for xi^m (1 - theta), which obeys the plane equation: exactly for slab and sphere until the far
 * side answers, and for the cylinder up to the term 1/(4 xi^2), a share of about Fo/4.
 */
import { scaledErfc } from "./erfc.ts";
import { GEOMETRIES } from "./geometry.ts";
import type { Geometry } from "./geometry.ts";

/** Below this H sqrt(Fo) the difference of two near values is replaced by its power series. */
const SMALL = 1e-4;
const SMALL_MEAN = 1e-2;
/** e(y) = sum of (-y)^n / gamma(n/2 + 1): the coefficients from n = 2 on. */
const ROOT_PI = Math.sqrt(Math.PI);
const E_COEFFICIENTS = [
  1,
  -4 / (3 * ROOT_PI),
  1 / 2,
  -8 / (15 * ROOT_PI),
  1 / 6,
  -16 / (105 * ROOT_PI),
  1 / 24,
];

export interface EarlyValue {
  readonly theta: number;
  readonly errorBound: number;
}

/**
 * Theta at a place, or of the volume mean, at small Fourier numbers (0.01 and below; the smaller the better).
 *
 * @param xi  position 0..1, or "mean"
 */
export function skinLayerResponse(
  geometry: Geometry,
  biot: number,
  fourier: number,
  xi: number | "mean",
): EarlyValue {
  const m = (GEOMETRIES[geometry].dimension - 1) / 2;
  if (fourier === 0 || biot === 0) return { theta: biot === Infinity && xi === 1 ? 0 : 1, errorBound: 0 };
  const loss = xi === "mean" ? meanLoss(m, biot, fourier) : lossAt(m, biot, fourier, xi);
  // share of the neglected 1/(4 xi^2), doubled; and what the far side has answered
  const far = Math.exp(-1 / (4 * fourier));
  return { theta: 1 - loss, errorBound: 2 * m * (1 - m) * fourier * Math.min(1, loss) + far };
}

function lossAt(m: number, biot: number, fourier: number, xi: number): number {
  const eta = (1 - xi) / (2 * Math.sqrt(fourier));
  const damping = Math.exp(-eta * eta);
  if (damping === 0 || xi === 0) return 0;
  return (damping * layer(biot, biot - m, fourier, eta)) / xi ** m;
}

/** (Bi/H) [e(eta) - e(eta + H sqrt(Fo))], also where H is 0 or infinite. */
function layer(biot: number, h: number, fourier: number, eta: number): number {
  if (biot === Infinity) return scaledErfc(eta);
  const y = h * Math.sqrt(fourier);
  if (Math.abs(y) > SMALL) return (biot / h) * (scaledErfc(eta) - scaledErfc(eta + y));
  const e = scaledErfc(eta);
  const e1 = 2 * eta * e - 2 / ROOT_PI;
  const e2 = 2 * e + 2 * eta * e1;
  return -biot * Math.sqrt(fourier) * (e1 + (y / 2) * e2);
}

/** Heat lost so far over heat to lose: (2m + 1) times the integral of Bi theta(surface) over Fo. */
function meanLoss(m: number, biot: number, fourier: number): number {
  const plane = 2 * Math.sqrt(fourier / Math.PI);
  if (biot === Infinity) return (2 * m + 1) * (plane - m * fourier);
  const h = biot - m;
  const y = h * Math.sqrt(fourier);
  // integral of e(H sqrt(tau)) over 0..Fo, divided by Fo
  const integral =
    Math.abs(y) > SMALL_MEAN ? (scaledErfc(y) - 1 + (2 * y) / ROOT_PI) / (y * y) : polynomial(y);
  // theta(surface) = 1 - (Bi/H)(1 - e): integrated, with 1 - integral of order y so that H may vanish
  const share = Math.abs(y) > SMALL_MEAN ? (1 - integral) / h : Math.sqrt(fourier) * oneMinusOverY(y);
  return (2 * m + 1) * biot * fourier * (1 - biot * share);
}

/** (e(y) - 1 + 2y/sqrt(pi)) / y^2 */
function polynomial(y: number): number {
  return E_COEFFICIENTS.reduceRight((sum, c) => sum * y + c, 0);
}

/** (1 - polynomial(y)) / y */
function oneMinusOverY(y: number): number {
  return -E_COEFFICIENTS.slice(1).reduceRight((sum, c) => sum * y + c, 0);
}
