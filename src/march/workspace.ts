/**
 * What a host keeps between marches while its inputs stand: the analysis of each pattern. Inputs are recognised by
 * identity (the same arrays), never by comparing values: a changed matrix must come in a new array.
 */
import type { SparsityPattern } from "../linalg/pattern.ts";
import { makeSolver, type SolverOptions, type SparseSolver } from "../linalg/solver.ts";

/** Work done through a workspace since it was made; tests of reuse read it. */
export interface WorkCounts {
  analyses: number;
  factorizations: number;
  solves: number;
}

export interface MarchWorkspace {
  /** the solver of this pattern, analysed on first use */
  solverFor(pattern: SparsityPattern, coordinates: Float64Array): SparseSolver;
  readonly counts: WorkCounts;
  /** give all memory back; the workspace is empty afterwards and may be used again */
  release(): void;
}

/** Patterns whose analysis is kept; the oldest goes first. A refinement study has about four meshes. */
const PATTERNS_KEPT = 4;

export function createWorkspace(options: SolverOptions = {}): MarchWorkspace {
  const solvers = new Map<SparsityPattern, SparseSolver>();
  const counts = { analyses: 0, factorizations: 0, solves: 0 };
  const drop = (pattern: SparsityPattern) => {
    solvers.get(pattern)?.release();
    solvers.delete(pattern);
  };
  return {
    counts,
    solverFor(pattern, coordinates) {
      let solver = solvers.get(pattern);
      if (!solver) {
        if (solvers.size >= PATTERNS_KEPT) drop(solvers.keys().next().value!);
        solver = makeSolver(pattern, coordinates, options);
        counts.analyses++;
        solvers.set(pattern, solver);
      }
      return solver;
    },
    release() {
      for (const pattern of [...solvers.keys()]) drop(pattern);
    },
  };
}
