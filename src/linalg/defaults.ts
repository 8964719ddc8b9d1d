/** Tolerances and defaults of the linear algebra, each with its reason. */

/**
 * Relative residual at which conjugate gradients stop. Rounding leaves about 1e-14 on systems of this project;
 * 1e-11 keeps what the solver adds far below any error in time or space at a handful of extra iterations.
 */
export const RELATIVE_RESIDUAL = 1e-11;

/**
 * Iterations after which conjugate gradients give up, as a multiple of the square root of the size: the incomplete
 * factor needs about 1.5 sqrt(n) on the stiffest systems measured (relative residual 1e-8, long step).
 */
export const ITERATIONS_PER_ROOT_SIZE = 40;
export const LEAST_ITERATION_LIMIT = 500;

/** First diagonal shift tried when the incomplete factor meets a pivot that is not positive; doubled until it succeeds. */
export const FIRST_DIAGONAL_SHIFT = 1e-3;

/**
 * A pivot below this share of its diagonal entry is the rounding error of a zero: the matrix is singular. Rounding
 * leaves some 1e-15; a part cooled only by a film of 1e-6 W/(m2 K) on a fine mesh still has about 1e-10.
 */
export const SINGULAR_PIVOT = 1e-13;

/** Multiply-adds of one step of a factorization that is taken in steps: some 20 ms. */
export const STEP_WORK = 3e7;

/**
 * What a numeric factorization costs, in solves: 9 to 13 were measured from 5 to 80 thousand unknowns. A kept factor is
 * renewed when the iterations it has cost beyond one each add up to this.
 */
export const FACTOR_COST_IN_SOLVES = 11;
