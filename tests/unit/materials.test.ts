/** The library holds what the tables of tests/data say, and every value names its source. */
import { describe, expect, test } from "vitest";
import { LIBRARY } from "../../presets/materials/index.ts";
import { fromMemory, sourceLine } from "../../src/case/library.ts";
import type { LibraryMaterial } from "../../src/case/library.ts";
import { readCase } from "../../src/case/readCase.ts";
import type { Curve, MaterialDocument } from "../../src/case/types.ts";
import { plain } from "../helpers/plainCase.ts";
import { numberIn, readTable } from "../helpers/readTable.ts";

const AT_20 = readTable("materials_20C");
const OVER_T = readTable("materials_vs_T");
const names = Object.keys(LIBRARY);
const get = (name: string): LibraryMaterial => LIBRARY[name]!;

/** Entries with constant values, and their row of materials_20C.csv. */
const CONSTANT: Readonly<Record<string, string>> = {
  "stainless-steel-304": "stainless AISI 304",
  "stainless-steel-316": "stainless AISI 316",
  "cast-iron-grey": "cast iron, grey EN-GJL-250",
  "cast-iron-ductile": "cast iron, ductile EN-GJS-400-15",
  aluminium: "aluminium, pure",
  "aluminium-2024": "aluminium 2024-T6",
  "aluminium-6061": "aluminium 6061-T6",
  "aluminium-a356-cast": "aluminium A356-T6 cast",
  copper: "copper, pure",
  brass: "cartridge brass 70Cu-30Zn",
  bronze: "bronze (design value)",
  titanium: "titanium, pure",
  "titanium-6al-4v": "Ti-6Al-4V",
  "nickel-alloy-600": "Inconel 600 (UNS N06600)",
  lead: "lead, pure",
  tin: "tin, pure",
  zinc: "zinc, pure",
  "glass-soda-lime": "soda-lime plate glass",
  "glass-borosilicate": "borosilicate 3.3 glass",
  "fused-silica": "fused silica",
  alumina: "alumina, polycrystalline",
  concrete: "concrete 2400",
  "fireclay-brick": "fireclay brick",
  graphite: "graphite, isostatic",
  "silica-sand": "silica sand, dry loose",
  ice: "ice -10 C",
  "polyethylene-hd": "PE-HD",
  polypropylene: "PP",
  ptfe: "PTFE",
  "acrylic-glass": "PMMA",
  "silicone-rubber": "silicone rubber",
};
/** Entries with tables, and their rows of materials_vs_T.csv. */
const TABLES: Readonly<Record<string, string>> = {
  "stainless-steel-304-over-temperature": "stainless AISI 304",
  "stainless-steel-316-over-temperature": "stainless AISI 316",
  "cast-iron-grey-over-temperature": "grey cast iron EN-GJL-250",
  "aluminium-over-temperature": "aluminium, pure",
  "aluminium-melting": "aluminium, pure",
  "copper-over-temperature": "copper, pure",
  "brass-over-temperature": "cartridge brass",
  "nickel-alloy-600-over-temperature": "Inconel 600",
  "fused-silica-over-temperature": "fused silica",
  "alumina-over-temperature": "alumina, polycrystalline",
};
const EUROCODE = ["carbon-steel", "carbon-steel-over-temperature", "stainless-steel-over-temperature"];

function valueAt(curve: Curve, x: number): number {
  if (typeof curve === "number") return curve;
  const { points } = curve;
  const after = points.findIndex((point) => point[0] >= x);
  if (after <= 0) return points.at(after === 0 ? 0 : -1)![1];
  const [[x0, y0], [x1, y1]] = [points[after - 1]!, points[after]!];
  return y0 + ((x - x0) / (x1 - x0)) * (y1 - y0);
}

describe("values", () => {
  test("every entry is held against a table", () => {
    expect([...Object.keys(CONSTANT), ...Object.keys(TABLES), ...EUROCODE].sort()).toEqual([...names].sort());
  });
  test.each(Object.entries(CONSTANT))("%s", (name, row) => {
    const given = AT_20.find((line) => line["material"] === row)!;
    expect(get(name).density).toBe(numberIn(given, "rho_kg_m3"));
    expect(get(name).conductivity).toBe(numberIn(given, "k_W_mK"));
    expect(get(name).heatCapacity).toBe(numberIn(given, "cp_J_kgK"));
    if (given["provenance"] === "from memory") expect(fromMemory(get(name))).toBe(true);
  });
  test.each(Object.entries(TABLES))("%s", (name, row) => {
    const lines = OVER_T.filter((line) => line["material"] === row);
    expect(lines.length).toBeGreaterThan(3);
    for (const line of lines) {
      const t = numberIn(line, "T_C");
      if (line["k_W_mK"]) expect(valueAt(get(name).conductivity, t)).toBe(numberIn(line, "k_W_mK"));
      if (line["cp_J_kgK"]) expect(valueAt(get(name).heatCapacity, t)).toBe(numberIn(line, "cp_J_kgK"));
    }
  });
  test("steels by EN 1993-1-2: conductivity to 0.5 %, heat capacity to 1.5 % and its integral to 0.3 %", () => {
    for (const line of readTable("eurocode_properties")) {
      const t = numberIn(line, "T_C");
      const carbon = get("carbon-steel-over-temperature");
      const stainless = get("stainless-steel-over-temperature");
      expect(valueAt(carbon.conductivity, t) / numberIn(line, "k_carbon_steel") - 1).toBeCloseTo(0, 2);
      expect(valueAt(stainless.conductivity, t) / numberIn(line, "k_stainless") - 1).toBeCloseTo(0, 3);
      expect(Math.abs(valueAt(stainless.heatCapacity, t) / numberIn(line, "c_stainless") - 1)).toBeLessThan(
        0.005,
      );
      expect(Math.abs(valueAt(carbon.heatCapacity, t) / numberIn(line, "c_carbon_steel") - 1)).toBeLessThan(
        0.015,
      );
    }
    // the formulas of 3.4.1.2 written out again, integrated by fine midpoint sums from 20 to 900 °C
    const exact = (t: number): number =>
      t <= 600
        ? 425 + 0.773 * t - 1.69e-3 * t ** 2 + 2.22e-6 * t ** 3
        : t <= 735
          ? 666 + 13002 / (738 - t)
          : 545 + 17820 / (t - 731);
    let [sum, table] = [0, 0];
    for (let t = 20.005; t < 900; t += 0.01) {
      sum += exact(t);
      table += valueAt(get("carbon-steel-over-temperature").heatCapacity, t);
    }
    expect(Math.abs(table / sum - 1)).toBeLessThan(0.003);
  });
  test("melting aluminium: 396 kJ/kg at 660.323 °C", () => {
    const line = readTable("phase_change").find((row) => row["material"] === "aluminium")!;
    expect(get("aluminium-melting").latent).toEqual({
      heat: numberIn(line, "latent_heat_kJ_kg") * 1000,
      solidus: numberIn(line, "T_solidus_C"),
      liquidus: numberIn(line, "T_liquidus_C"),
    });
  });
  test("emissivities are those of the surfaces named", () => {
    const emissivities = readTable("emissivity");
    for (const name of names) {
      const { emissivity, sources } = get(name);
      if (emissivity === undefined) continue;
      const row = emissivities.find(
        (line) =>
          sources.emissivity!.source.includes(`: ${line["surface"]}`) &&
          sources.emissivity!.source.endsWith(line["emissivity"]!),
      );
      expect(row, `${name}: ${sources.emissivity!.source}`).toBeDefined();
      const [low, high = low] = row!["emissivity"]!.split("-").map(Number);
      expect(emissivity).toBeGreaterThanOrEqual(low!);
      expect(emissivity).toBeLessThanOrEqual(high!);
    }
  });
});

describe("form", () => {
  test.each(names)("%s reads as a material of one's own too", (name) => {
    const { density, conductivity, heatCapacity, emissivity, latent, valid, sources } = get(name);
    const own = {
      density,
      conductivity,
      heatCapacity,
      ...(emissivity === undefined ? {} : { emissivity }),
      ...(latent ? { latent } : {}),
    };
    const read = readCase({ ...plain(), materials: { m: own as unknown as MaterialDocument } }, LIBRARY);
    expect("problems" in read && read.problems).toBe(false);
    expect(valid[1]).toBeGreaterThan(valid[0]);
    for (const field of Object.keys(own)) expect(Object.keys(sources)).toContain(field);
    for (const from of Object.values(sources)) {
      expect(["seen", "from memory", "computed"]).toContain(from.provenance);
      expect(from.source.length).toBeGreaterThan(8);
    }
    expect(sourceLine(get(name))).toMatch(/density.*\((seen|from memory|computed)\)/);
  });
  test("ten materials and more have constant values", () => {
    const constant = names.filter(
      (name) =>
        typeof get(name).conductivity === "number" &&
        typeof get(name).heatCapacity === "number" &&
        !get(name).latent,
    );
    expect(constant.length).toBeGreaterThanOrEqual(10);
    expect(constant).toContain("cast-iron-grey");
  });
});
