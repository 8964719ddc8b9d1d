/**
 * A second numbering of the unknowns. Solvers work in one that suits their factor and the cache ("inner"); everybody
 * else keeps the numbering of the mesh ("outer").
 */
import type { SparsityPattern } from "./pattern.ts";

export interface Numbering {
  /** outer number of each inner one */
  readonly outerOf: Int32Array;
  /** inner number of each outer one */
  readonly innerOf: Int32Array;
}

export function numberingFrom(outerOf: Int32Array): Numbering {
  const innerOf = new Int32Array(outerOf.length);
  for (let i = 0; i < outerOf.length; i++) innerOf[outerOf[i]!] = i;
  return { outerOf, innerOf };
}

/** out = x in the inner numbering */
export function toInner({ outerOf }: Numbering, x: Float64Array, out: Float64Array): Float64Array {
  for (let i = 0; i < outerOf.length; i++) out[i] = x[outerOf[i]!]!;
  return out;
}

/** out = x in the outer numbering */
export function toOuter({ outerOf }: Numbering, x: Float64Array, out: Float64Array): Float64Array {
  for (let i = 0; i < outerOf.length; i++) out[outerOf[i]!] = x[i]!;
  return out;
}

export interface RenumberedPattern {
  readonly pattern: SparsityPattern;
  /** place in the outer pattern of each entry of the inner one: inner values are gathered with it */
  readonly source: Int32Array;
}

/**
 * The pattern in the inner numbering. Entries are handed out column by column, so that every row comes out sorted
 * without sorting (a transposition of a symmetric matrix).
 */
export function renumberPattern(pattern: SparsityPattern, numbering: Numbering): RenumberedPattern {
  const { size, rowStart, columns } = pattern;
  const { outerOf, innerOf } = numbering;
  const start = new Int32Array(size + 1);
  for (let i = 0; i < size; i++)
    start[i + 1] = start[i]! + rowStart[outerOf[i]! + 1]! - rowStart[outerOf[i]!]!;
  const next = start.slice(0, size);
  const innerColumns = new Int32Array(columns.length);
  const source = new Int32Array(columns.length);
  const diagonal = new Int32Array(size);
  for (let column = 0; column < size; column++) {
    const outer = outerOf[column]!;
    for (let q = rowStart[outer]!; q < rowStart[outer + 1]!; q++) {
      const row = innerOf[columns[q]!]!;
      const place = next[row]!++;
      innerColumns[place] = column;
      source[place] = q;
      if (row === column) diagonal[row] = place;
    }
  }
  // `source` so far names entry (column, row); values are symmetric, so it serves for (row, column) as well.
  return { pattern: { size, rowStart: start, columns: innerColumns, diagonal }, source };
}

/** out = values on the inner pattern */
export function gatherValues(source: Int32Array, values: Float64Array, out: Float64Array): Float64Array {
  for (let q = 0; q < source.length; q++) out[q] = values[source[q]!]!;
  return out;
}
