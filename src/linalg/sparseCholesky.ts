/**
 * The exact solver: sparse Cholesky in WebAssembly. Nested dissection from the coordinates, elimination tree, relaxed
 * supernodes, multifrontal numeric phase; the kernels are in kernels/assembly, this file moves data in and out.
 */
import { SINGULAR_PIVOT } from "./defaults.ts";
import { NotPositiveDefiniteError } from "./errors.ts";
import { giveBackInstance, takeInstance, type KernelInstance } from "./kernels/instance.ts";
import { numberingFrom, type Numbering, type RenumberedPattern } from "./numbering.ts";
import type { SparsityPattern } from "./pattern.ts";
import type { Factor, HeldMatrix, SparseSolver } from "./solver.ts";

/**
 * Analyse a pattern for exact factors.
 *
 * @param coordinates  2 per unknown; only ratios matter
 * @throws when WebAssembly SIMD is missing, or memory runs out
 */
export function choleskySolver(pattern: SparsityPattern, coordinates: Float64Array): SparseSolver {
  const { size } = pattern;
  if (coordinates.length !== 2 * size)
    throw new Error(`${coordinates.length} coordinates for ${size} unknowns, 2 each are needed`);
  const instance = takeInstance();
  const kernels = instance.exports;
  analyze(instance, pattern, coordinates);
  const numbering = numberingFrom(instance.ints(kernels.outerOf.value, size).slice());
  const inner = innerPattern(instance, size, pattern.columns.length);
  // One buffer for values on their way in: they are used up at once.
  const values = kernels.allocateReals(pattern.columns.length);
  let live = true;
  const ensureLive = () => {
    if (!live) throw new Error("the solver was released");
  };
  return {
    kind: "cholesky",
    numbering,
    inner,
    facts: { factorEntries: kernels.factorEntries.value, factorWork: kernels.factorWork.value },
    factor() {
      ensureLive();
      return choleskyFactor(instance, size, values, numbering, ensureLive);
    },
    matrix() {
      ensureLive();
      return kernelMatrix(instance, size, pattern.columns.length, ensureLive);
    },
    release() {
      if (live) giveBackInstance(instance);
      live = false;
    },
  };
}

function analyze(instance: KernelInstance, pattern: SparsityPattern, coordinates: Float64Array): void {
  const { size, rowStart, columns } = pattern;
  const kernels = instance.exports;
  const pRowStart = kernels.allocateInts(size + 1);
  const pColumns = kernels.allocateInts(columns.length);
  const pCoordinates = kernels.allocateReals(2 * size);
  instance.ints(pRowStart, size + 1).set(rowStart);
  instance.ints(pColumns, columns.length).set(columns);
  instance.reals(pCoordinates, 2 * size).set(coordinates);
  kernels.analyze(size, pRowStart, pColumns, pCoordinates);
}

function innerPattern(instance: KernelInstance, size: number, entries: number): RenumberedPattern {
  const kernels = instance.exports;
  const rowStart = instance.ints(kernels.rowStart.value, size + 1).slice();
  const columns = instance.ints(kernels.columns.value, entries).slice();
  const source = instance.ints(kernels.source.value, entries).slice();
  const diagonal = new Int32Array(size);
  for (let i = 0; i < size; i++) {
    let place = rowStart[i]!;
    while (columns[place] !== i) place++;
    diagonal[i] = place;
  }
  return { pattern: { size, rowStart, columns, diagonal }, source };
}

function choleskyFactor(
  instance: KernelInstance,
  size: number,
  valueBuffer: number,
  { outerOf }: Numbering,
  ensureLive: () => void,
): Factor {
  const kernels = instance.exports;
  const factor = kernels.newFactor();
  let filled = false;
  return {
    refresh(values) {
      ensureLive();
      instance.reals(valueBuffer, values.length).set(values);
      filled = kernels.factorize(factor, valueBuffer, SINGULAR_PIVOT) !== 0;
      if (!filled)
        throw new NotPositiveDefiniteError(
          outerOf[kernels.failedUnknown.value]!,
          kernels.failedPivot.value,
          kernels.failedDiagonal.value,
        );
    },
    solve(b, x) {
      ensureLive();
      if (!filled) throw new Error("the factor holds no matrix yet");
      const work = instance.reals(kernels.workX.value, size);
      work.set(b);
      kernels.solve(factor, kernels.workX.value);
      x.set(work);
      return 1;
    },
  };
}

function kernelMatrix(
  instance: KernelInstance,
  size: number,
  entries: number,
  ensureLive: () => void,
): HeldMatrix {
  const kernels = instance.exports;
  const own = kernels.allocateReals(entries);
  return {
    refresh(values) {
      ensureLive();
      instance.reals(own, entries).set(values);
    },
    multiply(x, out) {
      ensureLive();
      instance.reals(kernels.workX.value, size).set(x);
      kernels.multiply(own, kernels.workX.value, kernels.workY.value);
      out.set(instance.reals(kernels.workY.value, size));
      return out;
    },
  };
}
