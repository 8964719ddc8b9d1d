/**
 * One Lanczos basis of the Krylov march: grown from one load vector, it holds the answer of the whole system to that
 * vector under any drive.
 *
 *   F = C + g K,   s = F^-1 p,   Lanczos on Z = F^-1 C in the capacity inner product from s:
 *   Z V = V T + b v e_m',        T = S diag(theta) S',   lambda = (1/theta - 1)/g.
 *
 * The answer to  C y' + K y = a(t) p,  y(0) = 0  is  y = V c  with  c = |s| S ((1 + g lambda) z),  z_k' + lambda_k z_k =
 * a(t) S_1k: `coefficients`. What it leaves unsolved is known exactly,
 *
 *   C y' + K y - a p = r'(t) F v,        r = b (c_m - (integral of c_m) / g),
 *
 * and gives two things. First an error estimate that costs nothing, b |g c_m' - c_m| max|v|: it follows the true error
 * within a factor of about two at every instant. Second a correction: with y - r v for y, and g r v taken from its
 * integral, C (y - r v) + K (integral of y - g r v) = (integral of a) p  holds to rounding: heat is conserved exactly,
 * however few vectors there are.
 */
import type { Factor, HeldMatrix } from "../linalg/solver.ts";
import { tridiagonalEigen } from "../linalg/tridiagonal.ts";
import { addScaled, dot, largestMagnitude, scale } from "../linalg/vectors.ts";
import { KRYLOV } from "./defaults.ts";
import { ModalResponse, type Drive, type ModeState } from "./drive.ts";

/** What growing a basis needs; `capacity` has zero rows and columns where unknowns are held. */
export interface KrylovOperator {
  readonly shift: number;
  readonly factor: Factor;
  readonly capacity: HeldMatrix;
}

/** Eigenpairs of the small matrix T of the first `count` vectors. */
interface SmallSystem {
  readonly count: number;
  readonly theta: Float64Array;
  readonly rates: Float64Array;
  /** count x count, eigenvector k in column k */
  readonly vectors: Float64Array;
}

export class KrylovBasis {
  private work = { solves: 0, linearIterations: 0 };
  private readonly vectors: Float64Array[] = [];
  /** largest magnitude in each vector */
  private readonly heights: number[] = [];
  private readonly diagonal: number[] = [];
  private readonly offDiagonal: number[] = [];
  private startNorm = 0;
  /** C times the newest vector */
  private image: Float64Array;
  private small: SmallSystem | undefined;

  constructor(
    private readonly operator: KrylovOperator,
    load: Float64Array,
  ) {
    const first = new Float64Array(load.length);
    this.solve(load, first);
    this.image = operator.capacity.multiply(first, new Float64Array(load.length));
    this.startNorm = Math.sqrt(Math.max(0, dot(first, this.image)));
    if (this.startNorm > 0) this.push(first, this.startNorm);
  }

  /** vectors that carry coefficients */
  get count(): number {
    return this.diagonal.length;
  }

  /** No further vector exists: the basis holds the exact answer. */
  get exhausted(): boolean {
    return this.vectors.length === this.count;
  }

  /** Work done since this was asked last. */
  takeWork(): { readonly solves: number; readonly linearIterations: number } {
    const { work } = this;
    this.work = { solves: 0, linearIterations: 0 };
    return work;
  }

  /** One more vector, by three-term recurrence: enough up to about 60 vectors at the shifts in use. */
  grow(): void {
    if (this.exhausted) return;
    const j = this.count;
    const newest = this.vectors[j]!;
    const next = new Float64Array(newest.length);
    this.solve(this.image, next);
    const alpha = dot(next, this.image);
    addScaled(-alpha, newest, next);
    if (j > 0) addScaled(-this.offDiagonal[j - 1]!, this.vectors[j - 1]!, next);
    this.operator.capacity.multiply(next, this.image);
    const beta = Math.sqrt(Math.max(0, dot(next, this.image)));
    this.diagonal.push(alpha);
    this.offDiagonal.push(beta);
    this.small = undefined;
    if (beta > KRYLOV.breakdown && this.count < newest.length) this.push(next, beta);
  }

  /** The answer to one drive. */
  answer(drive: Drive): KrylovAnswer {
    this.small ??= smallSystem(this.diagonal, this.offDiagonal, this.operator.shift);
    const { startNorm, heights, exhausted, count } = this;
    return new KrylovAnswer(this.small, drive, this.operator.shift, {
      vectors: this.vectors,
      startNorm,
      link: exhausted ? 0 : this.offDiagonal[count - 1]!,
      nextHeight: exhausted ? 0 : heights[count]!,
    });
  }

  private push(vector: Float64Array, norm: number): void {
    scale(1 / norm, vector);
    scale(1 / norm, this.image);
    this.vectors.push(vector);
    this.heights.push(largestMagnitude(vector));
  }

  private solve(b: Float64Array, x: Float64Array): void {
    this.work.linearIterations += this.operator.factor.solve(b, x);
    this.work.solves++;
  }
}

function smallSystem(diagonal: number[], offDiagonal: number[], shift: number): SmallSystem {
  const count = diagonal.length;
  const { values, vectors } = tridiagonalEigen(diagonal, offDiagonal.slice(0, count - 1));
  // Rounding can put an eigenvalue at or below 0, or above 1.
  const theta = values.map((value) => Math.min(1, Math.max(KRYLOV.leastTheta, value)));
  return { count, theta, rates: theta.map((value) => (1 / value - 1) / shift), vectors };
}

/** What the answer takes from its basis; the basis may go on growing meanwhile. */
interface BasisFacts {
  readonly vectors: readonly Float64Array[];
  readonly startNorm: number;
  /** b: how strongly the vector behind the last one is coupled; 0 when there is none */
  readonly link: number;
  readonly nextHeight: number;
}

/** The answer to one drive, at any time. */
export class KrylovAnswer {
  private readonly response: ModalResponse;
  private readonly state: ModeState = { value: 0, derivative: 0, integral: 0 };
  private readonly weights: Float64Array;

  constructor(
    private readonly small: SmallSystem,
    drive: Drive,
    private readonly shift: number,
    private readonly basis: BasisFacts,
  ) {
    this.response = new ModalResponse(drive, small.rates);
    this.weights = new Float64Array(small.count);
  }

  /** out += the answer at a time */
  addField(time: number, out: Float64Array): void {
    this.combine(time, "value", -this.unbalanced(time), out);
  }

  /** out += the integral of the answer over [0, time], in the sense in which heat is balanced */
  addIntegral(time: number, out: Float64Array): void {
    this.combine(time, "integral", -this.shift * this.unbalanced(time), out);
  }

  /** Estimate of the largest error over all unknowns at a time, the correction's share included. */
  errorAt(time: number): number {
    const { link, nextHeight } = this.basis;
    if (link === 0) return 0;
    const { value, derivative, integral } = this.lastCoefficient(time);
    const residual = Math.abs(this.shift * derivative - value);
    return link * nextHeight * (residual + Math.abs(value - integral / this.shift));
  }

  /** r at a time */
  private unbalanced(time: number): number {
    if (this.basis.link === 0) return 0;
    const { value, integral } = this.lastCoefficient(time);
    return this.basis.link * (value - integral / this.shift);
  }

  /** Coefficient of the last vector, its derivative and its integral. */
  private lastCoefficient(time: number): ModeState {
    const { count, theta, vectors } = this.small;
    const sum = { value: 0, derivative: 0, integral: 0 };
    const piece = this.response.pieceAt(time);
    const last = (count - 1) * count;
    for (let k = 0; k < count; k++) {
      const { value, derivative, integral } = this.response.state(piece, k, time, this.state);
      const weight = (this.basis.startNorm * vectors[last + k]! * vectors[k]!) / theta[k]!;
      sum.value += weight * value;
      sum.derivative += weight * derivative;
      sum.integral += weight * integral;
    }
    return sum;
  }

  /** out += V c + extra v for the coefficients c of values or integrals */
  private combine(time: number, of: "value" | "integral", extra: number, out: Float64Array): void {
    const { small, weights, basis } = this;
    const { count, theta, vectors } = small;
    const piece = this.response.pieceAt(time);
    for (let k = 0; k < count; k++) {
      const answer = this.response.state(piece, k, time, this.state)[of];
      weights[k] = (basis.startNorm * answer * vectors[k]!) / theta[k]!;
    }
    const coefficients: number[] = [];
    for (let j = 0; j < count; j++) {
      let sum = 0;
      for (let k = 0; k < count; k++) sum += vectors[j * count + k]! * weights[k]!;
      coefficients.push(sum);
    }
    if (extra !== 0) coefficients.push(extra);
    addCombination(basis.vectors, coefficients, out);
  }
}

/** out += sum of coefficients[j] vectors[j], four at a time: `out` then travels through the cache a quarter as often. */
function addCombination(
  vectors: readonly Float64Array[],
  coefficients: readonly number[],
  out: Float64Array,
): void {
  const count = coefficients.length;
  let j = 0;
  for (; j + 3 < count; j += 4) {
    const [a, b, c, d] = [vectors[j]!, vectors[j + 1]!, vectors[j + 2]!, vectors[j + 3]!];
    const [p, q, r, s] = [coefficients[j]!, coefficients[j + 1]!, coefficients[j + 2]!, coefficients[j + 3]!];
    for (let i = 0; i < out.length; i++) out[i]! += p * a[i]! + q * b[i]! + r * c[i]! + s * d[i]!;
  }
  for (; j < count; j++) addScaled(coefficients[j]!, vectors[j]!, out);
}
