/** A faulty outline is refused in plain words: which side, where, how to mend it. */
import { describe, expect, test } from "vitest";
import { findOutlineFaults } from "../../mesh/outlineFaults.ts";
import { readCase } from "../../src/case/readCase.ts";
import type { Case, CaseProblem, RegionDocument, VertexDocument } from "../../src/case/types.ts";
import { buildProfile } from "../../src/profile/buildProfile.ts";
import { outlineHints, outlineProblems } from "../../src/profile/outlineProblems.ts";
import { plain } from "../helpers/plainCase.ts";

type Corner = [number, number, string?, number?, number?];
const loop = (...corners: Corner[]): VertexDocument[] =>
  corners.map(([r, z, side, tr, tz]) => ({
    at: [r, z],
    ...(side ? { side } : {}),
    ...(tr === undefined ? {} : { through: [tr, tz!] }),
  }));

function caseOf(regions: Partial<RegionDocument>[], probe?: [number, number]): Case {
  const document = plain();
  document.part.regions = regions.map((region, i) => ({
    name: `r${i + 1}`,
    material: "m",
    outline: [],
    ...region,
  }));
  if (probe) document.probes = [{ name: "core", at: probe }];
  const read = readCase(document, {});
  if ("problems" in read) throw new Error(JSON.stringify(read.problems));
  return read.case;
}
function findingsOf(given: Case) {
  return findOutlineFaults(
    buildProfile(given).regions,
    given.probes.map((probe) => probe.at),
  );
}
function linesOf(regions: Partial<RegionDocument>[], probe?: [number, number]): string[] {
  const given = caseOf(regions, probe);
  return outlineProblems(findingsOf(given), given).map(lineOf);
}
const lineOf = ({ code, path, message, mend, places }: CaseProblem): string => {
  expect(message).toMatch(/^[A-Z].*\.$/);
  expect(mend).toMatch(/^[A-Z].*\.$/);
  expect(places?.length).toBeGreaterThan(0);
  return `${code} @ ${path} | ${message}`;
};
const square = loop([0, 0, "base"], [0.1, 0, "wall"], [0.1, 0.2, "top"], [0, 0.2, "axis"]);

const FAULTS: readonly [string, Partial<RegionDocument>[], RegExp][] = [
  [
    "crosses the axis",
    [{ outline: loop([-0.01, 0], [0.1, 0, "wall"], [0.1, 0.2], [0, 0.2]) }],
    /^outline-negative-radius @ part\.regions\[0\]\.outline\[0\] \| Side 1 of "r1" crosses the axis: it reaches r \u221210 mm at r \u221210, z 0 mm\.$/,
  ],
  [
    "crosses itself",
    [{ outline: loop([0, 0], [0.1, 0, "wall"], [0.02, 0.2, "lid"], [0.1, 0.2], [0.02, 0.05], [0, 0.05]) }],
    /^outline-crossing @ part\.regions\[0\]\.outline\[1\] \| Side "wall" of "r1" crosses side 4 of "r1" at r [\d.]+, z [\d.]+ mm\.$/,
  ],
  [
    "a side without length",
    [{ outline: loop([0, 0], [0.1, 0, "wall"], [0.1, 0], [0.1, 0.2], [0, 0.2]) }],
    /^outline-zero-length @ part\.regions\[0\]\.outline\[1\] \| Side "wall" of "r1" has no length: it starts and ends at r 100, z 0 mm\.$/,
  ],
  [
    "two lines only",
    [{ outline: loop([0, 0], [0.1, 0]) }],
    /^outline-few-sides .* The outline of "r1" has 2 sides/,
  ],
  ["no area", [{ outline: loop([0, 0], [0.1, 0], [0.2, 0]) }], /^outline-no-area .* encloses no area/],
  [
    "a hole outside",
    [{ outline: square, holes: [loop([0.3, 0], [0.4, 0], [0.4, 0.1])] }],
    /^outline-void-outside @ part\.regions\[0\]\.holes\[0\]\[0\] \| Hole 1 of "r1" does not lie inside/,
  ],
  [
    "regions that overlap",
    [{ outline: square }, { outline: loop([0.05, 0.05], [0.3, 0.05], [0.3, 0.1], [0.05, 0.1]) }],
    /^outline-overlap .* The regions "r1" and "r2" overlap near r 100, z/,
  ],
  [
    "a gap to the axis",
    [{ outline: loop([0.0004, 0, "base"], [0.1, 0, "wall"], [0.1, 0.2, "top"], [0.0004, 0.2, "axis"]) }],
    /^outline-gap-to-axis @ part\.regions\[0\]\.outline\[3\] \| Side "axis" of "r1" leaves a gap of 0\.4 mm to the axis\.$/,
  ],
  [
    "an axis that ends beside the axis",
    [{ outline: loop([0.0004, 0, "base"], [0.1, 0, "wall"], [0.1, 0.2, "top"], [0, 0.2, "axis"]) }],
    /^outline-gap-to-axis .* gap of 0\.4 mm/,
  ],
];

describe("faults", () => {
  test.each(FAULTS)("%s", (_what, regions, expected) => {
    const lines = linesOf(regions);
    expect(
      lines.some((line) => expected.test(line)),
      lines.join("\n"),
    ).toBe(true);
  });
  test("none in a sound outline", () => {
    expect(linesOf([{ outline: square }], [0.05, 0.1])).toEqual([]);
  });
  test("a probe outside", () => {
    expect(linesOf([{ outline: square }], [0.13, 0.1])).toEqual([
      'probe-outside @ probes[0].at | Probe "core" lies outside the part, 30 mm from its nearest side, at r 130, z 100 mm.',
    ]);
  });
  test("an open loop cannot be written in a document, but is told when it is handed in", () => {
    const given = caseOf([{ outline: square }]);
    const [fault] = outlineProblems(
      [
        {
          code: "gap",
          isRemark: false,
          at: { region: 0, loop: 0, side: 1 },
          places: [
            [0.1, 0.2],
            [0.1, 0.21],
          ],
          sizes: [0.01],
        },
      ],
      given,
    );
    expect(fault?.message).toBe(
      'The outline of "r1" is open: from r 100, z 200 mm to r 100, z 210 mm a gap of 10 mm is left.',
    );
  });
  test("a fault of a kind without words is a broken invariant", () => {
    const given = caseOf([{ outline: square }]);
    const finding = {
      code: "new",
      isRemark: false,
      at: { region: 0, loop: 0, side: 1 },
      places: [],
      sizes: [],
    };
    expect(() => outlineProblems([finding], given)).toThrow(/"new"/);
  });
});

describe("hints", () => {
  const hintsOf = (outline: VertexDocument[]): string[] => {
    const given = caseOf([{ outline }]);
    return outlineHints(findingsOf(given), given).map(lineOf);
  };
  test("an arc whose points are in line", () => {
    expect(hintsOf(loop([0, 0], [0.1, 0, "wall", 0.1, 0.1], [0.1, 0.2], [0, 0.2]))).toEqual([
      expect.stringMatching(
        /^outline-arc-in-line @ part\.regions\[0\]\.outline\[1\] \| Side "wall" of "r1" is to be an arc/,
      ),
    ]);
  });
  test("a bore narrower than any bore is likely to be", () => {
    expect(hintsOf(loop([0.0004, 0], [0.1, 0], [0.1, 0.2], [0.0004, 0.2, "inside"]))).toEqual([
      expect.stringMatching(
        /^outline-gap-to-axis .* gap of 0\.4 mm to the axis at side "inside" of "r1"; it is taken as a bore/,
      ),
    ]);
  });
  test("none for a cone with its tip on the axis, nor for a plain bore", () => {
    expect(hintsOf(loop([0, 0], [0.1, 0], [0, 0.2]))).toEqual([]);
    expect(hintsOf(loop([0.02, 0], [0.1, 0], [0.1, 0.2], [0.02, 0.2]))).toEqual([]);
  });
});
