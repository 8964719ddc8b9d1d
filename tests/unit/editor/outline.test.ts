import { describe, expect, it } from "vitest";
import { arcThrough } from "../../../src/editor/arcs.ts";
import {
  arcOfSide,
  bendSide,
  closeToAxis,
  insertVertex,
  loopOf,
  moveSide,
  moveVertex,
  removeVertex,
  riseOf,
  setRise,
  sheetLoop,
  typeCoordinate,
} from "../../../src/editor/outline.ts";
import { ingot } from "./ingot.ts";

const side = (index: number) => ({ region: 0, loop: 0, index });
const places = (document: ReturnType<typeof ingot>) =>
  sheetLoop(loopOf(document, { region: 0, loop: 0 })).map((vertex) => vertex.at);

describe("points of the outline", () => {
  it("a moved point keeps the unit it was written in", () => {
    const document = ingot();
    moveVertex(document, side(1), [0.213, 0.001]);
    expect(document.part.regions[0]!.outline[1]!.at).toEqual(["213 mm", 0.001]);
  });

  it("never crosses the axis", () => {
    const document = ingot();
    moveVertex(document, side(1), [-0.05, 0.1]);
    expect(places(document)[1]).toEqual([0, 0.1]);
  });

  it("a gap to the axis is closed by both ends of the side", () => {
    const document = ingot();
    const last = document.part.regions[0]!.outline.length - 1;
    moveVertex(document, side(last), [0.004, places(document)[last]![1]]);
    moveVertex(document, side(0), [0.004, 0]);
    closeToAxis(document, side(last));
    expect([places(document)[last]![0], places(document)[0]![0]]).toEqual([0, 0]);
    expect(places(document)[1]![0]).toBeGreaterThan(0.1);
  });

  it("a typed coordinate stands as it was typed", () => {
    const document = ingot();
    typeCoordinate(document, side(2), 0, "6 1/4 in");
    expect(document.part.regions[0]!.outline[2]!.at[0]).toBe("6 1/4 in");
    expect(places(document)[2]![0]).toBeCloseTo(0.15875, 12);
  });

  it("an arc keeps its shape when its end moves: rise over chord stays", () => {
    const document = ingot();
    const chord = () => {
      const [, , a, b] = places(document);
      return Math.hypot(b![0] - a![0], b![1] - a![1]);
    };
    const ratio = riseOf(loopOf(document, side(2)), 2) / chord();
    moveVertex(document, side(2), [0.12, 0.8]);
    expect(riseOf(loopOf(document, side(2)), 2) / chord()).toBeCloseTo(ratio, 6);
  });

  it("a new point on an arc lies on it and leaves the circle as it was", () => {
    const document = ingot();
    const before = arcOfSide(loopOf(document, side(2)), 2)!;
    const middle = [
      before.centre[0] + before.radius * Math.cos((before.from + before.to) / 2),
      before.centre[1] + before.radius * Math.sin((before.from + before.to) / 2),
    ] as const;
    insertVertex(document, side(2), middle);
    const loop = loopOf(document, side(2));
    expect(loop).toHaveLength(5);
    for (const index of [2, 3]) {
      const arc = arcOfSide(loop, index)!;
      expect(arc.radius).toBeCloseTo(before.radius, 6);
      expect(arc.centre[0]).toBeCloseTo(before.centre[0], 6);
    }
    expect(loop[3]!.side).toBe("crown");
  });

  it("a side that a stage speaks of by its number keeps its name when a point is set before it", () => {
    const document = ingot();
    for (const vertex of document.part.regions[0]!.outline) delete vertex.side;
    document.stages[0]!.sides = { "side 3": "insulated" };
    insertVertex(document, side(0), [0.1, 0]);
    expect(sheetLoop(loopOf(document, side(0))).map((vertex) => vertex.side)).toEqual([
      "side 1",
      "side 2",
      "side 3",
      "side 3",
      "side 5",
    ]);
  });

  it("the last three points stay", () => {
    const document = ingot();
    removeVertex(document, side(2));
    removeVertex(document, side(1));
    expect(places(document)).toHaveLength(3);
  });
});

describe("sides of the outline", () => {
  it("the wall of a plain round moves square to itself and its ends slide along the faces", () => {
    const document = ingot();
    document.part.regions[0]!.outline = [
      { at: [0, 0] },
      { at: [0.1, 0] },
      { at: [0.1, 0.5] },
      { at: [0, 0.5] },
    ];
    moveSide(document, side(1), 0.02);
    expect(places(document)).toEqual([
      [0, 0],
      [0.12, 0],
      [0.12, 0.5],
      [0, 0.5],
    ]);
    moveSide(document, side(2), -0.1);
    expect(places(document)).toEqual([
      [0, 0],
      [0.12, 0],
      [0.12, 0.4],
      [0, 0.4],
    ]);
  });

  it("a tapered wall stays parallel, its ends slide along base and chamfer", () => {
    const document = ingot();
    document.part.regions[0]!.outline = [
      { at: [0, 0] },
      { at: [0.2, 0] },
      { at: [0.16, 0.9] },
      { at: [0, 0.9] },
    ];
    moveSide(document, side(1), 0.01);
    const [, a, b] = places(document);
    expect(a![1]).toBe(0);
    expect(b![1]).toBeCloseTo(0.9, 9);
    expect((b![0] - a![0]) / (b![1] - a![1])).toBeCloseTo(-0.04 / 0.9, 9);
    expect(a![0] - 0.2).toBeCloseTo(0.01 / Math.cos(Math.atan(0.04 / 0.9)), 6);
  });

  it("a bent side bulges outwards, whichever way the loop runs", () => {
    for (const turn of [false, true]) {
      const document = ingot();
      const corners: [number, number][] = [
        [0, 0],
        [0.1, 0],
        [0.1, 0.5],
        [0, 0.5],
      ];
      if (turn) corners.reverse();
      document.part.regions[0]!.outline = corners.map((at) => ({ at }));
      const wall = 1; // the second side either way
      bendSide(document, side(wall));
      expect(riseOf(loopOf(document, side(wall)), wall)).toBeCloseTo(0.05, 9);
      expect(Number(document.part.regions[0]!.outline[wall]!.through![0])).toBeGreaterThan(0.1);
    }
  });

  it("a typed rise is the height over the chord", () => {
    const document = ingot();
    setRise(document, side(1), 0.03);
    expect(riseOf(loopOf(document, side(1)), 1)).toBeCloseTo(0.03, 9);
  });
});

describe("arcs", () => {
  it("run through the middle place, the long way round where it lies there", () => {
    const half = arcThrough([1, 0], [0, 1], [-1, 0])!;
    expect(half.to - half.from).toBeCloseTo(Math.PI, 12);
    const long = arcThrough([1, 0], [-1, 0], [0, 1])!;
    expect(long.to - long.from).toBeCloseTo(-1.5 * Math.PI, 12);
    expect(long.radius).toBeCloseTo(1, 12);
  });

  it("are none where the three places are in line", () => {
    expect(arcThrough([0, 0], [1, 1], [2, 2])).toBeNull();
    expect(arcThrough([0, 0], [Number.NaN, 1], [2, 2])).toBeNull();
  });
});
