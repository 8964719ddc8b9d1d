import { describe, expect, test } from "vitest";
import { readCase } from "../../src/case/readCase.ts";
import type { Case, CaseDocument, VertexDocument } from "../../src/case/types.ts";
import { buildProfile } from "../../src/profile/buildProfile.ts";
import { curveOf, lateralArea, nearestOn, placeAt } from "../../src/profile/curve.ts";
import { gaussPoints } from "../../src/profile/gauss.ts";
import { thickestSpot } from "../../src/profile/thickestSpot.ts";
import type { Profile } from "../../src/profile/types.ts";
import { plain } from "../helpers/plainCase.ts";

type Loops = { name: string; outline: VertexDocument[]; holes?: VertexDocument[][] };

function caseOf(...regions: Loops[]): Case {
  const document: CaseDocument = {
    ...plain(),
    part: { regions: regions.map((region) => ({ ...region, material: "m" })) },
  };
  const read = readCase(document, {});
  if ("problems" in read) throw new Error(JSON.stringify(read.problems));
  return read.case;
}
const profileOf = (...regions: Loops[]): Profile => buildProfile(caseOf(...regions));

/** A loop of [r, z, name?] or [r, z, name, throughR, throughZ]. */
type Corner = [number, number, string?, number?, number?];
const loop = (...corners: Corner[]): VertexDocument[] =>
  corners.map(([r, z, side, tr, tz]) => ({
    at: [r, z],
    ...(side ? { side } : {}),
    ...(tr === undefined ? {} : { through: [tr, tz!] }),
  }));
const block = (r0: number, z0: number, r1: number, z1: number, name = "b"): VertexDocument[] =>
  loop(
    [r0, z0, `${name} bottom`],
    [r1, z0, `${name} outside`],
    [r1, z1, `${name} top`],
    [r0, z1, `${name} inside`],
  );

const H = Math.SQRT1_2;

describe("measures of revolved parts, against closed forms of solid geometry", () => {
  test("cylinder: volume pi R2 H, skin 2 pi R H + 2 pi R2, V/A R H/(2 (R + H))", () => {
    const part = profileOf({ name: "round", outline: block(0, 0, 0.1, 0.3) });
    expect(part.volume).toBeCloseTo(Math.PI * 0.01 * 0.3, 14);
    expect(part.exposedArea).toBeCloseTo(2 * Math.PI * (0.1 * 0.3 + 0.01), 14);
    expect(part.characteristicLength).toBeCloseTo(0.03 / 0.8, 14);
    expect(part.mass).toBeCloseTo(7800 * Math.PI * 0.003, 9);
    expect(part.sides.map((side) => side.kind)).toEqual(["exposed", "exposed", "exposed", "axis"]);
    expect(part.exposedAreas["b outside"]).toBeCloseTo(2 * Math.PI * 0.03, 14);
    expect(Object.keys(part.exposedAreas)).not.toContain("b inside");
  });
  test("sphere from one half circle: 4/3 pi R3, 4 pi R2, V/A R/3", () => {
    const part = profileOf({ name: "ball", outline: loop([0, -0.05, "skin", 0.05, 0], [0, 0.05, "axis"]) });
    expect(part.volume).toBeCloseTo((4 / 3) * Math.PI * 0.05 ** 3, 16);
    expect(part.exposedArea).toBeCloseTo(4 * Math.PI * 0.05 ** 2, 15);
    expect(part.characteristicLength).toBeCloseTo(0.05 / 3, 15);
    expect(part.high[0]).toBeCloseTo(0.05, 15);
    expect(part.regions[0]?.centreZ).toBeCloseTo(0, 15);
    expect(part.regions[0]?.centroid[0]).toBeCloseTo((4 * 0.05) / (3 * Math.PI), 15);
  });
  test("half ball: centre of volume at 3/8 R", () => {
    const part = profileOf({
      name: "h",
      outline: loop([0, 0, "base"], [1, 0, "dome", H, H], [0, 1, "axis"]),
    });
    expect(part.regions[0]?.centreZ).toBeCloseTo(3 / 8, 14);
    expect(part.volume).toBeCloseTo((2 / 3) * Math.PI, 13);
  });
  test("cone: pi R2 H / 3, centre at H/4, mantle pi R s", () => {
    const part = profileOf({
      name: "cone",
      outline: loop([0, 0, "base"], [0.3, 0, "mantle"], [0, 0.4, "axis"]),
    });
    expect(part.volume).toBeCloseTo((Math.PI * 0.09 * 0.4) / 3, 14);
    expect(part.regions[0]?.centreZ).toBeCloseTo(0.1, 14);
    expect(part.exposedAreas["mantle"]).toBeCloseTo(Math.PI * 0.3 * 0.5, 14);
  });
  test("torus from two arcs: 2 pi2 R r2 and 4 pi2 R r (Pappus)", () => {
    const part = profileOf({ name: "t", outline: loop([0.8, 0, "low", 1, -0.2], [1.2, 0, "high", 1, 0.2]) });
    expect(part.volume).toBeCloseTo(2 * Math.PI ** 2 * 0.04, 13);
    expect(part.exposedArea).toBeCloseTo(4 * Math.PI ** 2 * 0.2, 12);
    expect(part.sectionArea).toBeCloseTo(Math.PI * 0.04, 14);
    expect([...part.low, ...part.high]).toEqual([0.8, -0.2, 1.2, 0.2].map((x) => expect.closeTo(x, 14)));
  });
  test("a void is taken off, whichever way the loops run", () => {
    const hollow = {
      name: "h",
      outline: block(0, 0, 0.1, 0.3),
      holes: [block(0.02, 0.1, 0.05, 0.2, "void")],
    };
    const volume = Math.PI * (0.01 * 0.3 - (0.0025 - 0.0004) * 0.1);
    expect(profileOf(hollow).volume).toBeCloseTo(volume, 14);
    const turned = {
      ...hollow,
      outline: [...hollow.outline].reverse(),
      holes: hollow.holes.map((h) => [...h].reverse()),
    };
    expect(profileOf(turned).volume).toBeCloseTo(volume, 14);
    expect(profileOf(hollow).exposedAreas["void inside"]).toBeCloseTo(2 * Math.PI * 0.02 * 0.1, 14);
  });
  test("stepped roll of 766 kg: barrel 400 x 600 mm, two necks 220 x 300 mm, density 7800", () => {
    const outline = loop(
      [0, 0],
      [0.11, 0],
      [0.11, 0.3],
      [0.2, 0.3],
      [0.2, 0.9],
      [0.11, 0.9],
      [0.11, 1.2],
      [0, 1.2],
    );
    const part = profileOf({ name: "roll", outline });
    expect(part.mass).toBeCloseTo(766.0, 1);
    expect(part.characteristicLength).toBeCloseTo(0.06916, 5);
  });
});

describe("arcs", () => {
  test("a shallow arc of a huge radius keeps its digits", () => {
    const sagitta = 1e-7;
    const curve = curveOf({ from: [0.1, 0], to: [0.1, 1], through: [0.1 + sagitta, 0.5] });
    expect(curve.arc).toBeDefined();
    expect(placeAt(curve, 0.5)[0] - 0.1).toBeCloseTo(sagitta, 16);
    // area of revolution of a parabola of that height: 2 pi (r0 + 2/3 sagitta) to first order
    expect(lateralArea(curve)).toBeCloseTo(2 * Math.PI * (0.1 + (2 / 3) * sagitta), 13);
  });
  test("an arc beyond the half circle goes the long way", () => {
    const curve = curveOf({ from: [1 + H, -H], to: [1 + H, H], through: [0, 0] });
    expect(curve.length).toBeCloseTo(1.5 * Math.PI, 13);
    expect(placeAt(curve, 0.5)).toEqual([expect.closeTo(0, 14), expect.closeTo(0, 14)]);
  });
  test("the nearest place of an arc", () => {
    const quarter = curveOf({ from: [1, 0], to: [0, 1], through: [H, H] });
    expect(nearestOn(quarter, [2, 2])).toEqual({
      share: expect.closeTo(0.5, 12),
      distance: expect.closeTo(Math.sqrt(8) - 1, 12),
    });
    expect(nearestOn(quarter, [1, -1]).share).toBe(0);
  });
  test("three points in line make a straight side", () => {
    expect(curveOf({ from: [0, 0], to: [1, 1], through: [0.5, 0.5] }).arc).toBeUndefined();
  });
  test("Gauss points integrate powers up to 2 n - 1", () => {
    for (const n of [1, 3, 12]) {
      for (let power = 0; power < 2 * n; power++) {
        const sum = gaussPoints(n).reduce((s, { at, weight }) => s + weight * at ** power, 0);
        expect(sum, `${n} points, power ${power}`).toBeCloseTo(1 / (power + 1), 14);
      }
    }
  });
});

describe("sides that touch", () => {
  test("a sleeve on a core: one interface, the rest exposed", () => {
    const part = profileOf(
      { name: "core", outline: block(0, 0, 0.05, 0.2, "core") },
      { name: "sleeve", outline: block(0.05, 0, 0.08, 0.2, "sleeve") },
    );
    const [, outside] = part.sides;
    expect(outside).toMatchObject({ name: "core outside", kind: "interface", exposedArea: 0, touches: [7] });
    expect(part.sides[7]).toMatchObject({
      name: "sleeve inside",
      kind: "interface",
      touches: [1],
      region: 1,
      loop: 0,
      index: 3,
    });
    expect(part.exposedArea).toBeCloseTo(2 * Math.PI * (0.08 * 0.2 + 0.0064), 14);
  });
  test("a short sleeve covers part of the core", () => {
    const part = profileOf(
      { name: "core", outline: block(0, 0, 0.05, 0.2, "core") },
      { name: "sleeve", outline: block(0.05, 0.05, 0.08, 0.12, "sleeve") },
    );
    expect(part.sides[1]).toMatchObject({ kind: "partly", touches: [7] });
    expect(part.sides[1]?.exposed).toEqual([
      [0, expect.closeTo(0.25, 12)],
      [expect.closeTo(0.6, 12), 1],
    ]);
    expect(part.exposedAreas["core outside"]).toBeCloseTo(2 * Math.PI * 0.05 * 0.13, 14);
    expect(part.sides[7]?.kind).toBe("interface");
  });
  test("arcs of one circle touch in part", () => {
    const cup = loop(
      [0, 0.5, "low"],
      [0, 0, "skin", Math.sin(Math.PI / 8), 1 - Math.cos(Math.PI / 8)],
      [H, 1 - H, "rim"],
      [H, 2, "lid"],
      [0, 2, "axis"],
    );
    const bed = loop(
      [0, 0, "seat", 0.5, 1 - Math.sqrt(0.75)],
      [1, 1, "outside"],
      [1, -1, "foot"],
      [0, -1, "axis"],
    );
    const part = profileOf({ name: "cup", outline: cup.slice(1) }, { name: "bed", outline: bed });
    const seat = part.sides.find((side) => side.name === "seat");
    expect(seat?.kind).toBe("partly");
    expect(seat?.exposed).toEqual([[expect.closeTo(0.5, 10), 1]]);
    // spherical cap: 2 pi R h
    expect(seat?.exposedArea).toBeCloseTo(2 * Math.PI * H, 12);
    expect(part.sides.find((side) => side.name === "skin")?.kind).toBe("interface");
  });
  test("an inclusion fills a hole", () => {
    const part = profileOf(
      { name: "body", outline: block(0, 0, 0.1, 0.3), holes: [block(0.02, 0.1, 0.05, 0.2, "void")] },
      { name: "filler", outline: block(0.02, 0.1, 0.05, 0.2, "filler") },
    );
    expect(part.sides.filter((side) => side.kind === "interface")).toHaveLength(8);
    expect(part.volume).toBeCloseTo(Math.PI * 0.003, 14);
    expect(part.exposedArea).toBeCloseTo(2 * Math.PI * (0.03 + 0.01), 14);
  });
  test("touching in one point is no interface", () => {
    const part = profileOf(
      { name: "a", outline: block(0, 0, 0.1, 0.1, "a") },
      { name: "b", outline: block(0.1, 0.1, 0.2, 0.2, "b") },
    );
    expect(part.sides.every((side) => side.touches.length === 0)).toBe(true);
  });
  test("the same part in millimetres and in kilometres touches alike", () => {
    for (const scale of [1e-3, 1e3]) {
      const part = profileOf(
        { name: "core", outline: block(0, 0, 0.05 * scale, 0.2 * scale, "core") },
        { name: "sleeve", outline: block(0.05 * scale, 0.1 * scale, 0.08 * scale, 0.2 * scale, "sleeve") },
      );
      expect(part.sides.map((side) => side.kind)).toEqual([
        "exposed",
        "partly",
        "exposed",
        "axis",
        "exposed",
        "exposed",
        "exposed",
        "interface",
      ]);
    }
  });
});

describe("the thickest spot", () => {
  const spotOf = (...regions: Loops[]) => thickestSpot(profileOf(...regions))!;
  test("of a squat round is on the axis, half its height from the faces", () => {
    const spot = spotOf({ name: "r", outline: block(0, 0, 0.2, 0.1) });
    expect(spot.radius).toBeCloseTo(0.05, 4);
    expect(spot.at[1]).toBeCloseTo(0.05, 4);
  });
  test("of a long round is its radius, on the axis", () => {
    const spot = spotOf({ name: "r", outline: block(0, 0, 0.02, 1) });
    expect(spot.radius).toBeCloseTo(0.02, 4);
    expect(spot.at[0]).toBeLessThan(2e-4);
  });
  test("of a ball is its middle", () => {
    const spot = spotOf({ name: "b", outline: loop([0, -0.05, "skin", 0.05, 0], [0, 0.05, "axis"]) });
    expect(spot.radius).toBeCloseTo(0.05, 5);
  });
  test("of a tube is half its wall", () => {
    const spot = spotOf({ name: "t", outline: block(0.1, 0, 0.14, 1) });
    expect(spot.radius).toBeCloseTo(0.02, 4);
    expect(spot.at[0]).toBeCloseTo(0.12, 3);
  });
  test("passes through a joint between regions", () => {
    const spot = spotOf(
      { name: "a", outline: block(0, 0, 0.05, 1, "a") },
      { name: "b", outline: block(0.05, 0, 0.08, 1, "b") },
    );
    expect(spot.radius).toBeCloseTo(0.08, 3);
  });
});
