/** Factors of C + w K for the few weights w (time steps) in use, refilled in place when a new weight comes. */
import type { Factor, HeldMatrix, SparseSolver } from "../linalg/solver.ts";
import { SAME_INSTANT } from "./defaults.ts";
import { shiftedMatrix, type InnerSystem } from "./innerSystem.ts";
import type { WorkCounts } from "./workspace.ts";

interface KeptFactor {
  weight: number;
  lastUse: number;
  readonly factor: Factor;
}

export class ShiftedFactors {
  factorizations = 0;
  solves = 0;
  linearIterations = 0;
  private readonly kept: KeptFactor[] = [];
  private readonly values: Float64Array;
  private uses = 0;

  constructor(
    private readonly solver: SparseSolver,
    private readonly system: InnerSystem,
    private readonly capacityOfShelf: number,
    private readonly counts: WorkCounts,
  ) {
    this.values = new Float64Array(system.capacity.length);
  }

  /** Solve (C + weight K) x = b with the held unknowns decoupled; `x` holds a guess on entry. */
  solve(weight: number, b: Float64Array, x: Float64Array): Float64Array {
    this.count(this.factorFor(weight).solve(b, x));
    return x;
  }

  /** out = (C + weight K)^-1 (M x + extra); `out` holds a guess on entry. */
  solveProduct(
    weight: number,
    matrix: HeldMatrix,
    x: Float64Array,
    extra: Float64Array,
    out: Float64Array,
  ): Float64Array {
    this.count(this.factorFor(weight).solveProduct(matrix, x, extra, out));
    return out;
  }

  /** give the room of all factors back */
  release(): void {
    for (const { factor } of this.kept) factor.release();
    this.kept.length = 0;
  }

  private count(iterations: number): void {
    this.linearIterations += iterations;
    this.solves++;
    this.counts.solves++;
  }

  private factorFor(weight: number): Factor {
    const found = this.kept.find((entry) => Math.abs(entry.weight - weight) <= SAME_INSTANT * weight);
    if (found) {
      found.lastUse = ++this.uses;
      return found.factor;
    }
    let entry = this.kept.reduce<KeptFactor | undefined>(
      (oldest, next) => (oldest && oldest.lastUse < next.lastUse ? oldest : next),
      undefined,
    );
    if (!entry || this.kept.length < this.capacityOfShelf) {
      entry = { weight, lastUse: 0, factor: this.solver.factor() };
      this.kept.push(entry);
    }
    entry.weight = weight;
    entry.lastUse = ++this.uses;
    entry.factor.refresh(shiftedMatrix(this.system, weight, this.values));
    this.factorizations++;
    this.counts.factorizations++;
    return entry.factor;
  }
}

/** A matrix of the system, held where it multiplies fastest. */
export function heldMatrix(solver: SparseSolver, values: Float64Array): HeldMatrix {
  const matrix = solver.matrix();
  matrix.refresh(values);
  return matrix;
}
