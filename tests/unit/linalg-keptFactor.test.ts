import { describe, expect, it } from "vitest";
import { KeptFactor } from "../../src/linalg/keptFactor.ts";
import { gatherValues } from "../../src/linalg/numbering.ts";
import { multiply } from "../../src/linalg/pattern.ts";
import { makeSolver, type SolverKind } from "../../src/linalg/solver.ts";
import { delaunayGraph, laplacian, patternOf, seeded } from "../helpers/systems.ts";

describe.each(["cholesky", "conjugate-gradients"] satisfies SolverKind[])(
  "a factor that is kept (%s)",
  (kind) => {
    const graph = delaunayGraph(1500, 4);
    const pattern = patternOf(graph);
    const conductance = laplacian(graph, pattern);
    const solver = makeSolver(pattern, graph.coordinates, { kind });
    const b = Float64Array.from({ length: graph.size }, seeded(2));
    /** capacity 1 and the conductance over a time step, conductances off by up to `spread` each */
    const matrix = (step: number, spread: number, seed: number) => {
      const random = seeded(seed);
      const values = new Float64Array(conductance.length);
      const factors = Float64Array.from({ length: graph.size }, () => 1 + spread * (2 * random() - 1));
      for (let i = 0; i < graph.size; i++)
        for (let q = pattern.rowStart[i]!; q < pattern.rowStart[i + 1]!; q++) {
          const j = pattern.columns[q]!;
          if (j === i) continue;
          values[q] = step * conductance[q]! * 0.5 * (factors[i]! + factors[j]!);
          values[pattern.diagonal[i]!]! -= values[q]!;
        }
      for (const place of pattern.diagonal) values[place]! += 1;
      return gatherValues(solver.inner.source, values, new Float64Array(values.length));
    };
    const residual = (values: Float64Array, x: Float64Array) => {
      const product = multiply(solver.inner.pattern, values, x, new Float64Array(x.length));
      return Math.hypot(...product.map((value, i) => value - b[i]!)) / Math.hypot(...b);
    };

    it("serves a small change in a handful of iterations and solves it as exactly", () => {
      const kept = new KeptFactor(solver);
      kept.update(matrix(1, 0, 1));
      kept.solve(b, new Float64Array(b.length));
      kept.update(matrix(1, 0.05, 1));
      const x = new Float64Array(b.length);
      expect(kept.solve(b, x)).toBeLessThan(9);
      expect(residual(matrix(1, 0.05, 1), x)).toBeLessThan(2e-11);
      expect(kept.factorizations).toBe(1);
      kept.release();
    });

    it("is renewed when what it costs adds up to a new one, and then serves in one iteration", () => {
      const kept = new KeptFactor(solver);
      kept.update(matrix(1, 0, 1));
      kept.solve(b, new Float64Array(b.length));
      const far = matrix(8, 0.3, 2);
      kept.update(far);
      const spent: number[] = [];
      for (let k = 0; k < 6; k++) {
        const x = new Float64Array(b.length);
        spent.push(kept.solve(b, x));
        expect(residual(far, x)).toBeLessThan(2e-11);
      }
      expect(kept.factorizations).toBe(2);
      if (kind === "cholesky") {
        expect(spent[0]).toBeGreaterThan(5);
        expect(spent.slice(-3)).toEqual([1, 1, 1]);
      }
      kept.release();
    });
  },
);
