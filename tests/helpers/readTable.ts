import { readFileSync } from "node:fs";
import { fileURLToPath } from "node:url";

/** One row of a table of tests/data, by column name. */
export type TableRow = Readonly<Record<string, string>>;

/** A comma separated table of tests/data: first line names the columns, fields may be quoted. */
export function readTable(name: string): TableRow[] {
  const path = fileURLToPath(new URL(`../data/${name}.csv`, import.meta.url));
  const lines = readFileSync(path, "utf8").split(/\r?\n/).filter(Boolean);
  const columns = splitFields(lines[0]!);
  return lines.slice(1).map((line) => {
    const fields = splitFields(line);
    if (fields.length !== columns.length)
      throw new Error(`${name}: ${fields.length} fields where ${columns.length} are named: ${line}`);
    return Object.fromEntries(columns.map((column, i) => [column, fields[i]!]));
  });
}

/** A field of a table as a number; "inf" is infinite. Throws where it is none. */
export function numberIn(row: TableRow, column: string): number {
  const text = row[column];
  const value = text === "inf" ? Infinity : text ? Number(text) : NaN;
  if (Number.isNaN(value)) throw new Error(`No number in column ${column}: ${JSON.stringify(row)}`);
  return value;
}

function splitFields(line: string): string[] {
  const fields = line.match(/("([^"]|"")*"|[^,]*)(,|$)/g)!.map((field) => field.replace(/,$/, ""));
  if (!line.endsWith(",")) fields.pop();
  return fields.map((field) => (field.startsWith('"') ? field.slice(1, -1).replaceAll('""', '"') : field));
}
