/**
 * Geometry of the half plane. Inside the mesher x stands for r and y for z, both in metres.
 */
import type { Point } from "./types.ts";

/** A circular arc: centre, radius [m], start angle and signed turn [rad], counter-clockwise positive. */
export interface Arc {
  readonly x: number;
  readonly y: number;
  readonly radius: number;
  readonly start: number;
  readonly turn: number;
}

/** Below this the three points of an arc are taken to be in line (twice their area over the chord squared). */
const IN_LINE = 1e-10;

/** True when `through` lies on the straight way from-to, so that no circle can be laid through the three. */
export function isInLine(from: Point, through: Point, to: Point): boolean {
  const bx = to[0] - from[0];
  const by = to[1] - from[1];
  const cross = (through[0] - from[0]) * by - (through[1] - from[1]) * bx;
  return Math.abs(cross) < IN_LINE * (bx * bx + by * by);
}

/** The arc from `from` by way of `through` to `to`, or null when the three are in line. */
export function arcThrough(from: Point, through: Point, to: Point): Arc | null {
  if (isInLine(from, through, to)) return null;
  const ax = through[0] - from[0];
  const ay = through[1] - from[1];
  const bx = to[0] - from[0];
  const by = to[1] - from[1];
  const d = 2 * (ax * by - ay * bx);
  if (d === 0) return null;
  const a2 = ax * ax + ay * ay;
  const b2 = bx * bx + by * by;
  const ux = (by * a2 - ay * b2) / d;
  const uy = (ax * b2 - bx * a2) / d;
  const start = Math.atan2(-uy, -ux);
  let turn = Math.atan2(by - uy, bx - ux) - start;
  if (d > 0 && turn <= 0) turn += 2 * Math.PI;
  if (d < 0 && turn >= 0) turn -= 2 * Math.PI;
  return { x: from[0] + ux, y: from[1] + uy, radius: Math.hypot(ux, uy), start, turn };
}

/** The part of an arc between two shares of its turn. */
export function partOfArc(arc: Arc, t0: number, t1: number): Arc {
  return { ...arc, start: arc.start + t0 * arc.turn, turn: (t1 - t0) * arc.turn };
}

/** Places of an arc with the least or greatest x or y, its ends aside. */
export function arcExtremes(arc: Arc): Point[] {
  const places: Point[] = [];
  for (let k = 0; k < 4; k++) {
    const angle = (k * Math.PI) / 2;
    let ahead = (angle - arc.start) * Math.sign(arc.turn);
    ahead -= 2 * Math.PI * Math.floor(ahead / (2 * Math.PI));
    if (ahead >= Math.abs(arc.turn)) continue;
    places.push([arc.x + arc.radius * Math.cos(angle), arc.y + arc.radius * Math.sin(angle)]);
  }
  return places;
}

/** A line or arc between two places; the ends are exact, what lies between follows from the share t in 0..1. */
export interface Curve {
  readonly ax: number;
  readonly ay: number;
  readonly bx: number;
  readonly by: number;
  readonly arc: Arc | null;
}

/** Place at share t of the curve's length. @param out x, y */
export function curveAt(c: Curve, t: number, out: Float64Array | number[]): void {
  if (t <= 0) {
    out[0] = c.ax;
    out[1] = c.ay;
  } else if (t >= 1) {
    out[0] = c.bx;
    out[1] = c.by;
  } else if (c.arc) {
    const angle = c.arc.start + t * c.arc.turn;
    out[0] = c.arc.x + c.arc.radius * Math.cos(angle);
    out[1] = c.arc.y + c.arc.radius * Math.sin(angle);
  } else {
    out[0] = c.ax + t * (c.bx - c.ax);
    out[1] = c.ay + t * (c.by - c.ay);
  }
}

/** Unit tangent at share t, in the direction of travel. @param out x, y */
export function curveTangent(c: Curve, t: number, out: Float64Array | number[]): void {
  if (c.arc) {
    const angle = c.arc.start + t * c.arc.turn;
    const sense = Math.sign(c.arc.turn);
    out[0] = -sense * Math.sin(angle);
    out[1] = sense * Math.cos(angle);
    return;
  }
  const length = Math.hypot(c.bx - c.ax, c.by - c.ay);
  out[0] = (c.bx - c.ax) / length;
  out[1] = (c.by - c.ay) / length;
}

export function curveLength(c: Curve): number {
  return c.arc ? Math.abs(c.arc.turn) * c.arc.radius : Math.hypot(c.bx - c.ax, c.by - c.ay);
}

/** Share t of a place that lies on the curve within the tolerance [m]; -1 when it does not. */
export function shareOnCurve(c: Curve, x: number, y: number, tolerance: number): number {
  if (c.arc) return shareOnArc(c.arc, x, y, tolerance);
  const dx = c.bx - c.ax;
  const dy = c.by - c.ay;
  const length = Math.hypot(dx, dy);
  if (Math.abs((x - c.ax) * dy - (y - c.ay) * dx) > tolerance * length) return -1;
  return ((x - c.ax) * dx + (y - c.ay) * dy) / (length * length);
}

function shareOnArc(arc: Arc, x: number, y: number, tolerance: number): number {
  if (Math.abs(Math.hypot(x - arc.x, y - arc.y) - arc.radius) > tolerance) return -1;
  let angle = (Math.atan2(y - arc.y, x - arc.x) - arc.start) * Math.sign(arc.turn);
  angle -= 2 * Math.PI * Math.floor(angle / (2 * Math.PI));
  // A hair before the start counts as the start, not as the far end of a full turn.
  if (angle > 2 * Math.PI - Math.min(1e-6, tolerance / arc.radius)) angle = 0;
  return angle / Math.abs(arc.turn);
}

/** Area between the curve and the origin, half the integral of x dy - y dx [m2]: closed loops add up to their area. */
export function areaUnder(c: Curve): number {
  const chord = (c.ax * c.by - c.bx * c.ay) / 2;
  if (!c.arc) return chord;
  const { turn, radius } = c.arc;
  return chord + (radius * radius * (turn - Math.sin(turn))) / 2;
}

/** Distance from a place to the curve [m]. */
export function distanceToCurve(c: Curve, x: number, y: number): number {
  const ends = Math.min(Math.hypot(x - c.ax, y - c.ay), Math.hypot(x - c.bx, y - c.by));
  const t = shareOnCurve(c, x, y, Infinity);
  if (t <= 0 || t >= 1) return ends;
  if (c.arc) return Math.min(ends, Math.abs(Math.hypot(x - c.arc.x, y - c.arc.y) - c.arc.radius));
  const dx = c.bx - c.ax;
  const dy = c.by - c.ay;
  return Math.abs((x - c.ax) * dy - (y - c.ay) * dx) / Math.hypot(dx, dy);
}
