import { describe, expect, it } from "vitest";
import {
  conjugateGradients,
  conjugateGradientsWork,
  diagonalPreconditioner,
  sparseOperator,
} from "../../src/linalg/conjugateGradients.ts";
import { NotConvergedError, NotPositiveDefiniteError } from "../../src/linalg/errors.ts";
import { incompleteCholesky } from "../../src/linalg/incompleteCholesky.ts";
import { patternFromEntries } from "../../src/linalg/pattern.ts";
import { solveOnce } from "../../src/linalg/solver.ts";
import { denseOf, denseSolve } from "../helpers/dense.ts";
import {
  gridGraph,
  laplacian,
  patternOf,
  randomPositiveDefinite,
  seeded,
  starGraph,
} from "../helpers/systems.ts";

describe("conjugate gradients", () => {
  const graph = gridGraph(12, 3);
  const pattern = patternOf(graph);
  const values = randomPositiveDefinite(graph, pattern);
  const random = seeded(4);
  const b = Float64Array.from({ length: graph.size }, random);
  const exact = denseSolve(denseOf(pattern, values), b);
  const run = (preconditioner: ReturnType<typeof diagonalPreconditioner>, x: Float64Array) =>
    conjugateGradients(
      sparseOperator(pattern, values),
      b,
      preconditioner,
      conjugateGradientsWork(b.length),
      {},
      x,
    );
  const incomplete = incompleteCholesky(pattern);
  incomplete.refresh(values);

  it("meet the dense solution with either preconditioner, the incomplete factor in fewer iterations", () => {
    const x = new Float64Array(b.length);
    const y = new Float64Array(b.length);
    const many = run(diagonalPreconditioner(pattern, values), x);
    const few = run(incomplete, y);
    exact.forEach((value, i) => {
      expect(x[i]).toBeCloseTo(value, 8);
      expect(y[i]).toBeCloseTo(value, 8);
    });
    expect(few).toBeLessThan(0.6 * many);
  });

  it("need no iteration when the guess is the solution", () => {
    expect(run(incomplete, Float64Array.from(exact))).toBe(0);
  });

  it("say so when the matrix is indefinite", () => {
    const indefinite = values.map((value) => -value);
    const solve = () =>
      conjugateGradients(
        sparseOperator(pattern, indefinite),
        b,
        diagonalPreconditioner(pattern, values),
        conjugateGradientsWork(b.length),
        {},
        new Float64Array(b.length),
      );
    expect(solve).toThrow(NotPositiveDefiniteError);
  });

  it("say how far they came when the limit is reached", () => {
    const solve = () =>
      conjugateGradients(
        sparseOperator(pattern, values),
        b,
        incomplete,
        conjugateGradientsWork(b.length),
        { iterationLimit: 2 },
        new Float64Array(b.length),
      );
    expect(solve).toThrow(NotConvergedError);
    expect(solve).toThrow(/after 2 iterations/);
  });
});

describe("incomplete factor", () => {
  it("is the exact factor where there is no fill: a star numbered hub last", () => {
    const graph = starGraph(30, 8);
    const pattern = patternFromEntries(
      30,
      Array.from({ length: 29 }, () => 29),
      Array.from({ length: 29 }, (_, i) => i),
    );
    const values = randomPositiveDefinite(
      { ...graph, links: [...Array(29).keys()].map((i) => [i, 29]) },
      pattern,
    );
    const factor = incompleteCholesky(pattern);
    factor.refresh(values);
    const b = Float64Array.from({ length: 30 }, seeded(2));
    const x = new Float64Array(30);
    factor.apply(b, x);
    denseSolve(denseOf(pattern, values), b).forEach((value, i) => expect(x[i]).toBeCloseTo(value, 11));
    expect(factor.shift).toBe(0);
  });

  it("raises the diagonal where a pivot fails although the matrix is positive definite (Kershaw 1978)", () => {
    const pattern = patternFromEntries(4, [0, 1, 2, 3], [1, 2, 3, 0]);
    const values = new Float64Array(pattern.columns.length);
    const kershaw = [
      [3, -2, 0, 2],
      [-2, 3, -2, 0],
      [0, -2, 3, -2],
      [2, 0, -2, 3],
    ];
    for (let i = 0; i < 4; i++)
      for (let q = pattern.rowStart[i]!; q < pattern.rowStart[i + 1]!; q++)
        values[q] = kershaw[i]![pattern.columns[q]!]!;
    const factor = incompleteCholesky(pattern);
    factor.refresh(values);
    expect(factor.shift).toBeGreaterThan(0);
    const b = Float64Array.of(1, 2, 3, 4);
    const x = new Float64Array(4);
    conjugateGradients(sparseOperator(pattern, values), b, factor, conjugateGradientsWork(4), {}, x);
    denseSolve(kershaw, b).forEach((value, i) => expect(x[i]).toBeCloseTo(value, 8));
  });
});

describe("solving once", () => {
  it("names a zero on the diagonal by the caller's number", () => {
    const graph = gridGraph(4);
    const pattern = patternOf(graph);
    const values = randomPositiveDefinite(graph, pattern);
    values[pattern.diagonal[6]!] = 0;
    const solve = () =>
      solveOnce(pattern, graph.coordinates, values, new Float64Array(16).fill(1), new Float64Array(16), {
        kind: "conjugate-gradients",
      });
    expect(solve).toThrow(/unknown 6/);
  });

  it("does not return an answer for a singular matrix with a load that does not balance", () => {
    const graph = gridGraph(8);
    const pattern = patternOf(graph);
    const values = laplacian(graph, pattern);
    const solve = () =>
      solveOnce(pattern, graph.coordinates, values, new Float64Array(64).fill(1), new Float64Array(64), {
        kind: "conjugate-gradients",
      });
    expect(solve).toThrow();
  });
});
