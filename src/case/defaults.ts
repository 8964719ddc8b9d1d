/** Defaults and limits of the case document, each with its reason. */

/** Aim for temperatures as a share of the run's temperature span: well below the doubt of any film coefficient. */
export const DEFAULT_ACCURACY = 0.0005;
/** Finer than this the rounding of the numbers shows; coarser than the other the answers mean nothing. */
export const FINEST_ACCURACY = 1e-7;
export const COARSEST_ACCURACY = 0.05;
/** Characters of a case file: a case of thousands of points is a few hundred kilobytes, so this is a wrong file. */
export const MOST_CHARACTERS = 20_000_000;
/** Depth of brackets in a case file; the format itself needs nine. */
export const DEEPEST_NESTING = 64;
/** Points of all outlines together: the checks between sides grow with its square. */
export const MOST_VERTICES = 5000;
/** How many faults are listed; beyond, the first ones are what helps. */
export const MOST_PROBLEMS = 200;

/** Bounds of what solids and treatments have been seen to do; beyond them a slip of units is likely. */
export const LIKELY = {
  /** W/(m K): diamond reaches about 2200 */
  conductivity: [0.005, 5000],
  /** kg/m3: osmium has 22 600, loose insulation about 10 */
  density: [5, 23_000],
  /** J/(kg K): hydrogen apart, nothing solid or liquid lies above water's 4200 by much; peaks at changes of phase do */
  heatCapacity: [50, 100_000],
  /** W/(m2 K): boiling and sprays reach some 1e5 */
  filmCoefficient: [0.1, 300_000],
  /** degC */
  temperature: [-273.15, 4000],
  /** m, the largest extent of a part */
  extent: [1e-4, 30],
} as const satisfies Record<string, readonly [number, number]>;
