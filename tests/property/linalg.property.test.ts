/** The sparse solvers against dense elimination on seeded random systems of awkward shape. */
import { describe, expect, it } from "vitest";
import { NotPositiveDefiniteError } from "../../src/linalg/errors.ts";
import { gatherValues, toInner } from "../../src/linalg/numbering.ts";
import { multiply, patternFromElements, slotOf, type SparsityPattern } from "../../src/linalg/pattern.ts";
import { makeSolver, solveOnce, type SolverKind } from "../../src/linalg/solver.ts";
import { denseOf, denseSolve } from "../helpers/dense.ts";
import {
  delaunayGraph,
  gridGraph,
  laplacian,
  patternOf,
  randomPositiveDefinite,
  scatteredGraph,
  seeded,
  starGraph,
  type Graph,
} from "../helpers/systems.ts";

const KINDS: SolverKind[] = ["cholesky", "conjugate-gradients"];
const SEEDS = [1, 2, 3, 4, 5];

const shapes: ((seed: number) => Graph)[] = [
  () => gridGraph(1),
  (seed) => gridGraph(2 + 3 * seed, seed),
  (seed) => delaunayGraph(30 + 40 * seed, seed),
  (seed) => starGraph(10 + 20 * seed, seed),
  (seed) => scatteredGraph(9 * seed, seed),
  (seed) => crowded(40 + 20 * seed, seed),
];

/** A chain with random chords, all points in three places only: cuts by coordinates find next to nothing. */
function crowded(size: number, seed: number): Graph {
  const random = seeded(seed);
  const links: [number, number][] = [];
  for (let i = 1; i < size; i++) links.push([i - 1, i], [i, Math.floor(random() * i)]);
  const coordinates = Float64Array.from({ length: 2 * size }, () => Math.floor(3 * random()));
  return {
    name: `${size} unknowns in nine places`,
    size,
    links: links.filter(([a, b]) => a !== b),
    coordinates,
  };
}

/** |b - A x| over |A| |x| + |b|, largest entries */
function backwardError(
  pattern: SparsityPattern,
  values: Float64Array,
  x: Float64Array,
  b: Float64Array,
): number {
  const largest = (list: Float64Array) => list.reduce((most, value) => Math.max(most, Math.abs(value)), 0);
  const product = multiply(pattern, values, x, new Float64Array(x.length));
  const rest = product.map((value, i) => value - b[i]!);
  return largest(rest) / (largest(values) * largest(x) + largest(b));
}

describe.each(KINDS)("%s", (kind) => {
  for (const seed of SEEDS)
    for (const shape of shapes) {
      const graph = shape(seed);
      it(`agrees with dense elimination: ${graph.name}, seed ${seed}`, () => {
        const pattern = patternOf(graph);
        const values = randomPositiveDefinite(graph, pattern, seed);
        const b = Float64Array.from({ length: graph.size }, seeded(seed + 100));
        const x = solveOnce(pattern, graph.coordinates, values, b, new Float64Array(graph.size), { kind });
        const exact = denseSolve(denseOf(pattern, values), b);
        const scale = Math.max(...exact.map(Math.abs));
        exact.forEach((value, i) => expect(Math.abs(value - x[i]!)).toBeLessThan(1e-7 * scale));
        expect(backwardError(pattern, values, x, b)).toBeLessThan(1e-10);
      });
    }

  it("needs no coordinates: distances in the graph serve for them", () => {
    for (const graph of [delaunayGraph(900, 6), scatteredGraph(60), gridGraph(1)]) {
      const pattern = patternOf(graph);
      const values = randomPositiveDefinite(graph, pattern);
      const b = Float64Array.from({ length: graph.size }, seeded(1));
      const x = solveOnce(pattern, undefined, values, b, new Float64Array(graph.size), { kind });
      expect(backwardError(pattern, values, x, b)).toBeLessThan(1e-10);
    }
  });

  it("takes new values again and again on one analysis, several factors side by side", () => {
    const graph = delaunayGraph(400, 3);
    const pattern = patternOf(graph);
    const solver = makeSolver(pattern, graph.coordinates, { kind });
    const [first, second] = [solver.factor(), solver.factor()];
    const blank = () => new Float64Array(graph.size);
    const b = toInner(solver.numbering, Float64Array.from({ length: graph.size }, seeded(2)), blank());
    const inner = (seed: number) =>
      gatherValues(
        solver.inner.source,
        randomPositiveDefinite(graph, pattern, seed),
        new Float64Array(pattern.columns.length),
      );
    first.refresh(inner(1));
    second.refresh(inner(2));
    first.refresh(inner(3));
    for (const [factor, seed] of [
      [first, 3],
      [second, 2],
    ] as const) {
      const x = blank();
      factor.solve(b, x);
      expect(backwardError(solver.inner.pattern, inner(seed), x, b)).toBeLessThan(1e-10);
    }
  });

  it("factors in steps as it does at once, and a factor left half done is empty", () => {
    const graph = gridGraph(kind === "cholesky" ? 170 : 20, 1);
    const pattern = patternOf(graph);
    const values = randomPositiveDefinite(graph, pattern);
    const solver = makeSolver(pattern, graph.coordinates, { kind });
    const inner = gatherValues(solver.inner.source, values, new Float64Array(values.length));
    const factor = solver.factor();
    const shares = [...factor.refreshInSteps(inner)];
    expect(shares.length).toBeGreaterThan(0);
    expect(shares).toEqual([...shares].sort((a, b) => a - b));
    const b = Float64Array.from({ length: graph.size }, seeded(2));
    const x = new Float64Array(graph.size);
    factor.solve(b, x);
    expect(backwardError(solver.inner.pattern, inner, x, b)).toBeLessThan(1e-10);
    if (kind === "cholesky") {
      factor.refreshInSteps(inner).next();
      expect(() => factor.solve(b, x)).toThrow("no matrix yet");
    }
    solver.release();
  });

  it("solves M x + extra in one go as it does step by step", () => {
    const graph = gridGraph(20, 4);
    const pattern = patternOf(graph);
    const solver = makeSolver(pattern, graph.coordinates, { kind });
    const gather = (values: Float64Array) =>
      gatherValues(solver.inner.source, values, new Float64Array(values.length));
    const factor = solver.factor();
    const matrix = solver.matrix();
    factor.refresh(gather(randomPositiveDefinite(graph, pattern, 1)));
    matrix.refresh(gather(randomPositiveDefinite(graph, pattern, 2)));
    const blank = () => new Float64Array(graph.size);
    const x = Float64Array.from({ length: graph.size }, seeded(5));
    const extra = Float64Array.from({ length: graph.size }, seeded(6));
    const b = matrix.multiply(x, blank()).map((value, i) => value + extra[i]!);
    const apart = blank();
    factor.solve(b, apart);
    factor.solveProduct(matrix, x, extra, x);
    x.forEach((value, i) => expect(Math.abs(value - apart[i]!)).toBeLessThan(1e-9));
  });

  it("refuses a diagonal that is zero, negative or not a number, naming the unknown", () => {
    const graph = delaunayGraph(120, 5);
    const pattern = patternOf(graph);
    for (const bad of [0, -3, NaN]) {
      const values = randomPositiveDefinite(graph, pattern);
      for (let q = pattern.rowStart[77]!; q < pattern.rowStart[78]!; q++) {
        values[q] = 0;
        values[slotOf(pattern, pattern.columns[q]!, 77)] = 0;
      }
      values[pattern.diagonal[77]!] = bad;
      const solve = () =>
        solveOnce(pattern, graph.coordinates, values, new Float64Array(120), new Float64Array(120), { kind });
      expect(solve).toThrow(NotPositiveDefiniteError);
      expect(solve).toThrow(/unknown 77/);
    }
  });
});

describe("sparse Cholesky", () => {
  for (const side of [3, 20, 60])
    it(`says that a system tied to nothing is singular: grid ${side} x ${side}`, () => {
      const graph = gridGraph(side, side);
      const pattern = patternOf(graph);
      const solve = () =>
        solveOnce(
          pattern,
          graph.coordinates,
          laplacian(graph, pattern),
          new Float64Array(graph.size).fill(1),
          new Float64Array(graph.size),
          { kind: "cholesky" },
        );
      expect(solve).toThrow(/singular.*every side insulated/);
    });

  it("still solves what a film of a millionth ties down", () => {
    const graph = gridGraph(40, 1);
    const pattern = patternOf(graph);
    const values = laplacian(graph, pattern);
    values[pattern.diagonal[5]!]! += 1e-6;
    const b = new Float64Array(graph.size);
    b[900] = 1e-6;
    const x = solveOnce(pattern, graph.coordinates, values, b, new Float64Array(graph.size), {
      kind: "cholesky",
    });
    x.forEach((value) => expect(Math.abs(value - 1)).toBeLessThan(1e-5));
  });

  it("says that an indefinite matrix is indefinite", () => {
    const graph = gridGraph(12, 2);
    const pattern = patternOf(graph);
    const values = laplacian(graph, pattern);
    for (const place of pattern.diagonal) values[place]! -= 0.5;
    const solve = () =>
      solveOnce(pattern, graph.coordinates, values, new Float64Array(144), new Float64Array(144), {
        kind: "cholesky",
      });
    expect(solve).toThrow(/indefinite|not positive definite/);
  });

  it("reuses the room of released factors, and the memory of released solvers", () => {
    const graph = gridGraph(30, 2);
    const pattern = patternOf(graph);
    const values = randomPositiveDefinite(graph, pattern);
    const b = new Float64Array(graph.size).fill(1);
    for (let run = 0; run < 400; run++) {
      const x = solveOnce(pattern, graph.coordinates, values, b, new Float64Array(graph.size), {
        kind: "cholesky",
      });
      if (run % 100 === 0) expect(backwardError(pattern, values, x, b)).toBeLessThan(1e-12);
    }
    const solver = makeSolver(pattern, graph.coordinates, { kind: "cholesky" });
    for (let run = 0; run < 50; run++) {
      const factor = solver.factor();
      factor.refresh(gatherValues(solver.inner.source, values, new Float64Array(values.length)));
      factor.release();
    }
    solver.release();
    expect(() => solver.factor()).toThrow("released");
  });

  it("fills no more than nested dissection should: 31/4 n log2 n of a grid (George 1973), with room to spare", () => {
    for (const side of [32, 64, 128]) {
      const graph = gridGraph(side, 1);
      const pattern = nineNeighbours(side);
      const { facts } = makeSolver(pattern, latticeCoordinates(side), { kind: "cholesky" });
      expect(facts.factorEntries).toBeLessThan((31 / 4) * graph.size * Math.log2(side));
    }
  });
});

/** Pattern of square elements, as in George's count. */
function nineNeighbours(side: number): SparsityPattern {
  const nodes: number[] = [];
  for (let i = 0; i + 1 < side; i++)
    for (let j = 0; j + 1 < side; j++)
      nodes.push(i * side + j, i * side + j + 1, (i + 1) * side + j, (i + 1) * side + j + 1);
  return patternFromElements(side * side, [{ nodes: Uint32Array.from(nodes), perElement: 4 }]);
}

function latticeCoordinates(side: number): Float64Array {
  return Float64Array.from({ length: 2 * side * side }, (_, k) =>
    k % 2 === 0 ? Math.floor((k >> 1) / side) : (k >> 1) % side,
  );
}
