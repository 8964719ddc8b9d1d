import { describe, expect, test } from "vitest";
import { findOutlineFaults } from "../../mesh/outlineFaults.ts";
import { readCase } from "../../src/case/readCase.ts";
import { SHAPES, shapeOutline, standardSizes } from "../../src/case/shapes.ts";
import type { ShapeKind, Sizes } from "../../src/case/shapes.ts";
import { startCase } from "../../src/case/startCase.ts";
import { buildProfile } from "../../src/profile/buildProfile.ts";
import type { Profile } from "../../src/profile/types.ts";

function profileOf(kind: ShapeKind, sizes: Sizes = {}): Profile {
  const started = startCase(kind, sizes);
  if ("faults" in started) throw new Error(JSON.stringify(started.faults));
  const read = readCase(started.document, {});
  if ("problems" in read) throw new Error(JSON.stringify(read.problems));
  expect(read.hints).toEqual([]);
  return buildProfile(read.case);
}

/** Volumes of the standard sizes by the formulas of solid geometry [m3]. */
const VOLUMES: Readonly<Record<ShapeKind, number>> = {
  // frustum, and the cap pi h (3 a2 + h2) / 6
  ingot:
    (Math.PI * 0.9 * (0.2 ** 2 + 0.2 * 0.16 + 0.16 ** 2)) / 3 +
    (Math.PI * 0.04 * (3 * 0.16 ** 2 + 0.04 ** 2)) / 6,
  "stepped-shaft": Math.PI * (0.2 ** 2 * 0.6 + 0.11 ** 2 * 0.6),
  ring: Math.PI * (0.15 ** 2 - 0.09 ** 2) * 0.07,
  sphere: (4 / 3) * Math.PI * 0.04 ** 3,
  "plain-round": Math.PI * 0.025 ** 2 * 0.2,
  tube: Math.PI * (0.135 ** 2 - 0.11 ** 2) * 0.6,
  cone: (Math.PI * 0.15 * (0.06 ** 2 + 0.06 * 0.02 + 0.02 ** 2)) / 3,
  "bottle-shell": bottleVolume(),
};

/**
 * Outer body less inner one. Of a quarter circle turned about the axis with its centre at distance c:
 * pi (c2 h + c pi R2 / 2 + 2 R3 / 3) for a full quarter of height h = R.
 */
function bottleVolume(): number {
  const quarter = (c: number, r: number): number =>
    Math.PI * (c * c * r + (c * Math.PI * r * r) / 2 + (2 * r ** 3) / 3);
  const outer =
    quarter(0.028, 0.01) + Math.PI * 0.038 ** 2 * 0.11 + quarter(0.014, 0.024) + Math.PI * 0.014 ** 2 * 0.06;
  // the inside dome ends where it meets the inside of the neck: integrate pi (c + sqrt(R2 - z2))2 up to z1
  const [c, r] = [0.014, 0.02];
  const z1 = Math.sqrt(r * r - 0.004 ** 2);
  const half = (z1 * Math.sqrt(r * r - z1 * z1) + r * r * Math.asin(z1 / r)) / 2;
  const dome = Math.PI * (c * c * z1 + 2 * c * half + r * r * z1 - z1 ** 3 / 3);
  // the arc bulges back over the neck's inside near its end: the shell holds r between c - 0.004 and the dome there
  const neck = Math.PI * 0.01 ** 2 * (0.204 - 0.12 - z1);
  const inner = quarter(0.028, 0.006) + Math.PI * 0.034 ** 2 * 0.11 + domeWithout(dome, c, r, z1) + neck;
  return outer - inner;
}
/** The inside shoulder runs past its top: beyond r = c the arc comes down again to the neck. */
function domeWithout(toTop: number, c: number, r: number, z1: number): number {
  // from z1 to the top r both branches c +- sqrt(r2 - z2) bound the hollow: pi 4 c sqrt(r2 - z2)
  const area = (Math.PI * r * r) / 4 - (z1 * Math.sqrt(r * r - z1 * z1) + r * r * Math.asin(z1 / r)) / 2;
  return toTop + Math.PI * 4 * c * area;
}

describe("shapes", () => {
  test.each(SHAPES.map((shape) => shape.kind))(
    "%s: sound, its sides named, its volume that of the formula",
    (kind) => {
      const part = profileOf(kind);
      expect(findOutlineFaults(part.regions)).toEqual([]);
      expect(part.volume / VOLUMES[kind]).toBeCloseTo(1, 7);
      for (const side of part.sides) {
        expect(side.name).not.toMatch(/^side \d/);
        expect(side.kind === "axis").toBe(side.name === "axis");
      }
      expect(part.low[1]).toBeCloseTo(0, 9);
    },
  );
  test.each(SHAPES.map((shape) => shape.kind))("%s: scaled sizes give a scaled part", (kind) => {
    const sizes = Object.fromEntries(
      Object.entries(standardSizes(kind)).map(([name, size]) => [name, size * 3]),
    );
    expect(profileOf(kind, sizes).volume / profileOf(kind).volume).toBeCloseTo(27, 6);
  });
  test("sizes that vanish where they may leave their side out", () => {
    expect(profileOf("cone", { top: 0 }).sides.map((side) => side.name)).toEqual(["base", "mantle", "axis"]);
    expect(profileOf("ingot", { crown: 0 }).volume).toBeCloseTo(
      (Math.PI * 0.9 * (0.04 + 0.032 + 0.0256)) / 3,
      12,
    );
  });
  test("a wall of even thickness in the bottle", () => {
    const shaped = shapeOutline("bottle-shell", { wall: 0.002 });
    expect("outline" in shaped).toBe(true);
    expect(profileOf("bottle-shell", { wall: 0.002 }).volume).toBeLessThan(profileOf("bottle-shell").volume);
  });
  const faulty: readonly [ShapeKind, Sizes, string[]][] = [
    ["ring", { bore: 0.4 }, ["bore"]],
    ["tube", { wall: 0.2 }, ["wall"]],
    ["stepped-shaft", { neck: 0.5 }, ["neck"]],
    ["ingot", { crown: 0.3 }, ["crown"]],
    ["plain-round", { diameter: 0, length: -1 }, ["diameter", "length"]],
    ["sphere", { diameter: Number.NaN }, ["diameter"]],
    ["bottle-shell", { wall: 0.014 }, ["neck", "wall", "heel"]],
    ["bottle-shell", { heel: 0.05 }, ["heel"]],
  ];
  test.each(faulty)("%s with %j is refused", (kind, sizes, expected) => {
    const shaped = shapeOutline(kind, sizes);
    if (!("faults" in shaped)) throw new Error("taken");
    expect(shaped.faults.map((fault) => fault.size)).toEqual(expected);
    for (const { message, mend } of shaped.faults)
      expect(`${message} ${mend}`).toMatch(/^[A-Z].*\. [A-Z].*\.$/);
  });
});
