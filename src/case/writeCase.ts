/** Writes a case document as JSON for people: stable, indented, short entries on one line. */
import type { CaseDocument } from "./types.ts";

/** Columns that an entry on one line may reach. */
const WIDTH = 110;
const INDENT = "  ";

/**
 * The text of a case file. What a person wrote is kept as it is: order of the fields, units, spellings. Fields that
 * are undefined are left out.
 */
export function writeCase(document: CaseDocument): string {
  return `${write(document, "", 0)}\n`;
}

/** `before`: columns of the line that are taken already */
function write(value: unknown, indent: string, before: number): string {
  if (typeof value !== "object" || value === null) return JSON.stringify(value) ?? "null";
  if (isShort(value)) {
    const line = onOneLine(value);
    if (before + line.length <= WIDTH) return line;
  }
  const deeper = indent + INDENT;
  if (Array.isArray(value)) {
    const items = value.map((item) => deeper + write(item, deeper, deeper.length));
    return `[\n${items.join(",\n")}\n${indent}]`;
  }
  const members = entries(value).map(([key, item]) => {
    const start = `${deeper}${JSON.stringify(key)}: `;
    return start + write(item, deeper, start.length);
  });
  return `{\n${members.join(",\n")}\n${indent}}`;
}

/** Holds only plain values, pairs of them or one more plain object inside: reads well on one line. */
function isShort(value: object): boolean {
  const items = Array.isArray(value) ? value : entries(value).map(([, item]) => item);
  if (items.length === 0) return true;
  if (Array.isArray(value)) return items.every((item) => !isObject(item) && depth(item) <= 1);
  return items.every((item) => !isObject(item) && depth(item) <= 2);
}

function isObject(value: unknown): boolean {
  return typeof value === "object" && value !== null && !Array.isArray(value);
}

/** Nesting of lists; beyond any limit when an object is inside. */
function depth(value: unknown): number {
  if (isObject(value)) return Number.POSITIVE_INFINITY;
  return Array.isArray(value) ? 1 + Math.max(0, ...value.map(depth)) : 0;
}

function onOneLine(value: unknown): string {
  if (typeof value !== "object" || value === null) return JSON.stringify(value) ?? "null";
  if (Array.isArray(value)) return `[${value.map(onOneLine).join(", ")}]`;
  const members = entries(value).map(([key, item]) => `${JSON.stringify(key)}: ${onOneLine(item)}`);
  return members.length === 0 ? "{}" : `{ ${members.join(", ")} }`;
}

function entries(value: object): [string, unknown][] {
  return Object.entries(value).filter(([, item]) => item !== undefined);
}
