/** Relative distance of the last two guesses at which a root is taken as found. */
const RELATIVE_TOLERANCE = 1e-15;
const MAX_ITERATIONS = 100;

/**
 * Root of a continuous function between two places where its signs differ, by Ridders' method: the bracket always
 * holds the root, and the correct digits about double at every step.
 *
 * Source: C. J. F. Ridders, IEEE Trans. Circuits and Systems 26 (1979) 979 (from memory).
 *
 * @throws RangeError when the signs do not differ, with the numbers
 */
export function findRoot(f: (x: number) => number, left: number, right: number): number {
  let [a, b, fa, fb] = [left, right, f(left), f(right)];
  if (fa === 0) return a;
  if (fb === 0) return b;
  if (!(fa < 0 !== fb < 0) || Number.isNaN(fa + fb))
    throw new RangeError(`No change of sign between ${left} (${fa}) and ${right} (${fb})`);
  let guess = NaN;
  for (let i = 0; i < MAX_ITERATIONS; i++) {
    const middle = (a + b) / 2;
    const fm = f(middle);
    if (fm === 0) return middle;
    const x = middle + ((middle - a) * Math.sign(fa) * fm) / Math.sqrt(fm * fm - fa * fb);
    const fx = f(x);
    if (fx === 0 || Math.abs(x - guess) <= RELATIVE_TOLERANCE * Math.abs(x)) return x;
    guess = x;
    // the new bracket: the two of middle, x and the old ends that lie next to each other with different signs
    if (fm < 0 !== fx < 0) [a, fa, b, fb] = [middle, fm, x, fx];
    else if (fa < 0 !== fx < 0) [b, fb] = [x, fx];
    else [a, fa] = [x, fx];
  }
  return guess;
}
