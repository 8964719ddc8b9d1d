/** Opening and saving case files: what can stand on the sheet is laid there, faults and all; the rest is told. */
import type { MaterialLibrary } from "../case/library.ts";
import { readCase } from "../case/readCase.ts";
import type { CaseDocument } from "../case/types.ts";
import { writeCase } from "../case/writeCase.ts";
import { download } from "./download.ts";
import { stem } from "./pane/files.ts";

export type Opened = { readonly document: CaseDocument } | { readonly refused: string };

/** A file that somebody opened: a case, or the reason why it is none. */
export function openText(text: string, name: string, library: MaterialLibrary): Opened {
  const read = readCase(text, library);
  if ("case" in read) return { document: read.document };
  const lenient = standable(text);
  if (lenient) return { document: lenient };
  const [first] = read.problems;
  return {
    refused: `${name} was not opened. ${first?.message ?? "It is not a case."} ${first?.mend ?? ""}`.trim(),
  };
}

/** A faulty document that can be drawn all the same, so that its faults are shown at their place. */
function standable(text: string): CaseDocument | null {
  let value: unknown;
  try {
    value = JSON.parse(text.replace(/^\ufeff/, ""));
  } catch {
    return null;
  }
  return isStandable(value) ? value : null;
}

type Loose = Record<string, unknown>;
const isObject = (value: unknown): value is Loose =>
  typeof value === "object" && value !== null && !Array.isArray(value);
const isPair = (value: unknown): boolean => Array.isArray(value) && value.length === 2;
const isLoop = (value: unknown): boolean =>
  Array.isArray(value) &&
  value.every(
    (vertex) =>
      isObject(vertex) &&
      isPair(vertex["at"]) &&
      (vertex["through"] === undefined || isPair(vertex["through"])),
  );

export function isStandable(value: unknown): value is CaseDocument {
  if (!isObject(value) || value["corelag"] !== 1 || !isObject(value["part"]) || !isObject(value["materials"]))
    return false;
  const { regions } = value["part"];
  const { stages, probes, questions } = value;
  return (
    Array.isArray(regions) &&
    regions.length > 0 &&
    regions.every(
      (region) =>
        isObject(region) &&
        typeof region["name"] === "string" &&
        typeof region["material"] === "string" &&
        isLoop(region["outline"]) &&
        (region["holes"] === undefined || (Array.isArray(region["holes"]) && region["holes"].every(isLoop))),
    ) &&
    Array.isArray(stages) &&
    stages.every((stage) => isObject(stage) && isObject(stage["sides"])) &&
    Object.values(value["materials"]).every(isObject) &&
    (probes === undefined ||
      (Array.isArray(probes) && probes.every((probe) => isObject(probe) && isPair(probe["at"])))) &&
    (questions === undefined || (Array.isArray(questions) && questions.every(isObject)))
  );
}

/** Hands the case over as a file. */
export function saveDocument(document: CaseDocument): void {
  download(
    new Blob([writeCase(document)], { type: "application/json" }),
    `${stem(document.title ?? "")}.json`,
  );
}
