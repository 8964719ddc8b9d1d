import { describe, expect, it } from "vitest";
import { bandOrdering } from "../../src/linalg/bandOrdering.ts";
import {
  gatherValues,
  numberingFrom,
  renumberPattern,
  toInner,
  toOuter,
} from "../../src/linalg/numbering.ts";
import {
  checkSparse,
  elementSlots,
  multiply,
  patternFromElements,
  patternFromEntries,
  slotOf,
} from "../../src/linalg/pattern.ts";
import { denseOf, times } from "../helpers/dense.ts";
import {
  delaunayGraph,
  patternOf,
  randomPositiveDefinite,
  scatteredGraph,
  seeded,
} from "../helpers/systems.ts";

describe("sparsity pattern", () => {
  const group = { nodes: Uint32Array.of(0, 1, 2, 2, 1, 4), perElement: 3 };

  it("couples the unknowns of an element, gives a lone unknown its diagonal, and is sound", () => {
    const pattern = patternFromElements(6, [group]);
    expect(checkSparse(pattern)).toEqual([]);
    expect([...pattern.columns.subarray(pattern.rowStart[1], pattern.rowStart[2])]).toEqual([0, 1, 2, 4]);
    expect([...pattern.columns.subarray(pattern.rowStart[3], pattern.rowStart[4])]).toEqual([3]);
    expect(() => slotOf(pattern, 0, 4)).toThrow("no entry (0, 4)");
  });

  it("joins groups of different elements, as contact pairs need", () => {
    const pattern = patternFromElements(6, [group, { nodes: Uint32Array.of(4, 5), perElement: 2 }]);
    expect(slotOf(pattern, 5, 4)).toBeGreaterThan(0);
    expect(checkSparse(pattern)).toEqual([]);
  });

  it("assembles in place through element slots what a dense assembly gives", () => {
    const pattern = patternFromElements(6, [group]);
    const slots = elementSlots(pattern, group);
    const values = new Float64Array(pattern.columns.length);
    const dense = Array.from({ length: 6 }, () => new Array<number>(6).fill(0));
    for (let e = 0; e < 2; e++)
      for (let a = 0; a < 3; a++)
        for (let b = 0; b < 3; b++) {
          const value = 1 + Math.min(a, b) + 10 * e;
          values[slots[9 * e + 3 * a + b]!]! += value;
          dense[group.nodes[3 * e + a]!]![group.nodes[3 * e + b]!]! += value;
        }
    expect(denseOf(pattern, values)).toEqual(dense);
  });

  it("refuses an element that names an unknown outside the system", () => {
    expect(() => patternFromElements(4, [group])).toThrow("unknown 4; there are 4");
  });

  it("multiplies as the dense matrix does", () => {
    const graph = delaunayGraph(60, 5);
    const pattern = patternOf(graph);
    const values = randomPositiveDefinite(graph, pattern);
    const random = seeded(9);
    const x = Float64Array.from({ length: 60 }, random);
    const product = multiply(pattern, values, x, new Float64Array(60));
    times(denseOf(pattern, values), x).forEach((value, i) => expect(product[i]).toBeCloseTo(value, 12));
  });

  it("tells what is wrong with a pattern or its values", () => {
    const sound = patternFromEntries(3, [0, 1], [1, 2]);
    expect(checkSparse({ ...sound, columns: Int32Array.of(1, 0, 0, 1, 2, 1, 2) })[0]).toMatch(/row 0/);
    expect(checkSparse({ ...sound, columns: sound.columns.slice(1) })[0]).toMatch(/rowStart runs/);
    const values = new Float64Array(sound.columns.length).fill(1);
    expect(checkSparse(sound, values)).toEqual([]);
    values[slotOf(sound, 0, 1)] = 2;
    expect(checkSparse(sound, values)).toHaveLength(1);
    values[0] = NaN;
    expect(checkSparse(sound, values)[0]).toMatch(/not a finite/);
  });
});

describe("numberings", () => {
  for (const graph of [delaunayGraph(200, 4), scatteredGraph(11)])
    it(`band ordering is a permutation and renumbering keeps the matrix: ${graph.name}`, () => {
      const pattern = patternOf(graph);
      const values = randomPositiveDefinite(graph, pattern);
      const numbering = numberingFrom(bandOrdering(pattern));
      expect([...numbering.outerOf].sort((a, b) => a - b)).toEqual(
        Array.from({ length: graph.size }, (_, i) => i),
      );
      const inner = renumberPattern(pattern, numbering);
      const innerValues = gatherValues(inner.source, values, new Float64Array(values.length));
      expect(checkSparse(inner.pattern, innerValues)).toEqual([]);
      const random = seeded(1);
      const x = Float64Array.from({ length: graph.size }, random);
      const blank = () => new Float64Array(graph.size);
      const there = multiply(inner.pattern, innerValues, toInner(numbering, x, blank()), blank());
      const back = toOuter(numbering, there, blank());
      multiply(pattern, values, x, blank()).forEach((value, i) => expect(back[i]).toBeCloseTo(value, 12));
    });

  it("band ordering narrows the band of a shuffled triangulation", () => {
    const pattern = patternOf(delaunayGraph(400, 7));
    const inner = renumberPattern(pattern, numberingFrom(bandOrdering(pattern))).pattern;
    expect(bandOf(inner)).toBeLessThan(0.3 * bandOf(pattern));
  });
});

function bandOf({ size, rowStart, columns }: ReturnType<typeof patternOf>): number {
  let band = 0;
  for (let i = 0; i < size; i++)
    for (let q = rowStart[i]!; q < rowStart[i + 1]!; q++) band = Math.max(band, Math.abs(i - columns[q]!));
  return band;
}
