/** The proof in plain words: what was checked, what came out, and whether it is as it should be. */
import type { CaseDocument } from "../../case/types.ts";
import type { UnitSystem } from "../../case/units.ts";
import type { CaseResult, RunFacts } from "../../run/result.ts";
import { difference, digits, duration, quantity, roundUp, temperature } from "../controls/figures.ts";
import { seriesName } from "../controls/words.ts";
import { scheduleOf } from "../strip/schedule.ts";
import { figureOf } from "./answer-words.ts";
import { siValue } from "./sentences.ts";

export interface Fact {
  readonly name: string;
  readonly value: string;
  /** in lesser ink behind or below the value */
  readonly note?: string;
  /** "kept" and "broken" carry a mark; undefined is a plain fact */
  readonly check?: "kept" | "broken";
}
export interface FactGroup {
  readonly title: string;
  readonly facts: readonly Fact[];
}

/** The group that also carries the picture of the triangles. */
export const MESH_TITLE = "Mesh";

/** Share of the largest exchanged heat that may stay unaccounted for. */
const ENERGY_LIMIT = 1e-6;
/** Sharpest corner [degrees] below which a mesh is frowned upon. */
const ANGLE_LIMIT = 20;
/** Share by which the meshed part may differ from the outline. */
const SIZE_LIMIT = 1e-3;
/** Share of the span by which a value may leave the range of start and surroundings: the sums' own roundness. */
const RANGE_SLACK = 1e-3;

export function proofOf(document: CaseDocument, result: CaseResult, system: UnitSystem): FactGroup[] {
  return [
    { title: "How sure", facts: sureFacts(document, result, system) },
    { title: "Heat", facts: heatFacts(result, system) },
    { title: MESH_TITLE, facts: meshFacts(result) },
    { title: "Outline against mesh", facts: sizeFacts(result, system) },
    { title: "Time", facts: timeFacts(result, system) },
    { title: "Quick estimates", facts: estimateFacts(result, system) },
  ];
}

function sureFacts(document: CaseDocument, result: CaseResult, system: UnitSystem): Fact[] {
  const { temperatureUncertainty: doubt, levels } = result.run;
  const sure: Fact =
    doubt === null
      ? { name: "temperatures", value: "not known yet", note: "one mesh only was solved" }
      : {
          name: "temperatures good to",
          value: `\u00b1${difference(roundUp(doubt), system).text}`,
          note: "mesh and time together",
        };
  const solved: Fact = {
    name: levels.length === 1 ? "mesh solved" : "meshes solved",
    value: levels.map((count) => digits(count, 0)).join(", "),
    note: "unknowns, coarse to fine",
  };
  return [sure, solved, rangeFact(document, result, system)];
}

/** No value outside the range of start and surroundings, where nothing else brings heat. */
function rangeFact(document: CaseDocument, result: CaseResult, system: UnitSystem): Fact {
  const name = "no value outside";
  if (bringsHeat(document))
    return { name, value: "not asked", note: "a flux or a source may leave the range" };
  const given = givenTemperatures(document, result, system);
  const [low, high] = [Math.min(...given), Math.max(...given)];
  const coldest = result.history.coldest.reduce((a, b) => Math.min(a, b), Infinity);
  const hottest = result.history.hottest.reduce((a, b) => Math.max(a, b), -Infinity);
  const slack = RANGE_SLACK * (high - low);
  const kept = coldest >= low - slack && hottest <= high + slack;
  const reached = `${temperature(coldest, system).text} to ${temperature(hottest, system).text}`;
  const range = `${temperature(low, system).text} to ${temperature(high, system).text}`;
  return {
    name: `${name} ${range}`,
    value: kept ? "kept" : "broken",
    note: `reached ${reached}`,
    check: kept ? "kept" : "broken",
  };
}

function bringsHeat(document: CaseDocument): boolean {
  const source = document.part.regions.some((region) => region.source !== undefined && region.source !== 0);
  const flux = document.stages.some((stage) =>
    Object.values(stage.sides).some((condition) => typeof condition !== "string" && "flux" in condition),
  );
  return source || flux;
}

function givenTemperatures(document: CaseDocument, result: CaseResult, system: UnitSystem): number[] {
  const starts = [document.start, ...document.part.regions.map((region) => region.start)]
    .map((value) => siValue(value, "temperature"))
    .filter(Number.isFinite);
  const knots = scheduleOf(document, result, system).flatMap((block) =>
    block.lines.flatMap((line) => line.knots.map((knot) => knot.degC)),
  );
  return [...starts, ...knots];
}

function heatFacts({ run }: CaseResult, system: UnitSystem): Fact[] {
  const joules = (value: number): string => figureOf("J", value, null, system).text;
  // the figures carry no sign: the words say which way the heat went
  const through = run.heatThroughSides < 0 ? "went out through the sides" : "came in through the sides";
  const stored = run.heatStored < 0 ? "given off by the part" : "taken up by the part";
  const facts: Fact[] = [{ name: through, value: joules(run.heatThroughSides) }];
  if (run.heatFromSources !== 0) facts.push({ name: "released inside", value: joules(run.heatFromSources) });
  const kept = run.energyImbalance <= ENERGY_LIMIT;
  return [
    ...facts,
    { name: stored, value: joules(run.heatStored) },
    {
      name: "left over",
      value: small(run.energyImbalance),
      note: "of the heat exchanged",
      check: kept ? "kept" : "broken",
    },
  ];
}

function meshFacts({ mesh, run }: CaseResult): Fact[] {
  return [
    { name: "unknowns", value: digits(mesh.nodes, 0) },
    {
      name: "triangles",
      value: digits(mesh.triangles, 0),
      note: run.element === 6 ? "six nodes each" : "three nodes each",
    },
    {
      name: "sharpest corner, widest",
      value: `${digits(mesh.minAngleDeg, 1)}\u00b0, ${digits(mesh.maxAngleDeg, 1)}\u00b0`,
      check: mesh.minAngleDeg >= ANGLE_LIMIT ? "kept" : "broken",
    },
    { name: "mean quality", value: digits(mesh.meanQuality, 3), note: "1 is equilateral" },
  ];
}

function sizeFacts({ mesh }: CaseResult, system: UnitSystem): Fact[] {
  return [
    sizeFact("volume", mesh.volume, mesh.meshVolume, "volume", system),
    sizeFact("exposed area", mesh.exposedArea, mesh.meshExposedArea, "area", system),
  ];
}

function sizeFact(
  name: string,
  outline: number,
  meshed: number,
  dimension: "volume" | "area",
  system: UnitSystem,
): Fact {
  const off = outline > 0 ? Math.abs(meshed - outline) / outline : 0;
  return {
    name,
    value: sizeWords(outline, dimension, system),
    note: off < 1e-9 ? "mesh the same" : `mesh ${small(off)} off`,
    check: off <= SIZE_LIMIT ? "kept" : "broken",
  };
}

/** Workpieces are named in litres (dm3) and square metres, small ones in cubic and square centimetres. */
function sizeWords(value: number, dimension: "volume" | "area", system: UnitSystem): string {
  const [least, size, unit] = dimension === "volume" ? [1e-3, 1e-3, "dm\u00b3"] : [0.1, 1, "m\u00b2"];
  if (system === "us" || value < least) return quantity(value, dimension, system).text;
  return `${quantity(value / size, "share", system).text}\u00a0${unit}`;
}

const SCHEMES: Readonly<Record<RunFacts["scheme"], Pick<Fact, "value" | "note">>> = {
  "implicit-euler": { value: "implicit Euler", note: "step by step" },
  "tr-bdf2": { value: "TR-BDF2", note: "second order, steps as needed" },
  krylov: { value: "rational Krylov", note: "exact in time to the tolerance" },
};

function timeFacts({ run }: CaseResult, system: UnitSystem): Fact[] {
  return [
    { name: "scheme", ...SCHEMES[run.scheme] },
    { name: "steps", value: digits(run.steps, 0), note: `${digits(run.rejectedSteps, 0)} tried again` },
    {
      name: "solves",
      value: digits(run.solves, 0),
      note: run.factorizations === 1 ? "1 factor" : `${digits(run.factorizations, 0)} factors`,
    },
    {
      name: "error in time",
      value: timeError(run.timeError, system),
    },
    { name: "took", value: duration(run.seconds, 0.1), note: "on this machine" },
  ];
}

/** To one figure; a thousandth of a kelvin is as fine as anybody asks. */
function timeError(kelvin: number, system: UnitSystem): string {
  if (kelvin < 1e-3) return `under ${difference(1e-3, system).text}`;
  return `\u00b1${difference(roundUp(kelvin), system).text}`;
}

function estimateFacts({ estimates }: CaseResult, system: UnitSystem): Fact[] {
  const facts: Fact[] = [];
  const { lumped, series } = estimates;
  if (lumped !== null) {
    facts.push({
      name: "V/A",
      value: quantity(lumped.length, "length", system).text,
      note: "volume over the area that exchanges heat",
    });
    facts.push({ name: "Biot number, V/A", value: digits(lumped.biot, lumped.biot < 0.1 ? 4 : 3) });
    facts.push({ name: "time constant", value: duration(lumped.timeConstant) });
  }
  if (series !== null) {
    facts.push({
      name: seriesName(series.shape),
      value: sizesWords(series.sizes, system),
      note: series.remark,
    });
    facts.push({
      name: "Biot and Fourier",
      value: `${digits(series.biot, 3)}, ${digits(series.fourier, 2)}`,
    });
  }
  for (const remark of estimates.remarks) facts.push({ name: "left out", value: "", note: remark });
  return facts;
}

function sizesWords(sizes: Readonly<Record<string, number>>, system: UnitSystem): string {
  return Object.entries(sizes)
    .map(([name, metres]) => `${words(name)} ${quantity(metres, "length", system).text}`)
    .join(", ");
}

/** "halfThickness" as "half thickness". */
const words = (name: string): string => name.replace(/[A-Z]/g, (letter) => ` ${letter.toLowerCase()}`);

/** A small share: in percent down to a thousandth of one, then as a power of ten. */
function small(share: number): string {
  if (share === 0) return "0";
  if (share >= 1e-5) return `${Number((100 * share).toPrecision(2))}\u00a0%`;
  const power = Math.floor(Math.log10(share));
  return `${(share / 10 ** power).toFixed(1)} \u00d7 10${superscript(power)}`;
}

const superscript = (value: number): string =>
  String(value).replace(
    /./g,
    (sign) =>
      ({ "-": "\u207b", "1": "\u00b9", "2": "\u00b2", "3": "\u00b3" })[sign] ??
      String.fromCodePoint(0x2070 + Number(sign)),
  );
