/**
 * Functions of exponential integrators, for x >= 0:
 *
 *   phi1 = (1 - e^-x) / x,   phi2 = (x - 1 + e^-x) / x^2,   phi3 = (x^2/2 - x + 1 - e^-x) / x^3,
 *
 * the integrals over a step of 1, s and s^2/2 against e^-(x (1 - s)). Power series near 0, where the formulas cancel.
 */
const SERIES_BELOW = 0.5;
const SERIES_TERMS = 14;

export const phi1 = (x: number): number => (x < 1e-8 ? 1 - x / 2 : -Math.expm1(-x) / x);

export const phi2 = (x: number): number => (x < SERIES_BELOW ? series(x, 2) : (x + Math.expm1(-x)) / (x * x));

export const phi3 = (x: number): number =>
  x < SERIES_BELOW ? series(x, 3) : (x * x * 0.5 - x - Math.expm1(-x)) / (x * x * x);

/** sum over k of (-x)^k / (k + order)! */
function series(x: number, order: number): number {
  let term = order === 2 ? 1 / 2 : 1 / 6;
  let sum = term;
  for (let k = 1; k < SERIES_TERMS; k++) {
    term *= -x / (k + order);
    sum += term;
  }
  return sum;
}
