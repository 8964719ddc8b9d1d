/**
 * What drives a stage, as vectors with a drive each. With y = u - u0 on the free unknowns,
 *
 *   C y' + K y = sum of a_g p_g + sum of h_g k_g + sum of h_g' m_g - K_ff u0,     y(0) = 0,
 *
 * where k_g and m_g couple a held group to the free unknowns through conductance and capacity.
 *
 * The imbalance K_ff u0 of a uniform start is a sum of the very same vectors (K times a constant is what the films
 * take), and is then dealt out to them: each vector is driven by its signal less its share. No vector of its own is
 * needed, and the start value is only a number in the drives.
 */
import { constantDrive, isConstant, isIdle, signalDrive, slopeDrive, type Drive } from "./drive.ts";
import type { InnerSystem } from "./innerSystem.ts";
import { signalAt } from "./signals.ts";
import type { Signal } from "./types.ts";
import { dot } from "../linalg/vectors.ts";

export interface DrivenVector {
  /** inner numbers, 0 on held rows */
  readonly vector: Float64Array;
  readonly drive: Drive;
  /** whether the vector belongs to the system alone (and its basis is worth keeping) or to this start */
  readonly lasting: boolean;
}

/** A signal with the vector that it drives and the sign it drives it with. */
interface Term {
  readonly vector: Float64Array;
  readonly signal: Signal;
  readonly sign: 1 | -1;
}

/** Row residual of the shares, over the row's largest terms, that counts as rounding. */
const SHARE_SLACK = 1e-12;

/**
 * @param start     inner numbers, held unknowns at their held values of time 0
 * @param separate  give every vector a basis of its own, so that it can be used again under other signals; otherwise
 *                  all constant parts are one vector
 */
export function drivenVectors(system: InnerSystem, start: Float64Array, separate: boolean): DrivenVector[] {
  const terms: Term[] = [
    ...system.loads.map(({ vector, signal }): Term => ({ vector, signal, sign: 1 })),
    ...system.held.map(({ conductanceColumn, signal }): Term => ({
      vector: conductanceColumn,
      signal,
      sign: -1,
    })),
  ].filter(({ vector }) => vector.some((value) => value !== 0));
  const { imbalance, magnitude } = startImbalance(system, start);
  const shares = sharesOf(terms, imbalance, magnitude);
  const driven =
    shares && (separate || fewActive(terms, shares)) ? eachAlone(terms, shares) : merged(terms, imbalance);
  for (const { capacityColumn, signal } of system.held)
    driven.push({ vector: capacityColumn, drive: slopeDrive(signal, -1), lasting: true });
  return driven.filter(({ vector, drive }) => !isIdle(drive) && vector.some((value) => value !== 0));
}

const termDrive = ({ signal, sign }: Term, offset: number): Drive => signalDrive(signal, offset, sign);

function eachAlone(terms: readonly Term[], shares: readonly number[]): DrivenVector[] {
  return terms.map((term, g) => ({ vector: term.vector, drive: termDrive(term, shares[g]!), lasting: true }));
}

/** All constant parts and the imbalance of the start as one vector, the rest of each signal on its own. */
function merged(terms: readonly Term[], imbalance: Float64Array): DrivenVector[] {
  const sum = imbalance.map((value) => -value);
  const driven: DrivenVector[] = [{ vector: sum, drive: constantDrive(1), lasting: false }];
  for (const term of terms) {
    const first = signalAt(term.signal, 0);
    for (let i = 0; i < sum.length; i++) sum[i]! += term.sign * first * term.vector[i]!;
    driven.push({ vector: term.vector, drive: termDrive(term, first), lasting: true });
  }
  return driven;
}

/** Whether single bases are no more than a merged one and one per varying signal. */
function fewActive(terms: readonly Term[], shares: readonly number[]): boolean {
  const drives = terms.map((term, g) => termDrive(term, shares[g]!));
  const active = drives.filter((drive) => !isIdle(drive)).length;
  return active <= 1 + drives.filter((drive) => !isConstant(drive)).length;
}

/** K_ff u0 on the free rows, and the sum of the magnitudes of its terms in each row. */
function startImbalance(system: InnerSystem, start: Float64Array) {
  const { pattern, conductance, heldMask } = system;
  const { size, rowStart, columns } = pattern;
  const imbalance = new Float64Array(size);
  const magnitude = new Float64Array(size);
  for (let row = 0; row < size; row++) {
    if (heldMask?.[row]) continue;
    for (let q = rowStart[row]!; q < rowStart[row + 1]!; q++) {
      const column = columns[q]!;
      if (heldMask?.[column]) continue;
      const term = conductance[q]! * start[column]!;
      imbalance[row]! += term;
      magnitude[row]! += Math.abs(term);
    }
  }
  return { imbalance, magnitude };
}

/** c with imbalance = sum of sign c vector to rounding; undefined when there is none. */
function sharesOf(
  terms: readonly Term[],
  imbalance: Float64Array,
  magnitude: Float64Array,
): number[] | undefined {
  const shares = leastSquares(terms, imbalance);
  for (let i = 0; i < imbalance.length; i++) {
    let rest = imbalance[i]!;
    let size = magnitude[i]!;
    for (let g = 0; g < terms.length; g++) {
      const part = terms[g]!.sign * shares[g]! * terms[g]!.vector[i]!;
      rest -= part;
      size += Math.abs(part);
    }
    // Written so that a share that is not a number fails too.
    if (!(Math.abs(rest) <= SHARE_SLACK * size)) return undefined;
  }
  return shares;
}

/** Normal equations by elimination; a vector that others already span gets no share. */
function leastSquares(terms: readonly Term[], target: Float64Array): number[] {
  const n = terms.length;
  const signed = terms.map(({ sign }) => sign);
  const rows = terms.map((term, g) => [
    ...terms.map((other, k) => signed[g]! * signed[k]! * dot(term.vector, other.vector)),
    signed[g]! * dot(term.vector, target),
  ]);
  const scale = rows.map((row, g) => row[g]!);
  for (let k = 0; k < n; k++) {
    if (rows[k]![k]! <= DEPENDENT * scale[k]!) {
      for (let j = 0; j <= n; j++) rows[k]![j] = j === k ? 1 : 0;
      for (let i = 0; i < n; i++) if (i !== k) rows[i]![k] = 0;
      continue;
    }
    for (let i = 0; i < n; i++) {
      if (i === k) continue;
      const factor = rows[i]![k]! / rows[k]![k]!;
      for (let j = k; j <= n; j++) rows[i]![j]! -= factor * rows[k]![j]!;
    }
  }
  return rows.map((row, k) => row[n]! / row[k]!);
}

/** A vector whose part outside the others has less than this share of its square is spanned by them. */
const DEPENDENT = 1e-12;
