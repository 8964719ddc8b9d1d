/**
 * Benchmark of the time schemes at equal accuracy: what each costs for a largest nodal error in time of 0.01 K from 1 %
 * of the duration on, on a system from Matrix Market files (see march.ts). Errors are true ones, against the Krylov
 * march at a far tighter tolerance.
 */
import { implicitEuler } from "../../src/march/implicitEuler.ts";
import { krylov } from "../../src/march/krylov.ts";
import { trBdf2 } from "../../src/march/trBdf2.ts";
import type { LinearSystem, Scheme, StageHistory } from "../../src/march/types.ts";
import { readSystem, type BenchSystem } from "./march.ts";
import { median } from "./rounds.ts";

export interface SchemeRecord {
  readonly scheme: string;
  /** K, at most 0.01; of implicit Euler at most 0.1 */
  readonly trueError: number;
  readonly statedError: number;
  readonly solves: number;
  readonly factorizations: number;
  /** median of the rounds */
  readonly ms: number;
  /** ms brought to 0.01 K by the order of the scheme; only implicit Euler is measured rougher, by its order of 1 */
  readonly msAtAim: number;
}

const AIM = 0.01;
const DURATION = 3600;
const FIRST_INSTANT = 0.01 * DURATION;
const INSTANTS = [36, 72, 180, 360, 720, 1800, 3600];
/** Surroundings that the load of the folder stands for. */
const AMBIENT = 20;
const ROUNDS = 5;

export function benchSchemes(folder: string, start = 850): SchemeRecord[] {
  const bench = readSystem(folder, start);
  const system = linearSystem(bench);
  const truth = march(krylov, system, bench.start, 1e-8).history;
  return [
    measure(krylov, system, bench.start, truth, AIM, ROUNDS),
    measure(trBdf2, system, bench.start, truth, AIM, ROUNDS),
    measure(implicitEuler, system, bench.start, truth, 10 * AIM, 1),
  ];
}

function measure(
  scheme: Scheme,
  system: LinearSystem,
  start: Float64Array,
  truth: StageHistory,
  aim: number,
  rounds: number,
): SchemeRecord {
  // Tolerances are on the safe side by different amounts: take the roughest whose true error is small enough.
  let tolerance = 64 * aim;
  let found = march(scheme, system, start, tolerance);
  while (largestError(found.history, truth, start.length) > aim) {
    tolerance /= 2;
    found = march(scheme, system, start, tolerance);
  }
  const times = Array.from({ length: rounds }, () => march(scheme, system, start, tolerance).ms);
  const ms = median(times);
  const { facts } = found.history;
  return {
    scheme: facts.scheme,
    trueError: largestError(found.history, truth, start.length),
    statedError: facts.timeError,
    solves: facts.solves,
    factorizations: facts.factorizations,
    ms,
    msAtAim: (ms * aim) / AIM,
  };
}

function march(scheme: Scheme, system: LinearSystem, start: Float64Array, tolerance: number) {
  const from = performance.now();
  const generator = scheme(system, start, { duration: DURATION, tolerance, firstInstant: FIRST_INSTANT });
  for (;;) {
    const step = generator.next();
    if (step.done) return { history: step.value, ms: performance.now() - from };
  }
}

function largestError(history: StageHistory, truth: StageHistory, size: number): number {
  const u = new Float64Array(size);
  const exact = new Float64Array(size);
  let worst = 0;
  for (const time of INSTANTS) {
    history.at(time, u);
    truth.at(time, exact);
    for (let i = 0; i < size; i++) worst = Math.max(worst, Math.abs(u[i]! - exact[i]!));
  }
  return worst;
}

function linearSystem({ pattern, capacity, conductance, load, coordinates }: BenchSystem): LinearSystem {
  const signal = { times: Float64Array.of(0), values: Float64Array.of(AMBIENT) };
  return {
    pattern,
    capacity,
    conductance,
    loads: [{ vector: load.map((value) => value / AMBIENT), signal }],
    held: [],
    coordinates: coordinates ?? new Float64Array(2 * pattern.size),
  };
}
