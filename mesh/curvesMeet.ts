/** Where two sides meet: single places, and stretches along which they lie on each other. */
import { curveAt, distanceToCurve, shareOnCurve, type Curve } from "./plane.ts";
import type { Point } from "./types.ts";

/** A place on both curves, with its share on each. */
export interface Meeting {
  readonly at: Point;
  readonly t: number;
  readonly u: number;
}

export interface Meetings {
  readonly places: readonly Meeting[];
  /** ends of the stretch along which the curves coincide, or null */
  readonly stretch: readonly [Meeting, Meeting] | null;
}

/** All places where curves p and q come within the tolerance of each other by crossing, touching or coinciding. */
export function curvesMeet(p: Curve, q: Curve, tolerance: number): Meetings {
  const ends = [...endsOn(p, q, tolerance), ...endsOn(q, p, tolerance).map(swapped)];
  const shared = distinct(ends, 4 * tolerance);
  const stretch = findStretch(shared, p, q, tolerance);
  if (stretch) return { places: [], stretch };
  const crossings = crossPlaces(p, q)
    .map((at) => meetingAt(at, p, q, tolerance))
    .filter((m) => m !== null);
  return { places: distinct([...shared, ...crossings], 10 * tolerance), stretch: null };
}

function swapped({ at, t, u }: Meeting): Meeting {
  return { at, t: u, u: t };
}

/** Ends of p that lie on q. */
function endsOn(p: Curve, q: Curve, tolerance: number): Meeting[] {
  return [
    { at: [p.ax, p.ay] as const, t: 0 },
    { at: [p.bx, p.by] as const, t: 1 },
  ]
    .filter(({ at }) => distanceToCurve(q, at[0], at[1]) <= tolerance)
    .map(({ at, t }) => ({ at, t, u: clampedShare(q, at) }));
}

function clampedShare(q: Curve, at: Point): number {
  if (Math.hypot(q.ax - at[0], q.ay - at[1]) < Math.hypot(q.bx - at[0], q.by - at[1])) {
    const t = shareOnCurve(q, at[0], at[1], Infinity);
    return t > 1 ? 0 : Math.max(0, t);
  }
  return Math.max(0, Math.min(1, shareOnCurve(q, at[0], at[1], Infinity)));
}

function distinct(meetings: readonly Meeting[], apart: number): Meeting[] {
  const kept: Meeting[] = [];
  for (const m of meetings) {
    if (!kept.some((k) => Math.hypot(k.at[0] - m.at[0], k.at[1] - m.at[1]) <= apart)) kept.push(m);
  }
  return kept;
}

/** Two shared ends with p's way between them on q as well. */
function findStretch(
  shared: readonly Meeting[],
  p: Curve,
  q: Curve,
  tolerance: number,
): [Meeting, Meeting] | null {
  const at = [0, 0];
  for (let i = 0; i < shared.length; i++) {
    for (let j = i + 1; j < shared.length; j++) {
      const [a, b] = [shared[i]!, shared[j]!];
      const isOnBoth = [0.25, 0.5, 0.75].every((s) => {
        curveAt(p, a.t + s * (b.t - a.t), at);
        return distanceToCurve(q, at[0]!, at[1]!) <= 2 * tolerance;
      });
      if (isOnBoth) return a.t < b.t ? [a, b] : [b, a];
    }
  }
  return null;
}

function meetingAt(at: Point, p: Curve, q: Curve, tolerance: number): Meeting | null {
  if (distanceToCurve(p, at[0], at[1]) > tolerance) return null;
  if (distanceToCurve(q, at[0], at[1]) > tolerance) return null;
  return { at, t: clampedShare(p, at), u: clampedShare(q, at) };
}

/** Places where the whole lines or circles of the curves cross or touch. */
function crossPlaces(p: Curve, q: Curve): Point[] {
  if (p.arc && q.arc) return circlesCross(p, q);
  if (p.arc) return lineCrossesCircle(q, p);
  if (q.arc) return lineCrossesCircle(p, q);
  return linesCross(p, q);
}

function linesCross(p: Curve, q: Curve): Point[] {
  const px = p.bx - p.ax;
  const py = p.by - p.ay;
  const qx = q.bx - q.ax;
  const qy = q.by - q.ay;
  const cross = px * qy - py * qx;
  if (Math.abs(cross) < 1e-14 * Math.hypot(px, py) * Math.hypot(qx, qy)) return [];
  const t = ((q.ax - p.ax) * qy - (q.ay - p.ay) * qx) / cross;
  return [[p.ax + t * px, p.ay + t * py]];
}

/** A circle that the line misses by a hair gives the nearest place: the tolerance decides later. */
function lineCrossesCircle(line: Curve, curve: Curve): Point[] {
  const arc = curve.arc!;
  const length = Math.hypot(line.bx - line.ax, line.by - line.ay);
  const ux = (line.bx - line.ax) / length;
  const uy = (line.by - line.ay) / length;
  const along = (arc.x - line.ax) * ux + (arc.y - line.ay) * uy;
  const beside = (arc.x - line.ax) * uy - (arc.y - line.ay) * ux;
  const half = Math.sqrt(Math.max(0, (arc.radius - Math.abs(beside)) * (arc.radius + Math.abs(beside))));
  const place = (s: number): Point => [line.ax + s * ux, line.ay + s * uy];
  return [place(along - half), place(along + half)];
}

function circlesCross(p: Curve, q: Curve): Point[] {
  const [c, d] = [p.arc!, q.arc!];
  const apart = Math.hypot(d.x - c.x, d.y - c.y);
  if (apart < 1e-12 * (c.radius + d.radius)) return [];
  const ux = (d.x - c.x) / apart;
  const uy = (d.y - c.y) / apart;
  const along = (apart * apart + (c.radius - d.radius) * (c.radius + d.radius)) / (2 * apart);
  const half = Math.sqrt(Math.max(0, (c.radius - along) * (c.radius + along)));
  const place = (s: number): Point => [c.x + along * ux - s * uy, c.y + along * uy + s * ux];
  // Circles that touch from inside or outside within a hair: the nearest place on the first one.
  const touch: Point = [c.x + Math.sign(along) * c.radius * ux, c.y + Math.sign(along) * c.radius * uy];
  return half > 0 ? [place(half), place(-half)] : [touch];
}
