/**
 * Every bundled case is solved and held to two or three numbers. Where a closed form or one of our worked stories gives
 * the number it is named; the others were found by a second route (some 4,000 linear triangles, implicit Euler, accuracy
 * 0.002), which agrees with the default route within the tolerance here. All cases are invented.
 */
import { describe, expect, it } from "vitest";
import { CASES } from "../presets/cases/index.ts";
import { solved } from "./helpers/solve.ts";

interface Checked {
  /** number of the question, from 0 */
  readonly question: number;
  readonly value: number;
  /** relative */
  readonly within: number;
  readonly from: string;
}

const secondRoute = "second route";
const CHECKS: Record<string, readonly Checked[]> = {
  "tapered-ingot": [
    { question: 0, value: 33238, within: 2e-3, from: secondRoute },
    { question: 2, value: 324.88, within: 2e-3, from: secondRoute },
    { question: 4, value: 242.4, within: 2e-3, from: secondRoute },
  ],
  "stepped-roll": [
    { question: 0, value: 27097, within: 3e-3, from: secondRoute },
    { question: 1, value: 25874, within: 3e-3, from: secondRoute },
    { question: 3, value: 204.7, within: 2e-3, from: secondRoute },
  ],
  "hub-ring": [
    {
      question: 0,
      value: 49.3 * 60,
      within: 3e-3,
      from: "worked story of a ring to slide on, product of series: 49.3 min",
    },
    { question: 2, value: 3.979, within: 5e-3, from: secondRoute },
  ],
  "ball-in-oil": [
    { question: 0, value: 220.8541, within: 1e-5, from: "series of the sphere [CJ59] sec. 9.4" },
    { question: 1, value: 62.6291, within: 1e-5, from: "series of the sphere" },
    { question: 2, value: 170.278, within: 1e-5, from: "series of the sphere" },
  ],
  "quenched-bar": [
    {
      question: 0,
      value: 503.688,
      within: 1e-5,
      from: "product of long round and plate [CJ59] sec. 8.4: 503.688",
    },
    { question: 1, value: 109.8592, within: 1e-4, from: "product of series" },
    { question: 3, value: 358.184, within: 1e-4, from: "product of series" },
  ],
  "sprayed-tube": [
    { question: 0, value: 145.66, within: 2e-3, from: secondRoute },
    { question: 2, value: 600.1, within: 2e-3, from: secondRoute },
  ],
  "aluminium-cone": [
    { question: 0, value: 5495, within: 3e-3, from: secondRoute },
    { question: 2, value: 2.744, within: 5e-3, from: secondRoute },
  ],
  "bottle-shell": [
    { question: 0, value: 37.31, within: 3e-3, from: secondRoute },
    { question: 1, value: 74.76, within: 3e-3, from: secondRoute },
    { question: 2, value: 37.2, within: 3e-3, from: secondRoute },
  ],
  "sleeve-on-core": [
    { question: 0, value: 7031.6, within: 3e-3, from: secondRoute },
    { question: 1, value: 7077.1, within: 3e-3, from: secondRoute },
  ],
  "jar-of-puree": [
    { question: 0, value: 3153.5, within: 2e-3, from: secondRoute },
    {
      question: 2,
      value: 70.27,
      within: 1e-3,
      from: "worked story of a jar, finite volumes: 70.3 C at the worst place when moved",
    },
  ],
  "heated-disc": [
    { question: 0, value: 108.52, within: 2e-3, from: secondRoute },
    { question: 1, value: 86.882, within: 1e-3, from: secondRoute },
  ],
};

describe("bundled cases", () => {
  it("all have their checks, and no check is left over", () => {
    expect(CASES.map((preset) => preset.id).sort()).toEqual(Object.keys(CHECKS).sort());
  });

  it.each(CASES)("$id says that it is invented", ({ document }) => {
    expect(document.notes).toMatch(/invented/i);
    expect(document.title).toBeTruthy();
  });

  it.each(CASES)(
    "$id meets its numbers, its heat balances and its uncertainty is stated",
    async ({ id, document }) => {
      const result = await solved(document);
      for (const { question, value, within, from } of CHECKS[id]!) {
        const found = result.answers[question]!.value!;
        expect(
          Math.abs(found / value - 1),
          `question ${question + 1}: ${found} against ${value} (${from})`,
        ).toBeLessThan(within);
      }
      expect(result.run.energyImbalance).toBeLessThan(1e-6);
      const span = Math.max(...result.history.hottest) - Math.min(...result.history.coldest);
      expect(result.run.temperatureUncertainty).toBeLessThan(5e-4 * span);
      for (const answer of result.answers) expect(answer.numericalUncertainty).toBeGreaterThanOrEqual(0);
    },
  );
});
