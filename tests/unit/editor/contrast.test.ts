/** Every pair of tokens that the look puts on each other keeps its contrast (WCAG 2.2, 1.4.3 and 1.4.11). */
import { readFileSync } from "node:fs";
import { describe, expect, it } from "vitest";

const css = readFileSync(new URL("../../../src/app/styles/tokens.css", import.meta.url), "utf8");
const read = (block: string): Record<string, string> =>
  Object.fromEntries(
    [...block.matchAll(/--([\w-]+):\s*(#[0-9a-f]{6})/gi)].map((match) => [match[1]!, match[2]!]),
  );
const darkBlock = /\[data-theme="dark"\] \{[\s\S]*?\n\}/.exec(css)![0];
const light = read(css.replace(darkBlock, ""));
const dark = { ...light, ...read(darkBlock) };

/** Relative luminance and contrast ratio as WCAG 2.2 defines them. */
const linear = (byte: number): number =>
  byte / 255 <= 0.04045 ? byte / 255 / 12.92 : ((byte / 255 + 0.055) / 1.055) ** 2.4;
const luminance = (hex: string): number => {
  const [r, g, b] = [1, 3, 5].map((i) => linear(Number.parseInt(hex.slice(i, i + 2), 16)));
  return 0.2126 * r! + 0.7152 * g! + 0.0722 * b!;
};
const ratio = (a: string, b: string): number => {
  const [high, low] = [luminance(a), luminance(b)].sort((p, q) => q - p);
  return (high! + 0.05) / (low! + 0.05);
};

const TEXT: readonly (readonly [ink: string, ...grounds: string[]])[] = [
  [
    "ink",
    "sheet",
    "ground",
    "well",
    "hand-ground",
    "good-ground",
    "bad-ground",
    "care-ground",
    "stale-ground",
  ],
  ["ink-2", "sheet", "ground", "bad-ground"],
  ["ink-3", "sheet", "ground"],
  ["hand", "sheet", "ground", "hand-ground", "bad-ground"],
  ["hand-strong", "hand-ground"],
  ["on-hand", "hand"],
  ["good", "sheet", "good-ground"],
  ["bad", "sheet", "ground", "bad-ground"],
  ["care", "sheet", "care-ground"],
  ["stale", "sheet", "ground", "stale-ground"],
];
const LINES: readonly (readonly [line: string, ...grounds: string[]])[] = [
  ["rule-strong", "sheet", "ground"],
  ["hand", "sheet", "ground"],
  ["bad", "sheet"],
];

describe.each([
  ["light", light],
  ["dark", dark],
] as const)("contrast of the %s sheet", (_, tokens) => {
  const pairs = (rows: typeof TEXT) =>
    rows.flatMap(([ink, ...grounds]) => grounds.map((ground) => [ink, ground] as const));
  it.each(pairs(TEXT))("words in %s on %s: 4.5", (ink, ground) => {
    expect(ratio(tokens[ink]!, tokens[ground]!)).toBeGreaterThanOrEqual(4.5);
  });
  it.each(pairs(LINES))("lines in %s on %s: 3", (ink, ground) => {
    expect(ratio(tokens[ink]!, tokens[ground]!)).toBeGreaterThanOrEqual(3);
  });
  it("dark or light isotherms read on every stop of the map: 3", () => {
    for (let i = 0; i < 17; i++) {
      const stop = tokens[`map-${String(i).padStart(2, "0")}`]!;
      expect(
        Math.max(ratio(stop, tokens["iso-dark"]!), ratio(stop, tokens["iso-light"]!)),
      ).toBeGreaterThanOrEqual(3);
    }
  });
});
