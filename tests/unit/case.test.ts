import { describe, expect, test } from "vitest";
import type { MaterialLibrary } from "../../src/case/library.ts";
import { readCase } from "../../src/case/readCase.ts";
import type { Case, CaseDocument } from "../../src/case/types.ts";
import { plain } from "../helpers/plainCase.ts";
import { writeCase } from "../../src/case/writeCase.ts";

const LIBRARY: MaterialLibrary = {
  "cast-iron-grey": {
    title: "grey cast iron",
    density: 7200,
    conductivity: 48.5,
    heatCapacity: 460,
    emissivity: 0.64,
    valid: [0, 200],
    sources: {
      density: { source: "table A", provenance: "from memory" },
      conductivity: { source: "table A", provenance: "from memory" },
      heatCapacity: { source: "table B", provenance: "seen" },
      emissivity: { source: "table B", provenance: "seen" },
    },
  },
};

/** The example of the format's description, whole. */
const EXAMPLE: CaseDocument = {
  corelag: 1,
  title: "Tapered ingot, stripped and air cooled",
  notes: "",
  part: {
    regions: [
      {
        name: "ingot",
        material: "steel",
        outline: [
          { at: [0, 0], side: "base" },
          { at: ["200 mm", 0], side: "wall" },
          { at: [0.16, 0.9], side: "top", through: [0.085, 0.93] },
          { at: [0, 0.94], side: "axis" },
        ],
        holes: [],
        start: 1100,
        source: 0,
      },
      {
        name: "mould",
        material: "mould",
        outline: [{ at: [0.2, 0] }, { at: [0.3, 0], side: "skin" }, { at: [0.3, 0.9] }, { at: [0.16, 0.9] }],
      },
    ],
    contacts: [{ between: ["ingot", "mould"], conductance: 1200 }],
  },
  materials: {
    steel: {
      density: 7850,
      conductivity: [
        [20, 53],
        ["1472 degF", 27],
      ],
      heatCapacity: 480,
      emissivity: 0.8,
      latent: { heat: "270 kJ/kg", solidus: 1420, liquidus: 1480 },
      source: "invented",
    },
    mould: { library: "cast-iron-grey" },
  },
  start: 20,
  stages: [
    {
      name: "air cooling",
      lasts: "4 h",
      ambient: [
        [0, 25],
        ["1 h", 30],
      ],
      sides: {
        "*": { film: 12, emissivity: 0.8 },
        base: "insulated",
        skin: {
          film: {
            over: "time",
            points: [
              [0, 5],
              [60, 10],
            ],
          },
          ambient: 20,
          surroundings: 15,
          emissivity: "50 %",
        },
      },
    },
    {
      until: { where: "core", reaches: 80, going: "down" },
      atMost: 50000,
      ambient: 25,
      sides: { "*": { held: 80 }, base: { flux: "5 kW/m2" } },
    },
  ],
  probes: [{ name: "core", at: [0, "450 mm"] }],
  questions: [
    { ask: "when", where: "every-point", reaches: 80 },
    { ask: "reading", where: "core", at: "1 h" },
    { ask: "spread", stage: "air cooling" },
    { ask: "passage", where: "mean", from: 800, to: 500 },
    { ask: "rate", where: "hottest", at: 700 },
    { ask: "held-above", where: "core", level: 600 },
    { ask: "held-below", where: "core", level: 600 },
    { ask: "dose", where: "coldest", reference: "140 degF", z: "18 degF" },
    { ask: "heat" },
  ],
  accuracy: 0.001,
};

function read(document: unknown): {
  case: Case;
  hints: readonly { code: string; message: string; mend: string }[];
} {
  const result = readCase(document, LIBRARY);
  if ("problems" in result) throw new Error(JSON.stringify(result.problems, null, 1));
  return result;
}

describe("a case is read into SI with its defaults", () => {
  const given = read(EXAMPLE).case;
  test("regions, sides and arcs", () => {
    const [ingot, mould] = given.regions;
    expect(ingot?.outline[1]).toEqual({ at: [0.2, 0], side: "wall" });
    expect(ingot?.outline[2]).toEqual({ at: [0.16, 0.9], side: "top", through: [0.085, 0.93] });
    expect(ingot?.start).toBe(1100);
    expect(mould?.start).toBe(20);
    expect(mould?.source).toBe(0);
    expect(mould?.holes).toEqual([]);
    expect(mould?.outline.map((vertex) => vertex.side)).toEqual(["side 1", "skin", "side 3", "side 4"]);
  });
  test("materials, own and from the library", () => {
    const { steel, mould } = given.materials;
    expect(steel?.conductivity).toEqual({
      over: "temperature",
      points: [
        [20, 53],
        [expect.closeTo(800, 9), 27],
      ],
    });
    expect(steel?.latent).toEqual({ heat: 270000, solidus: 1420, liquidus: 1480 });
    expect(mould).toMatchObject({ density: 7200, library: "cast-iron-grey", emissivity: 0.64 });
    expect(mould?.source).toBe(
      "density, conductivity: table A (from memory); heat capacity, emissivity: table B (seen)",
    );
  });
  test("stages, with the ambient of the stage in every film that gives none", () => {
    const [air, second] = given.stages;
    expect(air?.lasts).toBe(14400);
    const ambient = {
      over: "time",
      points: [
        [0, 25],
        [3600, 30],
      ],
    };
    expect(air?.sides["*"]).toEqual({
      kind: "film",
      film: 12,
      ambient,
      emissivity: 0.8,
      surroundings: ambient,
    });
    expect(air?.sides["base"]).toEqual({ kind: "insulated" });
    expect(air?.sides["skin"]).toMatchObject({ ambient: 20, surroundings: 15, emissivity: 0.5 });
    expect(second).toMatchObject({
      name: "stage 2",
      lasts: 50000,
      until: { where: "core", reaches: 80, going: "down" },
    });
    expect(second?.sides["*"]).toEqual({ kind: "held", held: 80 });
    expect(second?.sides["base"]).toEqual({ kind: "flux", flux: 5000 });
  });
  test("probes and questions; the z of a dose is a difference", () => {
    expect(given.probes).toEqual([{ name: "core", at: [0, 0.45] }]);
    expect(given.questions[1]).toEqual({ ask: "reading", where: "core", at: 3600 });
    expect(given.questions[7]).toEqual({
      ask: "dose",
      where: "coldest",
      reference: expect.closeTo(60, 9),
      z: expect.closeTo(10, 9),
    });
    expect(given.accuracy).toBe(0.001);
  });
  test("a side with surroundings and no emissivity takes that of the material", () => {
    const document = plain();
    (document.materials["m"] as { emissivity?: number }).emissivity = 0.7;
    document.stages[0]!.sides = { "*": { film: 5, surroundings: 15 } };
    expect(read(document).case.stages[0]?.sides["*"]).toMatchObject({ emissivity: 0.7, surroundings: 15 });
  });
  test("the text of a file reads as the document it holds", () => {
    expect(read(writeCase(EXAMPLE)).case).toEqual(given);
  });
});

describe("writing", () => {
  const text = writeCase(EXAMPLE);
  test("a round trip keeps what the person wrote", () => {
    expect(JSON.parse(text)).toEqual(EXAMPLE);
    expect(text).toContain('"450 mm"');
    const again = readCase(text, LIBRARY);
    if ("problems" in again) throw new Error("not read");
    expect(again.document).toEqual(EXAMPLE);
    expect(writeCase(again.document)).toBe(text);
  });
  test("short entries stand on one line", () => {
    expect(text).toContain('          { "at": [0, 0], "side": "base" },\n');
    expect(text).toContain('"conductivity": [[20, 53], ["1472 degF", 27]],');
    expect(text).toContain('{ "ask": "when", "where": "every-point", "reaches": 80 },');
    expect(Math.max(...text.split("\n").map((line) => line.length))).toBeLessThanOrEqual(111);
  });
  test("the order of the fields is kept and undefined fields are left out", () => {
    const document = { ...plain(), notes: undefined, title: "last" } as unknown as CaseDocument;
    expect(Object.keys(JSON.parse(writeCase(document)) as object).at(-1)).toBe("title");
    expect(writeCase(document)).not.toContain("notes");
  });
});

describe("hints", () => {
  const hintsFor = (spoil: (document: CaseDocument) => void): string[] => {
    const document = plain();
    spoil(document);
    return read(document).hints.map((hint) => `${hint.code}: ${hint.message} ${hint.mend}`);
  };
  test("none for a plain case", () => {
    expect(hintsFor(() => undefined)).toEqual([]);
  });
  test("a conductivity of 25 000 is asked about", () => {
    const hints = hintsFor(
      (d) => (d.materials["m"] = { density: 7800, conductivity: 25000, heatCapacity: 600 }),
    );
    expect(hints).toEqual([expect.stringMatching(/25\u2009000 W\/\(m K\).*Did you mean 25\?/)]);
  });
  test("millimetres written as bare numbers are asked about", () => {
    const hints = hintsFor((d) => {
      d.part.regions[0]!.outline = [{ at: [0, 0] }, { at: [200, 0] }, { at: [200, 900] }, { at: [0, 900] }];
    });
    expect(hints).toEqual([expect.stringMatching(/900 m across.*"200 mm"/)]);
  });
  test("a question at the temperature of the surroundings is never answered", () => {
    const hints = hintsFor((d) => (d.questions = [{ ask: "when", where: "mean", reaches: 20 }]));
    expect(hints).toEqual([expect.stringMatching(/question-at-ambient.*20 °C/)]);
  });
  test("an emissivity and a material that nothing uses", () => {
    const hints = hintsFor((d) => {
      d.materials["m"] = { density: 7800, conductivity: 30, heatCapacity: 600, emissivity: 0.8 };
      d.materials["spare"] = { library: "cast-iron-grey" };
    });
    expect(hints).toEqual([
      expect.stringMatching(/material-unused.*spare/),
      expect.stringMatching(/emissivity-unused/),
    ]);
  });
  test("a start outside the temperatures for which library values hold", () => {
    const hints = hintsFor((d) => (d.materials["m"] = { library: "cast-iron-grey" }));
    expect(hints).toEqual([expect.stringMatching(/outside-validity: "round" starts at 500 °C.*0 to 200 °C/)]);
  });
  test("a reading after the end", () => {
    const hints = hintsFor((d) => (d.questions = [{ ask: "reading", where: "mean", at: "2 h" }]));
    expect(hints).toEqual([expect.stringMatching(/question-too-late/)]);
  });
});
