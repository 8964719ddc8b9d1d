/**
 * The thermal layer: how thick the first row at a side should be, from numbers alone.
 *
 * When a film first acts, heat has come in by about l = sqrt(a t) at time t. A mesh coarser than that smears the
 * layer, and the error stays until the layer has grown past the first triangles. Rows parallel to the side resolve
 * it with few nodes, because the field hardly changes along the side.
 */
import type { SideRows } from "./types.ts";

/**
 * First row in diffusion lengths: 1 to 2 was best from the first instant on in trials on spheres and cylinders with
 * six-node triangles, Biot numbers 1 to 50.
 */
const FIRST_ROW_LENGTHS = 1.5;
/**
 * On a stepped shaft and a bottle wall growth 1.5 came two to four times closer than 2 some time after the first
 * instant, at equal numbers of nodes.
 */
const ROW_GROWTH = 1.5;
/** Below this Biot number the field bends so little across the layer that rows gain nothing. */
const LEAST_BIOT = 0.1;
/** A layer deeper than this share of the half thickness (Fourier number 0.06) is no layer any more. */
const DEEPEST_LAYER = 0.25;

export interface LayerConditions {
  /** first instant of interest, from when the film or its surroundings change [s] */
  readonly instant: number;
  /** thermal diffusivity k / (density heatCapacity) [m2/s] */
  readonly diffusivity: number;
  /** largest film coefficient of the stage [W/(m2 K)]; Infinity for a held temperature or a given flux */
  readonly film: number;
  /** conductivity [W/(m K)] */
  readonly conductivity: number;
  /** half thickness of the part behind the side, or its radius [m] */
  readonly halfThickness: number;
}

/**
 * First row thickness [m] and growth for a side, or null where rows are not warranted: no positive instant, a Biot
 * number below 0.1, or heat that has gone deep into the part by the first instant. The mesher adds rows only while
 * they are thinner than its triangles, so that a fine mesh needs none.
 */
export function firstRow(layer: LayerConditions): Pick<SideRows, "thickness" | "growth"> | null {
  const { instant, diffusivity, film, conductivity, halfThickness } = layer;
  if (!(instant > 0) || !(diffusivity > 0) || !(conductivity > 0) || !(halfThickness > 0)) return null;
  if (!((film * halfThickness) / conductivity >= LEAST_BIOT)) return null;
  const length = Math.sqrt(diffusivity * instant);
  if (length > DEEPEST_LAYER * halfThickness) return null;
  return { thickness: FIRST_ROW_LENGTHS * length, growth: ROW_GROWTH };
}
