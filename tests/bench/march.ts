/**
 * Benchmark of the linear engine: a system from Matrix Market files, marched by implicit Euler with equal steps.
 *
 * The folder holds capacity.mtx, conduction.mtx (symmetric, lower triangle) and load.mtx, as `corelag system` writes
 * them; start.mtx and nodes.mtx (r, z of each unknown, for ordering) are read when they are there.
 */
import { join } from "node:path";
import { gatherValues, toInner } from "../../src/linalg/numbering.ts";
import { patternFromEntries, slotOf, type SparsityPattern } from "../../src/linalg/pattern.ts";
import { makeSolver, type SolverKind } from "../../src/linalg/solver.ts";
import { median } from "./rounds.ts";
import { readArray, readArrayIfThere, readSymmetric, type Entries } from "./readMatrixMarket.ts";

export interface MarchBenchOptions {
  readonly dt: number;
  readonly steps: number;
  /** rounds of the whole; the medians are reported */
  readonly rounds?: number;
  /** uniform start where the folder has no start.mtx */
  readonly start?: number;
  readonly kind?: SolverKind;
}

export interface MarchBenchRecord {
  readonly nodes: number;
  readonly analyzeMs: number;
  readonly factorMs: number;
  readonly stepMs: number;
  readonly iterationsPerStep: number;
  readonly totalMs: number;
  readonly peakRssMiB: number;
  readonly tmin: number;
  readonly tmax: number;
  /** nonzeros of the triangular factor */
  readonly factorEntries: number;
  /** the least of each over all rounds: what to compare on a busy machine [ms] */
  readonly least: {
    readonly analyze: number;
    readonly factor: number;
    readonly step: number;
    readonly total: number;
  };
}

/** Same start as the native comparison when neither file nor option gives one. */
const DEFAULT_START = 850;
const LEAST_ROUNDS = 5;
const MOST_ROUNDS = 60;
/** Small systems are over before the machine is warm: go on for this long [ms]. */
const ENOUGH = 2000;

export function benchMarch(folder: string, options: MarchBenchOptions): MarchBenchRecord {
  const system = readSystem(folder, options.start ?? DEFAULT_START);
  const rounds = runRounds(() => marchOnce(system, options), options.rounds);
  const middle = (pick: (round: Round) => number) => median(rounds.map(pick));
  const least = (pick: (round: Round) => number[]) => Math.min(...rounds.flatMap(pick));
  const last = rounds[rounds.length - 1]!;
  return {
    nodes: system.pattern.size,
    analyzeMs: middle((round) => round.analyzeMs),
    factorMs: middle((round) => round.factorMs),
    stepMs: middle((round) => median(round.stepsMs)),
    iterationsPerStep: last.iterations / options.steps,
    totalMs: middle((round) => round.totalMs),
    peakRssMiB: process.resourceUsage().maxRSS / 1024,
    tmin: last.final.reduce((least, value) => Math.min(least, value), Infinity),
    tmax: last.final.reduce((most, value) => Math.max(most, value), -Infinity),
    factorEntries: last.factorEntries,
    least: {
      analyze: least((round) => [round.analyzeMs]),
      factor: least((round) => [round.factorMs]),
      step: least((round) => round.stepsMs),
      total: least((round) => [round.totalMs]),
    },
  };
}

function runRounds(once: () => Round, asked: number | undefined): Round[] {
  const rounds: Round[] = [];
  const began = performance.now();
  const wanted = () =>
    asked === undefined
      ? rounds.length < LEAST_ROUNDS || (performance.now() - began < ENOUGH && rounds.length < MOST_ROUNDS)
      : rounds.length < asked;
  while (wanted()) rounds.push(once());
  return rounds;
}

export interface BenchSystem {
  readonly pattern: SparsityPattern;
  readonly capacity: Float64Array;
  readonly conductance: Float64Array;
  readonly load: Float64Array;
  readonly start: Float64Array;
  readonly coordinates: Float64Array | undefined;
}

interface Round {
  readonly analyzeMs: number;
  readonly factorMs: number;
  readonly stepsMs: number[];
  readonly totalMs: number;
  readonly iterations: number;
  readonly final: Float64Array;
  readonly factorEntries: number;
}

function marchOnce(system: BenchSystem, { dt, steps, kind }: MarchBenchOptions): Round {
  const { pattern, capacity, conductance } = system;
  const began = performance.now();
  const solver = makeSolver(pattern, system.coordinates, kind ? { kind } : {});
  const analyzed = performance.now();
  const factor = solver.factor();
  const matrix = solver.matrix();
  const { source } = solver.inner;
  const values = gatherValues(source, capacity, new Float64Array(capacity.length));
  for (let q = 0; q < values.length; q++) values[q]! /= dt;
  matrix.refresh(values);
  for (let q = 0; q < values.length; q++) values[q]! += conductance[source[q]!]!;
  const gathered = performance.now();
  factor.refresh(values);
  const factored = performance.now();
  const load = toInner(solver.numbering, system.load, new Float64Array(pattern.size));
  const u = toInner(solver.numbering, system.start, new Float64Array(pattern.size));
  const stepsMs: number[] = [];
  let iterations = 0;
  for (let step = 0; step < steps; step++) {
    const from = performance.now();
    iterations += factor.solveProduct(matrix, u, load, u);
    stepsMs.push(performance.now() - from);
  }
  const ended = performance.now();
  solver.release();
  return {
    analyzeMs: analyzed - began,
    factorMs: factored - gathered,
    stepsMs,
    totalMs: ended - began,
    iterations,
    final: u,
    factorEntries: solver.facts.factorEntries,
  };
}

export function readSystem(folder: string, uniformStart: number): BenchSystem {
  const capacity = readSymmetric(join(folder, "capacity.mtx"));
  const conductance = readSymmetric(join(folder, "conduction.mtx"));
  const { size } = conductance;
  const joined = (pick: (entries: Entries) => Int32Array) => [...pick(capacity), ...pick(conductance)];
  const pattern = patternFromEntries(
    size,
    joined((entries) => entries.rows),
    joined((entries) => entries.columns),
  );
  const nodes = readArrayIfThere(join(folder, "nodes.mtx"));
  return {
    pattern,
    capacity: spread(pattern, capacity),
    conductance: spread(pattern, conductance),
    load: readArray(join(folder, "load.mtx")).values,
    start: readArrayIfThere(join(folder, "start.mtx"))?.values ?? new Float64Array(size).fill(uniformStart),
    coordinates: nodes && pairs(nodes.rows, nodes.values),
  };
}

function spread(pattern: SparsityPattern, { rows, columns, values }: Entries): Float64Array {
  const out = new Float64Array(pattern.columns.length);
  for (let q = 0; q < values.length; q++) {
    out[slotOf(pattern, rows[q]!, columns[q]!)] = values[q]!;
    out[slotOf(pattern, columns[q]!, rows[q]!)] = values[q]!;
  }
  return out;
}

/** Columns r and z of the file as pairs. */
function pairs(rows: number, values: Float64Array): Float64Array {
  return Float64Array.from({ length: 2 * rows }, (_, k) => values[(k % 2) * rows + (k >> 1)]!);
}
