/** Quadrature rules: data. */

/**
 * Seven points on the triangle, exact to degree 5 (Radon 1948; in [ZT00]): weights add up to 1 and are to be
 * multiplied by the area. Area coordinates of the first two corners.
 */
const root15 = Math.sqrt(15);
const near = (6 - root15) / 21;
const far = (6 + root15) / 21;
const nearWeight = (155 - root15) / 1200;
const farWeight = (155 + root15) / 1200;
export const TRIANGLE_POINTS: readonly (readonly [l0: number, l1: number, weight: number])[] = [
  [1 / 3, 1 / 3, 9 / 40],
  [near, near, nearWeight],
  [1 - 2 * near, near, nearWeight],
  [near, 1 - 2 * near, nearWeight],
  [far, far, farWeight],
  [1 - 2 * far, far, farWeight],
  [far, 1 - 2 * far, farWeight],
];

/** Three Gauss points on [-1, 1], exact to degree 5. */
export const LINE_POINTS: readonly (readonly [s: number, weight: number])[] = [
  [-Math.sqrt(3 / 5), 5 / 9],
  [0, 8 / 9],
  [Math.sqrt(3 / 5), 5 / 9],
];
