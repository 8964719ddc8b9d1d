import { describe, expect, test } from "vitest";
import type { Curve, Material } from "../../src/case/types.ts";
import { curveKnots, evaluateCurve, isConstant, meanOfCurve } from "../../src/heat/curve.ts";
import { biotNumber, fourierNumber, thermalDiffusivity } from "../../src/heat/groups.ts";
import { isConstantMaterial, materialAt, materialOverRange } from "../../src/heat/material.ts";

const table: Curve = {
  over: "temperature",
  points: [
    [0, 50],
    [100, 40],
    [300, 30],
  ],
};
const steel: Material = { density: 8000, conductivity: table, heatCapacity: 500, source: "invented" };

describe("curves", () => {
  test("a constant ignores where it is asked", () => expect(evaluateCurve(7, -1e9)).toBe(7));
  test("a table is linear between its points", () => {
    expect(evaluateCurve(table, 50)).toBe(45);
    expect(evaluateCurve(table, 100)).toBe(40);
    expect(evaluateCurve(table, 250)).toBe(32.5);
  });
  test("a table saturates beyond its ends", () => {
    expect(evaluateCurve(table, -40)).toBe(50);
    expect(evaluateCurve(table, 5000)).toBe(30);
    expect(evaluateCurve(table, Infinity)).toBe(30);
  });
  test("an empty table and a place that is no number are refused", () => {
    expect(() => evaluateCurve({ over: "time", points: [] }, 1)).toThrow(RangeError);
    expect(() => evaluateCurve(table, NaN)).toThrow(RangeError);
  });
  test("every segment of a long table is found", () => {
    const points = Array.from({ length: 37 }, (_, i) => [i * i, Math.sin(i)] as const);
    const long: Curve = { over: "time", points };
    for (let i = 0; i < 36; i++)
      expect(evaluateCurve(long, i * i + i + 0.5)).toBeCloseTo((Math.sin(i) + Math.sin(i + 1)) / 2, 12);
  });
  test("the mean over a range is the exact integral, tails included, in either order", () => {
    // by hand: -100..0 at 50, 0..100 mean 45, 100..300 mean 35, 300..400 at 30
    const mean = (100 * 50 + 100 * 45 + 200 * 35 + 100 * 30) / 500;
    expect(meanOfCurve(table, -100, 400)).toBeCloseTo(mean, 12);
    expect(meanOfCurve(table, 400, -100)).toBeCloseTo(mean, 12);
    expect(meanOfCurve(table, 50, 50)).toBe(45);
    expect(meanOfCurve(3, 0, 10)).toBe(3);
  });
  test("constants and knots are recognised", () => {
    expect(isConstant(3)).toBe(true);
    expect(isConstant(table)).toBe(false);
    expect(
      isConstant({
        over: "time",
        points: [
          [0, 5],
          [9, 5],
        ],
      }),
    ).toBe(true);
    expect(curveKnots(table)).toEqual([0, 100, 300]);
    expect(curveKnots(4)).toEqual([]);
  });
});

describe("groups", () => {
  test("Biot and Fourier numbers take the length they are given", () => {
    // a hub ring: h 30, V/A 16.1538 mm, k 45
    expect(biotNumber(30, 0.01615384615384616, 45)).toBeCloseTo(0.010769230769, 12);
    expect(fourierNumber(1e-5, 60, 0.05)).toBeCloseTo(0.24, 14);
    expect(thermalDiffusivity(40, 4e6)).toBe(1e-5);
  });
  test("a held surface has an infinite Biot number, an insulated one none", () => {
    expect(biotNumber(Infinity, 0.1, 40)).toBe(Infinity);
    expect(biotNumber(0, 0.1, 40)).toBe(0);
  });
  test("values outside their range throw and name the numbers", () => {
    expect(() => biotNumber(-1, 0.1, 40)).toThrow(/-1/);
    expect(() => biotNumber(10, 0, 40)).toThrow(RangeError);
    expect(() => biotNumber(10, 0.1, NaN)).toThrow(RangeError);
    expect(() => fourierNumber(1e-5, -1, 0.1)).toThrow(RangeError);
    expect(() => fourierNumber(0, 1, 0.1)).toThrow(RangeError);
    expect(() => thermalDiffusivity(1, 0)).toThrow(RangeError);
  });
});

describe("materials", () => {
  test("state at a temperature", () => {
    expect(materialAt(steel, 50)).toEqual({
      conductivity: 45,
      volumetricHeatCapacity: 4e6,
      diffusivity: 45 / 4e6,
    });
  });
  test("mean state over a range", () => {
    expect(materialOverRange(steel, 100, 300).conductivity).toBeCloseTo(35, 12);
  });
  test("a material is constant only without tables and latent heat", () => {
    expect(isConstantMaterial(steel)).toBe(false);
    const plain = { ...steel, conductivity: 40 };
    expect(isConstantMaterial(plain)).toBe(true);
    expect(isConstantMaterial({ ...plain, latent: { heat: 1, solidus: 1, liquidus: 2 } })).toBe(false);
  });
});
