/** Tolerances and defaults of the time schemes, each with its reason. */

/** Steps are the duration over a power of two, so that few factors serve the whole march; this is the shortest. */
export const SHORTEST_STEP_POWER = 40;

/** First step as a share of the first instant that matters: the start is where the field changes fastest. */
export const FIRST_STEP_SHARE = 1 / 8;

/** First instant that matters, as a share of the duration, when the caller names none. */
export const FIRST_INSTANT_SHARE = 1e-4;

/** A step is doubled when the error expected of the doubled one stays this factor below what is allowed. */
export const GROWTH_MARGIN = 1.25;

/** Share of the tolerance that implicit Euler aims at: its own estimate is true to some percent, not on the safe side. */
export const AIM = 0.8;

/** Share of the tolerance left over that one implicit Euler step may use up. */
export const STEP_SHARE_OF_REMAINDER = 0.5;

/** However much of the tolerance is used up, a step may add this share of its even part: the march must go on. */
export const LEAST_STEP_SHARE = 0.05;

/** Straight interpolation between kept states may add this share of the tolerance. */
export const INTERPOLATION_SHARE = 0.1;

/** Two steps (or an instant and a knot) are equal when they differ by less than this share. */
export const SAME_INSTANT = 1e-10;

/** Factors kept at a time: the step and its half. */
export const FACTORS_KEPT = 2;

/**
 * Numbers of the Krylov march. Shifts and counts come from a study on eight meshes (shift 0.003 to 0.1 of the span, 15 to
 * 60 vectors, first instant 1e-4 to 1e-2 of the span).
 */
export const KRYLOV = {
  /** shift g as a share of the span: smaller where early instants matter */
  shiftEarly: 0.005,
  shiftLate: 0.01,
  /** a first instant beyond this share of the span counts as late */
  lateShare: 0.01,
  /** a kept basis serves when its shift is within this factor of the one wished for */
  shiftSlack: 2,
  /** vectors before the first check, and between two checks */
  leastVectors: 10,
  checkEvery: 5,
  /** beyond this a second basis for the early instants is cheaper than more vectors */
  vectorsBeforeParting: 40,
  /** beyond this the three-term recursion begins to lose digits */
  mostVectors: 60,
  /** parting pays when the second basis has at most this share of the span left to serve */
  worthParting: 0.3,
  /** bases one behind the other, each for earlier instants than the one before */
  mostSpans: 5,
  /** factors kept of one system, one per shift; at least `mostSpans` */
  layersKept: 6,
  /** knots behind which the error is looked at; more are sampled */
  mostKnotsChecked: 16,
  /** stated error over estimated error: the estimate is within a factor of two of the truth */
  safety: 2,
  /** a next Lanczos vector this short means that the basis is exact */
  breakdown: 1e-14,
  /** rounding can make an eigenvalue 0 or negative */
  leastTheta: 1e-14,
} as const;
