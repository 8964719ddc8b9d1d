/** What the Krylov march promises beside its answer: an error stated on the safe side, heat balanced, work done once. */
import { describe, expect, it } from "vitest";
import { multiply } from "../../src/linalg/pattern.ts";
import { krylov } from "../../src/march/krylov.ts";
import { createWorkspace } from "../../src/march/workspace.ts";
import type { LinearSystem, MarchOptions, StageHistory } from "../../src/march/types.ts";
import { denseMarch } from "../helpers/dense.ts";
import {
  bar,
  constantSignal,
  drain,
  gridGraph,
  laplacian,
  patternOf,
  seeded,
  systemOf,
  tableSignal,
} from "../helpers/systems.ts";

const march = (system: LinearSystem, start: Float64Array, options: MarchOptions): StageHistory =>
  drain(krylov(system, start, options));

interface Case {
  readonly name: string;
  readonly system: LinearSystem;
  readonly start: Float64Array;
  readonly duration: number;
}

function barCases(degree: 1 | 2): Case[] {
  const name = degree === 1 ? "linear lumped bar" : "quadratic consistent bar";
  const parts = bar(60 / degree, degree, degree === 1, 5);
  const { film, size } = parts;
  const warm = new Float64Array(size).fill(100);
  const source = Float64Array.from({ length: size }, (_, i) => (i < size / 2 ? 1 : 0.1));
  const bare = bar(60 / degree, degree, degree === 1, 0);
  const end = Uint32Array.of(size - 1);
  const knots = tableSignal([0, 0.1, 0.5, 1, 1.3], [20, 150, 150, 40, 90]);
  const all: Omit<Case, "duration">[] = [
    { name: "cooling", system: systemOf(parts, [{ vector: film, signal: constantSignal(20) }]), start: warm },
    { name: "five knots", system: systemOf(parts, [{ vector: film, signal: knots }]), start: warm },
    {
      name: "film and source",
      system: systemOf(parts, [
        { vector: film, signal: constantSignal(20) },
        { vector: source, signal: constantSignal(5) },
      ]),
      start: warm,
    },
    {
      name: "uneven start",
      system: systemOf(parts, [{ vector: film, signal: constantSignal(20) }]),
      start: warm.map((_, i) => 100 * Math.cos((7 * i) / size)),
    },
    {
      name: "held end that jumps and ramps",
      system: systemOf(bare, [], [{ unknowns: end, signal: tableSignal([0, 1], [20, 60]) }]),
      start: warm,
    },
    {
      name: "insulated",
      system: systemOf(bare, [{ vector: source, signal: tableSignal([0, 1], [0, 60]) }]),
      start: warm,
    },
  ];
  return all.map((entry) => ({ ...entry, name: `${name}, ${entry.name}`, duration: 2 }));
}

function gridCase(): Case {
  const graph = gridGraph(9, 3);
  const pattern = patternOf(graph);
  const conductance = laplacian(graph, pattern);
  const random = seeded(3);
  const capacity = new Float64Array(conductance.length);
  for (let i = 0; i < graph.size; i++) capacity[pattern.diagonal[i]!] = 0.5 + random();
  const film = new Float64Array(graph.size);
  for (let i = 0; i < 9; i++) {
    film[i] = 1;
    conductance[pattern.diagonal[i]!]! += 1;
  }
  const parts = { pattern, capacity, conductance, coordinates: graph.coordinates };
  const system = systemOf(parts, [{ vector: film, signal: tableSignal([0, 30], [0, 50]) }]);
  return { name: "random lattice", system, start: new Float64Array(graph.size).fill(100), duration: 300 };
}

const cases = [...barCases(1), ...barCases(2), gridCase()];

describe.each(cases)("$name", ({ system, start, duration }) => {
  const exact = denseMarch(system, start);
  const instants = (first: number) =>
    Array.from({ length: 21 }, (_, q) => first * (duration / first) ** (q / 20));

  it("keeps to the tolerance, and the error it states covers the true one, from the first instant on", () => {
    for (const share of [1e-2, 1e-4])
      for (const tolerance of [1, 1e-3, 1e-6]) {
        const options = { duration, tolerance, firstInstant: share * duration };
        const history = march(system, start, options);
        const u = start.slice();
        let worst = 0;
        for (const time of instants(share * duration)) {
          history.at(time, u);
          exact(time).forEach((value, i) => (worst = Math.max(worst, Math.abs(value - u[i]!))));
        }
        // The dense reference itself is good to about 1e-8.
        expect(worst, `${tolerance} from ${share}`).toBeLessThan(tolerance + 2e-8);
        expect(worst, `${tolerance} from ${share}`).toBeLessThan(history.facts.timeError + 2e-8);
        expect(history.facts.timeError).toBeLessThan(tolerance);
      }
  });

  it("balances heat to rounding, however rough the tolerance", () => {
    const history = march(system, start, { duration, tolerance: 5, firstInstant: duration / 50 });
    const held = new Set(system.held.flatMap(({ unknowns }) => [...unknowns]));
    const first = history.at(0, start.slice());
    for (const time of [duration / 50, duration / 3, duration]) {
      const rise = history.at(time, start.slice()).map((value, i) => value - first[i]!);
      const stored = multiply(system.pattern, system.capacity, rise, start.slice());
      const flow = multiply(
        system.pattern,
        system.conductance,
        history.integral(time, start.slice()),
        start.slice(),
      );
      let worst = 0;
      let largest = 0;
      for (let i = 0; i < start.length; i++) {
        if (held.has(i)) continue;
        let sum = stored[i]! + flow[i]!;
        for (const { vector, signal } of system.loads)
          sum -= vector[i]! * history.signalIntegral(signal, time);
        worst = Math.max(worst, Math.abs(sum));
        largest = Math.max(largest, Math.abs(stored[i]!), Math.abs(flow[i]!));
      }
      expect(worst / largest).toBeLessThan(1e-10);
    }
  });

  it("gives the same answer by conjugate gradients where WebAssembly SIMD is missing", () => {
    const options = { duration, tolerance: 1e-4, firstInstant: duration / 100 };
    const workspace = createWorkspace({ kind: "conjugate-gradients" });
    expect(workspace.solverFor(system.pattern, system.coordinates).kind).toBe("conjugate-gradients");
    const plain = march(system, start, { ...options, workspace });
    const exactly = march(system, start, options);
    for (const time of instants(duration / 100)) {
      const u = plain.at(time, start.slice());
      exactly
        .at(time, start.slice())
        .forEach((value, i) => expect(Math.abs(value - u[i]!)).toBeLessThan(1e-4));
    }
  });
});

describe("work that is not done twice", () => {
  const parts = bar(30, 2, false, 5);
  const options = { duration: 2, tolerance: 1e-3, firstInstant: 0.02 };
  const uniform = (value: number) => new Float64Array(parts.size).fill(value);
  const film = (ambient: number) =>
    systemOf(parts, [{ vector: parts.film, signal: constantSignal(ambient) }]);

  it("moving an ambient, its course or a uniform start costs no analysis, no factor and no solve", () => {
    const workspace = createWorkspace();
    march(film(20), uniform(100), { ...options, workspace });
    const before = { ...workspace.counts };
    expect(before).toMatchObject({ analyses: 1, factorizations: 1 });
    const moved = march(film(35), uniform(100), { ...options, workspace });
    const warmer = march(film(20), uniform(140), { ...options, workspace });
    expect(workspace.counts).toEqual(before);
    expect(moved.facts).toMatchObject({ factorizations: 0, solves: 0 });
    for (const [history, system, start] of [
      [moved, film(35), uniform(100)],
      [warmer, film(20), uniform(140)],
    ] as const) {
      const exact = denseMarch(system, start)(0.7);
      history
        .at(0.7, uniform(0))
        .forEach((value, i) => expect(Math.abs(value - exact[i]!)).toBeLessThan(1e-3));
    }
    workspace.release();
  });

  it("moving a held value costs no solve either", () => {
    const workspace = createWorkspace();
    const bare = bar(30, 2, false, 0);
    const end = Uint32Array.of(bare.size - 1);
    const held = (value: number) => systemOf(bare, [], [{ unknowns: end, signal: constantSignal(value) }]);
    march(held(20), uniform(100), { ...options, workspace });
    const before = { ...workspace.counts };
    const moved = march(held(60), uniform(90), { ...options, workspace });
    expect(workspace.counts).toEqual(before);
    const exact = denseMarch(held(60), uniform(90))(0.5);
    moved.at(0.5, uniform(0)).forEach((value, i) => expect(Math.abs(value - exact[i]!)).toBeLessThan(1e-3));
  });

  it("another film brings a new factor but no new analysis", () => {
    const workspace = createWorkspace();
    march(film(20), uniform(100), { ...options, workspace });
    const other = { ...parts, conductance: parts.conductance.slice() };
    other.conductance[parts.pattern.diagonal[parts.size - 1]!]! += 1;
    const vector = parts.film.map((value) => (value === 0 ? 0 : value + 1));
    march(systemOf(other, [{ vector, signal: constantSignal(20) }]), uniform(100), { ...options, workspace });
    expect(workspace.counts).toMatchObject({ analyses: 1, factorizations: 2 });
  });

  it("a start that is uniform needs a basis per load only, an uneven one a single basis for all that is constant", () => {
    const second = new Float64Array(parts.size).fill(0.01);
    const system = systemOf(parts, [
      { vector: parts.film, signal: constantSignal(20) },
      { vector: second, signal: constantSignal(5) },
    ]);
    const together = march(system, uniform(100), options);
    const apart = march(system, uniform(100), { ...options, workspace: createWorkspace() });
    expect(together.facts.solves).toBeLessThan(0.7 * apart.facts.solves);
  });

  it("nothing is solved where nothing drives", () => {
    const history = march(film(100), uniform(100), options);
    expect(history.facts).toMatchObject({ solves: 0, timeError: 0 });
    expect(Math.max(...history.at(1, uniform(0)).map((value) => Math.abs(value - 100)))).toBe(0);
  });
});

describe("ending early", () => {
  it("ends at the first computed instant that the caller wants to stop at", () => {
    const parts = bar(20, 1, true, 5);
    const start = new Float64Array(parts.size).fill(100);
    const history = march(systemOf(parts, [{ vector: parts.film, signal: constantSignal(20) }]), start, {
      duration: 2,
      tolerance: 0.01,
      firstInstant: 0.01,
      stop: (_, u) => u[0]! < 60,
    });
    const last = history.times.at(-1)!;
    expect(last).toBeLessThan(2);
    expect(history.at(last, start.slice())[0]).toBeLessThan(60);
    expect(history.at(history.times.at(-2)!, start.slice())[0]).toBeGreaterThanOrEqual(60);
  });
});
