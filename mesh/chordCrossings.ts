/** Which chords cross others: a sweep along the larger extent. */
import type { SideNodes } from "./sideNodes.ts";

/** Numbers of the chords from `first` on that cross or touch another chord with which they share no node. */
export function crossingChords(sides: SideNodes, first: number): Set<number> {
  const { from, to } = sides;
  // Names for a sweep along x; a part that is taller than wide is swept along y.
  const isTall = spanOf(sides.y) > spanOf(sides.x);
  const x = isTall ? sides.y : sides.x;
  const y = isTall ? sides.x : sides.y;
  const order = from.map((_, c) => c).sort((p, q) => lowX(p) - lowX(q));
  const found = new Set<number>();
  const reach = Math.max(...order.map((c) => Math.abs(x[from[c]!]! - x[to[c]!]!)), 0);
  for (let i = 0; i < order.length; i++) {
    const p = order[i]!;
    const high = Math.max(x[from[p]!]!, x[to[p]!]!);
    for (let j = i + 1; j < order.length && lowX(order[j]!) <= Math.min(high, lowX(p) + reach); j++) {
      const q = order[j]!;
      if (p < first && q < first) continue;
      if (!chordsCross(p, q)) continue;
      if (p >= first) found.add(p);
      if (q >= first) found.add(q);
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
