/** Tolerances and ceilings of the closed-form answers. */

/** Neglected terms of a series may add up to this much (of 1): far below what any reader of a curve can use. */
export const SERIES_TOLERANCE = 1e-13;

/**
 * Terms a series may use: reaches down to a Fourier number of 2e-5. Earlier, the cylinder is answered by its skin layer
 * too, to within 1e-5, which its bound says; a series there would take milliseconds of root finding for every film.
 */
export const MAX_SERIES_TERMS = 400;

/**
 * Below this Fourier number slab and sphere are answered by their skin layer, which is exact there: what comes back
 * from the far side is erfc(1 / (2 sqrt(Fo))), less than 1e-100.
 */
export const SKIN_LAYER_FOURIER = 1e-3;

/** From here on charts and hand calculations keep one term. What that costs is in tests/data/one_term_validity.csv. */
export const ONE_TERM_FOURIER = 0.2;

/** A staged series is used from the instant its highest mode has decayed to this share. */
export const STAGED_TOLERANCE = 1e-9;

/** Modes a staged series carries at least, and at most: one direction down to a Fourier number of 1.3e-5. */
export const FEWEST_MODES = 12;
export const MOST_MODES = 400;

/** At most in each direction of a finite cylinder, whose modes multiply: down to a Fourier number of 2.3e-4. */
export const MOST_MODES_PER_DIRECTION = 96;

/** At least, where the surroundings run: the lag behind a ramp falls only with the third power of the eigenvalue. */
export const RAMP_MODES = 48;
