import { describe, expect, it } from "vitest";
import { multiply } from "../../src/linalg/pattern.ts";
import { implicitEuler } from "../../src/march/implicitEuler.ts";
import { signalAt, signalIntegral, slopeChanges } from "../../src/march/signals.ts";
import type { LinearSystem, MarchOptions } from "../../src/march/types.ts";
import { denseEvolution, denseOf } from "../helpers/dense.ts";
import { bar, constantSignal, drain, systemOf, tableSignal } from "../helpers/systems.ts";

const march = (system: LinearSystem, start: Float64Array, options: MarchOptions) =>
  drain(implicitEuler(system, start, options));

describe("signals", () => {
  const signal = tableSignal([1, 3, 4], [2, 6, 0]);
  it("are straight between knots and constant beyond the ends", () => {
    expect([0, 1, 2, 3.5, 4, 9].map((t) => signalAt(signal, t))).toEqual([2, 2, 4, 3, 0, 0]);
  });
  it("integrate exactly", () => {
    expect(signalIntegral(signal, 5)).toBeCloseTo(2 + 8 + 3, 12);
    expect(signalIntegral(signal, 2)).toBeCloseTo(2 + 3, 12);
    expect(signalIntegral(constantSignal(7), 3)).toBeCloseTo(21, 12);
  });
  it("list where their slope changes, counting the slope at 0", () => {
    expect(slopeChanges(signal)).toEqual([
      { time: 1, change: 2 },
      { time: 3, change: -8 },
      { time: 4, change: 6 },
    ]);
    expect(slopeChanges(tableSignal([-2, 2], [0, 4]))).toEqual([
      { time: 0, change: 1 },
      { time: 2, change: -1 },
    ]);
    expect(slopeChanges(constantSignal(3))).toEqual([]);
  });
});

describe("implicit Euler", () => {
  const parts = bar(20, 1, true, 5);
  const start = new Float64Array(parts.size).fill(100);
  const cooling = systemOf(parts, [{ vector: parts.film, signal: constantSignal(20) }]);
  const options = { duration: 2, tolerance: 0.2, firstInstant: 0.01 };

  it("stays within the stated error of the exact solution, and states an error near the true one", () => {
    const exact = denseEvolution(
      denseOf(parts.pattern, parts.capacity),
      denseOf(parts.pattern, parts.conductance),
    );
    const load = parts.film.map((value) => 20 * value);
    const history = march(cooling, start, options);
    let worst = 0;
    const u = new Float64Array(parts.size);
    for (let k = 0; k <= 40; k++) {
      const time = 0.01 * 200 ** (k / 40);
      const truth = exact(start, load, new Float64Array(parts.size), time);
      history.at(time, u);
      truth.forEach((value, i) => (worst = Math.max(worst, Math.abs(value - u[i]!))));
    }
    expect(worst).toBeLessThan(1.2 * options.tolerance);
    expect(worst).toBeGreaterThan(0.05 * options.tolerance);
    expect(history.facts.timeError).toBeGreaterThan(0.8 * worst);
    expect(history.facts.timeError).toBeLessThan(4 * worst);
  });

  it("never leaves the range of start and ambient when capacity and film are lumped", () => {
    const history = march(cooling, start, { ...options, tolerance: 20 });
    const u = new Float64Array(parts.size);
    for (const time of history.times) {
      history.at(time, u);
      expect(Math.min(...u)).toBeGreaterThanOrEqual(20);
      expect(Math.max(...u)).toBeLessThanOrEqual(100 + 1e-9);
    }
  });

  it("balances: C (u - u0) + K integral of u = loads, at every computed instant", () => {
    const signal = tableSignal([0, 0.5, 1], [20, 150, 40]);
    const system = systemOf(parts, [{ vector: parts.film, signal }]);
    const history = march(system, start, options);
    expect(history.times.length).toBeGreaterThan(10);
    for (const time of history.times) expect(imbalance(system, start, history, time)).toBeLessThan(1e-8);
    expect([...history.times]).toContain(0.5);
  });

  it("holds held unknowns, and balances through them, with lumped and with consistent capacity", () => {
    for (const lumped of [true, false]) {
      const held = bar(20, 1, lumped, 0);
      const signal = tableSignal([0, 1], [20, 60]);
      const system = systemOf(held, [], [{ unknowns: Uint32Array.of(held.size - 1), signal }]);
      const history = march(system, start, options);
      const u = new Float64Array(held.size);
      // held unknowns jump to their value at time 0; what follows starts from there
      const jumped = history.at(0, new Float64Array(held.size));
      expect([jumped[0], jumped[held.size - 1]]).toEqual([start[0], 20]);
      for (const time of history.times) {
        history.at(time, u);
        expect(u[held.size - 1]).toBeCloseTo(signalAt(signal, time), 9);
        expect(imbalance(system, jumped, history, time, held.size - 1)).toBeLessThan(1e-8);
      }
      expect(history.at(2, u)[0]).toBeGreaterThan(20);
      expect(history.at(2, u)[0]).toBeLessThan(64);
    }
  });

  it("ends where it is told to stop, and can tell what it reached on the way", () => {
    const seen: number[] = [];
    const generator = implicitEuler(cooling, start, {
      ...options,
      stop: (time, u) => {
        seen.push(time);
        return u[parts.size - 1]! < 60;
      },
    });
    const first = generator.next();
    if (first.done) throw new Error("one step ended the march");
    const early = first.value.soFar!();
    const reached = early.times.at(-1)!;
    const history = drain(generator);
    expect(early.times.at(-1)).toBe(reached);
    expect(history.times.at(-1)).toBe(seen.at(-1));
    expect(history.times.at(-1)).toBeLessThan(2);
    const u = new Float64Array(parts.size);
    expect(history.at(seen.at(-1)!, u).at(-1)).toBeLessThan(60);
  });

  it("refuses to give integrals between computed instants", () => {
    const history = march(cooling, start, { ...options, tolerance: 20 });
    expect(() => history.integral(1e-7, start.slice())).toThrow("not an instant");
  });

  it("refuses an unknown that is held twice", () => {
    const one = { unknowns: Uint32Array.of(3), signal: constantSignal(1) };
    expect(() => march(systemOf(parts, [], [one, one]), start, options)).toThrow("held twice");
  });
});

/** Largest residual of the heat balance over the free unknowns, over the largest heat in it. */
function imbalance(
  system: LinearSystem,
  start: Float64Array,
  history: ReturnType<typeof march>,
  time: number,
  held = -1,
): number {
  const blank = () => new Float64Array(start.length);
  const rise = history.at(time, blank()).map((value, i) => value - start[i]!);
  if (time === 0) return 0;
  const stored = multiply(system.pattern, system.capacity, rise, blank());
  const flow = multiply(system.pattern, system.conductance, history.integral(time, blank()), blank());
  let worst = 0;
  let largest = 0;
  for (let i = 0; i < start.length; i++) {
    if (i === held) continue;
    let sum = stored[i]! + flow[i]!;
    for (const { vector, signal } of system.loads) sum -= vector[i]! * history.signalIntegral(signal, time);
    worst = Math.max(worst, Math.abs(sum));
    largest = Math.max(largest, Math.abs(stored[i]!), Math.abs(flow[i]!));
  }
  return worst / largest;
}
