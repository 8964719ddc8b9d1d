/** Where the power series of erf hands over to the continued fraction of the scaled complement. */
const SERIES_BELOW = 2;
/** Terms of the continued fraction: enough for full precision at 2, where it is slowest. */
const FRACTION_TERMS = 120;

/**
 * Scaled complementary error function exp(x^2) erfc(x), to about 1e-14 for x above -5 (beyond, it overflows soon).
 *
 * Power series of erf below 2, Laplace's continued fraction above.
 * Source: Abramowitz & Stegun 7.1.6, 7.1.14 (from memory; checked against tests/data/semi_infinite_convection.csv).
 */
export function scaledErfc(x: number): number {
  if (x === Infinity) return 0;
  if (x < 0) return 2 * Math.exp(x * x) - scaledErfc(-x);
  return x < SERIES_BELOW ? Math.exp(x * x) - scaledErf(x) : continuedFraction(x);
}

/** exp(x^2) erf(x) = 2/sqrt(pi) sum of 2^n x^(2n+1) / (1 3 5 ... (2n+1)): all terms positive. */
function scaledErf(x: number): number {
  let term = x;
  let sum = x;
  for (let n = 1; term > sum * 1e-17; n++) {
    term *= (2 * x * x) / (2 * n + 1);
    sum += term;
  }
  return (2 / Math.sqrt(Math.PI)) * sum;
}

/** 1/sqrt(pi) / (x + (1/2)/(x + (2/2)/(x + (3/2)/(x + ...)))), from the inside out. */
function continuedFraction(x: number): number {
  let tail = x;
  for (let n = FRACTION_TERMS; n >= 1; n--) tail = x + n / 2 / tail;
  return 1 / (Math.sqrt(Math.PI) * tail);
}
