/** The Krylov march against a dense matrix exponential and against implicit Euler; its small eigenproblem and phi functions. */
import { describe, expect, it } from "vitest";
import { tridiagonalEigen } from "../../src/linalg/tridiagonal.ts";
import { krylov } from "../../src/march/krylov.ts";
import { phi1, phi2, phi3 } from "../../src/march/phi.ts";

describe("tridiagonal eigenproblem", () => {
  it("satisfies T S = S theta with orthonormal S, to rounding", () => {
    let seed = 7;
    const random = (): number => (seed = (seed * 48271) % 2147483647) / 2147483647;
    for (const n of [1, 2, 3, 10, 40, 60]) {
      const diagonal = Array.from({ length: n }, () => random() - 0.3);
      const offDiagonal = Array.from({ length: n - 1 }, () => (random() < 0.1 ? 0 : random()));
      const { values, vectors } = tridiagonalEigen(diagonal, offDiagonal);
      for (let i = 0; i < n; i++)
        for (let row = 0; row < n; row++) {
          const at = (r: number): number => (r >= 0 && r < n ? vectors[r * n + i]! : 0);
          const product =
            diagonal[row]! * at(row) +
            (offDiagonal[row - 1] ?? 0) * at(row - 1) +
            (offDiagonal[row] ?? 0) * at(row + 1);
          expect(Math.abs(product - values[i]! * at(row))).toBeLessThan(1e-13 * n);
        }
      for (let i = 0; i < n; i++)
        for (let j = 0; j <= i; j++) {
          let sum = 0;
          for (let row = 0; row < n; row++) sum += vectors[row * n + i]! * vectors[row * n + j]!;
          expect(Math.abs(sum - (i === j ? 1 : 0))).toBeLessThan(1e-13 * n);
        }
    }
  });
});

describe("phi functions", () => {
  it("join their series and their formulas without a step, and have the right values at 0 and 1", () => {
    expect([phi1(0), phi2(0), phi3(0)]).toEqual([1, 1 / 2, 1 / 6]);
    const e = Math.exp(-1);
    expect(phi1(1)).toBeCloseTo(1 - e, 15);
    expect(phi2(1)).toBeCloseTo(e, 15);
    expect(phi3(1)).toBeCloseTo(0.5 - e, 15);
    for (const phi of [phi1, phi2, phi3])
      for (const x of [1e-8, 0.5])
        expect(Math.abs(phi(x * (1 + 1e-12)) - phi(x * (1 - 1e-12)))).toBeLessThan(1e-12);
  });
});

/** 1-D rod of n unknowns: capacity 1 (or consistent), conductance of unit springs, film at both ends. */
function rod(n: number, consistent: boolean, film: number) {
  const rowStart = new Int32Array(n + 1);
  const columns: number[] = [];
  const diagonal = new Int32Array(n);
  const capacity: number[] = [];
  const conductance: number[] = [];
  for (let i = 0; i < n; i++) {
    for (const j of [i - 1, i, i + 1]) {
      if (j < 0 || j >= n) continue;
      if (j === i) diagonal[i] = columns.length;
      columns.push(j);
      const end = i === 0 || i === n - 1;
      capacity.push(consistent ? (j === i ? (end ? 2 : 4) / 6 : 1 / 6) : j === i ? (end ? 0.5 : 1) : 0);
      conductance.push(j === i ? (end ? 1 + film : 2) : -1);
    }
    rowStart[i + 1] = columns.length;
  }
  return {
    pattern: { size: n, rowStart, columns: Int32Array.from(columns), diagonal },
    capacity: Float64Array.from(capacity),
    conductance: Float64Array.from(conductance),
    coordinates: Float64Array.from({ length: 2 * n }, (_, i) => (i % 2 === 0 ? i / 2 : 0)),
  };
}

type Rod = ReturnType<typeof rod>;
const dense = ({ pattern }: Rod, values: Float64Array): number[][] => {
  const out = Array.from({ length: pattern.size }, () => new Array<number>(pattern.size).fill(0));
  for (let i = 0; i < pattern.size; i++)
    for (let k = pattern.rowStart[i]!; k < pattern.rowStart[i + 1]!; k++)
      out[i]![pattern.columns[k]!] = values[k]!;
  return out;
};

/** Reference: classical Runge-Kutta with steps far below the stability limit. */
function reference(
  system: Rod,
  f: (t: number) => number[],
  u0: number[],
  held: Map<number, (t: number) => number>,
  end: number,
): number[] {
  const n = system.pattern.size;
  const C = dense(system, system.capacity);
  const K = dense(system, system.conductance);
  const free = Array.from({ length: n }, (_, i) => i).filter((i) => !held.has(i));
  const slope = (u: number[], t: number): number[] => {
    const right = free.map((i) => {
      let sum = f(t)[i]!;
      for (let j = 0; j < n; j++) sum -= K[i]![j]! * u[j]!;
      for (const [j, h] of held) sum -= (C[i]![j]! * (h(t + 1e-7) - h(t - 1e-7))) / 2e-7;
      return sum;
    });
    const x = solveDense(
      free.map((i) => free.map((j) => C[i]![j]!)),
      right,
    );
    const out = new Array<number>(n).fill(0);
    free.forEach((i, k) => (out[i] = x[k]!));
    return out;
  };
  const at = (u: number[], t: number): number[] => u.map((value, i) => held.get(i)?.(t) ?? value);
  const step = 2e-3;
  let u = at(u0, 0);
  for (let k = 0; k < Math.round(end / step); k++) {
    const t = k * step;
    const add = (a: number[], s: number): number[] => u.map((value, i) => value + s * a[i]!);
    const k1 = slope(u, t);
    const k2 = slope(at(add(k1, step / 2), t + step / 2), t + step / 2);
    const k3 = slope(at(add(k2, step / 2), t + step / 2), t + step / 2);
    const k4 = slope(at(add(k3, step), t + step), t + step);
    u = at(
      u.map((value, i) => value + (step / 6) * (k1[i]! + 2 * k2[i]! + 2 * k3[i]! + k4[i]!)),
      t + step,
    );
  }
  return u;
}

function solveDense(matrix: number[][], right: number[]): number[] {
  const a = matrix.map((row, i) => [...row, right[i]!]);
  const n = a.length;
  for (let i = 0; i < n; i++) {
    for (let r = i + 1; r < n; r++) {
      const factor = a[r]![i]! / a[i]![i]!;
      for (let c = i; c <= n; c++) a[r]![c]! -= factor * a[i]![c]!;
    }
  }
  for (let i = n - 1; i >= 0; i--) {
    for (let c = i + 1; c < n; c++) a[i]![n]! -= a[i]![c]! * a[c]![n]!;
    a[i]![n]! /= a[i]![i]!;
  }
  return a.map((row) => row[n]!);
}

function drain<T>(generator: Generator<unknown, T, void>): T {
  for (;;) {
    const step = generator.next();
    if (step.done) return step.value;
  }
}

const constant = (value: number) => ({ times: Float64Array.of(0), values: Float64Array.of(value) });
const ramp = { times: Float64Array.of(0, 3, 4), values: Float64Array.of(0, 6, 2) };
const rampAt = (t: number): number => (t < 3 ? 2 * t : t < 4 ? 6 - 4 * (t - 3) : 2);
const END = 6;

describe.each([
  ["lumped", false],
  ["consistent", true],
])("with %s capacity", (_, consistent) => {
  const n = 12;
  const loadAt = (values: Record<number, number>): Float64Array =>
    Float64Array.from({ length: n }, (_v, i) => values[i] ?? 0);

  it("agrees with a fine reference under a constant and a ramped load", () => {
    const system = rod(n, consistent, 0.5);
    const [p, q] = [loadAt({ 0: 0.5 * 3 }), loadAt({ [n - 1]: 0.5 })];
    const history = drain(
      krylov(
        {
          ...system,
          loads: [
            { vector: p, signal: constant(1) },
            { vector: q, signal: ramp },
          ],
          held: [],
        },
        new Float64Array(n).fill(1),
        { duration: END, tolerance: 1e-9, firstInstant: 1e-2 },
      ),
    );
    const expected = reference(
      system,
      (t) => Array.from(p, (value, i) => value + q[i]! * rampAt(t)),
      new Array(n).fill(1),
      new Map(),
      END,
    );
    const found = history.at(END, new Float64Array(n));
    expected.forEach((value, i) => expect(Math.abs(found[i]! - value)).toBeLessThan(2e-6));
  });

  it("agrees with a fine reference where end values are held, jump and ramp, and conductance alone is singular", () => {
    const system = rod(n, consistent, 0);
    const history = drain(
      krylov(
        {
          ...system,
          loads: [],
          held: [
            { unknowns: Uint32Array.of(0), signal: constant(5) },
            { unknowns: Uint32Array.of(n - 1), signal: ramp },
          ],
        },
        new Float64Array(n).fill(1),
        { duration: END, tolerance: 1e-9, firstInstant: 1e-2 },
      ),
    );
    const held = new Map<number, (t: number) => number>([
      [0, () => 5],
      [n - 1, rampAt],
    ]);
    const expected = reference(system, () => new Array(n).fill(0), new Array(n).fill(1), held, END);
    const found = history.at(END, new Float64Array(n));
    expected.forEach((value, i) => expect(Math.abs(found[i]! - value)).toBeLessThan(2e-6));
  });

  it("closes C (u - u0) + K (integral of u) = p (integral of a) at any instant", () => {
    const system = rod(n, consistent, 0.5);
    const p = loadAt({ 0: 1, 5: 2 });
    const history = drain(
      krylov({ ...system, loads: [{ vector: p, signal: ramp }], held: [] }, new Float64Array(n).fill(1), {
        duration: END,
        tolerance: 1e-10,
        firstInstant: 1e-2,
      }),
    );
    const [C, K] = [dense(system, system.capacity), dense(system, system.conductance)];
    for (const time of [0.7, 3.3, END]) {
      const u = history.at(time, new Float64Array(n));
      const integral = history.integral(time, new Float64Array(n));
      const driven = history.signalIntegral(ramp, time);
      for (let i = 0; i < n; i++) {
        let sum = -p[i]! * driven;
        for (let j = 0; j < n; j++) sum += C[i]![j]! * (u[j]! - 1) + K[i]![j]! * integral[j]!;
        expect(Math.abs(sum)).toBeLessThan(1e-9);
      }
    }
  });
});

describe("a singular system", () => {
  it("with every side insulated and a source rises without bound, and needs no solve with K", () => {
    const n = 9;
    const system = rod(n, false, 0);
    const p = Float64Array.from({ length: n }, (_, i) => system.capacity[system.pattern.diagonal[i]!]!);
    const history = drain(
      krylov({ ...system, loads: [{ vector: p, signal: constant(2) }], held: [] }, new Float64Array(n), {
        duration: 10,
        tolerance: 1e-9,
        firstInstant: 0.01,
      }),
    );
    for (const value of history.at(10, new Float64Array(n))) expect(value).toBeCloseTo(20, 9);
    for (const value of history.at(2.5, new Float64Array(n))) expect(value).toBeCloseTo(5, 9);
  });
});

describe("work", () => {
  it("one surroundings and a uniform start need one factor and at most 61 solves, knots included", () => {
    const n = 200;
    const system = rod(n, false, 0.05);
    const p = new Float64Array(n);
    p[0] = 0.05;
    p[n - 1] = 0.05;
    const treatment = { times: Float64Array.of(0, 2000, 4000), values: Float64Array.of(0, 800, 300) };
    const history = drain(
      krylov({ ...system, loads: [{ vector: p, signal: treatment }], held: [] }, new Float64Array(n), {
        duration: 6000,
        tolerance: 0.01,
        firstInstant: 60,
      }),
    );
    expect(history.facts.factorizations).toBe(1);
    expect(history.facts.solves).toBeLessThanOrEqual(41);
    expect(history.facts.timeError).toBeLessThan(0.01);
  });
});
