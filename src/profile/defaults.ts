/** Numbers the profile decides with, each with its reason. */

/** Places nearer than this share of the part's size coincide: the mesher joins points at the same share. */
export const JOIN_SHARE = 1e-8;
/** Twice the area of an arc's three points over its chord squared, below which they are in line (as the mesher). */
export const IN_LINE = 1e-10;
/** A place deeper by more than this share of the depth is not overlooked: far below what an estimate notices. */
export const SPOT_SHARE = 1e-2;
/** Chords that stand for an arc where only inside or outside is asked. */
export const INSIDE_CHORDS = 48;
/** A bore below this share of the greatest radius is more likely a point that missed the axis. */
export const NARROW_BORE_SHARE = 0.01;
