/** Every preset is a sound case: read without a hint, written as it stands, its part as the formulas say. */
import { readdirSync, readFileSync } from "node:fs";
import { describe, expect, test } from "vitest";
import { findOutlineFaults } from "../../mesh/outlineFaults.ts";
import { BUNDLED_CASE, CASES } from "../../presets/cases/index.ts";
import { LIBRARY } from "../../presets/materials/index.ts";
import { readCase } from "../../src/case/readCase.ts";
import type { Case } from "../../src/case/types.ts";
import { writeCase } from "../../src/case/writeCase.ts";
import { buildProfile } from "../../src/profile/buildProfile.ts";
import { outlineHints, outlineProblems } from "../../src/profile/outlineProblems.ts";

const FOLDER = new URL("../../presets/cases/", import.meta.url);
const textOf = (id: string): string => readFileSync(new URL(`${id}.json`, FOLDER), "utf8");

function read(id: string): Case {
  const result = readCase(textOf(id), LIBRARY);
  if ("problems" in result) throw new Error(JSON.stringify(result.problems));
  expect(result.hints).toEqual([]);
  return result.case;
}

/** Mass [kg] and V/A [mm] by hand. */
const MEASURES: Readonly<Record<string, readonly [mass: number, length: number]>> = {
  "stepped-roll": [766.0, 69.16],
  "hub-ring": [24.86, 16.15],
  "ball-in-oil": [2.091, 13.33],
  "quenched-bar": [3.063, 11.11],
  "heated-disc": [22.2, 15.79],
  "jar-of-puree": [0.4275, 13.24],
};

test("all files are offered, and the bundled one first", () => {
  const files = readdirSync(FOLDER).filter((name) => name.endsWith(".json"));
  expect(CASES.map(({ id }) => `${id}.json`).sort()).toEqual(files.sort());
  expect(CASES.length).toBeGreaterThanOrEqual(8);
  expect(CASES[0]).toBe(BUNDLED_CASE);
});

describe.each(CASES.map(({ id }) => id))("%s", (id) => {
  const given = read(id);
  const profile = buildProfile(given);
  test("the file stands as it would be written again", () => {
    expect(textOf(id)).toBe(writeCase(CASES.find((one) => one.id === id)!.document));
  });
  test("says what it is and that its data is invented", () => {
    expect(given.title.length).toBeGreaterThan(10);
    expect(given.notes).toMatch(/^All data of this case is invented\./);
    expect(given.questions.length).toBeGreaterThan(1);
    expect(given.probes.length).toBeGreaterThan(0);
  });
  test("its outline is sound and every probe lies in it", () => {
    const findings = findOutlineFaults(
      profile.regions,
      given.probes.map((probe) => probe.at),
    );
    expect([...outlineProblems(findings, given), ...outlineHints(findings, given)]).toEqual([]);
  });
  test("one stage, constant surroundings and properties: what the first solver takes", () => {
    expect(given.stages).toHaveLength(1);
    const [stage] = given.stages;
    const numbers = Object.values(stage!.sides).flatMap((condition) =>
      condition.kind === "film"
        ? [condition.film, condition.ambient]
        : condition.kind === "flux"
          ? [condition.flux]
          : condition.kind === "held"
            ? [condition.held]
            : [],
    );
    const properties = Object.values(given.materials).flatMap(({ conductivity, heatCapacity }) => [
      conductivity,
      heatCapacity,
    ]);
    for (const value of [...numbers, ...properties]) expect(typeof value).toBe("number");
  });
  if (MEASURES[id]) {
    test("mass and V/A", () => {
      const [mass, length] = MEASURES[id]!;
      expect(profile.mass / mass).toBeCloseTo(1, 3);
      expect((profile.characteristicLength * 1000) / length).toBeCloseTo(1, 3);
    });
  }
});
