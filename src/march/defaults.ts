/** Tolerances and defaults of the time schemes, each with its reason. */

/** Steps are the duration over a power of two, so that few factors serve the whole march; this is the shortest. */
export const SHORTEST_STEP_POWER = 40;

/** First step as a share of the first instant that matters: the start is where the field changes fastest. */
export const FIRST_STEP_SHARE = 1 / 8;

/** First instant that matters, as a share of the duration, when the caller names none. */
export const FIRST_INSTANT_SHARE = 1e-4;

/** A step is doubled when the error expected of the doubled one stays this factor below what is allowed. */
export const GROWTH_MARGIN = 1.25;

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
