/**
 * The exact solver: sparse Cholesky in WebAssembly. Nested dissection from the coordinates, elimination tree, relaxed
 * supernodes, multifrontal numeric phase; the kernels are in kernels/assembly, this file moves data in and out.
 */
import { SINGULAR_PIVOT, STEP_WORK } from "./defaults.ts";
import { NotPositiveDefiniteError } from "./errors.ts";
import { giveBackInstance, takeInstance, type KernelInstance } from "./kernels/instance.ts";
import type { Numbering, RenumberedPattern } from "./numbering.ts";
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
  const numbering = {
    outerOf: instance.ints(kernels.outerOf.value, size).slice(),
    innerOf: instance.ints(kernels.innerOf.value, size).slice(),
  };
  const inner = innerPattern(instance, size, pattern.columns.length);
  // One buffer for values on their way in: they are used up at once.
  const values = kernels.allocateReals(pattern.columns.length);
  // Room that was given back, to be used again: kernel memory itself cannot be freed piecemeal.
  const idleFactors: number[] = [];
  const idleMatrices: number[] = [];
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
      return choleskyFactor(instance, size, values, numbering, ensureLive, idleFactors);
    },
    matrix() {
      ensureLive();
      return kernelMatrix(instance, size, pattern.columns.length, ensureLive, idleMatrices);
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
  const { rowStart, columns, source, diagonal } = instance.exports;
  const copy = (list: { readonly value: number }, count: number) => instance.ints(list.value, count).slice();
  return {
    pattern: {
      size,
      rowStart: copy(rowStart, size + 1),
      columns: copy(columns, entries),
      diagonal: copy(diagonal, size),
    },
    source: copy(source, entries),
  };
}

/** A matrix in kernel memory. */
interface KernelMatrix extends HeldMatrix {
  readonly pointer: number;
}

function choleskyFactor(
  instance: KernelInstance,
  size: number,
  valueBuffer: number,
  { outerOf }: Numbering,
  ensureLive: () => void,
  idle: number[],
): Factor {
  const kernels = instance.exports;
  const factor = idle.pop() ?? kernels.newFactor();
  const workX = kernels.workX.value;
  const workY = kernels.workY.value;
  let filled = false;
  let released = false;
  const ensureFilled = () => {
    ensureLive();
    if (!filled) throw new Error("the factor holds no matrix yet");
  };
  const begin = (values: Float64Array) => {
    ensureLive();
    if (released) throw new Error("the factor was released");
    filled = false;
    instance.reals(valueBuffer, values.length).set(values);
    kernels.beginFactorization(factor, valueBuffer);
  };
  const goOn = (work: number): boolean => {
    const state = kernels.continueFactorization(factor, SINGULAR_PIVOT, work);
    if (state === 0)
      throw new NotPositiveDefiniteError(
        outerOf[kernels.failedUnknown.value]!,
        kernels.failedPivot.value,
        kernels.failedDiagonal.value,
      );
    filled = state === 1;
    return filled;
  };
  return {
    refresh(values) {
      begin(values);
      goOn(Infinity);
    },
    *refreshInSteps(values) {
      begin(values);
      while (!goOn(STEP_WORK)) yield Math.min(1, kernels.factorizationWork() / kernels.factorWork.value);
    },
    solve(b, x) {
      ensureFilled();
      const work = instance.reals(workX, size);
      work.set(b);
      kernels.solve(factor, workX);
      x.set(work);
      return 1;
    },
    solveProduct(matrix, x, extra, out) {
      ensureFilled();
      const work = instance.reals(workY, size);
      instance.reals(workX, size).set(x);
      work.set(extra);
      kernels.multiplyAdd((matrix as KernelMatrix).pointer, workX, workY, workY);
      kernels.solve(factor, workY);
      out.set(work);
      return 1;
    },
    release() {
      filled = false;
      if (!released) idle.push(factor);
      released = true;
    },
  };
}

function kernelMatrix(
  instance: KernelInstance,
  size: number,
  entries: number,
  ensureLive: () => void,
  idle: number[],
): KernelMatrix {
  const kernels = instance.exports;
  const pointer = idle.pop() ?? kernels.allocateReals(entries);
  const workX = kernels.workX.value;
  const workY = kernels.workY.value;
  return {
    pointer,
    refresh(values) {
      ensureLive();
      instance.reals(pointer, entries).set(values);
    },
    multiply(x, out) {
      ensureLive();
      const product = instance.reals(workY, size);
      instance.reals(workX, size).set(x);
      product.fill(0);
      kernels.multiplyAdd(pointer, workX, workY, workY);
      out.set(product);
      return out;
    },
    release() {
      idle.push(pointer);
    },
  };
}
