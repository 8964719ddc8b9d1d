/**
 * Incomplete Cholesky factor without fill: L has the pattern of the lower triangle of A, and L L' agrees with A on
 * that pattern. Meijerink and van der Vorst (1977) show that it exists for M-matrices; quadratic elements and
 * consistent capacity are none, so a pivot may fail: then the diagonal is raised by a small share and the factor
 * built anew (Manteuffel 1980), which weakens the preconditioner a little and always succeeds in the end.
 */
import { FIRST_DIAGONAL_SHIFT } from "./defaults.ts";
import { NotPositiveDefiniteError } from "./errors.ts";
import type { Preconditioner } from "./conjugateGradients.ts";
import type { SparsityPattern } from "./pattern.ts";

export interface IncompleteCholesky extends Preconditioner {
  /** compute the factor of these values, in place */
  refresh(values: Float64Array): void;
  /** share by which the diagonal had to be raised, 0 as a rule */
  readonly shift: number;
}

export function incompleteCholesky(pattern: SparsityPattern): IncompleteCholesky {
  const lower = strictLowerTriangle(pattern);
  const factor = new Float64Array(lower.columns.length);
  const inverseDiagonal = new Float64Array(pattern.size);
  const placeOf = new Int32Array(pattern.size).fill(-1);
  let shift = 0;
  return {
    get shift() {
      return shift;
    },
    refresh(values) {
      refuseBadDiagonal(pattern, values);
      shift = 0;
      while (!tryFactor(pattern, values, shift, lower, placeOf, factor, inverseDiagonal))
        shift = shift === 0 ? FIRST_DIAGONAL_SHIFT : 2 * shift;
    },
    apply(residual, out) {
      solveWithFactor(lower, factor, inverseDiagonal, residual, out);
    },
  };
}

interface LowerTriangle {
  readonly rowStart: Int32Array;
  readonly columns: Int32Array;
}

function strictLowerTriangle({ size, rowStart, columns, diagonal }: SparsityPattern): LowerTriangle {
  const start = new Int32Array(size + 1);
  for (let i = 0; i < size; i++) start[i + 1] = start[i]! + diagonal[i]! - rowStart[i]!;
  const lowerColumns = new Int32Array(start[size]!);
  for (let i = 0; i < size; i++) lowerColumns.set(columns.subarray(rowStart[i]!, diagonal[i]!), start[i]!);
  return { rowStart: start, columns: lowerColumns };
}

/** A diagonal that is not positive would make the shift grow for ever. */
function refuseBadDiagonal({ size, diagonal }: SparsityPattern, values: Float64Array): void {
  for (let i = 0; i < size; i++) {
    const value = values[diagonal[i]!]!;
    if (!(value > 0 && value < Infinity)) throw new NotPositiveDefiniteError(i, value, value);
  }
}

/** Row by row; false when a pivot is not positive. `placeOf` must be -1 everywhere and is so again afterwards. */
function tryFactor(
  { size, rowStart, diagonal }: SparsityPattern,
  values: Float64Array,
  shift: number,
  lower: LowerTriangle,
  placeOf: Int32Array,
  factor: Float64Array,
  inverseDiagonal: Float64Array,
): boolean {
  const { rowStart: start, columns } = lower;
  for (let i = 0; i < size; i++) {
    const begin = start[i]!;
    const end = start[i + 1]!;
    for (let q = begin; q < end; q++) {
      placeOf[columns[q]!] = q;
      factor[q] = values[rowStart[i]! + q - begin]!;
    }
    let pivot = values[diagonal[i]!]! * (1 + shift);
    for (let q = begin; q < end; q++) {
      const j = columns[q]!;
      let value = factor[q]!;
      for (let t = start[j]!; t < start[j + 1]!; t++) {
        const place = placeOf[columns[t]!]!;
        if (place >= 0) value -= factor[t]! * factor[place]!;
      }
      value *= inverseDiagonal[j]!;
      factor[q] = value;
      pivot -= value * value;
    }
    for (let q = begin; q < end; q++) placeOf[columns[q]!] = -1;
    if (!(pivot > 0)) return false;
    inverseDiagonal[i] = 1 / Math.sqrt(pivot);
  }
  return true;
}

/** out = (L L')^-1 b */
function solveWithFactor(
  { rowStart, columns }: LowerTriangle,
  factor: Float64Array,
  inverseDiagonal: Float64Array,
  b: Float64Array,
  out: Float64Array,
): void {
  const size = inverseDiagonal.length;
  for (let i = 0; i < size; i++) {
    let value = b[i]!;
    for (let q = rowStart[i]!; q < rowStart[i + 1]!; q++) value -= factor[q]! * out[columns[q]!]!;
    out[i] = value * inverseDiagonal[i]!;
  }
  for (let i = size - 1; i >= 0; i--) {
    const value = out[i]! * inverseDiagonal[i]!;
    out[i] = value;
    for (let q = rowStart[i]!; q < rowStart[i + 1]!; q++) out[columns[q]!]! -= factor[q]! * value;
  }
}
