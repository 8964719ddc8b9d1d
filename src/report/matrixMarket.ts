/** Matrix Market exchange files (NIST, "The Matrix Market Exchange Formats"): any linear-algebra library reads them. */
import type { SparsityPattern } from "../linalg/pattern.ts";

/** A symmetric matrix: coordinate form, lower triangle stored, numbers from 1. */
export function symmetricMatrix(pattern: SparsityPattern, values: Float64Array, comment: string): string {
  const lines: string[] = [];
  for (let row = 0; row < pattern.size; row++)
    for (let k = pattern.rowStart[row]!; k < pattern.rowStart[row + 1]!; k++) {
      const column = pattern.columns[k]!;
      if (column <= row && (values[k] !== 0 || column === row))
        lines.push(`${row + 1} ${column + 1} ${values[k]}`);
    }
  return [
    "%%MatrixMarket matrix coordinate real symmetric",
    `% ${comment}`,
    `${pattern.size} ${pattern.size} ${lines.length}`,
    ...lines,
    "",
  ].join("\n");
}

/** A dense array, stored by columns. @param columns each of the same length */
export function denseArray(columns: readonly ArrayLike<number>[], comment: string): string {
  return [
    "%%MatrixMarket matrix array real general",
    `% ${comment}`,
    `${columns[0]!.length} ${columns.length}`,
    ...columns.flatMap((column) => Array.from(column, String)),
    "",
  ].join("\n");
}
