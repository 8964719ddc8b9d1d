/** Reads what `corelag system` writes: Matrix Market files (NIST, "The Matrix Market Exchange Formats"). */
import { existsSync, readFileSync } from "node:fs";

export interface Entries {
  readonly size: number;
  readonly rows: Int32Array;
  readonly columns: Int32Array;
  readonly values: Float64Array;
}

/** A symmetric matrix in coordinate form, lower triangle stored. */
export function readSymmetric(file: string): Entries {
  const scan = open(file, "coordinate");
  const size = scan();
  if (scan() !== size) throw new Error(`${file}: the matrix is not square`);
  const count = scan();
  const rows = new Int32Array(count);
  const columns = new Int32Array(count);
  const values = new Float64Array(count);
  for (let q = 0; q < count; q++) {
    rows[q] = scan() - 1;
    columns[q] = scan() - 1;
    values[q] = scan();
  }
  return { size, rows, columns, values };
}

/** A dense array, column after column. */
export function readArray(file: string): { readonly rows: number; readonly values: Float64Array } {
  const scan = open(file, "array");
  const rows = scan();
  const columns = scan();
  return { rows, values: Float64Array.from({ length: rows * columns }, scan) };
}

export const readArrayIfThere = (file: string) => (existsSync(file) ? readArray(file) : undefined);

/** Numbers of the file one after the other, after its header and comments. */
function open(file: string, form: string): () => number {
  const bytes = readFileSync(file);
  let place = 0;
  const line = () => {
    const end = bytes.indexOf(10, place);
    const text = bytes.toString("latin1", place, end < 0 ? bytes.length : end);
    place = end < 0 ? bytes.length : end + 1;
    return text;
  };
  const header = line();
  if (!header.startsWith("%%MatrixMarket") || !header.includes(form))
    throw new Error(
      `${file}: a Matrix Market file of the ${form} form is needed, found "${header.slice(0, 60)}"`,
    );
  while (bytes[place] === 37) line();
  return () => {
    while (bytes[place]! <= 32) place++;
    const begin = place;
    while (place < bytes.length && bytes[place]! > 32) place++;
    if (begin === place) throw new Error(`${file}: ends too early`);
    return Number(bytes.toString("latin1", begin, place));
  };
}
