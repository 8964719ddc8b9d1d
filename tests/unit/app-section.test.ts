/** The parts of the section that need no page: view, fields, lines, scales, marks. */
import { describe, expect, it } from "vitest";
import { colourAt, mapTable, parseHex } from "../../src/app/colours.ts";
import { paintField } from "../../src/app/section/fieldCanvas.ts";
import { arrivalTimes, fieldAt } from "../../src/app/section/frames.ts";
import { dimensionsOf } from "../../src/app/section/dimensions.ts";
import { levelLines, levelsBetween, placeLabels, roundStep } from "../../src/app/section/isotherms.ts";
import { markPath, outsideIsLeft } from "../../src/app/section/marks.ts";
import { rulerStep, ticksBetween } from "../../src/app/section/rulers.ts";
import { insidePart, nearestOn, readSheet } from "../../src/app/section/sheet.ts";
import {
  boundsOf,
  fitView,
  fromScreen,
  prefersLying,
  toMirror,
  toScreen,
} from "../../src/app/section/view.ts";
import { isStandable } from "../../src/app/opening.ts";
import { CASES } from "../../presets/cases/index.ts";
import { ingot } from "./editor/ingot.ts";

/** A square plate of four triangles around its middle, r 0..1, z 0..1 [m]. */
const plate = {
  nodes: Float64Array.of(0, 0, 1, 0, 1, 1, 0, 1, 0.5, 0.5),
  triangles: Uint32Array.of(0, 1, 4, 1, 2, 4, 2, 3, 4, 3, 0, 4),
  triangleRegion: new Uint16Array(4),
  elements: Uint32Array.of(0, 1, 4, 1, 2, 4, 2, 3, 4, 3, 0, 4),
};
const linear = (f: (r: number, z: number) => number): Float32Array =>
  Float32Array.from({ length: plate.nodes.length / 2 }, (_, i) =>
    f(plate.nodes[2 * i]!, plate.nodes[2 * i + 1]!),
  );

describe("view of the section", () => {
  const frame = { left: 100, top: 50, right: 700, bottom: 350 };
  it.each([true, false])("screen and half plane are inverse to each other, lying %s", (lying) => {
    const view = fitView({ rMax: 0.2, zMin: -0.1, zMax: 0.94 }, frame, lying);
    const [x, y] = toScreen(view, 0.123, 0.456);
    const [r, z] = fromScreen(view, x, y);
    expect(r).toBeCloseTo(0.123, 9);
    expect(z).toBeCloseTo(0.456, 9);
    expect(fromScreen(view, ...toMirror(view, 0.123, 0.456))[0]).toBeCloseTo(-0.123, 9);
  });

  it.each([true, false])("a fitted part, both halves, lies inside its frame, lying %s", (lying) => {
    const bounds = { rMax: 0.2, zMin: 0.3, zMax: 0.94 };
    const view = fitView(bounds, frame, lying);
    for (const r of [-0.2, 0.2])
      for (const z of [0.3, 0.94]) {
        const [x, y] = toScreen(view, r, z);
        expect(x).toBeGreaterThanOrEqual(frame.left - 1);
        expect(x).toBeLessThanOrEqual(frame.right + 1);
        expect(y).toBeGreaterThanOrEqual(frame.top - 1);
        expect(y).toBeLessThanOrEqual(frame.bottom + 1);
      }
  });

  it("parts longer than 1.4 diameters lie", () => {
    expect(prefersLying({ rMax: 0.1, zMin: 0, zMax: 0.29 })).toBe(true);
    expect(prefersLying({ rMax: 0.1, zMin: 0, zMax: 0.27 })).toBe(false);
  });
});

describe("lines of equal value", () => {
  it("of a linear field are straight and at their value", () => {
    const [line] = levelLines(
      plate,
      linear((r, z) => 10 * r + 4 * z),
      [6],
    );
    expect(line!.segments.length).toBeGreaterThan(0);
    for (let i = 0; i < line!.segments.length; i += 2)
      expect(10 * line!.segments[i]! + 4 * line!.segments[i + 1]!).toBeCloseTo(6, 5);
  });

  it("cut every triangle twice or not at all, also through a node", () => {
    for (const level of [0, 0.25, 0.5, 0.75, 1]) {
      const [line] = levelLines(
        plate,
        linear((r) => r),
        [level],
      );
      expect(line!.segments.length % 4).toBe(0);
    }
  });

  it("pass over what has no value", () => {
    const values = linear((r) => r);
    values[4] = Number.NaN;
    expect(levelLines(plate, values, [0.5])[0]!.segments).toHaveLength(0);
  });

  it("stand at round steps strictly inside the range", () => {
    expect(levelsBetween(700, 1000, 50)).toEqual([750, 800, 850, 900, 950]);
    expect(levelsBetween(-30, 20, 20)).toEqual([-20, 0]);
    expect(roundStep(1130, 24)).toBe(50);
    expect(roundStep(8, 8)).toBe(1);
  });

  it("labels never touch and never leave the part", () => {
    const lines = levelLines(
      plate,
      linear((r) => 100 * r),
      levelsBetween(0, 100, 2),
    );
    const labels = placeLabels(lines, (r, z) => [200 * r, 200 * z], {
      width: 24,
      height: 12,
      from: [0, 0],
      to: [200, 200],
      fits: (x, y) => x > 12 && x < 188 && y > 6 && y < 194,
    });
    expect(labels.length).toBeGreaterThan(3);
    for (const [i, a] of labels.entries())
      for (const b of labels.slice(i + 1))
        expect(Math.abs(a.x - b.x) >= 24 || Math.abs(a.y - b.y) >= 12).toBe(true);
  });
});

describe("fields", () => {
  const frames = {
    times: Float64Array.of(0, 10, 30),
    temperatures: [Float32Array.of(100, 100), Float32Array.of(80, 100), Float32Array.of(40, 60)],
  };

  it("between frames are linear in time, beyond them held", () => {
    expect([...fieldAt(frames, 20)]).toEqual([60, 80]);
    expect([...fieldAt(frames, -5)]).toEqual([100, 100]);
    expect([...fieldAt(frames, 99)]).toEqual([40, 60]);
  });

  it("arrive when they pass the level, and nowhere else", () => {
    expect(arrivalTimes(frames, 60, "down")[0]).toBeCloseTo(20, 6);
    expect(arrivalTimes(frames, 60, "down")[1]).toBeCloseTo(30, 6);
    expect(arrivalTimes(frames, 50, "down")[1]).toBeNaN();
    expect(arrivalTimes(frames, 60, "up")[0]).toBeNaN();
  });

  it("painted without WebGL show the map's colour at the value, mirrored half veiled", () => {
    const stops = Array.from({ length: 17 }, (_, i) => [15 * i, 0, 255 - 15 * i] as const);
    const out = { data: new Uint8ClampedArray(4 * 100 * 100), width: 100, height: 100 };
    paintField(
      {
        mesh: plate,
        values: linear((_, z) => z),
        range: { from: 0, to: 1 },
        stops,
        view: { lying: true, scale: 40, x: 30, y: 50 },
        sheet: [255, 255, 255],
        veil: 0.5,
        ghost: false,
        width: 100,
        height: 100,
        pixelRatio: 1,
      },
      out,
    );
    const pixel = (x: number, y: number) => [...out.data.slice(4 * (y * 100 + x), 4 * (y * 100 + x) + 4)];
    const [red, , blue, alpha] = pixel(50, 30); // z 0.5125, r about 0.5
    expect(alpha).toBe(255);
    expect(Math.abs(red! - colourAt(stops, 0.5125)[0])).toBeLessThanOrEqual(1);
    const [veiledRed] = pixel(50, 70);
    expect(Math.abs(veiledRed! - (red! + 255) / 2)).toBeLessThanOrEqual(1);
    expect(blue).toBeGreaterThan(0);
    expect(pixel(10, 30)[3]).toBe(0);
    // no gaps along the edges that triangles share
    for (let x = 31; x < 69; x++) for (let y = 11; y < 89; y++) expect(pixel(x, y)[3]).toBe(255);
  });

  it("the map passes through its stops and holds its ends", () => {
    const stops = ["#004459", "#d1526d", "#f1e390"].map(parseHex);
    expect(colourAt(stops, 0.5)).toEqual([209, 82, 109]);
    expect(colourAt(stops, -3)).toEqual(colourAt(stops, 0));
    expect([...mapTable(stops, 3).slice(8)]).toEqual([241, 227, 144, 255]);
  });
});

describe("scales", () => {
  it.each([0.2, 0.62, 1.7, 5, 40])(
    "at %s px a millimetre figures keep their distance and divide evenly",
    (perUnit) => {
      const { major, minor } = rulerStep(perUnit);
      expect(major * perUnit).toBeGreaterThanOrEqual(39.9);
      expect(minor * perUnit).toBeGreaterThanOrEqual(4.4);
      expect(Math.abs(major / minor - Math.round(major / minor))).toBeLessThan(1e-9);
    },
  );

  it("count from their zero both ways", () => {
    const ticks = ticksBetween(400, 0, 200, 2, -1);
    const zero = ticks.find((tick) => tick.value === 0)!;
    expect(zero).toMatchObject({ at: 200, rank: 2 });
    expect(ticks.find((tick) => Math.abs(tick.value - 50) < 1e-9)!.at).toBeCloseTo(100, 9);
  });
});

describe("the sheet", () => {
  const sheet = readSheet(ingot());

  it("knows the axis, what is inside, and the nearest place of a side", () => {
    const [loop] = sheet.loops;
    expect(loop!.sides.map((side) => side.onAxis)).toEqual([false, false, false, true]);
    expect(insidePart(sheet, [0.1, 0.4])).toBe(true);
    expect(insidePart(sheet, [0.19, 0.8])).toBe(false);
    expect(insidePart(sheet, [0.02, 0.935])).toBe(true);
    const near = nearestOn(loop!.sides[0]!, [0.1, -0.02]);
    expect(near.at).toEqual([0.1, 0]);
    expect(near.distance).toBeCloseTo(0.02, 12);
  });

  it("measures both diameters and both heights of an ingot", () => {
    const sizes = dimensionsOf(sheet).map(({ kind, value }) => [kind, Number(value.toFixed(6))]);
    expect(sizes).toEqual([
      ["diameter", 0.4],
      ["diameter", 0.32],
      ["length", 0.9],
      ["length", 0.94],
    ]);
  });

  it("measures the bore of a ring", () => {
    const ring = ingot();
    ring.part.regions[0]!.outline = [
      { at: [0.09, 0] },
      { at: [0.15, 0] },
      { at: [0.15, 0.07] },
      { at: [0.09, 0.07] },
    ];
    const sizes = dimensionsOf(readSheet(ring)).filter(({ kind }) => kind === "diameter");
    expect(sizes.map(({ value }) => Number(value.toFixed(6)))).toEqual([0.3, 0.18]);
  });

  it("stands with a coordinate that cannot be read", () => {
    const faulty = ingot();
    faulty.part.regions[0]!.outline[1]!.at = ["two", 0];
    const bounds = boundsOf(
      readSheet(faulty).loops.flatMap((loop) => loop.vertices.map((vertex) => vertex.at)),
    );
    expect(bounds.zMax).toBeCloseTo(0.94, 9);
  });

  it("marks stand outside the part, whichever way the loop runs", () => {
    for (const square of [
      [
        [0, 0],
        [10, 0],
        [10, 10],
        [0, 10],
      ],
      [
        [0, 0],
        [0, 10],
        [10, 10],
        [10, 0],
      ],
    ] as [number, number][][]) {
      const path = markPath("held", [square[0]!, square[1]!], outsideIsLeft(square, false));
      const numbers = path.match(/-?\d+(\.\d+)?/g)!.map(Number);
      const centre = [0, 1].map(
        (k) => numbers.filter((_, i) => i % 2 === k).reduce((a, b) => a + b, 0) / (numbers.length / 2),
      );
      expect(Math.min(...centre)).toBeLessThan(0);
    }
  });
});

describe("what may stand on the sheet", () => {
  it.each(CASES.map((preset) => [preset.id, preset.document] as const))(
    "the preset %s may",
    (_, document) => {
      expect(isStandable(document)).toBe(true);
    },
  );

  it.each([
    null,
    3,
    "case",
    [],
    {},
    { corelag: 1 },
    { corelag: 2, part: { regions: [] } },
    { corelag: 1, part: { regions: [{}] }, materials: {}, stages: [] },
  ])("%j may not", (value) => {
    expect(isStandable(value)).toBe(false);
  });
});
