/** Numbers that steer a run when the case and the command line do not say otherwise, each with its reason. */

/**
 * Corner nodes of the first mesh. Six-node elements then carry about four times as many unknowns (2,000), which gives
 * late temperatures to about 1e-5 and middle ones to 1e-4 of the span; linear ones start at the same unknowns.
 */
export const FIRST_MESH_CORNERS = 500;
export const FIRST_MESH_LINEAR = 2000;

/** Unknowns beyond which no further refinement is tried: some seconds of work, and 16 times the first mesh. */
export const NODE_BUDGET = 36_000;

/** Share of the asked accuracy that the time scheme may use up; the rest is left to the mesh. */
export const TIME_SHARE = 0.1;

/** First instant of a stage that has to be right, as a share of the stage, when no question asks for an earlier one. */
export const FIRST_INSTANT_SHARE = 1e-3;

/** Rows along exposed sides aim at this share of the shortest stage, when nothing earlier is asked for. */
export const ROWS_FROM = 0.01;

/** Instants kept of each stage: evenly spaced ones, and more towards its start, where the skin moves fast. */
export const EVEN_INSTANTS = 96;
export const EARLY_INSTANTS = 32;
/** the earliest kept instant as a share of the stage */
export const EARLIEST_SHARE = 1e-4;

/** Fields kept for looking at, over the whole case. */
export const FRAME_COUNT = 121;

/** Factors of the stated uncertainty, from the coverage study described in DEVELOPERS.md [accuracy]. */
export const UNCERTAINTY = {
  /** two meshes only: share of the change, and least share of the pooled change */
  firstRefinement: { 3: 1.5, 6: 0.6 },
  /** grid convergence index with the observed order kept in [0.5, 2] */
  safety: { 3: 2, 6: 1.5 },
  orderRange: [0.5, 2],
  /** changes that alternate in sign: the order cannot be observed, take three times the last change */
  alternating: 3,
  pooledShare: { first: 0.2, later: 0.05 },
} as const;
