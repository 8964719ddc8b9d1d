/**
 * Eigenvalues and eigenvectors of a small symmetric tridiagonal matrix: implicit QL with Wilkinson's shift (Golub and
 * Van Loan, Matrix Computations, sec. 8.3, from memory). Meant for some tens of rows.
 */
export interface TridiagonalEigen {
  readonly values: Float64Array;
  /** eigenvector i is column i: entry (row, i) stands at row * size + i */
  readonly vectors: Float64Array;
}

/** Turns allowed for one eigenvalue; three are usual. */
const TURNS = 60;

/**
 * @param diagonal    n values
 * @param offDiagonal n - 1 values
 * @throws when an eigenvalue does not settle (entries that are not numbers)
 */
export function tridiagonalEigen(
  diagonal: ArrayLike<number>,
  offDiagonal: ArrayLike<number>,
): TridiagonalEigen {
  const n = diagonal.length;
  const d = Float64Array.from(diagonal);
  const e = new Float64Array(n);
  for (let i = 0; i < n - 1; i++) e[i] = offDiagonal[i]!;
  const vectors = new Float64Array(n * n);
  for (let i = 0; i < n; i++) vectors[i * n + i] = 1;
  for (let first = 0; first < n; first++) {
    for (let turn = 0; ; turn++) {
      const last = endOfBlock(d, e, first);
      if (last === first) break;
      if (turn === TURNS)
        throw new Error(`eigenvalue ${first} of ${n} did not settle: ${d[first]}, ${e[first]}`);
      sweep(d, e, vectors, first, last);
    }
  }
  return { values: d, vectors };
}

/** Last row of the block that begins at `first` and is not yet cut by a negligible off-diagonal entry. */
function endOfBlock(d: Float64Array, e: Float64Array, first: number): number {
  let last = first;
  while (last < d.length - 1) {
    const size = Math.abs(d[last]!) + Math.abs(d[last + 1]!);
    if (Math.abs(e[last]!) <= Number.EPSILON * size) break;
    last++;
  }
  return last;
}

/** One implicit QL sweep over rows first..last, rotations gathered into the vectors. */
function sweep(d: Float64Array, e: Float64Array, vectors: Float64Array, first: number, last: number): void {
  const n = d.length;
  const half = (d[first + 1]! - d[first]!) / (2 * e[first]!);
  const root = Math.hypot(half, 1);
  let g = d[last]! - d[first]! + e[first]! / (half + (half >= 0 ? root : -root));
  let [sine, cosine, lifted] = [1, 1, 0];
  for (let i = last - 1; i >= first; i--) {
    const f = sine * e[i]!;
    const b = cosine * e[i]!;
    const r = Math.hypot(f, g);
    e[i + 1] = r;
    if (r === 0) {
      d[i + 1]! -= lifted;
      e[last] = 0;
      return;
    }
    sine = f / r;
    cosine = g / r;
    g = d[i + 1]! - lifted;
    const turned = (d[i]! - g) * sine + 2 * cosine * b;
    lifted = sine * turned;
    d[i + 1] = g + lifted;
    g = cosine * turned - b;
    for (let row = 0; row < n; row++) {
      const right = vectors[row * n + i + 1]!;
      const left = vectors[row * n + i]!;
      vectors[row * n + i + 1] = sine * left + cosine * right;
      vectors[row * n + i] = cosine * left - sine * right;
    }
  }
  d[first]! -= lifted;
  e[first] = g;
  e[last] = 0;
}
