/** Eigenvalues and coefficients against tables computed apart (12 digits) and the figures printed in a textbook. */
import { describe, expect, test } from "vitest";
import type { Geometry } from "../../src/analytic/geometry.ts";
import { findRoot } from "../../src/analytic/findRoot.ts";
import { Spectrum, eigenvalue, spectrumOf } from "../../src/analytic/spectrum.ts";
import { numberIn, readTable } from "../helpers/readTable.ts";

const GEOMETRIES = ["slab", "cylinder", "sphere"] as const;

describe("eigenvalues", () => {
  const rows = readTable("transient_eigen");
  test.each(GEOMETRIES)("%s: zeta, C and D agree with the 12-digit table to 2e-12", (geometry) => {
    const own = rows.filter((row) => row.geometry === geometry);
    expect(own.length).toBe(222);
    for (const row of own) {
      const mode = spectrumOf(geometry, numberIn(row, "Bi")).mode(numberIn(row, "n"));
      const where = JSON.stringify(row);
      expect(Math.abs(mode.zeta - numberIn(row, "zeta_n")), where).toBeLessThan(2e-12);
      expect(Math.abs(mode.coefficient - numberIn(row, "C_n_centre")), where).toBeLessThan(2e-12);
      expect(Math.abs(mode.coefficient * mode.mean - numberIn(row, "D_n_mean")), where).toBeLessThan(2e-12);
    }
  });

  // Incropera, DeWitt, Bergman, Lavine, Fundamentals of Heat and Mass Transfer, Table 5.1, printed figures from
  // memory: to one unit of the last printed digit, save the two rows where the print as remembered is itself off
  test("the printed one-term table is met to its last digit", () => {
    const anchors = readTable("transient_textbook_anchors");
    expect(anchors.length).toBe(24);
    for (const row of anchors) {
      const mode = spectrumOf(row.geometry as Geometry, numberIn(row, "Bi")).mode(1);
      expect(mode.zeta).toBeCloseTo(numberIn(row, "zeta1_recomputed"), 6);
      expect(mode.coefficient).toBeCloseTo(numberIn(row, "C1_recomputed"), 6);
      if (row.verdict !== "agree") continue;
      expect(Math.abs(mode.zeta - numberIn(row, "zeta1_printed")), JSON.stringify(row)).toBeLessThan(1.01e-4);
      expect(Math.abs(mode.coefficient - numberIn(row, "C1_printed")), JSON.stringify(row)).toBeLessThan(
        1.01e-4,
      );
    }
  });

  test("Abramowitz & Stegun Table 9.5 (from memory): zeros of J0 and J1 are the held and the insulated cylinder", () => {
    expect(eigenvalue("cylinder", Infinity, 1)).toBeCloseTo(2.4048255577, 10);
    expect(eigenvalue("cylinder", Infinity, 2)).toBeCloseTo(5.5200781103, 10);
    expect(eigenvalue("cylinder", 0, 2)).toBeCloseTo(3.8317059702, 10);
    expect(eigenvalue("cylinder", 0, 3)).toBeCloseTo(7.0155866698, 10);
  });

  test.each(GEOMETRIES)(
    "%s: eigenvalues interlace and rise from insulated to held at any Biot number",
    (geometry) => {
      const biots = [0, 1e-15, 1e-12, 1e-6, 1e-3, 0.1, 1, 10, 1e3, 1e6, 1e12, 1e15, Infinity];
      for (let n = 1; n <= 400; n += n < 60 ? 1 : 17) {
        const zetas = biots.map((biot) => eigenvalue(geometry, biot, n));
        for (let i = 1; i < zetas.length; i++)
          expect(zetas[i]!).toBeGreaterThanOrEqual(zetas[i - 1]! - 1e-12);
        expect(eigenvalue(geometry, 0, n + 1)).toBeGreaterThan(zetas.at(-1)! + 0.4);
      }
    },
  );

  test.each(GEOMETRIES)("%s: for small Biot numbers the first eigenvalue tends to sqrt(d Bi)", (geometry) => {
    const dimension = { slab: 1, cylinder: 2, sphere: 3 }[geometry];
    for (const biot of [1e-12, 1e-9, 1e-6])
      expect(eigenvalue(geometry, biot, 1) / Math.sqrt(dimension * biot)).toBeCloseTo(1, 6);
  });

  test.each(GEOMETRIES)(
    "%s: what the tail bound rests on holds: |C_n| falls, steps of zeta^2 grow",
    (geometry) => {
      for (const biot of [0.001, 0.3, 1, 5, 40, 1000, Infinity]) {
        const modes = new Spectrum(geometry, biot).modes(300);
        for (let n = 2; n < 299; n++) {
          const [a, b, c] = [modes[n - 1]!, modes[n]!, modes[n + 1]!];
          expect(Math.abs(b.coefficient)).toBeLessThanOrEqual(Math.abs(a.coefficient) * (1 + 1e-12));
          expect(c.zeta ** 2 - b.zeta ** 2).toBeGreaterThanOrEqual((b.zeta ** 2 - a.zeta ** 2) * (1 - 1e-12));
        }
      }
    },
  );

  test("a Biot number below zero or none at all is refused", () => {
    expect(() => eigenvalue("slab", -1, 1)).toThrow(RangeError);
    expect(() => new Spectrum("sphere", NaN)).toThrow(RangeError);
  });
});

describe("root finding", () => {
  test("finds roots to rounding, also at the ends and where the function is flat", () => {
    expect(findRoot((x) => x * x - 2, 0, 2)).toBeCloseTo(Math.SQRT2, 15);
    expect(findRoot((x) => x, 0, 2)).toBe(0);
    expect(findRoot((x) => x - 2, 0, 2)).toBe(2);
    expect(findRoot((x) => (x - 1) ** 3, 0.3, 2.5)).toBeCloseTo(1, 5);
    expect(findRoot((x) => Math.exp(x) - 1e6, 0, 100)).toBeCloseTo(Math.log(1e6), 12);
  });
  test("refuses a bracket without a change of sign", () => {
    expect(() => findRoot((x) => x * x + 1, -1, 1)).toThrow(/-1/);
    expect(() => findRoot(() => NaN, -1, 1)).toThrow(RangeError);
  });
});
