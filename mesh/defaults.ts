/**
 * Numbers the mesher decides with. Shares without a unit; angles in radians.
 * Where a value was found by trial, the trial is named; all trials ran over thousands of random outlines.
 */

const DEGREE = Math.PI / 180;

/** Points nearer than this share of the part's size are one point; a vertex this near to a side lies on it. */
export const JOIN_SHARE = 1e-8;

/** Walls thinner than this share of the part's size cannot be meshed and are reported. */
export const THINNEST_SHARE = 1e-6;

/** More nodes than this are refused: working arrays of about 400 bytes a node must fit a browser tab. */
export const MOST_NODES = 2_000_000;

/** Said when an outline would need more than a machine can hold. */
export const TOO_FINE =
  "the outline's details are too fine for a mesh: more cells or nodes than memory allows";

// ---- relative size of the triangles --------------------------------------------------------------------------

/** Largest relative size, as a share of the part's larger extent: a plain block still gets 16 triangles across. */
export const LARGEST_SHARE = 0.06;
/** No source asks for less than this share of the part's size, so that a slip of the hand cannot fill the memory. */
export const FINEST_SHARE = 2e-7;
/** Relative size on an arc, in radii: about 16 chords on a full circle at the default number of nodes. */
export const ARC_SHARE = 0.4;
/** An arc's chords never exceed this share of its radius, however few nodes are asked for (40 degrees a chord). */
export const ARC_MOST = 0.7;
/** Triangles across a wall at the relative size. */
export const WALL_TRIANGLES = 4;
/** A size may exceed the side's own length by this only, else vertices close together spoil what lies beside them. */
export const SIDE_MOST = 1.1;
/** Size at a re-entrant corner, as a share of what it would be without. */
export const REENTRANT_SHARE = 0.3;
/** A corner counts as re-entrant from here. */
export const REENTRANT_ANGLE = 200 * DEGREE;
/** Size grows by this much per unit of way: neighbouring triangles differ by a quarter at most. */
export const GRADING = 0.25;
/**
 * Where given vertices alone ask for more nodes than wanted, size may grow faster, by this factor a step and up to
 * the other number; neighbouring triangles then differ by 1.5.
 */
export const GRADING_STEP = 1.25;
export const GRADING_MOST = 0.5;
/** A leaf of the size tree is at most this many local sizes wide. */
export const LEAF_SIZES = 1.5;
/** Contacts of the inscribed circle count as a wall when seen from its centre at more than this. */
export const WALL_CONTACT_COSINE = 0.42;
/** A requested point inside asks for this share of its distance to the next side or point. */
export const POINT_SHARE = 0.8;
/** Most cells of a size tree before the outline is refused. */
export const MOST_CELLS = 3_000_000;

// ---- side nodes and front ------------------------------------------------------------------------------------

/** Corners below this angle get side nodes at equal distances on both sides. */
export const SHARP_ANGLE = 60 * DEGREE;
/** Nodes are placed again when their number is off by more than this. */
export const COUNT_TOLERANCE = 0.06;
/** Most placings to meet the number of nodes. */
export const MOST_PLACINGS = 5;
/** The front packs this much closer than the integral of the size says. */
export const PACKING = 1.03;
/** Two points keep this share of their mean size between them; less gains nothing, more starves thin walls. */
export const POINT_GAP = 0.63;
/** A point keeps this share of its size to any side. */
export const SIDE_GAP = 0.5;
/** A point settles on the neighbours within this many sizes. */
export const SETTLE_REACH = 1.3;

// ---- rows parallel to sides -----------------------------------------------------------------------------------

/** Rows are added while the next one is thinner than this share of the size along the side. */
export const ROW_MOST = 0.8;
/** Most rows, whatever growth is asked for. */
export const MOST_ROWS = 40;
/** Between these angles rows run through a corner or end on the neighbouring side. */
export const ROW_CORNER_LEAST = 55 * DEGREE;
export const ROW_CORNER_MOST = 125 * DEGREE;
/** Up to here the columns of two strips lean together into one; beyond, columns fan out from the corner. */
export const ROW_MITRE_MOST = 210 * DEGREE;
/** Columns of a fan stand about this far apart: near the corner their cells are nearly as wide as thick. */
export const ROW_FAN_STEP = 45 * DEGREE;
/** Rows take this share of a wall's thickness at most, of a radius towards whose centre they run, of a short side. */
export const ROW_WALL_SHARE = 0.33;
export const ROW_RADIUS_SHARE = 0.4;
export const ROW_SIDE_SHARE = 0.4;
/** A column may have one row more than its neighbour when that row is thinner than this share of their distance. */
export const ROW_STEP_SHARE = 0.7;
/** Rows stop where the size above them falls below this share of that at their foot: something small lies there. */
export const ROW_SIZE_DROP = 0.6;
/** Requested points keep this share of a top edge's length to it, else a row is left out. */
export const ROW_POINT_GAP = 0.35;
/** The true arc may lie off its chord by this share of the first row. */
export const ROW_SAGITTA_SHARE = 0.2;
/**
 * Rows take this share of the nodes at most; beyond, all of them are made thicker. Less leaves a bottle's wall
 * without them, more takes nodes from the inside that late answers need.
 */
export const ROW_NODES_SHARE = 0.65;
/** Columns that lean at a corner stand upright again after so many depths of the rows. */
export const ROW_LEAN_DEPTHS = 3;

// ---- relaxation and repair -----------------------------------------------------------------------------------

/** Passes of centroid relaxation; the fourth changes the mean quality by less than 0.001. */
export const RELAX_PASSES = 3;
/** Triangles with an angle below this are repaired (the promise is 31 degrees). */
export const REPAIR_ANGLE = 31.9 * DEGREE;
/** Rounds of repair; there is no proof that repair ends, so it is bounded. */
export const REPAIR_ROUNDS = 16;
/** A triangle's edge below this share of its size may lose its free end, one above the other may gain a node. */
export const SHORT_EDGE = 0.8;
export const LONG_EDGE = 1.25;
/** A side node may slide by this share of the way to its neighbours. */
export const SLIDE_MOST = 0.3;
/** Where side nodes are more than this share of all, the part is thin and they slide to raise the mean quality. */
export const THIN_SIDE_SHARE = 0.4;
export const THIN_PASSES = 4;
