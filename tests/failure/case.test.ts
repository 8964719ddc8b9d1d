/** A faulty case says what is wrong, where, and how to mend it; all faults at once and none of its own making. */
import { describe, expect, test } from "vitest";
import { readCase } from "../../src/case/readCase.ts";
import { pathSteps, pathText } from "../../src/case/path.ts";
import type { MaterialLibrary } from "../../src/case/library.ts";
import type { CaseProblem } from "../../src/case/types.ts";
import { writeCase } from "../../src/case/writeCase.ts";
import { plain } from "../helpers/plainCase.ts";

const FROM_A_TEST = { source: "invented", provenance: "from memory" } as const;
const LIBRARY: MaterialLibrary = {
  known: {
    title: "known",
    density: 1000,
    conductivity: 1,
    heatCapacity: 1000,
    valid: [0, 100],
    sources: { density: FROM_A_TEST, conductivity: FROM_A_TEST, heatCapacity: FROM_A_TEST },
  },
};

function problemsOf(input: unknown): readonly CaseProblem[] {
  const result = readCase(input, LIBRARY);
  if ("case" in result) throw new Error("the case was read");
  for (const { code, message, mend } of result.problems) {
    expect(code).toMatch(/^[a-z-]+$/);
    expect(message).toMatch(/\.$/);
    expect(mend).toMatch(/[.?]$/);
  }
  return result.problems;
}
const linesOf = (input: unknown): string[] =>
  problemsOf(input).map(({ code, path, message, mend }) => `${code} @ ${path} | ${message} | ${mend}`);

// eslint-disable-next-line @typescript-eslint/no-explicit-any
type Loose = any;
function spoiled(spoil: (document: Loose) => void): unknown {
  const document = plain() as Loose;
  spoil(document);
  return document;
}
const region = (d: Loose): Loose => d.part.regions[0];

/** [what is spoiled, how, the one line expected] */
const FAULTS: readonly [string, (d: Loose) => void, RegExp][] = [
  [
    "a unit of the wrong dimension",
    (d) => (region(d).outline[1].at[0] = "2 kg"),
    /^quantity @ part\.regions\[0\]\.outline\[1\]\.at\[0\] \| "2 kg" is a mass; a length is expected\. \| .*120 mm/,
  ],
  [
    "a number that is none",
    (d) => (region(d).outline[1].at[0] = Number.NaN),
    /at\[0\] \| Found NaN; a length/,
  ],
  ["an infinite number", (d) => (d.start = Number.POSITIVE_INFINITY), /@ start \| Found Infinity/],
  ["null for a number", (d) => (d.start = null), /@ start \| Found null; a temperature/],
  [
    "a place with three values",
    (d) => (region(d).outline[2].at = [1, 2, 3]),
    /^count @ .*outline\[2\]\.at \| Point 3 of region "round": "at" has 3 entries/,
  ],
  [
    "an outline of one point",
    (d) => (region(d).outline = [{ at: [0, 0] }]),
    /^count @ part\.regions\[0\]\.outline \| .*corners/,
  ],
  [
    "no material",
    (d) => delete region(d).material,
    /^missing @ part\.regions\[0\]\.material \| Region "round" has no material\. \| Give "material": one of/,
  ],
  [
    "a material that is not there",
    (d) => (region(d).material = "n"),
    /^no-such-material @ part\.regions\[0\]\.material \| Region "round" is made of "n".*"m"/,
  ],
  [
    "a material the library lacks",
    (d) => (d.materials.m = { library: "unobtainium" }),
    /^not-in-library @ materials\.m\.library/,
  ],
  [
    "no density",
    (d) => delete d.materials.m.density,
    /^missing @ materials\.m\.density \| Material "m" has no density\. \| .*kg\/m3/,
  ],
  [
    "an empty material",
    (d) => (d.materials.m = {}),
    /^choice @ materials\.m \| Nothing is given here\. \| .*library/,
  ],
  [
    "library and values",
    (d) => (d.materials.m = { library: "known", density: 3 }),
    /^unknown-field @ materials\.m\.density \| .* does not go with/,
  ],
  [
    "a density of zero",
    (d) => (d.materials.m.density = 0),
    /^range @ materials\.m\.density \| 0 kg\/m3 is out of range; it has to be above 0/,
  ],
  [
    "a conductivity below zero in a table",
    (d) =>
      (d.materials.m.conductivity = [
        [20, 5],
        [100, -3],
      ]),
    /^range @ materials\.m\.conductivity\[1\]\[1\]/,
  ],
  [
    "a table that goes back",
    (d) =>
      (d.materials.m.conductivity = [
        [20, 5],
        [20, 3],
      ]),
    /^table-order @ materials\.m\.conductivity\[1\]\[0\] \| 20 does not lie above/,
  ],
  ["an empty table", (d) => (d.materials.m.heatCapacity = []), /^count @ materials\.m\.heatCapacity/],
  [
    "a property over time",
    (d) => (d.materials.m.heatCapacity = { over: "time", points: [[0, 5]] }),
    /materials\.m\.heatCapacity\.over \| .*temperature/,
  ],
  [
    "a conductivity as an object",
    (d) => (d.materials.m.conductivity = { points: [[0, 5]] }),
    /^missing @ materials\.m\.conductivity\.over/,
  ],
  [
    "an emissivity above one",
    (d) => (d.materials.m.emissivity = 80),
    /^range @ materials\.m\.emissivity \| 80 is out of range; it has to be at most 1/,
  ],
  [
    "a liquidus below the solidus",
    (d) => (d.materials.m.latent = { heat: 1e5, solidus: 900, liquidus: 800 }),
    /^order @ materials\.m\.latent\.liquidus/,
  ],
  [
    "a temperature below absolute zero",
    (d) => (d.start = "-500 degC"),
    /^range @ start \| -500 degC \(-500 degC\) is out of range/,
  ],
  ["no start", (d) => delete d.start, /^missing @ start \| The case has no start temperature\./],
  ["no part", (d) => delete d.part, /^missing @ part \| The case has no part\./],
  ["no regions", (d) => (d.part = {}), /^missing @ part\.regions \| The part has no regions\./],
  ["an empty list of regions", (d) => (d.part.regions = []), /^count @ part\.regions/],
  ["no stages", (d) => delete d.stages, /^missing @ stages/],
  [
    "no duration",
    (d) => delete d.stages[0].lasts,
    /^missing @ stages\[0\]\.lasts \| Stage 1 does not say how long/,
  ],
  [
    "two durations",
    (d) => (d.stages[0].until = { where: "mean", reaches: 30 }),
    /^two-durations @ stages\[0\]\.lasts/,
  ],
  [
    "until without atMost",
    (d) => (d.stages[0] = { until: { where: "mean", reaches: 30 }, ambient: 20, sides: {} }),
    /^missing @ stages\[0\]\.atMost/,
  ],
  [
    "a film without ambient",
    (d) => delete d.stages[0].ambient,
    /^no-ambient @ stages\[0\]\.sides\["\*"\] \| Side "\*" in stage 1 has a film/,
  ],
  [
    "a side that is not there",
    (d) => (d.stages[0].sides.wal = "insulated"),
    /^no-such-side @ stages\[0\]\.sides\.wal \| .* \| Did you mean "wall"\?/,
  ],
  [
    "a condition on the axis",
    (d) => (d.stages[0].sides.axis = "insulated"),
    /^condition-on-axis @ stages\[0\]\.sides\.axis/,
  ],
  [
    "a misspelt condition",
    (d) => (d.stages[0].sides["*"] = { fil: 12 }),
    /^choice @ stages\[0\]\.sides\["\*"\] \| .*"fil"/,
  ],
  [
    "a condition that is no form",
    (d) => (d.stages[0].sides["*"] = 12),
    /^choice @ stages\[0\]\.sides\["\*"\] \| Found 12\. \| A condition is one of/,
  ],
  [
    "a word that is no condition",
    (d) => (d.stages[0].sides["*"] = "cold"),
    /sides\["\*"\] \| .*"cold".*insulated/,
  ],
  [
    "two conditions in one",
    (d) => (d.stages[0].sides["*"] = { film: 12, flux: 3 }),
    /sides\["\*"\] \| .*"film" and "flux"/,
  ],
  [
    "a wrong unit in a condition",
    (d) => (d.stages[0].sides["*"].film = "12 W/m2"),
    /^quantity @ stages\[0\]\.sides\["\*"\]\.film \| "12 W\/m2" is a heat flux; a film coefficient/,
  ],
  [
    "a field too many in a condition",
    (d) => (d.stages[0].sides["*"].emisivity = 0.8),
    /^unknown-field @ stages\[0\]\.sides\["\*"\]\.emisivity \| .* \| Did you mean "emissivity"\?/,
  ],
  [
    "surroundings without any emissivity",
    (d) => (d.stages[0].sides["*"].surroundings = 15),
    /^no-emissivity @ stages\[0\]\.sides\["\*"\]/,
  ],
  [
    "a field the format does not know",
    (d) => (d.colour = "red"),
    /^unknown-field @ colour \| The case has the field "colour"/,
  ],
  [
    "a probe named twice",
    (d) =>
      (d.probes = [
        { name: "a", at: [0, 0] },
        { name: "a", at: [0, 0.1] },
      ]),
    /^name-doubled @ probes\[1\]\.name \| .*probe 1 and probe 2/,
  ],
  [
    "a probe with a reserved name",
    (d) => (d.probes = [{ name: "mean", at: [0, 0] }]),
    /^name-reserved @ probes\[0\]\.name/,
  ],
  [
    "a stage named twice",
    (d) =>
      (d.stages = [
        { ...d.stages[0], name: "a" },
        { ...d.stages[0], name: "a" },
      ]),
    /^name-doubled @ stages\[1\]\.name/,
  ],
  [
    "a question about nowhere",
    (d) => (d.questions = [{ ask: "when", where: "cor", reaches: 80 }]),
    /^no-such-place @ questions\[0\]\.where \| Question 1 looks at "cor"/,
  ],
  [
    "a question of no kind",
    (d) => (d.questions = [{ ask: "why" }]),
    /^choice @ questions\[0\]\.ask \| Found "why"\. \| "ask" is one of/,
  ],
  [
    "a question without its kind",
    (d) => (d.questions = [{ where: "mean" }]),
    /^missing @ questions\[0\]\.ask/,
  ],
  [
    "a question without its temperature",
    (d) => (d.questions = [{ ask: "when", where: "mean" }]),
    /^missing @ questions\[0\]\.reaches \| Question 1 has no temperature to reach/,
  ],
  [
    "a dose whose z is zero",
    (d) => (d.questions = [{ ask: "dose", where: "mean", reference: 60, z: 0 }]),
    /^range @ questions\[0\]\.z/,
  ],
  [
    "a spread of a stage that is not there",
    (d) => (d.questions = [{ ask: "spread", stage: "quench" }]),
    /^no-such-stage @ questions\[0\]\.stage/,
  ],
  [
    "a contact with an unknown region",
    (d) => (d.part.contacts = [{ between: ["round", "sleeve"], conductance: 5 }]),
    /^no-such-region @ part\.contacts\[0\]\.between\[1\]/,
  ],
  [
    "a contact with itself",
    (d) => (d.part.contacts = [{ between: ["round", "round"], conductance: 5 }]),
    /^contact-with-itself @ part\.contacts\[0\]\.between/,
  ],
  [
    "an accuracy of one",
    (d) => (d.accuracy = 1),
    /^range @ accuracy \| "accuracy" is 1; it has to be at most 0\.05/,
  ],
  ["an accuracy as text", (d) => (d.accuracy = "fine"), /^type @ accuracy/],
  [
    "too many points",
    (d) => (region(d).outline = Array.from({ length: 5001 }, (_, i) => ({ at: [1, i] }))),
    /^too-many-points @ part\.regions/,
  ],
  [
    "a newer format",
    (d) => {
      d.corelag = 2;
      d.somethingNew = 1;
    },
    /^newer-version @ corelag \| .*version 2 .*reads version 1/,
  ],
  ["a version as text", (d) => (d.corelag = "1"), /^version @ corelag/],
];

describe("one fault gives one problem", () => {
  test.each(FAULTS)("%s", (_what, spoil, expected) => {
    const lines = linesOf(spoiled(spoil)).filter(
      (line) => !line.startsWith("no-such-side") || expected.source.includes("no-such-side"),
    );
    expect(lines).toEqual([expect.stringMatching(expected)]);
  });
  test("the case that is spoiled is sound itself", () => {
    expect("case" in readCase(plain(), {})).toBe(true);
  });
});

describe("all faults are told at once", () => {
  test("faults of values, of fields and between fields", () => {
    const codes = problemsOf(
      spoiled((d) => {
        d.start = "cold";
        d.extra = 1;
        d.materials.m.density = -1;
        region(d).material = "n";
        d.stages[0].sides.lid = "insulated";
        d.questions = [{ ask: "when", where: "nowhere" }];
      }),
    ).map((problem) => problem.code);
    expect(codes.sort()).toEqual(
      [
        "missing",
        "no-such-material",
        "no-such-place",
        "no-such-side",
        "quantity",
        "range",
        "unknown-field",
      ].sort(),
    );
  });
  test("a thousand faults are cut short and counted", () => {
    const problems = problemsOf(
      spoiled((d) => (region(d).outline = Array.from({ length: 1000 }, () => ({ at: ["x", 0] })))),
    );
    expect(problems.length).toBe(201);
    expect(problems.at(-1)?.message).toBe("There are 800 more faults.");
  });
});

describe("values that are no case", () => {
  test.each([[undefined], [null], [5], [[]], [{}], [{ part: {} }], [true]])("%j", (value) => {
    expect(problemsOf(value).map((problem) => problem.code)).toEqual(["not-a-case"]);
  });
});

describe("faulty text is told by line and column", () => {
  const texts: readonly [string, RegExp][] = [
    ["", /Line 1, column 1: The file is empty/],
    ["  \n ", /empty/],
    ['{\n  "corelag": 1,\n  "title": "a"\n  "notes": ""\n}', /Line 4, column 3: A comma or }/],
    ['{ "corelag": 1, }', /column 15: A comma stands before }/],
    ['{ "corelag": 1, "corelag": 1 }', /column 17: The field "corelag" stands twice/],
    ['{ "corelag": 1', /The file ends too soon/],
    ['{ "a": [1, 2', /The file ends too soon/],
    ['{ "a": "open }', /A text is not closed/],
    ["{ 'a': 1 }", /The name of a field is expected/],
    ["{ \"a\": 'b' }", /single quotes/],
    ['{ "a": 1 } x', /Something follows/],
    ['{ "a": 0.5.2 }', /A number is not written/],
    ['{ "a": .5 }', /A number is not written/],
    ['{ "a": 012 }', /A number is not written/],
    ['{ "a": NaN }', /"NaN" stands without quotes/],
    ['{ "a": 12 mm }', /A comma or }/],
    ['{ "a": /* why */ 1 }', /comment/],
    ['{ "a": }', /A value is missing/],
    ['{ "__proto__": {} }', /__proto__/],
    ['{ "a" 1 }', /A colon is missing after "a"/],
    ["[".repeat(100_000), /nested too deep/],
  ];
  test.each(texts)("%j", (text, expected) => {
    const problems = problemsOf(text);
    expect(problems).toHaveLength(1);
    expect(problems[0]).toMatchObject({ code: "json", path: "", message: expect.stringMatching(expected) });
  });
  test("a file that begins with a byte order mark is read", () => {
    expect("case" in readCase(`\ufeff${writeCase(plain())}`, {})).toBe(true);
  });
  test("a huge file is refused before it is read", () => {
    expect(problemsOf(" ".repeat(20_000_001))).toEqual([expect.objectContaining({ code: "too-large" })]);
  });
});

test("a path is written and read back", () => {
  const steps = ["stages", 0, "sides", 'mould "wall"', "*", "film", 3];
  expect(pathText(steps)).toBe('stages[0].sides["mould \\"wall\\""]["*"].film[3]');
  expect(pathSteps(pathText(steps))).toEqual(steps);
});
