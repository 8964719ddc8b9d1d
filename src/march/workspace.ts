/**
 * What a host keeps between marches while its inputs stand: the analysis of each pattern, and the factors and Krylov
 * bases of each system. Inputs are recognised by identity (the same arrays), never by comparing values: a changed
 * matrix must come in a new array, and one that is to be recognised must be kept.
 */
import type { SparsityPattern } from "../linalg/pattern.ts";
import { giveBackMemory, makeSolver, type SolverOptions, type SparseSolver } from "../linalg/solver.ts";
import { KrylovSystem } from "./krylovSystem.ts";
import type { LinearSystem } from "./types.ts";

/** Work done through a workspace since it was made; tests of reuse read it. */
export interface WorkCounts {
  analyses: number;
  factorizations: number;
  solves: number;
}

export interface MarchWorkspace {
  /** the solver of this pattern, analysed on first use */
  solverFor(pattern: SparsityPattern, coordinates: Float64Array): SparseSolver;
  /** the factors and bases of a system with these matrices and held unknowns, whatever its signals */
  krylovSystem(system: LinearSystem): KrylovSystem;
  readonly counts: WorkCounts;
  /** give all memory back; the workspace is empty afterwards and may be used again */
  release(): void;
}

/** Systems whose bases are kept: the stages of a treatment, some hundred vectors each. */
const SYSTEMS_KEPT = 4;

/** Patterns whose analysis is kept; the oldest goes first. A refinement study has about four meshes. */
const PATTERNS_KEPT = 4;

export function createWorkspace(options: SolverOptions = {}): MarchWorkspace {
  const solvers = new Map<SparsityPattern, SparseSolver>();
  const counts = { analyses: 0, factorizations: 0, solves: 0 };
  let systems: KrylovSystem[] = [];
  const dropSystems = (drop: (system: KrylovSystem) => boolean) => {
    for (const system of systems) if (drop(system)) system.release();
    systems = systems.filter((system) => !drop(system));
  };
  const drop = (pattern: SparsityPattern) => {
    dropSystems(({ solver }) => solver === solvers.get(pattern));
    solvers.get(pattern)?.release();
    solvers.delete(pattern);
  };
  const solverFor = (pattern: SparsityPattern, coordinates: Float64Array) => {
    let solver = solvers.get(pattern);
    if (!solver) {
      if (solvers.size >= PATTERNS_KEPT) drop(solvers.keys().next().value!);
      solver = makeSolver(pattern, coordinates, options);
      counts.analyses++;
      solvers.set(pattern, solver);
    }
    return solver;
  };
  return {
    counts,
    solverFor,
    krylovSystem(system) {
      const known = systems.find((kept) => kept.serves(system));
      if (known) return known;
      const solver = solverFor(system.pattern, system.coordinates);
      if (systems.length >= SYSTEMS_KEPT) dropSystems((kept) => kept === systems[0]);
      const fresh = new KrylovSystem(system, solver, counts);
      systems.push(fresh);
      return fresh;
    },
    release() {
      for (const pattern of [...solvers.keys()]) drop(pattern);
      giveBackMemory();
    },
  };
}
