/**
 * The system of a stage as the schemes march it: in the numbering of the solver, and with the held unknowns taken
 * out symmetrically. A held unknown keeps its row and column in the pattern, so that one analysis serves any choice
 * of held unknowns; the couplings are moved to the right-hand side:
 *
 *   free rows   A_ff u_f = b_f - sum over groups of h_g A_fh 1_g,        held rows   a_ii u_i = a_ii h_g.
 */
import type { SparseSolver } from "../linalg/solver.ts";
import { gatherValues, toInner } from "../linalg/numbering.ts";
import type { SparsityPattern } from "../linalg/pattern.ts";
import { signalAt } from "./signals.ts";
import type { LinearSystem, Signal } from "./types.ts";

export interface InnerSystem {
  readonly pattern: SparsityPattern;
  readonly capacity: Float64Array;
  readonly conductance: Float64Array;
  readonly loads: readonly InnerLoad[];
  readonly held: readonly InnerHeld[];
  /** 1 for held unknowns; undefined when none is held */
  readonly heldMask: Uint8Array | undefined;
}

export interface InnerLoad {
  readonly vector: Float64Array;
  readonly signal: Signal;
}

export interface InnerHeld {
  readonly unknowns: Int32Array;
  readonly signal: Signal;
  /** C 1_g and K 1_g on the free rows, 0 on held rows, with 1_g = 1 on the group and 0 elsewhere */
  readonly capacityColumn: Float64Array;
  readonly conductanceColumn: Float64Array;
}

/** @throws when arrays do not fit the pattern or one unknown is held twice */
export function innerSystem(system: LinearSystem, solver: SparseSolver): InnerSystem {
  checkLengths(system);
  const { numbering, inner } = solver;
  const capacity = gatherValues(inner.source, system.capacity, new Float64Array(inner.source.length));
  const conductance = gatherValues(inner.source, system.conductance, new Float64Array(inner.source.length));
  const loads = system.loads.map(({ vector, signal }) => ({
    vector: toInner(numbering, vector, new Float64Array(vector.length)),
    signal,
  }));
  const heldMask = maskOfHeld(system, numbering.innerOf);
  const held = system.held.map(({ unknowns, signal }) => {
    const innerUnknowns = Int32Array.from(unknowns, (unknown) => numbering.innerOf[unknown]!);
    return {
      unknowns: innerUnknowns,
      signal,
      capacityColumn: freeColumn(inner.pattern, capacity, innerUnknowns, heldMask!),
      conductanceColumn: freeColumn(inner.pattern, conductance, innerUnknowns, heldMask!),
    };
  });
  return { pattern: inner.pattern, capacity, conductance, loads, held, heldMask };
}

/** out += sum of a_g(time) p_g on the free rows */
export function addLoads({ loads, heldMask }: InnerSystem, time: number, out: Float64Array): Float64Array {
  for (const { vector, signal } of loads) {
    const amount = signalAt(signal, time);
    if (amount !== 0) for (let i = 0; i < out.length; i++) if (!heldMask?.[i]) out[i]! += amount * vector[i]!;
  }
  return out;
}

export const heldValue = ({ signal }: InnerHeld, time: number): number => signalAt(signal, time);

/** Set the held unknowns of `out` to their values at `time`. */
export function setHeld(held: InnerSystem["held"], time: number, out: Float64Array): Float64Array {
  for (const group of held) {
    const value = heldValue(group, time);
    for (const i of group.unknowns) out[i] = value;
  }
  return out;
}

/** out = C + conductanceWeight K with held unknowns decoupled (their diagonal stays). */
export function shiftedMatrix(
  system: InnerSystem,
  conductanceWeight: number,
  out: Float64Array,
): Float64Array {
  const { capacity, conductance, pattern, heldMask } = system;
  for (let q = 0; q < out.length; q++) out[q] = capacity[q]! + conductanceWeight * conductance[q]!;
  if (heldMask) decouple(pattern, heldMask, out);
  return out;
}

/** Zero the entries outside the diagonal that lie in a row or a column of a marked unknown. */
function decouple(pattern: SparsityPattern, mask: Uint8Array, out: Float64Array): Float64Array {
  const { size, rowStart, columns } = pattern;
  for (let row = 0; row < size; row++)
    for (let q = rowStart[row]!; q < rowStart[row + 1]!; q++) {
      const column = columns[q]!;
      if (column !== row && (mask[row] || mask[column])) out[q] = 0;
    }
  return out;
}

/** A copy of the values with zero rows (and with `columnsToo` zero columns) where unknowns are held. */
export function freeRows(system: InnerSystem, values: Float64Array, columnsToo: boolean): Float64Array {
  const { pattern, heldMask } = system;
  const out = values.slice();
  if (!heldMask) return out;
  for (let row = 0; row < pattern.size; row++)
    for (let q = pattern.rowStart[row]!; q < pattern.rowStart[row + 1]!; q++)
      if (heldMask[row] || (columnsToo && heldMask[pattern.columns[q]!])) out[q] = 0;
  return out;
}

/** Every signal that drives the system. */
export function signalsOf(system: {
  readonly loads: readonly { readonly signal: Signal }[];
  readonly held: readonly { readonly signal: Signal }[];
}): Signal[] {
  return [...system.loads, ...system.held].map(({ signal }) => signal);
}

function maskOfHeld(system: LinearSystem, innerOf: Int32Array): Uint8Array | undefined {
  if (system.held.length === 0) return undefined;
  const mask = new Uint8Array(system.pattern.size);
  for (const { unknowns } of system.held)
    for (const unknown of unknowns) {
      const i = innerOf[unknown]!;
      if (mask[i]) throw new Error(`unknown ${unknown} is held twice`);
      mask[i] = 1;
    }
  return mask;
}

/** A 1_g on the free rows, for a symmetric A: the rows of the group are its columns. */
function freeColumn(
  { size, rowStart, columns }: SparsityPattern,
  values: Float64Array,
  unknowns: Int32Array,
  mask: Uint8Array,
): Float64Array {
  const out = new Float64Array(size);
  for (const i of unknowns)
    for (let q = rowStart[i]!; q < rowStart[i + 1]!; q++) {
      const row = columns[q]!;
      if (!mask[row]) out[row]! += values[q]!;
    }
  return out;
}

function checkLengths({ pattern, capacity, conductance, loads }: LinearSystem): void {
  const entries = pattern.columns.length;
  if (capacity.length !== entries || conductance.length !== entries)
    throw new Error(
      `capacity has ${capacity.length} and conductance ${conductance.length} values; the pattern has ${entries} entries`,
    );
  for (const { vector, signal } of loads) {
    if (vector.length !== pattern.size)
      throw new Error(`a load has ${vector.length} values for ${pattern.size} unknowns`);
    if (signal.times.length === 0 || signal.times.length !== signal.values.length)
      throw new Error(`a signal has ${signal.times.length} times and ${signal.values.length} values`);
  }
}
