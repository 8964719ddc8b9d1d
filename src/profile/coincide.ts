/** Where sides of different regions lie on each other, wholly or in part. */
import { extremesOf, nearestOn, placeAt } from "./curve.ts";
import type { Curve } from "./curve.ts";
import type { Span } from "./types.ts";

export interface Touch {
  /** number of the other side */
  readonly other: number;
  readonly span: Span;
}

/**
 * For each curve the stretches along which a curve of another region coincides with it.
 *
 * @param region    region number of each curve
 * @param tolerance m
 */
export function findTouches(
  curves: readonly Curve[],
  region: readonly number[],
  tolerance: number,
): Touch[][] {
  const touches: Touch[][] = curves.map(() => []);
  const boxes = curves.map(boxOf);
  for (let i = 0; i < curves.length; i++) {
    for (let j = i + 1; j < curves.length; j++) {
      if (region[i] === region[j] || !boxesMeet(boxes[i]!, boxes[j]!, tolerance)) continue;
      for (const span of sharedSpans(curves[i]!, curves[j]!, tolerance)) touches[i]!.push({ other: j, span });
      for (const span of sharedSpans(curves[j]!, curves[i]!, tolerance)) touches[j]!.push({ other: i, span });
    }
  }
  return touches;
}

/** Stretches of `a` that lie on `b`: between ends of either that lie on both, when the middle does too. */
function sharedSpans(a: Curve, b: Curve, tolerance: number): Span[] {
  if (a.length <= tolerance || b.length <= tolerance) return [];
  const cuts: number[] = [];
  for (const [share, place] of [
    [0, a.from],
    [1, a.to],
  ] as const) {
    if (nearestOn(b, place).distance <= tolerance) cuts.push(share);
  }
  for (const place of [b.from, b.to]) {
    const { share, distance } = nearestOn(a, place);
    if (distance <= tolerance) cuts.push(share);
  }
  cuts.sort((p, q) => p - q);
  const spans: Span[] = [];
  for (let k = 1; k < cuts.length; k++) {
    const [from, to] = [cuts[k - 1]!, cuts[k]!];
    if ((to - from) * a.length <= tolerance) continue;
    if (nearestOn(b, placeAt(a, (from + to) / 2)).distance <= 10 * tolerance) spans.push([from, to]);
  }
  return spans;
}

/** What is left of 0..1 without the given stretches; slivers below `least` are dropped. */
export function remaining(taken: readonly Span[], least: number): Span[] {
  const left: Span[] = [];
  let at = 0;
  for (const [from, to] of [...taken].sort((p, q) => p[0] - q[0])) {
    if (from - at > least) left.push([at, from]);
    at = Math.max(at, to);
  }
  if (1 - at > least) left.push([at, 1]);
  return left;
}

type Box = readonly [lowR: number, lowZ: number, highR: number, highZ: number];

function boxOf(curve: Curve): Box {
  const places = extremesOf(curve);
  const r = places.map((place) => place[0]);
  const z = places.map((place) => place[1]);
  return [Math.min(...r), Math.min(...z), Math.max(...r), Math.max(...z)];
}

function boxesMeet(a: Box, b: Box, gap: number): boolean {
  return a[0] <= b[2] + gap && b[0] <= a[2] + gap && a[1] <= b[3] + gap && b[1] <= a[3] + gap;
}
