/** Any part of a sound case replaced by anything: the case is read or its faults are told, and nothing is thrown. */
import { expect, test } from "vitest";
import { CASES } from "../../presets/cases/index.ts";
import { LIBRARY } from "../../presets/materials/index.ts";
import { pathSteps, valueAt } from "../../src/case/path.ts";
import { readCase } from "../../src/case/readCase.ts";
import { buildProfile } from "../../src/profile/buildProfile.ts";

const ODD: readonly unknown[] = [
  undefined,
  null,
  true,
  0,
  -1,
  1e300,
  Number.NaN,
  "",
  "x",
  "12 mm",
  "*",
  [],
  [[]],
  [1],
  [1, 2, 3],
  {},
  { a: 1 },
  { library: "copper" },
  { over: "time", points: [[0, 1]] },
  [
    [0, 1],
    [0, 1],
  ],
  "constructor",
  "__proto__",
];

/** Paths to every value inside a value. */
function allPaths(value: unknown, path: (string | number)[] = []): (string | number)[][] {
  if (typeof value !== "object" || value === null) return [path];
  const inner = Array.isArray(value)
    ? value.flatMap((item, i) => allPaths(item, [...path, i]))
    : Object.entries(value).flatMap(([key, item]) => allPaths(item, [...path, key]));
  return path.length === 0 ? inner : [path, ...inner];
}

function replaced(document: unknown, path: readonly (string | number)[], odd: unknown): unknown {
  const copy = structuredClone(document);
  const holder = valueAt(copy, path.slice(0, -1)) as Record<string | number, unknown>;
  if (odd === undefined) Reflect.deleteProperty(holder, path.at(-1)!);
  else holder[path.at(-1)!] = odd;
  return copy;
}

/** What is wrong with how a spoiled document was taken; "" when nothing is. */
function complaint(spoiled: unknown): string {
  const result = readCase(spoiled, LIBRARY);
  if ("case" in result) {
    buildProfile(result.case);
    return "";
  }
  if (result.problems.length === 0) return "no problem told";
  for (const { code, path, message, mend } of result.problems) {
    const words = `${code}: ${message} ${mend}`;
    if (!code || !message || !mend) return `a part is empty: ${words}`;
    if (/undefined|\[object|Invalid input|NaN is|Unrecognized/.test(words)) return `raw words: ${words}`;
    // the path leads into the document, but for its last step, which may be what is missing
    const steps = pathSteps(path);
    if (steps.length > 1 && valueAt(spoiled, steps.slice(0, -1)) === undefined)
      return `leads nowhere: ${path}`;
  }
  return "told";
}

test.each(["sleeve-on-core", "heated-disc"])("%s: every value replaced by every odd one", (id) => {
  const { document } = CASES.find((one) => one.id === id)!;
  const complaints: string[] = [];
  let told = 0;
  for (const path of allPaths(document)) {
    for (const odd of ODD) {
      const found = complaint(replaced(document, path, odd));
      if (found === "told") told++;
      else if (found !== "") complaints.push(`${path.join(".")} = ${JSON.stringify(odd)}: ${found}`);
    }
  }
  expect(complaints).toEqual([]);
  expect(told).toBeGreaterThan(500);
});
