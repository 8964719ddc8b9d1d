/** What drives a segment: vectors, each with the steps and ramps that act on it. */
import { addLoads } from "./innerSystem.ts";
import type { InnerSystem } from "./innerSystem.ts";
import { slopeChanges } from "./signals.ts";
import type { Signal } from "./types.ts";

/** A change of what drives a vector, at a time of the segment: of its value (step) or of its slope (ramp). */
export interface LoadEvent {
  readonly time: number;
  readonly kind: "step" | "ramp";
  readonly amount: number;
}

export interface DrivenVector {
  readonly vector: Float64Array;
  readonly events: readonly LoadEvent[];
}

/** Two vectors are taken as one when they are parallel to this share of their length. */
const PARALLEL = 1e-13;

/**
 * The imbalance at the start acts as a step, then every slope of a signal on its own vector. Vectors that are parallel
 * share one basis: with a uniform start and one surroundings, that is all of them.
 */
export function drivenVectors(
  system: InnerSystem,
  start: Float64Array,
  from: number,
  to: number,
): DrivenVector[] {
  const driven: { vector: Float64Array; events: LoadEvent[] }[] = [];
  const add = (vector: Float64Array, events: LoadEvent[]): void => {
    if (events.length === 0 || isZero(vector)) return;
    for (const other of driven) {
      const factor = parallelFactor(other.vector, vector);
      if (factor === null) continue;
      other.events.push(...events.map((event) => ({ ...event, amount: factor * event.amount })));
      return;
    }
    driven.push({ vector, events });
  };
  add(imbalance(system, start, from), [{ time: 0, kind: "step", amount: 1 }]);
  for (const { vector, signal } of system.loads) add(onFreeRows(system, vector), rampsOf(signal, from, to));
  for (const { signal, capacityColumn, conductanceColumn } of system.held) {
    const ramps = rampsOf(signal, from, to);
    add(
      conductanceColumn.map((value) => -value),
      ramps,
    );
    add(
      capacityColumn.map((value) => -value),
      ramps.map((event) => ({ ...event, kind: "step" as const })),
    );
  }
  return driven;
}

/** sum a_g p_g - K u on the free rows at an instant; held unknowns stand at their held values in `u`. */
function imbalance(system: InnerSystem, u: Float64Array, time: number): Float64Array {
  const { rowStart, columns, size } = system.pattern;
  const out = addLoads(system, time, 1, new Float64Array(size));
  for (let row = 0; row < size; row++)
    for (let q = rowStart[row]!; q < rowStart[row + 1]!; q++)
      out[row]! -= system.conductance[q]! * u[columns[q]!]!;
  return onFreeRows(system, out);
}

function onFreeRows({ heldMask }: InnerSystem, vector: Float64Array): Float64Array {
  return heldMask ? vector.map((value, i) => (heldMask[i] ? 0 : value)) : vector;
}

/** Changes of slope of a signal within a segment, on the time of the segment. */
function rampsOf(signal: Signal, from: number, to: number): LoadEvent[] {
  return slopeChanges(shifted(signal, from))
    .filter(({ time }) => time < to - from)
    .map(({ time, change }) => ({ time, kind: "ramp", amount: change }));
}

const shifted = (signal: Signal, by: number): Signal =>
  by === 0 ? signal : { times: signal.times.map((time) => time - by), values: signal.values };

const isZero = (vector: Float64Array): boolean => vector.every((value) => value === 0);

/** c with b = c a, where there is one. */
function parallelFactor(a: Float64Array, b: Float64Array): number | null {
  let [aa, ab, bb] = [0, 0, 0];
  for (let i = 0; i < a.length; i++) {
    aa += a[i]! * a[i]!;
    ab += a[i]! * b[i]!;
    bb += b[i]! * b[i]!;
  }
  const factor = ab / aa;
  let miss = 0;
  for (let i = 0; i < a.length; i++) miss += (b[i]! - factor * a[i]!) ** 2;
  return miss <= PARALLEL ** 2 * bb ? factor : null;
}
