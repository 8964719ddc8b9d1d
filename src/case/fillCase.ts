/** From the parsed document to the case: names and defaults filled in, materials taken from the library. */
import { DEFAULT_ACCURACY } from "./defaults.ts";
import { sourceLine } from "./library.ts";
import type { MaterialLibrary } from "./library.ts";
import type { ParsedCase, ParsedCondition, ParsedMaterial, ParsedStage } from "./schema.ts";
import type { Case, Condition, Material, Region, Stage, Vertex } from "./types.ts";

type ParsedRegion = ParsedCase["part"]["regions"][number];
type ParsedLoop = ParsedRegion["outline"];

/** A document that passed the schema and `checkDocument`, as a case in SI. */
export function fillCase(parsed: ParsedCase, library: MaterialLibrary): Case {
  const materials = mapValues(parsed.materials, (material) => fillMaterial(material, library));
  const partEmissivity = commonEmissivity(parsed, materials);
  return {
    title: parsed.title ?? "",
    notes: parsed.notes ?? "",
    regions: parsed.part.regions.map((region) => fillRegion(region, parsed.start)),
    contacts: parsed.part.contacts ?? [],
    materials,
    start: parsed.start,
    stages: parsed.stages.map((stage, i) => fillStage(stage, i, partEmissivity)),
    probes: parsed.probes ?? [],
    questions: parsed.questions ?? [],
    accuracy: parsed.accuracy ?? DEFAULT_ACCURACY,
  };
}

function fillRegion(region: ParsedRegion, start: number): Region {
  return {
    name: region.name,
    material: region.material,
    outline: fillLoop(region.outline),
    holes: (region.holes ?? []).map(fillLoop),
    start: region.start ?? start,
    source: region.source ?? 0,
  };
}

function fillLoop(loop: ParsedLoop): Vertex[] {
  return loop.map(({ at, side, through }, i) => ({
    at,
    side: side ?? `side ${i + 1}`,
    ...(through ? { through } : {}),
  }));
}

function fillMaterial(material: ParsedMaterial, library: MaterialLibrary): Material {
  if (!("library" in material)) return { ...material, source: material.source ?? "" };
  const entry = library[material.library];
  if (!entry)
    throw new Error(`Material ${material.library} is not in the library; checkDocument should have said so.`);
  const { density, conductivity, heatCapacity, emissivity, latent } = entry;
  return {
    density,
    conductivity,
    heatCapacity,
    ...(emissivity === undefined ? {} : { emissivity }),
    ...(latent === undefined ? {} : { latent }),
    source: sourceLine(entry),
    library: material.library,
  };
}

function fillStage(stage: ParsedStage, index: number, partEmissivity: number | undefined): Stage {
  return {
    name: stage.name ?? `stage ${index + 1}`,
    lasts: stage.lasts ?? stage.atMost ?? 0,
    ...(stage.until ? { until: stage.until } : {}),
    ambient: stage.ambient,
    sides: mapValues(stage.sides, (condition) => fillCondition(condition, stage, partEmissivity)),
  };
}

function fillCondition(
  condition: ParsedCondition,
  stage: ParsedStage,
  partEmissivity: number | undefined,
): Condition {
  if (condition === "insulated") return { kind: "insulated" };
  if ("flux" in condition) return { kind: "flux", flux: condition.flux };
  if ("held" in condition) return { kind: "held", held: condition.held };
  const ambient = condition.ambient ?? stage.ambient;
  if (ambient === undefined) throw new Error("A film has no ambient; checkDocument should have said so.");
  const radiates = condition.surroundings !== undefined;
  return {
    kind: "film",
    film: condition.film,
    ambient,
    emissivity: condition.emissivity ?? (radiates ? (partEmissivity ?? 0) : 0),
    surroundings: condition.surroundings ?? ambient,
  };
}

/** The one emissivity of all the part's materials; undefined when they differ or none is given. */
export function commonEmissivity(
  parsed: ParsedCase,
  materials: Readonly<Record<string, Material>>,
): number | undefined {
  const all = new Set(parsed.part.regions.map((region) => materials[region.material]?.emissivity));
  return all.size === 1 ? [...all][0] : undefined;
}

function mapValues<T, U>(values: Readonly<Record<string, T>>, change: (value: T) => U): Record<string, U> {
  return Object.fromEntries(Object.entries(values).map(([key, value]) => [key, change(value)]));
}
