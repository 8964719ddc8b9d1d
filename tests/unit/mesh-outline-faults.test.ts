import { describe, expect, it } from "vitest";
import { findOutlineFaults, type OutlineFaultCode } from "../../mesh/outlineFaults.ts";
import type { OutlineRegion, Point } from "../../mesh/types.ts";
import { extremes, mapOutline, parts, regionOf, type Corner } from "../helpers/outlines.ts";

const block = (r0: number, z0: number, r1: number, z1: number): Corner[] => [
  [r0, z0],
  [r1, z0],
  [r1, z1],
  [r0, z1],
];

function codes(regions: OutlineRegion[], points?: Point[]): OutlineFaultCode[] {
  return findOutlineFaults(regions, points).map(({ code }) => code);
}

describe("sound outlines", () => {
  for (const [name, regions] of Object.entries({ ...parts, ...extremes })) {
    it(`${name}: no fault, at any scale, mirrored, shifted`, () => {
      const maps: ((p: Point) => Point)[] = [
        (p) => p,
        ([r, z]) => [1e-3 * r, 1e-3 * z],
        ([r, z]) => [1e3 * r, 1e3 * z],
        ([r, z]) => [r, -z],
        ([r, z]) => [r, z + 100],
      ];
      for (const map of maps) {
        expect(findOutlineFaults(mapOutline(regions, map)).filter((fault) => !fault.isRemark)).toEqual([]);
      }
    });
  }
});

describe("faults of one loop", () => {
  it("crossing names both sides and the place", () => {
    const bow = regionOf([
      [0, 0],
      [2, 0],
      [1, 2],
      [2, 2],
      [0, 1],
    ]);
    const faults = findOutlineFaults([bow]);
    expect(faults.map(({ code }) => code)).toEqual(["crossing"]);
    expect(faults[0]!.at).toEqual({ region: 0, loop: 0, side: 1 });
    expect(faults[0]!.other).toEqual({ region: 0, loop: 0, side: 3 });
    expect(faults[0]!.places[0]![0]).toBeCloseTo(1.2, 12);
    expect(faults[0]!.places[0]![1]).toBeCloseTo(1.6, 12);
  });

  it("crossing at a vertex of the loop is a crossing, not a touch", () => {
    const through = regionOf([
      [0, 0],
      [2, 0],
      [2, 1],
      [1, 0],
      [0, -1],
    ]);
    expect(codes([through])).toContain("crossing");
  });

  it("an arc that cuts a line is a crossing", () => {
    const bulged = regionOf([
      [1, 0],
      [3, 0],
      [3, 0.6, 2, -0.05],
      [1, 0.6],
    ]);
    const faults = findOutlineFaults([bulged]);
    expect(faults.map(({ code }) => code)).toEqual(["crossing", "crossing"]);
    for (const { places } of faults) expect(places[0]![1]).toBeCloseTo(0, 9);
  });

  it("gap gives its size and both ends", () => {
    const open: OutlineRegion = {
      loops: [
        [
          { from: [0, 0], to: [1, 0] },
          { from: [1, 0.002], to: [1, 1] },
          { from: [1, 1], to: [0, 0] },
        ],
      ],
    };
    const faults = findOutlineFaults([open]);
    expect(faults.map(({ code }) => code)).toEqual(["gap"]);
    expect(faults[0]!.sizes[0]).toBeCloseTo(0.002, 12);
    expect(faults[0]!.places).toEqual([
      [1, 0],
      [1, 0.002],
    ]);
  });

  it("negative r, of a vertex and of an arc that bulges across the axis", () => {
    const faults = findOutlineFaults([
      regionOf([
        [-0.1, 0],
        [1, 0],
        [1, 1],
      ]),
    ]);
    expect(faults.map(({ code }) => code)).toEqual(["negative-radius", "negative-radius"]);
    const bulge = findOutlineFaults([
      regionOf([
        [0.1, 0],
        [1, 0],
        [1, 1],
        [0.1, 1, -0.2, 0.5],
      ]),
    ]);
    expect(bulge.map(({ code }) => code)).toEqual(["negative-radius"]);
    expect(bulge[0]!.sizes[0]).toBeCloseTo(-0.2, 9);
  });

  it("zero-length and duplicate sides", () => {
    expect(
      codes([
        regionOf([
          [0, 0],
          [1, 0],
          [1, 0],
          [1, 1],
        ]),
      ]),
    ).toEqual(["zero-length"]);
    const spike = findOutlineFaults([
      regionOf([
        [0, 0],
        [1, 0],
        [1, 1],
        [1, 2],
        [1, 1],
        [0, 1],
      ]),
    ]);
    expect(spike.map(({ code }) => code)).toContain("duplicate");
    expect(spike.find(({ code }) => code === "duplicate")!.sizes[0]).toBeCloseTo(1, 12);
  });

  it("an arc through points in line is a remark", () => {
    const flat = regionOf([
      [0, 0],
      [1, 0, 1, 0.5],
      [1, 1],
      [0, 1],
    ]);
    const faults = findOutlineFaults([flat]);
    expect(faults.map(({ code, isRemark }) => [code, isRemark])).toEqual([["arc-in-line", true]]);
  });

  it("too few sides, no area, not a number", () => {
    expect(
      codes([
        regionOf([
          [0, 0],
          [1, 0],
        ]),
      ]),
    ).toContain("few-sides");
    expect(
      codes([
        regionOf([
          [0, 0],
          [1, 0],
          [2, 0],
        ]),
      ]),
    ).toContain("no-area");
    expect(
      codes([
        regionOf([
          [0, NaN],
          [1, 0],
          [2, 3],
        ]),
      ]),
    ).toEqual(["not-a-number"]);
  });
});

describe("walls, voids, regions, points", () => {
  it("a wall thinner than can be meshed gives its thickness", () => {
    const thin = regionOf([
      [1, 0],
      [1 + 1e-7, 0],
      [1 + 1e-7, 1],
      [1, 1],
    ]);
    const faults = findOutlineFaults([thin]).filter(({ code }) => code === "thin-wall");
    expect(faults.length).toBeGreaterThan(0);
    expect(faults[0]!.sizes[0]).toBeCloseTo(1e-7, 12);
  });

  it("a void that touches the outside at two places cuts the region in pieces", () => {
    const faults = codes([
      regionOf(block(0, 0, 2, 2), [
        [0.5, 0],
        [1.5, 1],
        [1, 2],
      ]),
    ]);
    expect(faults).toContain("in-pieces");
  });

  it("a void outside of its region", () => {
    expect(codes([regionOf(block(0, 0, 1, 1), block(2, 0, 3, 1))])).toEqual(["void-outside"]);
  });

  it("overlap of regions that cross, that contain and that are the same", () => {
    const crossing = findOutlineFaults([regionOf(block(0, 0, 1, 1)), regionOf(block(0.5, 0.5, 2, 2))]);
    expect(crossing.map(({ code }) => code)).toEqual(["overlap"]);
    expect(crossing[0]!.places).toHaveLength(2);
    expect(codes([regionOf(block(0, 0, 1, 1)), regionOf(block(0.2, 0.2, 0.4, 0.4))])).toEqual(["overlap"]);
    expect(codes([regionOf(block(0, 0, 1, 1)), regionOf(block(0, 0, 1, 1))])).toEqual(["overlap"]);
    expect(codes([regionOf(block(0, 0, 1, 1)), regionOf(block(0, 0, 1, 0.5))])).toEqual(["overlap"]);
  });

  it("neighbours, and a region that fills another's void, are sound; one apart is a remark", () => {
    expect(codes([regionOf(block(0, 0, 1, 1)), regionOf(block(1, 0.2, 2, 2))])).toEqual([]);
    const ring = regionOf(block(0, 0, 3, 3), block(1, 1, 2, 2));
    expect(codes([ring, regionOf(block(1, 1, 2, 2))])).toEqual([]);
    const apart = findOutlineFaults([regionOf(block(0, 0, 1, 1)), regionOf(block(2, 0, 3, 1))]);
    expect(apart.map(({ code, isRemark }) => [code, isRemark])).toEqual([["stands-apart", true]]);
  });

  it("requested points outside are named, those inside and on sides are not", () => {
    const faults = findOutlineFaults(
      [regionOf(block(0, 0, 1, 1))],
      [
        [0.5, 0.5],
        [1, 0.3],
        [1.5, 0.5],
      ],
    );
    expect(faults.map(({ code, point }) => [code, point])).toEqual([["point-outside", 2]]);
    expect(faults[0]!.sizes[0]).toBeCloseTo(0.5, 12);
  });

  it("says all faults at once", () => {
    const many = codes([
      regionOf([
        [-1, 0],
        [2, 0],
        [1, 2],
        [2, 2],
        [0, 1],
      ]),
      regionOf([
        [5, 0],
        [5, 0],
        [6, 0],
        [6, 1],
      ]),
    ]);
    expect(many).toContain("negative-radius");
    expect(many).toContain("crossing");
    expect(many).toContain("zero-length");
  });
});
