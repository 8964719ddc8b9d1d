/** Small sparse systems with a shape of their own, for tests of the engine. All are seeded. */
import Delaunator from "delaunator";
import { patternFromElements, slotOf, type SparsityPattern } from "../../src/linalg/pattern.ts";
import type { HeldUnknowns, LinearSystem, Load, Signal } from "../../src/march/types.ts";

/** Uniform numbers in [0, 1) from a seed (a 32-bit mixing generator). */
export function seeded(seed: number): () => number {
  let state = seed >>> 0;
  return () => {
    state = (state + 0x6d2b79f5) >>> 0;
    let t = Math.imul(state ^ (state >>> 15), 1 | state);
    t = (t + Math.imul(t ^ (t >>> 7), 61 | t)) ^ t;
    return ((t ^ (t >>> 14)) >>> 0) / 4294967296;
  };
}

export interface Graph {
  readonly name: string;
  readonly size: number;
  /** pairs of unknowns */
  readonly links: readonly (readonly [number, number])[];
  readonly coordinates: Float64Array;
}

/** A lattice of side x side unknowns, numbered at random. */
export function gridGraph(side: number, seed = 1): Graph {
  const random = seeded(seed);
  const label = shuffled(side * side, random);
  const links: [number, number][] = [];
  const coordinates = new Float64Array(2 * side * side);
  for (let i = 0; i < side; i++)
    for (let j = 0; j < side; j++) {
      const here = label[i * side + j]!;
      coordinates[2 * here] = i + 0.2 * random();
      coordinates[2 * here + 1] = j + 0.2 * random();
      if (i + 1 < side) links.push([here, label[(i + 1) * side + j]!]);
      if (j + 1 < side) links.push([here, label[i * side + j + 1]!]);
    }
  return { name: `grid ${side} x ${side}`, size: side * side, links, coordinates };
}

export function delaunayGraph(size: number, seed = 1): Graph {
  const random = seeded(seed);
  const coordinates = Float64Array.from({ length: 2 * size }, () => random());
  const { triangles } = new Delaunator(coordinates);
  const links: [number, number][] = [];
  for (let e = 0; e < triangles.length; e++) {
    const next = e % 3 === 2 ? e - 2 : e + 1;
    links.push([triangles[e]!, triangles[next]!]);
  }
  return { name: `triangulation of ${size} points`, size, links, coordinates };
}

/** One unknown tied to all others: the worst case for an ordering that meets it early. */
export function starGraph(size: number, seed = 1): Graph {
  const random = seeded(seed);
  const hub = Math.floor(random() * size);
  const links = Array.from({ length: size }, (_, i) => [hub, i] as [number, number]).filter(
    ([a, b]) => a !== b,
  );
  return {
    name: `star of ${size}`,
    size,
    links,
    coordinates: Float64Array.from({ length: 2 * size }, () => random()),
  };
}

/** Parts that do not touch each other, with lone unknowns among them; all at one and the same place. */
export function scatteredGraph(parts: number, seed = 1): Graph {
  const links: [number, number][] = [];
  let size = 0;
  for (let p = 0; p < parts; p++) {
    const length = 1 + (p % 4);
    for (let k = 1; k < length; k++) links.push([size + k - 1, size + k]);
    size += length;
  }
  return {
    name: `${parts} parts apart (seed ${seed})`,
    size,
    links,
    coordinates: new Float64Array(2 * size),
  };
}

export function patternOf(graph: Graph): SparsityPattern {
  const nodes = Uint32Array.from(graph.links.flat());
  return patternFromElements(graph.size, [{ nodes, perElement: 2 }]);
}

/** Weighted graph Laplacian: random conductances of a few decades, rows add up to 0. */
export function laplacian(graph: Graph, pattern: SparsityPattern, seed = 2): Float64Array {
  const random = seeded(seed);
  const values = new Float64Array(pattern.columns.length);
  for (const [a, b] of graph.links) {
    const weight = 10 ** (2 * random() - 1);
    values[slotOf(pattern, a, b)]! -= weight;
    values[slotOf(pattern, b, a)]! -= weight;
    values[pattern.diagonal[a]!]! += weight;
    values[pattern.diagonal[b]!]! += weight;
  }
  return values;
}

/** Symmetric, diagonally dominant, with entries of both signs. */
export function randomPositiveDefinite(graph: Graph, pattern: SparsityPattern, seed = 3): Float64Array {
  const random = seeded(seed);
  const values = new Float64Array(pattern.columns.length);
  for (let i = 0; i < graph.size; i++) values[pattern.diagonal[i]!]! += 0.1 + random();
  for (const [a, b] of graph.links) {
    const weight = 2 * random() - 1;
    values[slotOf(pattern, a, b)]! += weight;
    values[slotOf(pattern, b, a)]! += weight;
    values[pattern.diagonal[a]!]! += Math.abs(weight);
    values[pattern.diagonal[b]!]! += Math.abs(weight);
  }
  return values;
}

export const constantSignal = (value: number): Signal => ({
  times: Float64Array.of(0),
  values: Float64Array.of(value),
});
export const tableSignal = (times: number[], values: number[]): Signal => ({
  times: Float64Array.from(times),
  values: Float64Array.from(values),
});

/** Everything of a bar problem before signals are chosen. */
export interface Bar {
  readonly pattern: SparsityPattern;
  readonly capacity: Float64Array;
  readonly conductance: Float64Array;
  /** film vector of the right end; its ambient is the signal of the load */
  readonly film: Float64Array;
  readonly coordinates: Float64Array;
  readonly size: number;
}

/**
 * A bar of unit length, conductivity and capacity, cut into elements of degree 1 (lumped or consistent capacity) or
 * 2 (consistent): exact 1-D element matrices. Insulated at the left, film `film` at the right end.
 */
export function bar(elements: number, degree: 1 | 2, lumped: boolean, film: number): Bar {
  const per = degree + 1;
  const size = elements * degree + 1;
  const h = 1 / elements;
  const nodes = Uint32Array.from(
    { length: elements * per },
    (_, q) => Math.floor(q / per) * degree + (q % per),
  );
  const pattern = patternFromElements(size, [{ nodes, perElement: per }]);
  const c = degree === 1 ? LINEAR_CAPACITY : QUADRATIC_CAPACITY;
  const k = degree === 1 ? LINEAR_CONDUCTANCE : QUADRATIC_CONDUCTANCE;
  const capacity = new Float64Array(pattern.columns.length);
  const conductance = new Float64Array(pattern.columns.length);
  for (let e = 0; e < elements; e++)
    for (let a = 0; a < per; a++)
      for (let b = 0; b < per; b++) {
        const [i, j] = [e * degree + a, e * degree + b];
        const share = h * c[a]![b]!;
        capacity[lumped ? pattern.diagonal[i]! : slotOf(pattern, i, j)]! += share;
        conductance[slotOf(pattern, i, j)]! += k[a]![b]! / h;
      }
  const filmVector = new Float64Array(size);
  filmVector[size - 1] = film;
  conductance[pattern.diagonal[size - 1]!]! += film;
  const coordinates = new Float64Array(2 * size);
  for (let i = 0; i < size; i++) coordinates[2 * i + 1] = i / (size - 1);
  return { pattern, capacity, conductance, film: filmVector, coordinates, size };
}

export function systemOf(
  parts: Pick<Bar, "pattern" | "capacity" | "conductance" | "coordinates">,
  loads: readonly Load[],
  held: readonly HeldUnknowns[] = [],
): LinearSystem {
  const { pattern, capacity, conductance, coordinates } = parts;
  return { pattern, capacity, conductance, coordinates, loads, held };
}

/** Run a generator to its end. */
export function drain<R>(generator: Generator<unknown, R, void>): R {
  for (;;) {
    const { done, value } = generator.next();
    if (done) return value as R;
  }
}

const LINEAR_CAPACITY = [
  [1 / 3, 1 / 6],
  [1 / 6, 1 / 3],
];
const LINEAR_CONDUCTANCE = [
  [1, -1],
  [-1, 1],
];
const QUADRATIC_CAPACITY = [
  [4 / 30, 2 / 30, -1 / 30],
  [2 / 30, 16 / 30, 2 / 30],
  [-1 / 30, 2 / 30, 4 / 30],
];
const QUADRATIC_CONDUCTANCE = [
  [7 / 3, -8 / 3, 1 / 3],
  [-8 / 3, 16 / 3, -8 / 3],
  [1 / 3, -8 / 3, 7 / 3],
];

function shuffled(size: number, random: () => number): number[] {
  const list = Array.from({ length: size }, (_, i) => i);
  for (let i = size - 1; i > 0; i--) {
    const j = Math.floor(random() * (i + 1));
    [list[i], list[j]] = [list[j]!, list[i]!];
  }
  return list;
}
