/**
 * Coordinates for a graph that comes without any, good enough to cut it in two again and again: distances in links
 * from two far ends, smoothed by averaging over neighbours so that the levels spread out.
 */
import type { SparsityPattern } from "./pattern.ts";

const SMOOTHING_ROUNDS = 4;

/** @returns 2 per unknown */
export function graphCoordinates(pattern: SparsityPattern): Float64Array {
  const { size } = pattern;
  const coordinates = new Float64Array(2 * size);
  // First axis: along the graph, between two ends found by walking. Second: from the point farthest from both.
  const from = levels(pattern, 0);
  const left = levels(pattern, farthest(from));
  const rightEnd = farthest(left);
  const right = levels(pattern, rightEnd);
  const side = levels(pattern, farthest(left.map((value, i) => Math.min(value, right[i]!))));
  for (let i = 0; i < size; i++) {
    coordinates[2 * i] = left[i]! - right[i]!;
    coordinates[2 * i + 1] = 2 * side[i]!;
  }
  for (let round = 0; round < SMOOTHING_ROUNDS; round++) smooth(pattern, coordinates);
  return coordinates;
}

/** Links from the root to each unknown; parts that it does not reach follow behind, each from a root of its own. */
function levels({ size, rowStart, columns }: SparsityPattern, root: number): Float64Array {
  const level = new Float64Array(size).fill(-1);
  const queue = new Int32Array(size);
  let end = 0;
  let head = 0;
  let offset = 0;
  for (let next = root, seed = 0; ; next = seed) {
    level[next] = offset;
    queue[end++] = next;
    for (; head < end; head++) {
      const unknown = queue[head]!;
      for (let q = rowStart[unknown]!; q < rowStart[unknown + 1]!; q++) {
        const neighbour = columns[q]!;
        if (level[neighbour]! >= 0) continue;
        level[neighbour] = level[unknown]! + 1;
        queue[end++] = neighbour;
      }
    }
    if (end === size) return level;
    offset = level[queue[end - 1]!]! + 2;
    while (level[seed]! >= 0) seed++;
  }
}

function farthest(level: Float64Array): number {
  let best = 0;
  for (let i = 1; i < level.length; i++) if (level[i]! > level[best]!) best = i;
  return best;
}

function smooth({ size, rowStart, columns }: SparsityPattern, out: Float64Array): void {
  const before = out.slice();
  for (let i = 0; i < size; i++) {
    let r = 0;
    let z = 0;
    for (let q = rowStart[i]!; q < rowStart[i + 1]!; q++) {
      r += before[2 * columns[q]!]!;
      z += before[2 * columns[q]! + 1]!;
    }
    const count = rowStart[i + 1]! - rowStart[i]!;
    out[2 * i] = r / count;
    out[2 * i + 1] = z / count;
  }
}
