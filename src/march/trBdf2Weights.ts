/** Constants of TR-BDF2; see trBdf2.ts for the formulas. */

/** where the trapezoidal stage ends, as a share of the step: both stages then have the same matrix */
export const GAMMA = 2 - Math.SQRT2;
/** weight of K in that matrix, as a share of the step */
export const DIAGONAL = GAMMA / 2;
/** share of the middle value in the BDF2 stage */
export const BDF_SHARE = 1 / (GAMMA * (2 - GAMMA));
/** weights of the rates at the beginning, in the middle and at the end */
export const STEP_WEIGHTS = [Math.SQRT2 / 4, Math.SQRT2 / 4, DIAGONAL] as const;
/** the same less those of the embedded third-order formula; they add up to 0 */
export const ERROR_WEIGHTS = [
  (4 * STEP_WEIGHTS[0] - 1) / 3,
  STEP_WEIGHTS[1] - (3 * STEP_WEIGHTS[1] + 1) / 3,
  (2 * DIAGONAL) / 3,
] as const;
