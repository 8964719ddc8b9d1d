import { describe, expect, it } from "vitest";
import { checkSparse, multiply, type SparsityPattern } from "../../src/linalg/pattern.ts";
import { gatherValues } from "../../src/linalg/numbering.ts";
import { makeSolver, solveOnce } from "../../src/linalg/solver.ts";
import {
  delaunayGraph,
  gridGraph,
  patternOf,
  randomPositiveDefinite,
  scatteredGraph,
  seeded,
  starGraph,
} from "../helpers/systems.ts";

const residual = (pattern: SparsityPattern, values: Float64Array, x: Float64Array, b: Float64Array) => {
  const product = multiply(pattern, values, x, new Float64Array(x.length));
  return Math.max(...product.map((value, i) => Math.abs(value - b[i]!))) / Math.max(...b.map(Math.abs));
};

describe("sparse Cholesky", () => {
  for (const graph of [
    gridGraph(1),
    gridGraph(2),
    gridGraph(9),
    gridGraph(40),
    delaunayGraph(3000, 2),
    starGraph(700),
    scatteredGraph(101),
    scatteredGraph(1),
  ])
    it(`solves: ${graph.name}`, () => {
      const pattern = patternOf(graph);
      const values = randomPositiveDefinite(graph, pattern);
      const b = Float64Array.from({ length: graph.size }, seeded(6));
      const x = solveOnce(pattern, graph.coordinates, values, b, new Float64Array(graph.size), {
        kind: "cholesky",
      });
      expect(residual(pattern, values, x, b)).toBeLessThan(1e-11);
    });

  it("keeps a sound inner pattern", () => {
    const graph = delaunayGraph(1000, 3);
    const pattern = patternOf(graph);
    const values = randomPositiveDefinite(graph, pattern);
    const { inner } = makeSolver(pattern, graph.coordinates, { kind: "cholesky" });
    const own = gatherValues(inner.source, values, new Float64Array(values.length));
    expect(checkSparse(inner.pattern, own)).toEqual([]);
  });
});
