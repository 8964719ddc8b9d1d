/**
 * Sparsity pattern of a symmetric matrix in compressed rows, both triangles stored. The pattern is built once from
 * the elements; values live in plain Float64Arrays of its length, are refilled in place and may be many (capacity,
 * conductance, their sums) on one pattern.
 */

export interface SparsityPattern {
  /** number of unknowns */
  readonly size: number;
  /** start of each row in `columns`, size + 1 values */
  readonly rowStart: Int32Array;
  /** column numbers, ascending in each row, diagonal and both triangles included */
  readonly columns: Int32Array;
  /** place of each diagonal entry in `columns` */
  readonly diagonal: Int32Array;
}

/** Elements of one kind: the unknowns of each, `perElement` after `perElement`. */
export interface ElementGroup {
  readonly nodes: Uint32Array;
  readonly perElement: number;
}

/**
 * Pattern in which every two unknowns of one element are coupled. Several groups (triangles, contact pairs) may be
 * given. Every unknown gets its diagonal entry, also one that no element names.
 *
 * @throws when an element names an unknown outside 0 .. size - 1
 */
export function patternFromElements(size: number, groups: readonly ElementGroup[]): SparsityPattern {
  const touching = groups.map((group) => elementsOfUnknowns(size, group));
  const rowStart = new Int32Array(size + 1);
  const lastRow = new Int32Array(size).fill(-1);
  let columns = new Int32Array(8 * size + 16);
  let end = 0;
  for (let row = 0; row < size; row++) {
    const begin = end;
    lastRow[row] = row;
    if (end === columns.length) columns = grown(columns);
    columns[end++] = row;
    for (let g = 0; g < groups.length; g++) {
      const { nodes, perElement } = groups[g]!;
      const { start, elements } = touching[g]!;
      for (let q = start[row]!; q < start[row + 1]!; q++) {
        const first = elements[q]! * perElement;
        for (let k = first; k < first + perElement; k++) {
          const column = nodes[k]!;
          if (lastRow[column] === row) continue;
          lastRow[column] = row;
          if (end === columns.length) columns = grown(columns);
          columns[end++] = column;
        }
      }
    }
    sortRange(columns, begin, end);
    rowStart[row + 1] = end;
  }
  return finishPattern(size, rowStart, columns.slice(0, end));
}

/** Pattern of the entries (rows[q], columns[q]), their mirror images and the diagonal; repeats are allowed. */
export function patternFromEntries(
  size: number,
  rows: ArrayLike<number>,
  columns: ArrayLike<number>,
): SparsityPattern {
  const nodes = new Uint32Array(2 * rows.length);
  for (let q = 0; q < rows.length; q++) {
    nodes[2 * q] = rows[q]!;
    nodes[2 * q + 1] = columns[q]!;
  }
  return patternFromElements(size, [{ nodes, perElement: 2 }]);
}

/**
 * Place in `columns` (and so in every array of values) of each entry of each element matrix, row by row:
 * perElement^2 places per element. Assembly then adds without searching.
 *
 * @throws when the pattern lacks a coupling that the elements need
 */
export function elementSlots(pattern: SparsityPattern, group: ElementGroup): Int32Array {
  const { nodes, perElement } = group;
  const slots = new Int32Array(nodes.length * perElement);
  let place = 0;
  for (let first = 0; first < nodes.length; first += perElement)
    for (let a = first; a < first + perElement; a++)
      for (let b = first; b < first + perElement; b++) slots[place++] = slotOf(pattern, nodes[a]!, nodes[b]!);
  return slots;
}

/** Place of one entry, by bisection of its row. @throws when the pattern has no such entry */
export function slotOf(pattern: SparsityPattern, row: number, column: number): number {
  const { rowStart, columns } = pattern;
  let low = rowStart[row]!;
  let high = rowStart[row + 1]! - 1;
  while (low < high) {
    const middle = (low + high) >> 1;
    if (columns[middle]! < column) low = middle + 1;
    else high = middle;
  }
  if (columns[low] !== column) throw new Error(`the pattern has no entry (${row}, ${column})`);
  return low;
}

/** out = A x; `out` must not be `x`. */
export function multiply(
  pattern: SparsityPattern,
  values: Float64Array,
  x: Float64Array,
  out: Float64Array,
): Float64Array {
  const { size, rowStart, columns } = pattern;
  let place = 0;
  for (let row = 0; row < size; row++) {
    const end = rowStart[row + 1]!;
    let sum = 0;
    for (; place < end; place++) sum += values[place]! * x[columns[place]!]!;
    out[row] = sum;
  }
  return out;
}

/**
 * Faults of a pattern, and of values on it when they are given: lengths, order and range of the columns, missing
 * diagonal, missing mirror image, values that are not finite or not symmetric to 1e-12 of the largest. An empty
 * list means sound.
 */
export function checkSparse(pattern: SparsityPattern, values?: Float64Array): string[] {
  const faults = patternFaults(pattern);
  if (faults.length > 0 || values === undefined) return faults;
  return valueFaults(pattern, values);
}

function patternFaults({ size, rowStart, columns, diagonal }: SparsityPattern): string[] {
  const faults: string[] = [];
  if (rowStart.length !== size + 1) faults.push(`rowStart has ${rowStart.length} values for ${size} rows`);
  if (diagonal.length !== size) faults.push(`diagonal has ${diagonal.length} values for ${size} rows`);
  if (rowStart[0] !== 0 || rowStart[size] !== columns.length)
    faults.push(`rowStart runs from ${rowStart[0]} to ${rowStart[size]}, columns has ${columns.length}`);
  if (faults.length > 0) return faults;
  const entries = new Set<number>();
  for (let row = 0; row < size; row++) {
    if (columns[diagonal[row]!] !== row) faults.push(`row ${row} has no diagonal entry where it should be`);
    for (let q = rowStart[row]!; q < rowStart[row + 1]!; q++) {
      const column = columns[q]!;
      if (column < 0 || column >= size) faults.push(`row ${row} names column ${column} of ${size}`);
      if (q > rowStart[row]! && columns[q - 1]! >= column)
        faults.push(`row ${row} is not ascending at ${column}`);
      entries.add(row * size + column);
    }
  }
  for (const entry of entries) {
    const row = Math.floor(entry / size);
    const column = entry % size;
    if (!entries.has(column * size + row)) faults.push(`entry (${row}, ${column}) has no mirror image`);
  }
  return faults;
}

function valueFaults(pattern: SparsityPattern, values: Float64Array): string[] {
  const { size, rowStart, columns } = pattern;
  if (values.length !== columns.length)
    return [`${values.length} values for ${columns.length} entries of the pattern`];
  const faults: string[] = [];
  const largest = values.reduce((most, value) => Math.max(most, Math.abs(value)), 0);
  if (!Number.isFinite(largest)) return ["some value is not a finite number"];
  for (let row = 0; row < size; row++)
    for (let q = rowStart[row]!; q < rowStart[row + 1]!; q++) {
      const column = columns[q]!;
      const mirror = values[slotOf(pattern, column, row)]!;
      if (column > row && Math.abs(values[q]! - mirror) > SYMMETRY_SLACK * largest)
        faults.push(`(${row}, ${column}) holds ${values[q]}, its mirror image ${mirror}`);
    }
  return faults;
}

/** Rounding in the sums of an assembly may differ between the two triangles by this share of the largest entry. */
const SYMMETRY_SLACK = 1e-12;

function finishPattern(size: number, rowStart: Int32Array, columns: Int32Array): SparsityPattern {
  const diagonal = new Int32Array(size);
  for (let row = 0; row < size; row++) {
    let q = rowStart[row]!;
    while (columns[q] !== row) q++;
    diagonal[row] = q;
  }
  return { size, rowStart, columns, diagonal };
}

/** For each unknown the elements that name it, in compressed form. */
function elementsOfUnknowns(size: number, { nodes, perElement }: ElementGroup) {
  const start = new Int32Array(size + 1);
  for (const node of nodes) {
    if (node >= size) throw new Error(`an element names unknown ${node}; there are ${size}`);
    start[node + 1]!++;
  }
  for (let i = 0; i < size; i++) start[i + 1]! += start[i]!;
  const next = start.slice(0, size);
  const elements = new Int32Array(nodes.length);
  for (let k = 0; k < nodes.length; k++) elements[next[nodes[k]!]!++] = Math.floor(k / perElement);
  return { start, elements };
}

/** Insertion sort: rows hold a dozen entries. */
function sortRange(list: Int32Array, begin: number, end: number): void {
  for (let i = begin + 1; i < end; i++) {
    const value = list[i]!;
    let j = i;
    for (; j > begin && list[j - 1]! > value; j--) list[j] = list[j - 1]!;
    list[j] = value;
  }
}

function grown(list: Int32Array): Int32Array<ArrayBuffer> {
  const longer = new Int32Array(2 * list.length);
  longer.set(list);
  return longer;
}
