/** Limits of the choices that estimates and verdict make, each with its reason. */

/** An estimate agrees when it is within this share of the answer: finer than any film coefficient is known. */
export const AGREEMENT = 0.005;

/** Share of the answer an estimate may be out before the verdict warns; the user may set another. */
export const VERDICT_TOLERANCE = 0.05;

/** A part is taken for a ball when radius, height, volume and V/A all fit one this well. */
export const BALL_FIT = 0.07;

/** Share of its enclosing round that a part fills to be taken for that round itself. */
export const ROUND_FILL = 0.97;

/** A part whose V/A is below this share of that of a solid round of its volume and height is a shell: a wall. */
export const SHELL_SHARE = 0.5;

/** Length over diameter from where the ends of a round are left out, and below which its wall is: 5 % of the area. */
export const LONG_ROUND = 20;
export const FLAT_DISC = 1 / 40;

/** Films that differ by a smaller share from side to side are one film. */
export const SAME_FILM = 0.005;

/** Instants per stage at which estimates are worked out, denser at its start: t = duration (i / n)^2. */
export const INSTANTS_PER_STAGE = 120;

/** A later stage whose first instants were bridged over more than this share is remarked on. */
export const BRIDGED_SHARE = 0.01;

/** K: surroundings that differ by less from side to side are one temperature. */
export const SAME_SURROUNDINGS = 0.5;
