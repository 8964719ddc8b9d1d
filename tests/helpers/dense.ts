/**
 * Dense reference algebra, written for clarity: what the sparse engine is held against on small systems. A matrix is
 * an array of rows.
 */
import type { SparsityPattern } from "../../src/linalg/pattern.ts";
import { signalAt } from "../../src/march/signals.ts";
import type { LinearSystem, Signal } from "../../src/march/types.ts";

export type Dense = number[][];

export function denseOf({ size, rowStart, columns }: SparsityPattern, values: Float64Array): Dense {
  const a: Dense = Array.from({ length: size }, () => new Array<number>(size).fill(0));
  for (let i = 0; i < size; i++)
    for (let q = rowStart[i]!; q < rowStart[i + 1]!; q++) a[i]![columns[q]!] = values[q]!;
  return a;
}

export const times = (a: Dense, x: ArrayLike<number>): number[] =>
  a.map((row) => row.reduce((sum, value, j) => sum + value * x[j]!, 0));

/** Solve by Gaussian elimination with row exchanges. */
export function denseSolve(matrix: Dense, b: ArrayLike<number>): number[] {
  const n = matrix.length;
  const a = matrix.map((row, i) => [...row, b[i]!]);
  for (let k = 0; k < n; k++) {
    let best = k;
    for (let i = k + 1; i < n; i++) if (Math.abs(a[i]![k]!) > Math.abs(a[best]![k]!)) best = i;
    [a[k], a[best]] = [a[best]!, a[k]!];
    for (let i = k + 1; i < n; i++) {
      const factor = a[i]![k]! / a[k]![k]!;
      for (let j = k; j <= n; j++) a[i]![j]! -= factor * a[k]![j]!;
    }
  }
  const x = new Array<number>(n).fill(0);
  for (let i = n - 1; i >= 0; i--) {
    let sum = a[i]![n]!;
    for (let j = i + 1; j < n; j++) sum -= a[i]![j]! * x[j]!;
    x[i] = sum / a[i]![i]!;
  }
  return x;
}

/** Lower triangular L with L L' = A. */
export function denseCholesky(a: Dense): Dense {
  const n = a.length;
  const l: Dense = a.map((row) => row.map(() => 0));
  for (let i = 0; i < n; i++)
    for (let j = 0; j <= i; j++) {
      let sum = a[i]![j]!;
      for (let k = 0; k < j; k++) sum -= l[i]![k]! * l[j]![k]!;
      l[i]![j] = i === j ? Math.sqrt(sum) : sum / l[j]![j]!;
    }
  return l;
}

/** Eigenvalues and eigenvectors (columns of `vectors`) of a symmetric matrix, by cyclic Jacobi rotations. */
export function denseEigen(matrix: Dense): { values: number[]; vectors: Dense } {
  const n = matrix.length;
  const a = matrix.map((row) => [...row]);
  const v: Dense = a.map((_, i) => a.map((__, j) => (i === j ? 1 : 0)));
  for (let sweep = 0; sweep < 60; sweep++) {
    let off = 0;
    let on = 0;
    for (let i = 0; i < n; i++)
      for (let j = 0; j < n; j++)
        if (i === j) on += a[i]![j]! ** 2;
        else off += a[i]![j]! ** 2;
    if (off <= 1e-32 * on) break;
    for (let p = 0; p < n; p++)
      for (let q = p + 1; q < n; q++) {
        if (a[p]![q] === 0) continue;
        const theta = (a[q]![q]! - a[p]![p]!) / (2 * a[p]![q]!);
        const t = Math.sign(theta || 1) / (Math.abs(theta) + Math.sqrt(theta * theta + 1));
        const c = 1 / Math.sqrt(t * t + 1);
        const s = t * c;
        for (let k = 0; k < n; k++) {
          const x = a[k]![p]!;
          const y = a[k]![q]!;
          a[k]![p] = c * x - s * y;
          a[k]![q] = s * x + c * y;
        }
        for (let k = 0; k < n; k++) {
          const x = a[p]![k]!;
          const y = a[q]![k]!;
          a[p]![k] = c * x - s * y;
          a[q]![k] = s * x + c * y;
          const vx = v[k]![p]!;
          const vy = v[k]![q]!;
          v[k]![p] = c * vx - s * vy;
          v[k]![q] = s * vx + c * vy;
        }
      }
  }
  return { values: a.map((row, i) => row[i]!), vectors: v };
}

/**
 * Exact solution of C u' + K u = f0 + f1 t by eigenvectors of (K, C), C positive definite.
 *
 * @returns u as a function of time
 */
export function denseEvolution(
  capacity: Dense,
  conductance: Dense,
): (start: ArrayLike<number>, f0: ArrayLike<number>, f1: ArrayLike<number>, time: number) => number[] {
  const n = capacity.length;
  const l = denseCholesky(capacity);
  const inverse = (b: number[]) => forward(l, b);
  // B = L^-1 K L^-T, built column by column from both sides
  const half = transpose(conductance.map((row) => inverse(row)));
  const b = half.map((row) => inverse(row));
  const symmetric = b.map((row, i) => row.map((value, j) => 0.5 * (value + b[j]![i]!)));
  const { values, vectors } = denseEigen(symmetric);
  const modes = transpose(transpose(vectors).map((vector) => backward(l, vector)));
  const project = (f: ArrayLike<number>) =>
    transpose(modes).map((mode) => mode.reduce((s, m, i) => s + m * f[i]!, 0));
  return (start, f0, f1, time) => {
    const a = project(times(capacity, start));
    const p = project(f0);
    const q = project(f1);
    const y = a.map((value, k) => {
      const x = values[k]! * time;
      return Math.exp(-x) * value + time * phi1(x) * p[k]! + time * time * phi2(x) * q[k]!;
    });
    return Array.from({ length: n }, (_, i) => y.reduce((sum, value, k) => sum + modes[i]![k]! * value, 0));
  };
}

const phi1 = (x: number) => (Math.abs(x) < 1e-5 ? 1 - x / 2 + (x * x) / 6 : -Math.expm1(-x) / x);
const phi2 = (x: number) =>
  Math.abs(x) < 1e-2
    ? 0.5 - x / 6 + x ** 2 / 24 - x ** 3 / 120 + x ** 4 / 720
    : (x + Math.expm1(-x)) / (x * x);

const transpose = (a: Dense): Dense => a[0]!.map((_, j) => a.map((row) => row[j]!));

function forward(l: Dense, b: readonly number[]): number[] {
  const x = [...b];
  for (let i = 0; i < x.length; i++) {
    for (let k = 0; k < i; k++) x[i]! -= l[i]![k]! * x[k]!;
    x[i]! /= l[i]![i]!;
  }
  return x;
}

function backward(l: Dense, b: readonly number[]): number[] {
  const x = [...b];
  for (let i = x.length - 1; i >= 0; i--) {
    for (let k = i + 1; k < x.length; k++) x[i]! -= l[k]![i]! * x[k]!;
    x[i]! /= l[i]![i]!;
  }
  return x;
}

/**
 * Exact solution of a linear stage, knots of the signals and held unknowns included: from knot to knot by eigenvectors.
 * Held unknowns start at their held value.
 */
export function denseMarch(system: LinearSystem, start: ArrayLike<number>): (time: number) => number[] {
  const n = system.pattern.size;
  const c = denseOf(system.pattern, system.capacity);
  const k = denseOf(system.pattern, system.conductance);
  const held = new Map<number, Signal>();
  for (const { unknowns, signal } of system.held) for (const i of unknowns) held.set(i, signal);
  const free = Array.from({ length: n }, (_, i) => i).filter((i) => !held.has(i));
  const part = (a: Dense) => free.map((i) => free.map((j) => a[i]![j]!));
  const evolve = denseEvolution(part(c), part(k));
  const all = [...system.loads, ...system.held].flatMap(({ signal }) => [...signal.times]);
  const knots = [0, ...new Set(all.filter((time) => time > 0))].sort((a, b) => a - b);
  const slopeOf = (signal: Signal, from: number) => {
    const next = signal.times.find((time) => time > from);
    return next === undefined || signal.times[0]! > from
      ? 0
      : (signalAt(signal, next) - signalAt(signal, from)) / (next - from);
  };
  /** constant and slope of the free right-hand sides from a knot on */
  const loadsFrom = (from: number) => {
    const constant = new Array<number>(free.length).fill(0);
    const slope = new Array<number>(free.length).fill(0);
    free.forEach((i, row) => {
      for (const { vector, signal } of system.loads) {
        constant[row]! += vector[i]! * signalAt(signal, from);
        slope[row]! += vector[i]! * slopeOf(signal, from);
      }
      for (const [j, signal] of held) {
        constant[row]! -= k[i]![j]! * signalAt(signal, from) + c[i]![j]! * slopeOf(signal, from);
        slope[row]! -= k[i]![j]! * slopeOf(signal, from);
      }
    });
    return { constant, slope };
  };
  return (time) => {
    let u = free.map((i) => start[i]!);
    for (let q = 0; q < knots.length && (q === 0 || knots[q]! < time); q++) {
      const { constant, slope } = loadsFrom(knots[q]!);
      u = evolve(u, constant, slope, Math.min(time, knots[q + 1] ?? Infinity) - knots[q]!);
    }
    const out = new Array<number>(n).fill(0);
    free.forEach((i, row) => (out[i] = u[row]!));
    for (const [i, signal] of held) out[i] = signalAt(signal, time);
    return out;
  };
}
