/**
 * Solves with a matrix that keeps changing a little: conjugate gradients preconditioned by the exact factor of an
 * earlier one. While the factor is current one iteration does; after a change of some percent a handful; after a change
 * by a factor of two about ten, as much as a new factor costs. So the factor is kept until what it has cost beyond one
 * iteration per solve adds up to the price of a new one: never more than twice the work of the best choice in hindsight.
 */
import {
  conjugateGradients,
  conjugateGradientsWork,
  type ConjugateGradientsWork,
} from "./conjugateGradients.ts";
import { FACTOR_COST_IN_SOLVES, RELATIVE_RESIDUAL } from "./defaults.ts";
import type { Factor, HeldMatrix, SparseSolver } from "./solver.ts";

export class KeptFactor {
  factorizations = 0;
  iterations = 0;
  private readonly factor: Factor;
  private readonly matrix: HeldMatrix;
  private readonly values: Float64Array;
  private readonly work: ConjugateGradientsWork;
  /** iterations beyond one per solve since the factor was made */
  private overspent = Infinity;
  private current = false;

  constructor(
    private readonly solver: SparseSolver,
    private readonly relativeResidual = RELATIVE_RESIDUAL,
  ) {
    this.factor = solver.factor();
    this.matrix = solver.matrix();
    this.values = new Float64Array(solver.inner.source.length);
    this.work = conjugateGradientsWork(solver.inner.pattern.size);
  }

  /** The matrix to solve with from now on, by its values on the inner pattern. */
  update(values: Float64Array): void {
    this.values.set(values);
    this.matrix.refresh(values);
    this.current = false;
  }

  /**
   * Solve A x = b in inner numbers; `x` holds a guess on entry.
   *
   * @returns iterations spent
   * @throws NotPositiveDefiniteError when the matrix is not positive definite
   */
  solve(b: Float64Array, x: Float64Array): number {
    if (!this.current && this.overspent >= FACTOR_COST_IN_SOLVES) {
      this.factor.refresh(this.values);
      this.factorizations++;
      this.overspent = 0;
      this.current = true;
    }
    const spent = this.current ? this.factor.solve(b, x) : this.iterate(b, x);
    this.iterations += spent;
    if (!this.current) this.overspent += Math.max(0, spent - 1);
    return spent;
  }

  release(): void {
    this.factor.release();
    this.matrix.release();
  }

  private iterate(b: Float64Array, x: Float64Array): number {
    const preconditioner = {
      apply: (residual: Float64Array, out: Float64Array) => {
        // Of conjugate gradients as a factor, a guess of 0 keeps the preconditioner a fixed matrix to their tolerance.
        if (this.solver.kind === "conjugate-gradients") out.fill(0);
        this.factor.solve(residual, out);
      },
    };
    const options = { relativeResidual: this.relativeResidual };
    return conjugateGradients(this.matrix, b, preconditioner, this.work, options, x);
  }
}
