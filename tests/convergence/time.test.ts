/** Observed orders in time, on systems small enough to know the exact answer. */
import { describe, expect, it } from "vitest";
import { patternFromEntries } from "../../src/linalg/pattern.ts";
import { implicitEuler } from "../../src/march/implicitEuler.ts";
import { krylov } from "../../src/march/krylov.ts";
import { trBdf2 } from "../../src/march/trBdf2.ts";
import type { LinearSystem, Scheme } from "../../src/march/types.ts";
import { denseMarch } from "../helpers/dense.ts";
import { bar, constantSignal, drain, systemOf, tableSignal } from "../helpers/systems.ts";

/** Two unequal bodies, coupled, the second facing surroundings that rise from 20 to 80. */
function twoBodies(knots: number): LinearSystem {
  const pattern = patternFromEntries(2, [0], [1]);
  const signal = tableSignal(
    Array.from({ length: knots + 1 }, (_, k) => (2 * k) / knots),
    Array.from({ length: knots + 1 }, (_, k) => 20 + (60 * k) / knots),
  );
  return {
    pattern,
    capacity: Float64Array.of(1, 0.1, 0.1, 2),
    conductance: Float64Array.of(1.5, -1.5, -1.5, 2.3),
    loads: [{ vector: Float64Array.of(0, 0.8), signal }],
    held: [],
    coordinates: Float64Array.of(0, 0, 1, 0),
  };
}

/**
 * Error at the end after equal steps: every step is forced by a knot of the signal, and no error is ever too large.
 */
function errorAfter(scheme: Scheme, steps: number): number {
  const start = Float64Array.of(100, 40);
  const options = { duration: 2, tolerance: 1e9, firstInstant: 32 };
  const history = drain(scheme(twoBodies(steps), start, options));
  expect(history.facts.steps).toBe(steps);
  const exact = denseMarch(twoBodies(1), start)(2);
  const u = history.at(2, start.slice());
  return Math.max(...exact.map((value, i) => Math.abs(value - u[i]!)));
}

function observedOrder(scheme: Scheme): number {
  return Math.log2(errorAfter(scheme, 40) / errorAfter(scheme, 80));
}

describe("observed order in time on two coupled bodies", () => {
  it("is 1 for implicit Euler", () => {
    expect(observedOrder(implicitEuler)).toBeGreaterThan(0.9);
    expect(observedOrder(implicitEuler)).toBeLessThan(1.1);
  });
  it("is 2 for TR-BDF2", () => {
    expect(observedOrder(trBdf2)).toBeGreaterThan(1.9);
    expect(observedOrder(trBdf2)).toBeLessThan(2.1);
  });
  it("is past all orders for the Krylov march: two vectors are exact", () => {
    const history = drain(
      krylov(twoBodies(1), Float64Array.of(100, 40), { duration: 2, tolerance: 1, firstInstant: 0.1 }),
    );
    const exact = denseMarch(twoBodies(1), [100, 40]);
    for (const time of [0.01, 0.3, 2]) {
      const u = history.at(time, new Float64Array(2));
      exact(time).forEach((value, i) => expect(Math.abs(value - u[i]!)).toBeLessThan(1e-10));
    }
    expect(history.facts.timeError).toBe(0);
  });
});

describe("on a cooling bar", () => {
  const parts = bar(100, 2, false, 5);
  const system = systemOf(parts, [{ vector: parts.film, signal: constantSignal(20) }]);
  const start = new Float64Array(parts.size).fill(100);
  const exact = denseMarch(system, start);
  const instants = Array.from({ length: 15 }, (_, q) => 0.02 * 100 ** (q / 14));
  const truths = instants.map((time) => exact(time));
  const largestError = (scheme: Scheme, tolerance: number) => {
    const history = drain(scheme(system, start, { duration: 2, tolerance, firstInstant: 0.02 }));
    const u = start.slice();
    let worst = 0;
    instants.forEach((time, q) => {
      history.at(time, u);
      truths[q]!.forEach((value, i) => (worst = Math.max(worst, Math.abs(value - u[i]!))));
    });
    return { worst, history };
  };

  it("every further decade costs the Krylov march a few vectors only (spectral decay)", () => {
    const solves = [1e-1, 1e-2, 1e-3, 1e-4, 1e-5].map((tolerance) => {
      const { worst, history } = largestError(krylov, tolerance);
      expect(worst).toBeLessThan(tolerance);
      return history.facts.solves;
    });
    expect(solves.at(-1)! - solves[0]!).toBeLessThanOrEqual(20);
  });

  it("all three schemes agree within their tolerances", () => {
    for (const [scheme, tolerance] of [
      [implicitEuler, 0.5],
      [trBdf2, 0.05],
      [krylov, 1e-4],
    ] as const) {
      const { worst, history } = largestError(scheme, tolerance);
      expect(worst, history.facts.scheme).toBeLessThan(tolerance);
      expect(worst, history.facts.scheme).toBeLessThan(1.1 * history.facts.timeError);
    }
  });

  it("a tenfold tighter tolerance costs TR-BDF2 about threefold steps", () => {
    const [rough, fine] = [1e-1, 1e-2].map(
      (tolerance) => largestError(trBdf2, tolerance).history.facts.steps,
    );
    expect(fine! / rough!).toBeGreaterThan(2);
    expect(fine! / rough!).toBeLessThan(4);
  });
});

describe("an end that is held at another value than it starts with", () => {
  /** Series of a plate, one face insulated, the other stepped from 1 to 0 (Carslaw and Jaeger 1959, 3.3(9)). */
  const series = (x: number, time: number) => {
    let sum = 0;
    for (let k = 0; k < 200; k++) {
      const mode = (k + 0.5) * Math.PI;
      sum += ((2 * (-1) ** k) / mode) * Math.cos(mode * x) * Math.exp(-mode * mode * time);
    }
    return sum;
  };
  const errorWith = (elements: number) => {
    const parts = bar(elements, 2, false, 0);
    const end = { unknowns: Uint32Array.of(parts.size - 1), signal: constantSignal(0) };
    const start = new Float64Array(parts.size).fill(1);
    const options = { duration: 0.3, tolerance: 1e-10, firstInstant: 0.01 };
    const history = drain(krylov(systemOf(parts, [], [end]), start, options));
    const errors = [0.01, 0.05, 0.3].flatMap((time) => {
      const u = history.at(time, start.slice());
      return Array.from(u, (value, i) => Math.abs(value - series(i / (parts.size - 1), time)));
    });
    return Math.max(...errors);
  };

  it("loses no order in space: 4 at the nodes of quadratic elements with consistent capacity", () => {
    const order = Math.log2(errorWith(16) / errorWith(32));
    expect(order).toBeGreaterThan(3.7);
    expect(errorWith(32)).toBeLessThan(2e-5);
  });
});
