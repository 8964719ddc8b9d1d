/** One Lanczos basis: how it grows, when it is good enough, what it answers. */
import type { Factor, HeldMatrix } from "../linalg/solver.ts";
import { tridiagonalEigen } from "../linalg/tridiagonal.ts";
import { KRYLOV } from "./defaults.ts";
import type { InnerSystem } from "./innerSystem.ts";
import type { DrivenVector, LoadEvent } from "./krylovLoads.ts";
import { phi1, phi2, phi3 } from "./phi.ts";

export interface KrylovBasis {
  /** out += the response at a time of the segment */
  addField(time: number, out: Float64Array): void;
  /** out += the integral of the response over [0, time] */
  addIntegral(time: number, out: Float64Array): void;
  /** estimate of its largest error at the instants that matter */
  readonly estimate: number;
}

interface Lanczos {
  readonly vectors: Float64Array[];
  readonly diagonal: number[];
  readonly offDiagonal: number[];
  /** capacity norm of the start vector */
  readonly norm: number;
}

/** The small system of the first m vectors. */
interface Small {
  readonly size: number;
  readonly lambda: Float64Array;
  readonly theta: Float64Array;
  readonly vectors: Float64Array;
}

/**
 * Grows a basis until its estimate is below the tolerance at every instant, or the vectors allowed are spent. Yields
 * the share of them that is spent.
 */
export function* growBasis(
  system: InnerSystem,
  factor: Factor,
  capacity: HeldMatrix,
  shift: number,
  driven: DrivenVector,
  instants: readonly number[],
  tolerance: number,
  mustDo: boolean,
): Generator<number, { basis: KrylovBasis; solves: number; iterations: number }, void> {
  const size = driven.vector.length;
  const image = new Float64Array(size);
  const first = new Float64Array(size);
  let iterations = factor.solve(driven.vector, first);
  let solves = 1;
  multiplyFree(system, capacity, first, image);
  const norm = Math.sqrt(Math.max(0, dot(first, image)));
  const lanczos: Lanczos = { vectors: [scaled(first, 1 / norm)], diagonal: [], offDiagonal: [], norm };
  const allowed = mustDo ? KRYLOV.mostVectors : KRYLOV.vectorsBeforeParting;
  let estimate = Infinity;
  for (let j = 0; ; j++) {
    const v = lanczos.vectors[j]!;
    multiplyFree(system, capacity, v, image);
    const w = new Float64Array(size);
    iterations += factor.solve(image, w);
    solves++;
    const alpha = dot(w, image);
    subtract(w, alpha, v);
    if (j > 0) subtract(w, lanczos.offDiagonal[j - 1]!, lanczos.vectors[j - 1]!);
    multiplyFree(system, capacity, w, image);
    const beta = Math.sqrt(Math.max(0, dot(w, image)));
    lanczos.diagonal.push(alpha);
    const count = j + 1;
    const invariant = beta <= KRYLOV.breakdown || count >= size;
    if (!invariant) {
      lanczos.offDiagonal.push(beta);
      lanczos.vectors.push(scaled(w, 1 / beta));
    }
    const done = invariant || count >= allowed;
    if (done || (count >= KRYLOV.leastVectors && count % KRYLOV.checkEvery === 0))
      estimate = invariant ? 0 : errorEstimate(lanczos, driven.events, shift, instants);
    if (estimate <= tolerance || done) break;
    yield count / allowed;
  }
  return { basis: finished(lanczos, driven.events, shift, estimate), solves, iterations };
}

/** Twice (largest residual up to now + change over the last vectors), at the worst of the instants. */
function errorEstimate(
  lanczos: Lanczos,
  events: readonly LoadEvent[],
  shift: number,
  instants: readonly number[],
): number {
  const now = smallSystem(lanczos, lanczos.diagonal.length, shift);
  const before = smallSystem(lanczos, Math.max(1, now.size - KRYLOV.checkEvery), shift);
  const next = lanczos.vectors[now.size]!;
  const height =
    lanczos.offDiagonal[now.size - 1]! * next.reduce((most, value) => Math.max(most, Math.abs(value)), 0);
  const change = new Float64Array(next.length);
  let residual = 0;
  let worst = 0;
  for (const time of instants) {
    const weights = responseWeights(now, events, time, "field");
    residual = Math.max(residual, height * Math.abs(lastOfInverse(now, lanczos.norm, weights)));
    change.fill(0);
    addCombination(lanczos, now, weights, 1, change);
    addCombination(lanczos, before, responseWeights(before, events, time, "field"), -1, change);
    const moved = change.reduce((most, value) => Math.max(most, Math.abs(value)), 0);
    worst = Math.max(worst, 2 * (residual + moved));
  }
  return worst;
}

function finished(
  lanczos: Lanczos,
  events: readonly LoadEvent[],
  shift: number,
  estimate: number,
): KrylovBasis {
  const small = smallSystem(lanczos, lanczos.diagonal.length, shift);
  return {
    estimate,
    addField: (time, out) =>
      addCombination(lanczos, small, responseWeights(small, events, time, "field"), 1, out),
    addIntegral: (time, out) =>
      addCombination(lanczos, small, responseWeights(small, events, time, "integral"), 1, out),
  };
}

function smallSystem({ diagonal, offDiagonal }: Lanczos, size: number, shift: number): Small {
  const { values, vectors } = tridiagonalEigen(diagonal.slice(0, size), offDiagonal.slice(0, size - 1));
  // rounding can put an eigenvalue at or below 0, or above 1
  const theta = values.map((value) => Math.min(1, Math.max(KRYLOV.leastTheta, value)));
  return { size, theta, lambda: theta.map((value) => (1 / value - 1) / shift), vectors };
}

/** (1 + g lambda) times the responses to all events so far, per eigenvalue. */
function responseWeights(
  { size, lambda, theta }: Small,
  events: readonly LoadEvent[],
  time: number,
  of: "field" | "integral",
): Float64Array {
  const weights = new Float64Array(size);
  for (const event of events) {
    const since = time - event.time;
    if (since <= 0) continue;
    for (let i = 0; i < size; i++) {
      const x = lambda[i]! * since;
      // step: t phi1, its integral (and the ramp) t^2 phi2, the ramp's integral t^3 phi3
      const rank = (event.kind === "ramp" ? 2 : 1) + (of === "integral" ? 1 : 0);
      const response =
        rank === 1 ? since * phi1(x) : rank === 2 ? since ** 2 * phi2(x) : since ** 3 * phi3(x);
      weights[i]! += (event.amount * response) / theta[i]!;
    }
  }
  return weights;
}

/** out += sign |s| V S (weights * first row of S). */
function addCombination(
  { vectors, norm }: Lanczos,
  small: Small,
  weights: Float64Array,
  sign: number,
  out: Float64Array,
): void {
  const { size } = small;
  for (let j = 0; j < size; j++) {
    let coefficient = 0;
    for (let i = 0; i < size; i++)
      coefficient += small.vectors[j * size + i]! * weights[i]! * small.vectors[i]!;
    coefficient *= sign * norm;
    if (coefficient === 0) continue;
    const vector = vectors[j]!;
    for (let i = 0; i < out.length; i++) out[i]! += coefficient * vector[i]!;
  }
}

/** Last entry of T^-1 c for the coefficients c of the weights. */
function lastOfInverse({ size, theta, vectors }: Small, norm: number, weights: Float64Array): number {
  let sum = 0;
  for (let i = 0; i < size; i++)
    sum += ((vectors[(size - 1) * size + i]! * weights[i]!) / theta[i]!) * vectors[i]!;
  return norm * sum;
}

/** out = C x on the free rows. */
function multiplyFree(
  { heldMask }: InnerSystem,
  capacity: HeldMatrix,
  x: Float64Array,
  out: Float64Array,
): void {
  capacity.multiply(x, out);
  if (heldMask) for (let i = 0; i < out.length; i++) if (heldMask[i]) out[i] = 0;
}

function dot(a: Float64Array, b: Float64Array): number {
  let sum = 0;
  for (let i = 0; i < a.length; i++) sum += a[i]! * b[i]!;
  return sum;
}

function subtract(from: Float64Array, factor: number, vector: Float64Array): void {
  for (let i = 0; i < from.length; i++) from[i]! -= factor * vector[i]!;
}

const scaled = (vector: Float64Array, factor: number): Float64Array => vector.map((value) => value * factor);
