/** Circular arcs through three places of the half plane, as the sheet draws and divides them. */

export type Place = readonly [r: number, z: number];

export interface Arc {
  readonly centre: Place;
  readonly radius: number;
  /** angles [rad] at the start and through to the end; the turn is to - from */
  readonly from: number;
  readonly to: number;
}

/** The circle arc from `a` through `b` to `c`; null where they are in line or not numbers. */
export function arcThrough(a: Place, b: Place, c: Place): Arc | null {
  const [bx, by, cx, cy] = [b[0] - a[0], b[1] - a[1], c[0] - a[0], c[1] - a[1]];
  const twice = 2 * (bx * cy - by * cx);
  if (!(Math.abs(twice) > 1e-9 * (bx * bx + by * by + cx * cx + cy * cy))) return null;
  const [bb, cc] = [bx * bx + by * by, cx * cx + cy * cy];
  const [ux, uy] = [(cy * bb - by * cc) / twice, (bx * cc - cx * bb) / twice];
  const centre: Place = [a[0] + ux, a[1] + uy];
  const angle = (p: Place): number => Math.atan2(p[1] - centre[1], p[0] - centre[0]);
  const from = angle(a);
  const turn = positive(angle(c) - from);
  const passes = positive(angle(b) - from) < turn;
  return { centre, radius: Math.hypot(ux, uy), from, to: from + (passes ? turn : turn - 2 * Math.PI) };
}

const positive = (angle: number): number => ((angle % (2 * Math.PI)) + 2 * Math.PI) % (2 * Math.PI);

/** Middle of the piece of an arc between two places on it. */
export function arcMiddle(arc: Arc, from: Place, to: Place): Place {
  const angle = (p: Place): number => Math.atan2(p[1] - arc.centre[1], p[0] - arc.centre[0]);
  const start = angle(from);
  const turn = arc.to > arc.from ? positive(angle(to) - start) : -positive(start - angle(to));
  return onArc(arc, start + turn / 2);
}

export function onArc({ centre, radius }: Arc, angle: number): Place {
  return [centre[0] + radius * Math.cos(angle), centre[1] + radius * Math.sin(angle)];
}
