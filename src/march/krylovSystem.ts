/**
 * What the Krylov march can use again while its inputs stand: the matrices in the inner numbering, a factor of C + g K
 * per shift, and the basis of every load vector. Signals and start values are no part of it, so that another ambient,
 * another held value or another uniform start costs no solve.
 */
import type { Factor, HeldMatrix, SparseSolver } from "../linalg/solver.ts";
import { toInner } from "../linalg/numbering.ts";
import { KRYLOV } from "./defaults.ts";
import { freeRows, innerSystem, shiftedMatrix, type InnerSystem } from "./innerSystem.ts";
import { KrylovBasis, type KrylovOperator } from "./krylovBasis.ts";
import type { LinearSystem } from "./types.ts";
import type { WorkCounts } from "./workspace.ts";

/** One shift: its factor and the bases grown with it. */
export class KrylovLayer implements KrylovOperator {
  private readonly bases = new Map<Float64Array, KrylovBasis>();

  constructor(
    readonly shift: number,
    readonly factor: Factor,
    readonly capacity: HeldMatrix,
  ) {}

  /** The basis of a vector; kept under it when `keep` is set. Vectors are told apart by identity. */
  basisOf(vector: Float64Array, keep: boolean): KrylovBasis {
    const known = this.bases.get(vector);
    if (known) return known;
    const basis = new KrylovBasis(this, vector);
    if (keep) this.bases.set(vector, basis);
    return basis;
  }
}

export class KrylovSystem {
  private readonly matrices: InnerSystem;
  private readonly capacity: HeldMatrix;
  private readonly layers: KrylovLayer[] = [];
  private readonly loadVectors = new Map<Float64Array, Float64Array>();
  private readonly values: Float64Array;

  constructor(
    private readonly source: LinearSystem,
    readonly solver: SparseSolver,
    private readonly counts: WorkCounts,
  ) {
    this.matrices = innerSystem({ ...source, loads: [] }, solver);
    this.values = this.matrices.capacity.slice();
    this.capacity = solver.matrix();
    this.capacity.refresh(freeRows(this.matrices, this.matrices.capacity, true));
  }

  /** Whether a system has the matrices and held unknowns of this one. */
  serves(system: LinearSystem): boolean {
    const { source } = this;
    return (
      source.pattern === system.pattern &&
      source.capacity === system.capacity &&
      source.conductance === system.conductance &&
      source.held.length === system.held.length &&
      source.held.every(({ unknowns }, g) => unknowns === system.held[g]!.unknowns)
    );
  }

  /** The system in inner numbers, with the signals it has now. */
  inner(system: LinearSystem): InnerSystem {
    const loads = system.loads.map(({ vector, signal }) => ({ vector: this.loadVector(vector), signal }));
    const held = this.matrices.held.map((group, g) => ({ ...group, signal: system.held[g]!.signal }));
    return { ...this.matrices, loads, held };
  }

  /** A layer whose shift is near the one wished for; made when there is none, yielding the share of its factor. */
  *layer(shift: number): Generator<number, KrylovLayer, void> {
    const known = this.layers.find(
      (layer) => Math.abs(Math.log(layer.shift / shift)) < Math.log(KRYLOV.shiftSlack),
    );
    if (known) return known;
    if (this.layers.length >= KRYLOV.layersKept) this.layers.shift()!.factor.release();
    const factor = this.solver.factor();
    let made = false;
    try {
      yield* factor.refreshInSteps(shiftedMatrix(this.matrices, shift, this.values));
      made = true;
    } finally {
      if (!made) factor.release();
    }
    this.counts.factorizations++;
    const layer = new KrylovLayer(shift, factor, this.capacity);
    this.layers.push(layer);
    return layer;
  }

  release(): void {
    for (const { factor } of this.layers) factor.release();
    this.layers.length = 0;
    this.capacity.release();
  }

  /** A load vector in inner numbers, zero on held rows. */
  private loadVector(vector: Float64Array): Float64Array {
    let inner = this.loadVectors.get(vector);
    if (!inner) {
      inner = toInner(this.solver.numbering, vector, new Float64Array(vector.length));
      const mask = this.matrices.heldMask;
      if (mask) for (let i = 0; i < inner.length; i++) if (mask[i]) inner[i] = 0;
      this.loadVectors.set(vector, inner);
    }
    return inner;
  }
}
