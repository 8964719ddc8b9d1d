/** The half profile in (r, z): sides with their names, what they touch, and the measures of the revolved part. */

/** A place in the half plane: r, z [m]. */
export type Place = readonly [r: number, z: number];

/** A straight side, or the circular arc that passes through `through`. */
export interface Line {
  readonly from: Place;
  readonly to: Place;
  readonly through?: Place;
}

/**
 * - "axis": lies on r = 0, takes no condition
 * - "exposed": nothing of the part beyond it
 * - "interface": another region beyond it, all along
 * - "partly": another region along some of it, exposed along the rest
 */
export type SideKind = "axis" | "exposed" | "interface" | "partly";

/** A stretch of a side, as shares 0..1 of its length. */
export type Span = readonly [from: number, to: number];

export interface ProfileSide extends Line {
  /** place in the order region, loop, side: the number the mesher gives it */
  readonly number: number;
  readonly region: number;
  /** 0: the outer loop; from 1: the holes */
  readonly loop: number;
  readonly index: number;
  readonly name: string;
  readonly kind: SideKind;
  /** m */
  readonly length: number;
  /** lateral area when revolved [m2], and the share of it that is exposed [m2] */
  readonly area: number;
  readonly exposedArea: number;
  /** stretches that are exposed */
  readonly exposed: readonly Span[];
  /** numbers of the sides of other regions that coincide with it, wholly or in part */
  readonly touches: readonly number[];
}

export interface ProfileRegion {
  /** outer loop first, then the holes, as the mesher takes them */
  readonly loops: readonly (readonly Line[])[];
  readonly name: string;
  /** of the section [m2] and of the revolved region [m3] */
  readonly sectionArea: number;
  readonly volume: number;
  /** kg */
  readonly mass: number;
  /** centroid of the section; volume = 2 pi r sectionArea (Pappus) */
  readonly centroid: Place;
  /** z of the centre of the revolved volume [m] */
  readonly centreZ: number;
}

export interface Profile {
  readonly regions: readonly ProfileRegion[];
  readonly sides: readonly ProfileSide[];
  /** m2, m3, kg of the whole part */
  readonly sectionArea: number;
  readonly volume: number;
  readonly mass: number;
  /** m2, whole and by the name of the side */
  readonly exposedArea: number;
  readonly exposedAreas: Readonly<Record<string, number>>;
  /** volume over exposed area, V/A [m]; infinite when nothing is exposed */
  readonly characteristicLength: number;
  /** corners of the box around the section, arcs included */
  readonly low: Place;
  readonly high: Place;
}
