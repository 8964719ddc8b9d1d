/**
 * Geometry of one side: places along it, distances to it, and integrals over it.
 *
 * An arc is told by its chord and its half angle instead of by its centre, so that shallow arcs of a huge radius lose
 * no digits: with u along the chord from its middle and v towards the bulge,
 *   u(a) = R sin a,   v(a) = 2 R sin((A - a)/2) sin((A + a)/2),   -A <= a <= A.
 */
import { IN_LINE } from "./defaults.ts";
import { gaussPoints } from "./gauss.ts";
import type { Line, Place } from "./types.ts";

export interface Curve {
  readonly from: Place;
  readonly to: Place;
  /** m */
  readonly length: number;
  /** undefined for a straight side */
  readonly arc: Arc | undefined;
}
interface Arc {
  readonly radius: number;
  /** half of the angle it spans, 0..pi */
  readonly halfAngle: number;
  /** middle of the chord */
  readonly middle: Place;
  /** unit vectors along the chord and towards the bulge */
  readonly along: Place;
  readonly bulge: Place;
}

/** A side as a curve. Three points in line make a straight side. */
export function curveOf({ from, to, through }: Line): Curve {
  const chord = Math.hypot(to[0] - from[0], to[1] - from[1]);
  const arc = through && chord > 0 ? arcOf(from, through, to, chord) : undefined;
  return { from, to, length: arc ? 2 * arc.halfAngle * arc.radius : chord, arc };
}

function arcOf(from: Place, through: Place, to: Place, chord: number): Arc | undefined {
  const along: Place = [(to[0] - from[0]) / chord, (to[1] - from[1]) / chord];
  const [ar, az] = [from[0] - through[0], from[1] - through[1]];
  const [br, bz] = [to[0] - through[0], to[1] - through[1]];
  const cross = ar * bz - az * br;
  if (Math.abs(cross) < IN_LINE * chord * chord) return undefined;
  // the angle at `through` over the chord is pi less half of the angle at the centre (inscribed angle)
  const halfAngle = Math.atan2(Math.abs(cross), -(ar * br + az * bz));
  // cross < 0: the way turns left at `through`, which then lies to the right of the chord
  const side = cross < 0 ? 1 : -1;
  return {
    radius: chord / (2 * Math.sin(halfAngle)),
    halfAngle,
    middle: [(from[0] + to[0]) / 2, (from[1] + to[1]) / 2],
    along,
    bulge: [side * along[1], -side * along[0]],
  };
}

/** The place at a share 0..1 of the length. */
export function placeAt(curve: Curve, share: number): Place {
  const { from, to, arc } = curve;
  if (!arc) return [from[0] + share * (to[0] - from[0]), from[1] + share * (to[1] - from[1])];
  const { radius, halfAngle, middle, along, bulge } = arc;
  const angle = halfAngle * (2 * share - 1);
  const u = radius * Math.sin(angle);
  const v = 2 * radius * Math.sin((halfAngle - angle) / 2) * Math.sin((halfAngle + angle) / 2);
  return [middle[0] + u * along[0] + v * bulge[0], middle[1] + u * along[1] + v * bulge[1]];
}

/** d(r, z)/d(share) at a share. */
function velocityAt(curve: Curve, share: number): Place {
  const { from, to, arc } = curve;
  if (!arc) return [to[0] - from[0], to[1] - from[1]];
  const { radius, halfAngle, along, bulge } = arc;
  const angle = halfAngle * (2 * share - 1);
  const speed = 2 * halfAngle * radius;
  const [u, v] = [speed * Math.cos(angle), -speed * Math.sin(angle)];
  return [u * along[0] + v * bulge[0], u * along[1] + v * bulge[1]];
}

/** The share of the nearest place of the curve, and the distance to it [m]. */
export function nearestOn(curve: Curve, place: Place): { share: number; distance: number } {
  const share = Math.min(1, Math.max(0, curve.arc ? arcShare(curve.arc, place) : lineShare(curve, place)));
  const ends = [0, 1, share].map((s) => {
    const [r, z] = placeAt(curve, s);
    return { share: s, distance: Math.hypot(r - place[0], z - place[1]) };
  });
  return ends.reduce((best, end) => (end.distance < best.distance ? end : best));
}

function lineShare({ from, to, length }: Curve, place: Place): number {
  if (length === 0) return 0;
  const [dr, dz] = [to[0] - from[0], to[1] - from[1]];
  return ((place[0] - from[0]) * dr + (place[1] - from[1]) * dz) / (length * length);
}

function arcShare({ radius, halfAngle, middle, along, bulge }: Arc, place: Place): number {
  const [dr, dz] = [place[0] - middle[0], place[1] - middle[1]];
  const u = dr * along[0] + dz * along[1];
  const v = dr * bulge[0] + dz * bulge[1] + radius * Math.cos(halfAngle);
  return (Math.atan2(u, v) / halfAngle + 1) / 2;
}

/** Gauss points: a straight side's integrands are cubic at most; a quarter of an arc is met to rounding by twelve. */
const LINE_POINTS = gaussPoints(3);
const ARC_POINTS = gaussPoints(12);
const ARC_PIECE = Math.PI / 4;

/** Integral over a stretch of the curve of f(place, d place / d share) d share. */
export function integrate(
  curve: Curve,
  f: (place: Place, velocity: Place) => number,
  from = 0,
  to = 1,
): number {
  const points = curve.arc ? ARC_POINTS : LINE_POINTS;
  const pieces = curve.arc ? Math.max(1, Math.ceil((curve.arc.halfAngle * (to - from)) / ARC_PIECE)) : 1;
  const width = (to - from) / pieces;
  let sum = 0;
  for (let piece = 0; piece < pieces; piece++) {
    for (const { at, weight } of points) {
      const share = from + (piece + at) * width;
      sum += weight * width * f(placeAt(curve, share), velocityAt(curve, share));
    }
  }
  return sum;
}

/** Lateral area of a stretch when revolved: 2 pi times the integral of r over its length [m2]. */
export function lateralArea(curve: Curve, from = 0, to = 1): number {
  return integrate(curve, (place) => 2 * Math.PI * place[0] * curve.length, from, to);
}

/** Places of the curve where r or z is least or greatest. */
export function extremesOf(curve: Curve): Place[] {
  const places = [curve.from, curve.to];
  const { arc } = curve;
  if (!arc) return places;
  const { radius, halfAngle, middle, bulge } = arc;
  const fall = radius * Math.cos(halfAngle);
  const centre: Place = [middle[0] - fall * bulge[0], middle[1] - fall * bulge[1]];
  for (const [dr, dz] of [
    [1, 0],
    [-1, 0],
    [0, 1],
    [0, -1],
  ] as const) {
    const place: Place = [centre[0] + radius * dr, centre[1] + radius * dz];
    const share = arcShare(arc, place);
    if (share > 0 && share < 1) places.push(place);
  }
  return places;
}
