/**
 * What has to hold between the fields of a document: names that exist and are not doubled, stages that end, films
 * that have an ambient. The checks take the raw document, so that they speak also when some value elsewhere is
 * faulty, and keep quiet about shapes: those are the schema's matter.
 */
import { MOST_VERTICES } from "./defaults.ts";
import type { MaterialLibrary } from "./library.ts";
import { pathText, spokenPlace } from "./path.ts";
import type { PathStep } from "./path.ts";
import { listed, nearest } from "./similar.ts";
import type { CaseProblem } from "./types.ts";
import { parseQuantity } from "./units.ts";

/** Places that a question can name besides the probes. */
export const WHERE_WORDS = [
  "every-point",
  "any-point",
  "mean",
  "surface-mean",
  "coldest",
  "hottest",
] as const;
/** The side name that stands for every exposed side not named. */
export const EVERY_SIDE = "*";

type Loose = Record<string, unknown>;
const record = (value: unknown): Loose =>
  typeof value === "object" && value !== null && !Array.isArray(value) ? (value as Loose) : {};
const list = (value: unknown): unknown[] => (Array.isArray(value) ? value : []);
const nameOf = (value: unknown): string | undefined => {
  const name = record(value)["name"];
  return typeof name === "string" && name !== "" ? name : undefined;
};

/** Every fault between fields, in the order of the document. */
export function checkDocument(document: unknown, library: MaterialLibrary): CaseProblem[] {
  const check = new DocumentCheck(record(document), library);
  check.regions();
  check.contacts();
  check.materials();
  check.stages();
  check.probes();
  check.questions();
  return check.problems;
}

/** Holds the document and collects the problems. */
class DocumentCheck {
  readonly problems: CaseProblem[] = [];
  private readonly document: Loose;
  private readonly library: MaterialLibrary;
  private readonly regionList: unknown[];

  constructor(document: Loose, library: MaterialLibrary) {
    this.document = document;
    this.library = library;
    this.regionList = list(record(document["part"])["regions"]);
  }

  private add(code: string, path: readonly PathStep[], message: string, mend: string): void {
    this.problems.push({ code, path: pathText(path), message, mend });
  }
  private place(path: readonly PathStep[]): string {
    return spokenPlace(this.document, path);
  }

  /** "Did you mean", else the names there are. */
  private meant(written: string, names: readonly string[], none: string): string {
    if (names.length === 0) return none;
    const near = nearest(written, names);
    return near === undefined ? `Use ${listed(names)}.` : `Did you mean "${near}"?`;
  }

  regions(): void {
    this.doubled(this.regionList, ["part", "regions"], "region");
    const materials = Object.keys(record(this.document["materials"]));
    let vertices = 0;
    this.regionList.forEach((entry, i) => {
      const region = record(entry);
      for (const loop of [region["outline"], ...list(region["holes"])]) vertices += list(loop).length;
      const material = region["material"];
      if (typeof material !== "string" || material === "" || materials.includes(material)) return;
      const path = ["part", "regions", i, "material"];
      this.add(
        "no-such-material",
        path,
        `${this.place(path)} is made of "${material}", which is not among the materials.`,
        this.meant(material, materials, `Add "${material}" to "materials".`),
      );
    });
    if (vertices <= MOST_VERTICES) return;
    this.add(
      "too-many-points",
      ["part", "regions"],
      `The outlines have ${vertices} points; at most ${MOST_VERTICES} are taken.`,
      "Thin the outlines out, and use arcs for curves.",
    );
  }

  private doubled(entries: unknown[], path: readonly PathStep[], kind: string): void {
    const first = new Map<string, number>();
    entries.forEach((entry, i) => {
      const name = nameOf(entry);
      if (name === undefined) return;
      const before = first.get(name);
      if (before === undefined) first.set(name, i);
      else
        this.add(
          "name-doubled",
          [...path, i, "name"],
          `The name "${name}" is used by ${kind} ${before + 1} and ${kind} ${i + 1}.`,
          "Give one of them another name.",
        );
    });
  }

  contacts(): void {
    const names = this.regionList.flatMap((region) => nameOf(region) ?? []);
    const pairs = new Set<string>();
    list(record(this.document["part"])["contacts"]).forEach((entry, i) => {
      const path = ["part", "contacts", i, "between"];
      const between = list(record(entry)["between"]).filter((name) => typeof name === "string");
      between.forEach((name, k) => {
        if (name === "" || names.includes(name)) return;
        this.add(
          "no-such-region",
          [...path, k],
          `${this.place(path)} names the region "${name}", which does not exist.`,
          this.meant(name, names, "Add the region."),
        );
      });
      if (between.length !== 2) return;
      if (between[0] === between[1]) {
        this.add(
          "contact-with-itself",
          path,
          `${this.place(path)} joins "${between[0]}" with itself.`,
          "Name two different regions.",
        );
      }
      const pair = JSON.stringify([...between].sort());
      if (pairs.has(pair))
        this.add(
          "contact-doubled",
          path,
          `The contact between ${listed(between).replace(" or ", " and ")} is given twice.`,
          "Keep one of them.",
        );
      pairs.add(pair);
    });
  }

  materials(): void {
    for (const [name, entry] of Object.entries(record(this.document["materials"]))) {
      const wanted = record(entry)["library"];
      if (typeof wanted !== "string" || wanted === "" || Object.hasOwn(this.library, wanted)) continue;
      this.add(
        "not-in-library",
        ["materials", name, "library"],
        `Material "${name}" asks the library for "${wanted}", which it does not have.`,
        this.meant(wanted, Object.keys(this.library), "Give the values instead."),
      );
    }
  }

  stages(): void {
    const stages = list(this.document["stages"]);
    this.doubled(stages, ["stages"], "stage");
    const sides = this.sideNames();
    stages.forEach((entry, i) => {
      const stage = record(entry);
      this.duration(stage, ["stages", i]);
      const until = stage["until"];
      if (until !== undefined) this.where(record(until)["where"], ["stages", i, "until", "where"]);
      for (const [name, condition] of Object.entries(record(stage["sides"]))) {
        this.side(name, sides, ["stages", i, "sides", name]);
        this.film(record(condition), stage, ["stages", i, "sides", name]);
      }
    });
  }

  private duration(stage: Loose, path: readonly PathStep[]): void {
    const has = (field: string): boolean => stage[field] !== undefined;
    const place = this.place(path);
    if (has("lasts") && (has("until") || has("atMost"))) {
      this.add(
        "two-durations",
        [...path, "lasts"],
        `${place} says both how long it lasts and "${has("until") ? "until" : "atMost"}".`,
        'Keep "lasts" alone, or "until" with "atMost".',
      );
    } else if (!has("lasts") && !has("until") && !has("atMost")) {
      this.add(
        "missing",
        [...path, "lasts"],
        `${place} does not say how long it lasts.`,
        'Give "lasts", for example "4 h"; or "until" with "atMost".',
      );
    } else if (has("until") && !has("atMost")) {
      this.add(
        "missing",
        [...path, "atMost"],
        `${place} waits until a temperature is reached, but for how long at most is not said.`,
        'Give "atMost", for example "24 h".',
      );
    } else if (has("atMost") && !has("until")) {
      this.add(
        "missing",
        [...path, "until"],
        `${place} has "atMost" without "until".`,
        'Give "until": { "where", "reaches" }, or write "lasts".',
      );
    }
  }

  private side(name: string, sides: ReadonlyMap<string, boolean>, path: readonly PathStep[]): void {
    if (name === EVERY_SIDE) return;
    const onAxisOnly = sides.get(name);
    if (onAxisOnly === true) {
      this.add(
        "condition-on-axis",
        path,
        `${this.place(path)} lies on the axis, which takes no condition.`,
        "Take the condition out: nothing passes through the axis.",
      );
    } else if (onAxisOnly === undefined) {
      this.add(
        "no-such-side",
        path,
        `${this.place(path)} does not exist in the part.`,
        this.meant(
          name,
          [...sides.keys()].filter((key) => sides.get(key) === false),
          'Name a side of the outline, or use "*".',
        ),
      );
    }
  }

  /** Side names of all loops; true where every side of that name lies on the axis. */
  private sideNames(): Map<string, boolean> {
    const names = new Map<string, boolean>();
    for (const entry of this.regionList) {
      const region = record(entry);
      for (const loop of [region["outline"], ...list(region["holes"])]) {
        const vertices = list(loop).map(record);
        vertices.forEach((vertex, i) => {
          const next = vertices[(i + 1) % vertices.length] ?? {};
          const name = typeof vertex["side"] === "string" ? vertex["side"] : `side ${i + 1}`;
          const onAxis = vertex["through"] === undefined && isOnAxis(vertex) && isOnAxis(next);
          names.set(name, (names.get(name) ?? true) && onAxis);
        });
      }
    }
    return names;
  }

  private film(condition: Loose, stage: Loose, path: readonly PathStep[]): void {
    if (
      condition["film"] === undefined ||
      condition["ambient"] !== undefined ||
      stage["ambient"] !== undefined
    )
      return;
    this.add(
      "no-ambient",
      path,
      `${this.place(path)} has a film, but neither it nor the stage says the temperature of the air or bath.`,
      'Give "ambient" in the stage or in the condition, for example 25.',
    );
  }

  private where(where: unknown, path: readonly PathStep[]): void {
    if (typeof where !== "string" || where === "") return;
    const probes = list(this.document["probes"]).flatMap((probe) => nameOf(probe) ?? []);
    const words = [...WHERE_WORDS, ...probes];
    if (words.includes(where)) return;
    this.add(
      "no-such-place",
      path,
      `${this.place(path.slice(0, 2))} looks at "${where}", which is neither a probe nor one of the places that are always there.`,
      this.meant(where, words, ""),
    );
  }

  probes(): void {
    const probes = list(this.document["probes"]);
    this.doubled(probes, ["probes"], "probe");
    probes.forEach((probe, i) => {
      const name = nameOf(probe);
      if (name === undefined || !(WHERE_WORDS as readonly string[]).includes(name)) return;
      this.add(
        "name-reserved",
        ["probes", i, "name"],
        `Probe ${i + 1} is called "${name}", which already means a place of the part.`,
        "Give the probe another name.",
      );
    });
  }

  questions(): void {
    const stages = list(this.document["stages"]).map((stage, i) => nameOf(stage) ?? `stage ${i + 1}`);
    list(this.document["questions"]).forEach((entry, i) => {
      const question = record(entry);
      this.where(question["where"], ["questions", i, "where"]);
      const stage = question["stage"];
      if (typeof stage !== "string" || stage === "" || stages.includes(stage)) return;
      this.add(
        "no-such-stage",
        ["questions", i, "stage"],
        `Question ${i + 1} asks about the stage "${stage}", which does not exist.`,
        this.meant(stage, stages, "Add the stage."),
      );
    });
  }
}

function isOnAxis(vertex: Loose): boolean {
  const r = list(vertex["at"])[0];
  if (typeof r !== "string" && typeof r !== "number") return false;
  const read = parseQuantity(r, "length");
  return "value" in read && read.value === 0;
}
