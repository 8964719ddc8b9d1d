/** Which chords cross others: a sweep along the larger extent. */
import type { SideNodes } from "./sideNodes.ts";

/** A node in front of a chord keeps this share of the chord's length off it. */
const FRONT_GAP = 0.3;

/**
 * Numbers of the chords from `first` on that cross another chord with which they share no node, or have an end of
 * one close in front (on their left).
 */
export function crossingChords(sides: SideNodes, first: number): Set<number> {
  const { from, to } = sides;
  // Names for a sweep along x; a part that is taller than wide is swept along y.
  const isTall = spanOf(sides.y) > spanOf(sides.x);
  const x = isTall ? sides.y : sides.x;
  const y = isTall ? sides.x : sides.y;
  const order = from.map((_, c) => c).sort((p, q) => lowX(p) - lowX(q));
  const found = new Set<number>();
  const reach = order.reduce((most, c) => Math.max(most, lengthOf(c)), 0);
  for (let i = 0; i < order.length; i++) {
    const p = order[i]!;
    const high = Math.max(x[from[p]!]!, x[to[p]!]!);
    for (
      let j = i + 1;
      j < order.length && lowX(order[j]!) <= Math.min(high, lowX(p) + reach) + FRONT_GAP * reach;
      j++
    ) {
      const q = order[j]!;
      if (p < first && q < first) continue;
      const cross = chordsCross(p, q);
      if (p >= first && (cross || hasInFront(p, q))) found.add(p);
      if (q >= first && (cross || hasInFront(q, p))) found.add(q);
    }
  }
  return found;

  function lowX(c: number): number {
    return Math.min(x[from[c]!]!, x[to[c]!]!);
  }

  function chordsCross(p: number, q: number): boolean {
    const [a, b, c, d] = [from[p]!, to[p]!, from[q]!, to[q]!];
    if (a === c || a === d || b === c || b === d) return false;
    if (Math.max(y[a]!, y[b]!) < Math.min(y[c]!, y[d]!) || Math.max(y[c]!, y[d]!) < Math.min(y[a]!, y[b]!))
      return false;
    return turn(a, b, c) * turn(a, b, d) <= 0 && turn(c, d, a) * turn(c, d, b) <= 0;
  }

  function lengthOf(c: number): number {
    return Math.hypot(x[from[c]!]! - x[to[c]!]!, y[from[c]!]! - y[to[c]!]!);
  }

  function hasInFront(p: number, q: number): boolean {
    const [a, b] = [from[p]!, to[p]!];
    const length = lengthOf(p);
    const [ux, uy] = [(x[b]! - x[a]!) / length, (y[b]! - y[a]!) / length];
    return [from[q]!, to[q]!].some((v) => {
      if (v === a || v === b) return false;
      const along = (x[v]! - x[a]!) * ux + (y[v]! - y[a]!) * uy;
      const cross = ux * (y[v]! - y[a]!) - uy * (x[v]! - x[a]!);
      const left = isTall ? -cross : cross;
      return along > 0 && along < length && left > 0 && left < FRONT_GAP * length;
    });
  }

  function turn(a: number, b: number, c: number): number {
    return Math.sign((x[b]! - x[a]!) * (y[c]! - y[a]!) - (y[b]! - y[a]!) * (x[c]! - x[a]!));
  }
}

function spanOf(values: readonly number[]): number {
  let [low, high] = [Infinity, -Infinity];
  for (const v of values) {
    low = Math.min(low, v);
    high = Math.max(high, v);
  }
  return high - low;
}
