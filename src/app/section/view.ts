/**
 * Where the half plane (r, z) stands on the board. Lying: z to the right, r up, the upper half is edited.
 * Standing: z up, r to the right, the right half is edited. The other half mirrors it.
 */

export interface View {
  readonly lying: boolean;
  /** px per m */
  readonly scale: number;
  /** px of r = 0, z = 0 */
  readonly x: number;
  readonly y: number;
}

export interface Bounds {
  readonly rMax: number;
  readonly zMin: number;
  readonly zMax: number;
}

/** Free room on the board [px]. */
export interface Frame {
  readonly left: number;
  readonly top: number;
  readonly right: number;
  readonly bottom: number;
}

/** Offset at which the one-pixel line of the axis falls on one row of pixels. */
const CRISP = 0.5;

export type Spot = readonly [x: number, y: number];

/** A part longer than this many diameters lies. */
export const LIES_FROM = 1.4;

export function toScreen(view: View, r: number, z: number): Spot {
  return view.lying
    ? [view.x + z * view.scale, view.y - r * view.scale]
    : [view.x + r * view.scale, view.y - z * view.scale];
}

/** The same place on the mirrored half. */
export const toMirror = (view: View, r: number, z: number): Spot => toScreen(view, -r, z);

/** r [m] (negative on the mirrored half) and z [m] of a spot on the board. */
export function fromScreen(view: View, x: number, y: number): readonly [r: number, z: number] {
  const [across, up] = [(x - view.x) / view.scale, (view.y - y) / view.scale];
  return view.lying ? [up, across] : [across, up];
}

export function prefersLying(bounds: Bounds): boolean {
  return bounds.zMax - bounds.zMin > LIES_FROM * 2 * bounds.rMax;
}

/** The largest view that shows the whole part, both halves, in the middle of the frame. */
export function fitView(bounds: Bounds, frame: Frame, lying: boolean): View {
  const length = Math.max(bounds.zMax - bounds.zMin, 1e-6);
  const width = Math.max(2 * bounds.rMax, 1e-6);
  const [across, up] = lying ? [length, width] : [width, length];
  const room = [Math.max(40, frame.right - frame.left), Math.max(40, frame.bottom - frame.top)] as const;
  const scale = Math.min(room[0] / across, room[1] / up);
  const middle = (bounds.zMin + bounds.zMax) / 2;
  const [cx, cy] = [(frame.left + frame.right) / 2, (frame.top + frame.bottom) / 2];
  return lying
    ? { lying, scale, x: Math.round(cx - middle * scale), y: Math.round(cy) + CRISP }
    : { lying, scale, x: Math.round(cx) + CRISP, y: Math.round(cy + middle * scale) };
}

/** The view between two views, for the short move from one to the other; share 0 to 1. */
export function between(from: View, to: View, share: number): View {
  const mix = (a: number, b: number): number => a + share * (b - a);
  return {
    lying: to.lying,
    scale: from.scale * (to.scale / from.scale) ** share,
    x: mix(from.x, to.x),
    y: mix(from.y, to.y),
  };
}

export function boundsOf(places: Iterable<readonly [number, number]>): Bounds {
  let [rMax, zMin, zMax] = [0, Infinity, -Infinity];
  for (const [r, z] of places) {
    rMax = Math.max(rMax, r);
    zMin = Math.min(zMin, z);
    zMax = Math.max(zMax, z);
  }
  return zMax >= zMin ? { rMax, zMin, zMax } : { rMax: 0.1, zMin: 0, zMax: 0.2 };
}
