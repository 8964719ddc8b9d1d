import { describe, expect, test } from "vitest";
import type { CaseDocument } from "../../src/case/types.ts";
import { produce } from "immer";
import { along, extent, firstPassing, pathOf, pointsOf, valueAt } from "../../src/app/strip/curves.ts";
import { makeFrame } from "../../src/app/strip/frame.ts";
import { niceStep, temperatureGraduations, timeGraduations } from "../../src/app/strip/graduations.ts";
import { arrivalSpan, marksOf } from "../../src/app/strip/marks.ts";
import {
  addStage,
  dragStep,
  endStage,
  limitStage,
  moveKnot,
  temperatureText,
  timeSteps,
  timeText,
} from "../../src/app/strip/moves.ts";
import { bestPlace, crowding, sparse, textWidth, touch } from "../../src/app/strip/place-labels.ts";
import { placeBalloons } from "../../src/app/strip/draw-curves.ts";
import { placeReading, readingRows } from "../../src/app/strip/reading.ts";
import { endOf, scheduleOf, valueOn } from "../../src/app/strip/schedule.ts";
import { makeScales } from "../../src/app/strip/scales.ts";
import type { Room } from "../../src/app/strip/scales.ts";
import { cursorWords, treatmentWords } from "../../src/app/strip/spoken.ts";
import { tableOf } from "../../src/app/strip/table.ts";
import { fixtureDocument, fixtureResult } from "../helpers/page-fixture.ts";

const ROOM: Room = {
  width: 904,
  height: 236,
  left: 58,
  right: 10,
  row: 30,
  foot: 30,
  noteSize: 13.5,
  bodySize: 15,
  scaleSize: 12,
};
const HOUR = 3600;

describe("time graduations", () => {
  test.each([
    [9.6 * HOUR, "hours"],
    [2.6 * HOUR, "hours"],
    [40 * 60, "minutes"],
    [115, "seconds"],
    [9 * 24 * HOUR, "days"],
  ])("a treatment of %d s is read in %s", (end, word) => expect(timeGraduations(end, 836).word).toBe(word));

  test.each([0.4, 7, 115, 900, 5000, 34_560, 2e5, 3e6, 4e8])(
    "of %d s: figures are whole, far enough apart, and begin at 0",
    (end) => {
      for (const width of [240, 836, 1500]) {
        const { lines, major, minor } = timeGraduations(end, width);
        const figures = lines.filter(({ label }) => label !== "");
        expect(figures[0]?.label).toBe("0");
        expect((major / end) * width).toBeGreaterThanOrEqual(43.9);
        expect((minor / end) * width).toBeGreaterThan(4);
        expect(figures.length).toBeGreaterThan(1);
        if (end > 10) for (const { label } of figures) expect(label).toMatch(/^\d+$/);
      }
    },
  );

  test("short and middle lines fall onto the long ones", () => {
    const { lines, major, middle, minor } = timeGraduations(9.6 * HOUR, 836);
    expect(major % minor).toBe(0);
    expect(middle % minor).toBe(0);
    expect(lines.filter(({ rank }) => rank === 2).every(({ at }) => at % major === 0)).toBe(true);
  });
});

describe("temperature graduations", () => {
  test.each([
    [20, 1150, 168],
    [-40, 12, 168],
    [68, 2102, 280],
    [79.9, 80.1, 168],
  ])("hold everything from %d to %d", (low, high, height) => {
    const { from, to, lines, major } = temperatureGraduations(low, high, height);
    expect(from).toBeLessThanOrEqual(low);
    expect(to).toBeGreaterThanOrEqual(high);
    expect((major / (to - from)) * height).toBeGreaterThan(20);
    expect(lines.some(({ label }) => label !== "")).toBe(true);
  });

  test("the step is 1, 2 or 5 of a power of ten", () => {
    expect([0.3, 1.1, 2.2, 6, 170].map(niceStep)).toEqual([0.5, 2, 5, 10, 200]);
  });
});

describe("labels", () => {
  const box = (x: number, y: number) => ({ x, y, width: 20, height: 10 });
  test("those that would touch an earlier one are left out", () => {
    const labels = [box(0, 0), box(15, 5), box(30, 0)].map((each) => ({ box: each }));
    expect(sparse(labels, 0)).toEqual([labels[0], labels[2]]);
    expect(touch(box(0, 0), box(20, 0))).toBe(false);
    expect(touch(box(0, 0), box(20, 0), 1)).toBe(true);
  });
  test("the least crowded place wins, and none outside the bounds", () => {
    const points = Float64Array.of(5, 5, 6, 6, 105, 5);
    const bounds = { x: 0, y: 0, width: 200, height: 20 };
    expect(crowding(box(0, 0), points)).toBe(2);
    expect(bestPlace([box(0, 0), box(100, 0), box(150, 0)], bounds, [], points)).toEqual(box(150, 0));
    expect(bestPlace([box(150, 0), box(190, 0)], bounds, [box(140, 0)], points)).toBeNull();
  });
  test("a longer text is wider", () => {
    expect(textWidth("one temperature", 13.5)).toBeGreaterThan(textWidth("core", 13.5));
    expect(textWidth("", 13.5)).toBe(0);
  });
});

describe("schedule", () => {
  const document = fixtureDocument();
  const result = fixtureResult();

  test("lays stages end to end; an until stage ends where the run found its end", () => {
    const blocks = scheduleOf(document, result, "si");
    expect(blocks.map(({ began, ended }) => [began, ended])).toEqual([
      [0, 13_560],
      [13_560, 13_920],
      [13_920, 7.93 * HOUR],
    ]);
    expect(endOf(scheduleOf(document, null, "si"))).toBe(13_920 + 10 * HOUR);
  });

  test("says what each stage does, in the units of the page", () => {
    const [furnace, carry, air] = scheduleOf(document, result, "si").map(({ does }) =>
      does[0]?.replaceAll("\u00a0", " "),
    );
    expect(furnace).toBe("150 to 1150 °C for 3 h 46 min");
    expect(carry).toBe("25 °C for 6 min");
    expect(air).toBe("25 °C, until every point has 300 °C");
    expect(scheduleOf(document, result, "us")[2]?.does[0]).toContain("572");
  });

  test("a table of surroundings is prolonged to the end of its stage, and only its own points can be taken", () => {
    const [line] = scheduleOf(document, result, "si")[0]!.lines;
    expect(line?.knots.map(({ at, degC, held }) => [at, degC, held])).toEqual([
      [0, 150, true],
      [9000, 1150, true],
      [13_560, 1150, false],
    ]);
    expect(valueOn(line!.knots, 4500)).toBe(650);
    expect(valueOn(line!.knots, -1)).toBe(150);
  });

  test("a side with surroundings of its own, or a held temperature, is a line of its own", () => {
    const own: CaseDocument = {
      ...document,
      stages: [
        {
          lasts: 60,
          ambient: 20,
          sides: {
            "*": { film: 10 },
            wall: { film: 50, ambient: "80 degC" },
            base: { held: 100 },
            top: "insulated",
          },
        },
      ],
    };
    const lines = scheduleOf(own, null, "si")[0]!.lines;
    expect(lines.map(({ name }) => name)).toEqual(["surroundings", "at wall", "base held"]);
  });

  test("a duration that cannot be read does not stop the drawing", () => {
    const broken: CaseDocument = { ...document, stages: [{ lasts: "soon", ambient: "warm", sides: {} }] };
    const [block] = scheduleOf(broken, null, "si");
    expect(block?.ended).toBeGreaterThan(0);
    expect(block?.lines).toEqual([]);
  });
});

describe("curves", () => {
  const time = Float64Array.of(0, 10, 20);
  const values = Float64Array.of(100, 50, 60);

  test("are read linearly and held beyond their ends", () => {
    expect([-5, 0, 5, 15, 99].map((at) => valueAt(time, values, at))).toEqual([100, 100, 75, 55, 60]);
    expect(valueAt(new Float64Array(), new Float64Array(), 1)).toBeNaN();
  });

  test("pass a level once they have been on the other side", () => {
    expect(firstPassing(time, values, 80, "down")).toBe(4);
    expect(firstPassing(time, values, 55, "up")).toBe(15);
    expect(firstPassing(time, values, 120, "down")).toBeNull();
    expect(firstPassing(time, values, 100, "down")).toBeNull();
  });

  test("keep their last point when they are thinned for the screen", () => {
    const scales = makeScales(ROOM, 100, [0, 100], "si");
    const many = Float64Array.from({ length: 5000 }, (_, i) => i / 50);
    const points = pointsOf({ habit: "core", name: "core", time: many, values: many }, scales);
    expect(points.length / 2).toBeLessThan(2000);
    expect(points.at(-2)).toBeCloseTo(scales.x(4999 / 50), 9);
    expect(pathOf(points)).toMatch(/^M[\d.]+,[\d.]+L/);
  });

  test("marks along a line stand evenly", () => {
    const marks = along(Float64Array.of(0, 0, 30, 0, 30, 40), 20);
    expect([...marks]).toEqual([10, 0, 30, 0, 30, 20, 30, 40].slice(0, marks.length));
  });

  test("the scale holds curves and further values", () => {
    expect(extent([{ habit: "core", name: "", time, values }], [-3, NaN])).toEqual([-3, 100]);
    expect(extent([], [])).toEqual([0, 100]);
  });
});

describe("marks of the answers", () => {
  const result = fixtureResult();

  test("a when question has its level from the start of its stage to its answer", () => {
    const [first, second, spread] = marksOf(result);
    expect(first).toMatchObject({ at: 13_538, degC: 1120, drops: true, level: { from: 0, to: 13_538 } });
    expect(second?.level?.from).toBe(13_920);
    expect(spread?.bracket).not.toBeNull();
  });

  test("a level never reached is drawn over the whole run", () => {
    const answer = { ...result.answers[0]!, value: null, at: null };
    const [mark] = marksOf({ ...result, answers: [answer] });
    expect(mark).toMatchObject({ drops: false, level: { from: 0, to: 7.93 * HOUR } });
  });

  test("an arrival runs from the first point to the last", () => {
    const when = { ask: "when", where: "every-point", reaches: 600, going: "up" } as const;
    const asked = { ...result, answers: [{ ...result.answers[0]!, question: when }] };
    const [first, last] = arrivalSpan(asked, 0)!;
    expect(first).toBeGreaterThan(0);
    expect(last).toBeGreaterThan(first);
    expect(arrivalSpan(result, 2)).toBeNull();
  });

  test("balloons do not lie on one another", () => {
    const frame = makeFrame({
      document: fixtureDocument(),
      result,
      was: null,
      system: "si",
      room: ROOM,
      kept: null,
    });
    const placed = placeBalloons(frame);
    for (const [i, a] of placed.entries())
      for (const b of placed.slice(i + 1))
        expect(Math.hypot(a.x - b.x, a.y - b.y)).toBeGreaterThanOrEqual(17);
  });
});

describe("reading at the cursor", () => {
  const frame = makeFrame({
    document: fixtureDocument(),
    result: fixtureResult(),
    was: null,
    system: "si",
    room: ROOM,
    kept: null,
  });

  test("lists core, mean and skin first, whole degrees", () => {
    const rows = readingRows(frame.curves, 4 * HOUR, "si");
    expect(rows.slice(0, 3).map(({ name }) => name)).toEqual(["core", "mean", "skin"]);
    for (const { value } of rows) expect(value).toMatch(/^\d+$/);
  });

  test("stays inside the plot wherever the cursor stands", () => {
    for (let at = 0; at <= frame.end; at += frame.end / 23) {
      const reading = placeReading(
        readingRows(frame.curves, at, "si"),
        frame.scales.x(at),
        frame.scales,
        [],
        frame.crowd,
      );
      expect(reading).not.toBeNull();
      expect(reading!.box.x).toBeGreaterThanOrEqual(ROOM.left);
      expect(reading!.box.x + reading!.box.width).toBeLessThanOrEqual(ROOM.width);
    }
  });

  test("a narrow strip keeps core, mean and skin", () => {
    const room = { ...ROOM, width: 300 };
    const narrow = makeFrame({
      document: fixtureDocument(),
      result: fixtureResult(),
      was: null,
      system: "si",
      room,
      kept: null,
    });
    const rows = readingRows(narrow.curves, 0, "si");
    expect(placeReading(rows, narrow.scales.x(0), narrow.scales, [], narrow.crowd)?.cells).toHaveLength(3);
  });

  test("a probe that is called like a curve of the part says that it is a probe", () => {
    const result = fixtureResult();
    const named = { ...result, history: { ...result.history, probes: { core: result.history.mean } } };
    const names = makeFrame({
      document: fixtureDocument(),
      result: named,
      was: null,
      system: "si",
      room: ROOM,
      kept: null,
    }).curves.map(({ name }) => name);
    expect(names.at(-1)).toBe("core, probe");
  });
});

describe("moves of the hand", () => {
  const document = fixtureDocument();
  const [furnace, , air] = scheduleOf(document, fixtureResult(), "si");
  const edited = (recipe: (draft: CaseDocument) => void): CaseDocument =>
    produce(document, (draft) => recipe(draft as CaseDocument));

  test("a stage end snaps and is kept in the unit people would write", () => {
    expect(edited(endStage(furnace!, 13_590, 60)).stages[0]?.lasts).toBe("227 min");
    expect(edited(endStage(furnace!, 4 * HOUR, 60)).stages[0]?.lasts).toBe("4 h");
    expect(edited(endStage(furnace!, -500, 60)).stages[0]?.lasts).toBe("1 min");
    expect([90, 120, 7200, 100_800].map(timeText)).toEqual(["90 s", "2 min", "2 h", "28 h"]);
  });

  test("an until stage moves its limit, not its length", () => {
    const next = edited(limitStage(air!, 322.4, "si")).stages[2];
    expect(next?.until?.reaches).toBe("322 degC");
    expect(next?.lasts).toBeUndefined();
  });

  test("a knot changes its own point, a constant the whole stage", () => {
    const line = furnace!.lines[0]!;
    const ambient = edited(moveKnot(line.place, line.knots[1]!, 1100, "si")).stages[0]?.ambient;
    expect(ambient).toEqual([
      ["0 s", "150 degC"],
      ["150 min", "1100 degC"],
    ]);
    const flat = air!.lines[0]!;
    expect(edited(moveKnot(flat.place, flat.knots[1]!, 30, "us")).stages[2]?.ambient).toBe("86 degF");
    expect(temperatureText(-0.2, "si")).toBe("0 degC");
  });

  test("a held temperature of a side moves in its own condition", () => {
    const held: CaseDocument = { ...document, stages: [{ lasts: 60, sides: { "*": { held: 100 } } }] };
    const line = scheduleOf(held, null, "si")[0]!.lines[0]!;
    const next = produce(held, (draft) =>
      moveKnot(line.place, line.knots[1]!, 120, "si")(draft as CaseDocument),
    );
    expect(next.stages[0]?.sides["*"]).toEqual({ held: "120 degC" });
  });

  test("a further stage is a copy of the last that lasts a time", () => {
    const stages = edited(addStage()).stages;
    expect(stages).toHaveLength(4);
    expect(stages[3]).toMatchObject({ name: "Stage 4", ambient: "25 degC" });
    expect(stages[3]?.until).toBeUndefined();
    expect(stages[3]?.sides).toEqual(stages[2]?.sides);
  });

  test("steps follow the scale: seconds for a quench, minutes for a furnace", () => {
    expect(timeSteps("hours")).toEqual([60, 300, 600]);
    expect(timeSteps("seconds")).toEqual([1, 5, 10]);
    expect(dragStep([60, 300, 600], 836 / (9.6 * HOUR))).toBe(300);
  });
});

describe("for those who listen", () => {
  test("the treatment is one sentence, the cursor says time and temperatures", () => {
    const frame = makeFrame({
      document: fixtureDocument(),
      result: fixtureResult(),
      was: null,
      system: "si",
      room: ROOM,
      kept: null,
    });
    expect(treatmentWords(frame.schedule)).toBe(
      "Treatment: Furnace, 150 to 1150 °C for 3 h 46 min; Carry, 25 °C for 6 min; Still air, 25 °C, until every point has 300 °C",
    );
    expect(cursorWords(14_700, frame.curves, "si", 60)).toMatch(
      /^4 h 05 min\. Core \d+, mean \d+, skin \d+ °C\.$/,
    );
  });

  test("the table has a row for each long graduation, stage end and answer, ascending", () => {
    const table = tableOf(fixtureResult(), "si", HOUR);
    expect(table.rows.map(({ event }) => event).filter(Boolean)).toEqual([
      "answer 3",
      "answer 1",
      "end of Furnace",
      "end of Carry",
      "end of Still air, answer 2",
    ]);
    expect(table.rows).toHaveLength(8 + 5);
    for (const row of table.rows) expect(row.values).toHaveLength(table.head.length - 1);
  });
});
