import { strFromU8, unzipSync } from "fflate";
import { describe, expect, test } from "vitest";
import type { Question, QuestionDocument } from "../../src/case/types.ts";
import { calliperScale } from "../../src/app/controls/calliper-scale.ts";
import {
  decimalsOf,
  isBareNumber,
  moved,
  plainNumber,
  strideOf,
  withUnit,
} from "../../src/app/controls/entry.ts";
import {
  difference,
  digits,
  duration,
  lasting,
  place,
  roundUp,
  temperature,
  time,
} from "../../src/app/controls/figures.ts";
import {
  estimateLines,
  figureOf,
  matchAnswers,
  offBy,
  questionKey,
  span,
  whereLine,
} from "../../src/app/pane/answer-words.ts";
import { curvesFile, nearestFrame, nodesFile, snapshotsFile, stem } from "../../src/app/pane/files.ts";
import { landing } from "../../src/app/pane/lift.ts";
import { proofOf } from "../../src/app/pane/proof-facts.ts";
import {
  entryScale,
  newQuestion,
  OFFERED,
  plainSentence,
  sentenceOf,
  settingOf,
  withField,
} from "../../src/app/pane/sentences.ts";
import type { Ask, Entry } from "../../src/app/pane/sentences.ts";
import { unsourced } from "../../src/app/pane/sources.ts";
import { bandOf, faultOf, faultsToTell } from "../../src/app/pane/verdict-words.ts";
import { fixtureDocument, fixtureResult } from "../helpers/page-fixture.ts";

const plain = (text: string): string => text.replace(/[\u00a0\u2009\u202f]/g, " ");

describe("entries of the hand", () => {
  test("a bare number takes the unit of its blank, anything else stands as typed", () => {
    expect(["12", " -4.5", "1e-3", "4 1/2", "10 000"].map((text) => isBareNumber(text))).toEqual(
      Array(5).fill(true),
    );
    expect(["12 mm", "450degF", "", "cold"].map((text) => isBareNumber(text))).toEqual(Array(4).fill(false));
    expect(withUnit("\u22125", "degC")).toBe("-5 degC");
    expect(withUnit("450 degF", "degC")).toBe("450 degF");
    expect(withUnit("3", "")).toBe("3");
  });

  test("steps land on multiples of the step and stay inside the limits", () => {
    expect(moved(118.37, 1, 5, -Infinity, Infinity)).toBe(120);
    expect(moved(118.37, -1, 5, -Infinity, Infinity)).toBe(115);
    expect(moved(120, 1, 5, -Infinity, Infinity)).toBe(125);
    expect(moved(0.3, 1, 0.1, -Infinity, Infinity)).toBe(0.4);
    expect(moved(2, -9, 1, 0, Infinity)).toBe(0);
    expect(moved(7.3, 0, 1, 0, 9)).toBe(7.3);
  });

  test("Shift takes ten steps, Alt a tenth", () => {
    expect(strideOf(1, { shiftKey: true, altKey: false })).toBe(10);
    expect(strideOf(1, { shiftKey: false, altKey: true })).toBe(0.1);
    expect([1, 0.5, 0.01, 25].map(decimalsOf)).toEqual([0, 1, 2, 0]);
    expect(plainNumber(0.30000000000000004, 0.1)).toBe("0.3");
  });
});

describe("figures", () => {
  test.each([
    [115.23, "115.2 s"],
    [599.9, "599.9 s"],
    [2958, "49 min 18 s"],
    [13_538, "3 h 46 min"],
    [7200, "2 h"],
    [86_400 * 3 + 7000, "3 d 2 h"],
    [-90, "\u221290.0 s"],
  ])("%d s reads %s", (seconds, words) => expect(plain(duration(seconds))).toBe(words));

  test("what lasts whole minutes is said in minutes", () => {
    expect([360, 90, 5400, 100].map((each) => plain(lasting(each)))).toEqual([
      "6 min",
      "90 s",
      "1 h 30 min",
      "100 s",
    ]);
  });

  test("a value is told to the last digit of its doubt, the doubt to one figure", () => {
    expect(plain(temperature(503.688, "si", 0.3).text)).toBe("503.7 °C");
    expect(plain(temperature(503.688, "si", 0.3).doubt)).toBe("±0.3 K");
    expect(plain(temperature(0, "us").text)).toBe("32 °F");
    expect(plain(difference(377.4, "si", 1.6).text)).toBe("377 K");
    expect(plain(time(115.234, 0.3).text)).toBe("115.2 s");
    expect(plain(time(13_538, 4).doubt)).toBe("±1 min");
    expect(time(115, null).doubt).toBe("");
  });

  test("figures group from 10 000 and carry a true minus", () => {
    expect([9999, 12_345, -1_234_567].map((value) => plain(digits(value, 0)))).toEqual([
      "9999",
      "12 345",
      "\u22121 234 567",
    ]);
    expect(digits(-0.001, 1)).toBe("0.0");
    expect([0.021, 0.95, 14].map(roundUp)).toEqual([0.03, 1, 20]);
  });

  test("a place on the axis says so", () => {
    expect(plain(place([0, 0.307], "si"))).toBe("on the axis, z 307");
    expect(plain(place([0, 0], "si"))).toBe("on the axis, z 0");
    expect(plain(place([0.0254, 0.0254], "us"))).toBe("r 1, z 1");
  });
});

describe("sentences", () => {
  const setting = settingOf(fixtureDocument(), "si");
  const words = (question: QuestionDocument): string => plainSentence(sentenceOf(question, setting), "si");

  test.each<[QuestionDocument, string]>([
    [{ ask: "when", where: "every-point", reaches: 1120 }, "When has every point reached 1120 °C?"],
    [
      { ask: "when", where: "shoulder", reaches: "572 degF", going: "down" },
      "When has shoulder fallen to 300 °C?",
    ],
    [{ ask: "when", where: "surface-mean", reaches: 5 }, "When has the skin, on average, fallen to 5 °C?"],
    [{ ask: "reading", where: "hottest", at: "2 h" }, "How hot is the hottest point at 2 h?"],
    [{ ask: "spread" }, "How far apart do hottest and coldest get in the whole run?"],
    [{ ask: "spread", stage: "Carry" }, "How far apart do hottest and coldest get in Carry?"],
    [
      { ask: "passage", where: "mean", from: 800, to: 500 },
      "How long does the mean take from 800 °C to 500 °C?",
    ],
    [{ ask: "rate", where: "coldest", at: 700 }, "How fast does the coldest point pass 700 °C?"],
    [{ ask: "held-above", where: "coldest", level: 700 }, "How long is the coldest point above 700 °C?"],
    [{ ask: "held-below", where: "any-point", level: 700 }, "How long is the first point below 700 °C?"],
    [
      { ask: "dose", where: "coldest", reference: 60, z: 7 },
      "What dose does the coldest point get, counted at 60 °C with z 7 K?",
    ],
    [{ ask: "heat" }, "How much heat has the part exchanged by the end?"],
    [{ ask: "heat", until: 3600 }, "How much heat has the part exchanged by 1 h?"],
  ])("%j", (question, sentence) => expect(words(question)).toBe(sentence));

  test("what cannot be read stands in its blank as it was typed", () => {
    expect(words({ ask: "when", where: "mean", reaches: "warm" })).toContain("warm");
  });

  test("probes are offered beside the places, and a place no longer known is kept", () => {
    const [, where] = sentenceOf({ ask: "when", where: "gone", reaches: 100 }, setting);
    const values =
      typeof where === "object" && where.kind === "choice" ? where.options.map(({ value }) => value) : [];
    expect(values).toEqual([
      "gone",
      "every-point",
      "any-point",
      "mean",
      "surface-mean",
      "coldest",
      "hottest",
      "shoulder",
    ]);
  });

  test("a field is set, and left out again by an empty text", () => {
    const heat = withField({ ask: "heat" }, "until", "2 h");
    expect(heat).toEqual({ ask: "heat", until: "2 h" });
    expect(withField(heat, "until", "")).toEqual({ ask: "heat" });
    expect(withField({ ask: "held-above", where: "mean", level: 5 }, "ask", "held-below")).toMatchObject({
      ask: "held-below",
    });
  });

  test("every kind that is offered makes a sound question inside the run", () => {
    for (const { value } of OFFERED) {
      const question = newQuestion(value as Ask, [20, 1100], 9 * 3600, "si");
      expect(words(question)).toMatch(/\?$/);
      expect(words(question)).not.toMatch(/NaN|undefined/);
    }
    expect(newQuestion("when", [20, 1100], 9 * 3600, "us")).toMatchObject({ reaches: "1040 degF" });
  });

  test("an entry scrubs in the unit it is shown in", () => {
    const entry = (value: string | number, dimension: Entry["dimension"]): Entry => ({
      kind: "entry",
      field: "x",
      dimension,
      value,
      label: "x",
    });
    expect(entryScale(entry("100 degC", "temperature"), "us")).toMatchObject({ number: 212, unit: "°F" });
    expect(entryScale(entry("90 s", "time"), "si")).toMatchObject({ number: 90, unit: "s" });
    expect(entryScale(entry("3 h", "time"), "si")).toMatchObject({ number: 3, unit: "h" });
    expect(entryScale(entry("warm", "temperature"), "si").number).toBeUndefined();
  });
});

describe("answers in words", () => {
  const result = fixtureResult();

  test("place, and for a spread the instant and its stage", () => {
    expect(result.answers.map((answer) => plain(whereLine(answer, result.stages, "si")))).toEqual([
      "last: on the axis, z 307",
      "last: on the axis, z 121",
      "at 2 h 11 min, in Furnace",
    ]);
  });

  test("each estimate says its value and how far it is out; the unsafe side is told apart", () => {
    const [first] = result.answers;
    const lines = estimateLines(first!, result.estimates.series, true, "si").map((line) => ({
      ...line,
      value: plain(line.value),
      verdict: plain(line.verdict),
    }));
    expect(lines).toEqual([
      {
        habit: "lumped",
        name: "one temperature",
        value: "2 h 53 min, ",
        verdict: "53 min early",
        unsafe: true,
      },
      {
        habit: "series",
        name: "series, long round",
        value: "3 h 45 min, ",
        verdict: "agrees",
        unsafe: false,
      },
    ]);
    const [lumped] = estimateLines(result.answers[2]!, null, true, "si");
    expect(lumped?.verdict).toBe("cannot say");
  });

  test("off by: late, too cold, too little", () => {
    const off = (difference: number) => ({ difference, kelvin: null, seconds: null, side: "safe" as const });
    expect(plain(offBy("s", off(400), "si"))).toBe("6.7 min late");
    expect(plain(offBy("degC", off(-64.84), "si"))).toBe("65 K too cold");
    expect(plain(offBy("K", off(-3.21), "us"))).toBe("5.8 °F too little");
    expect([40, 3200, 20_000].map((each) => plain(span(each)))).toEqual(["40 s", "53 min", "5 h 33 min"]);
  });

  test("a dose stays in minutes, heat goes into megajoules", () => {
    expect(plain(figureOf("min", 1009.4, 8, "si").text)).toBe("1009 min");
    expect(plain(figureOf("J", 4.2e8, null, "si").text)).toBe("420 MJ");
    expect(plain(figureOf("J", -501_995_521, 1, "si").text)).toBe("502.00 MJ");
    expect(plain(figureOf("J", 5200, null, "si").text)).toBe("5.2 kJ");
  });

  test("answers go to the same question wherever it now stands, and to no other", () => {
    const [a, b, c] = fixtureDocument().questions!;
    const matched = matchAnswers([c!, a!, { ask: "heat" }, b!], result.answers);
    expect(matched.map((answer) => answer?.value ?? null)).toEqual([
      377,
      13_538,
      null,
      result.answers[1]!.value,
    ]);
  });

  test("units do not make another question", () => {
    const si: Question = { ask: "when", where: "mean", reaches: 300 };
    expect(questionKey({ ask: "when", where: "mean", reaches: "572 degF" })).toBe(questionKey(si));
    expect(questionKey({ ask: "when", where: "mean", reaches: 301 })).not.toBe(questionKey(si));
    expect(questionKey({ ask: "reading", where: "mean", at: "1 h" })).toBe(
      questionKey({ ask: "reading", where: "mean", at: 3600 }),
    );
  });
});

describe("calliper", () => {
  test("holds the answer, its doubt and the estimates, with a few figures", () => {
    for (const width of [180, 344, 440]) {
      const scale = calliperScale("time", 13_538, 60, [10_320, 13_510], width);
      expect(scale.x(10_320)).toBeGreaterThan(0);
      expect(scale.x(13_598)).toBeLessThan(width);
      const figures = scale.lines.filter(({ label }) => label !== "");
      expect(figures.length).toBeGreaterThan(0);
      for (const { label } of figures) expect(plain(label)).toMatch(/^\d+ h( \d\d)?$/);
    }
  });

  test("seconds beyond ten minutes are written with their minutes", () => {
    const labels = calliperScale("time", 2960, 1, [2938], 600)
      .lines.map(({ label }) => plain(label))
      .filter(Boolean);
    expect(labels.length).toBeGreaterThan(2);
    for (const label of labels) expect(label).toMatch(/^\d+ min( \d\d)?$/);
  });

  test("an estimate that agrees does not blow the scale up", () => {
    const scale = calliperScale("number", 300, 0.1, [300.1, null], 344);
    expect(scale.to - scale.from).toBeGreaterThan(20);
  });
});

describe("verdict and faults", () => {
  test("the band leads with what to do", () => {
    const band = bandOf({
      tone: "bad",
      headline: "Do not use the quick estimate here. It comes 53 to 64 min early, on the unsafe side.",
      detail: "The series agrees.",
      worst: 0.2,
    });
    expect(band.heading).toBe("Do not use the quick estimate here");
    expect(band.text).toBe("It comes 53 to 64 min early, on the unsafe side. The series agrees.");
    const good = bandOf({
      tone: "good",
      headline: "The quick estimate will do for this part: 0.7 % out, late rather than early.",
      detail: "",
      worst: 0.007,
    });
    expect(good).toMatchObject({
      heading: "The quick estimate will do for this part",
      text: "0.7 % out, late rather than early.",
    });
  });

  test("a fault stands on the card, at its blank, in the section or in the list", () => {
    const fault = (path: string, places?: readonly (readonly [number, number])[]) => ({
      code: "x",
      path,
      message: "m",
      mend: "n",
      ...(places ? { places } : {}),
    });
    const problems = [
      fault("stages"),
      fault("questions[1].reaches"),
      fault("part.regions[0].outline[2].at", [[0, 1]]),
      fault("materials.steel.density"),
    ];
    expect(faultOf(problems, 1, "reaches")?.message).toBe("m");
    expect(faultOf(problems, 0, "reaches")).toBeNull();
    expect(faultsToTell(problems).map(({ path }) => path)).toEqual(["materials.steel.density"]);
  });

  test("a row dropped past the middle of another takes its place", () => {
    expect(landing([50, 150, 250], 0, 60)).toBe(0);
    expect(landing([50, 150, 250], 0, 160)).toBe(1);
    expect(landing([50, 150, 250], 0, 900)).toBe(2);
    expect(landing([50, 150, 250], 2, 10)).toBe(0);
  });
});

describe("proof", () => {
  const facts = (change: object) =>
    proofOf(fixtureDocument(), { ...fixtureResult(), ...change }, "si").flatMap((group) => group.facts);

  test("says what was kept", () => {
    expect(
      facts({})
        .filter(({ check }) => check !== undefined)
        .map(({ check }) => check),
    ).toEqual(Array(5).fill("kept"));
  });

  test("says what was broken: heat left over, a value out of range, a sharp corner", () => {
    const result = fixtureResult();
    const broken = facts({
      run: { ...result.run, energyImbalance: 1e-3 },
      mesh: { ...result.mesh, minAngleDeg: 4, meshVolume: 0.09 },
      history: { ...result.history, coldest: result.history.coldest.map(() => -30) },
    });
    expect(broken.filter(({ check }) => check === "broken")).toHaveLength(4);
  });

  test("one mesh alone has no doubt to state", () => {
    const result = fixtureResult();
    expect(facts({ run: { ...result.run, temperatureUncertainty: null, levels: [2080] } })[0]).toMatchObject({
      value: "not known yet",
    });
  });
});

describe("files of the hand-over", () => {
  const result = fixtureResult();

  test("are named after the case", () => {
    expect(stem("Tapered ingot, heated & air-cooled (Ø400)")).toBe("tapered-ingot-heated-air-cooled-400");
    expect(stem("…")).toBe("case");
    expect(curvesFile(result).name).toBe("tapered-ingot-heated-and-air-cooled-curves.csv");
  });

  test("curves carry a line for each instant", () => {
    const lines = String(curvesFile(result).content).trim().split("\n");
    expect(lines).toHaveLength(1 + result.history.time.length);
  });

  test("nodes and triangles are of the frame nearest to the cursor", () => {
    expect(nearestFrame(Float64Array.of(0, 10, 20), 16)).toBe(2);
    const files = unzipSync(nodesFile(result, 0).content as Uint8Array);
    const names = Object.keys(files);
    expect(names.map((name) => name.replace(/^.*-(nodes|triangles)/, "$1"))).toEqual([
      "nodes.csv",
      "triangles.csv",
    ]);
    expect(strFromU8(files[names[0]!]!)).toContain("T_degC at 0 s");
  });

  test("the series names every snapshot in the archive", () => {
    const files = unzipSync(snapshotsFile(result).content as Uint8Array);
    const series = strFromU8(files[Object.keys(files).find((name) => name.endsWith(".pvd"))!]!);
    const snapshots = Object.keys(files).filter((name) => name.endsWith(".vtu"));
    expect(snapshots).toHaveLength(result.frames.times.length);
    for (const name of snapshots) expect(series).toContain(`file="${name}"`);
  });

  test("materials without a source are named, those of the library are not", () => {
    const document = fixtureDocument();
    expect(unsourced(document)).toEqual([]);
    expect(
      unsourced({ ...document, materials: { steel: { density: 1, conductivity: 1, heatCapacity: 1 } } }),
    ).toEqual(["The values of steel"]);
    expect(unsourced({ ...document, materials: { steel: { library: "steel" } } })).toEqual([]);
  });
});
