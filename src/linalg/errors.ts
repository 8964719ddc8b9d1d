/** Why a linear system could not be solved, with the numbers that show it. */

/** The matrix is not positive definite: a pivot came out zero or negative. */
export class NotPositiveDefiniteError extends Error {
  override readonly name = "NotPositiveDefiniteError";
  constructor(
    /** unknown (outer numbering) at which elimination broke down, or -1 when an iteration noticed it as a whole */
    readonly unknown: number,
    /** what was left of the diagonal there */
    readonly pivot: number,
    /** the diagonal entry before elimination */
    readonly diagonal: number,
  ) {
    super(describe(unknown, pivot, diagonal));
  }
}

/** Share of its diagonal entry below which a pivot is rounding only; see `SINGULAR_PIVOT` in defaults.ts. */
function describe(unknown: number, pivot: number, diagonal: number): string {
  if (unknown < 0) return `the matrix is not positive definite: a direction has curvature ${pivot}`;
  const seen = `pivot ${pivot.toExponential(3)} of diagonal ${diagonal.toExponential(3)} at unknown ${unknown}`;
  if (!Number.isFinite(pivot)) return `the matrix holds a value that is not a number: ${seen}`;
  if (diagonal <= 0) return `the matrix is not positive definite: ${seen}, nothing stores or conducts there`;
  if (Math.abs(pivot) < 1e-8 * diagonal)
    return `the matrix is singular: ${seen}; some part is tied to nothing (for example every side insulated and a steady state asked)`;
  return `the matrix is indefinite: ${seen}`;
}

/** An iteration did not reach its tolerance. */
export class NotConvergedError extends Error {
  override readonly name = "NotConvergedError";
  constructor(
    readonly iterations: number,
    readonly relativeResidual: number,
    readonly aim: number,
  ) {
    super(
      `conjugate gradients stand at relative residual ${relativeResidual.toExponential(2)} after ${iterations} iterations, ` +
        `${aim.toExponential(2)} was asked; the matrix is singular or nearly so`,
    );
  }
}
