// Supernodes: runs of columns of the factor with (nearly) the same rows, stored and worked on as dense panels.
import {
  allocateInts,
  allocateReals,
  fillInts,
  getInt,
  getReal,
  mark,
  reset,
  setInt,
  setReal,
} from "./memory";

/**
 * A supernode is merged with its last child as long as few zeros come along: panels get wider and fewer, which is
 * worth storing some zeros. Shares of zeros in the merged panel that are accepted, by its width.
 */
function mayMerge(width: i32, zeros: f64, size: f64): bool {
  const share = zeros / size;
  if (zeros == 0) return true;
  if (width <= 4) return share < 0.6;
  if (width <= 16) return share < 0.25;
  if (width <= 48) return share < 0.1;
  return share < 0.05;
}

/** entries of the factor without the zeros of merging, and multiply-adds of its computation */
export let factorEntries: f64 = 0;
export let factorWork: f64 = 0;

/**
 * Cut the columns into supernodes.
 *
 * @param parent     elimination tree in postorder
 * @param counts     entries per column, diagonal included
 * @param first      out: first column of each supernode, and n behind the last: room for n + 1
 * @param rowsStart  out: where the list of rows below each supernode begins: room for n + 1
 * @returns the number of supernodes
 */
export function findSupernodes(n: i32, parent: usize, counts: usize, first: usize, rowsStart: usize): i32 {
  const before = mark();
  const children = allocateInts(n);
  fillInts(children, n, 0);
  factorEntries = 0;
  factorWork = 0;
  for (let j = 0; j < n; j++) {
    const p = getInt(parent, j);
    if (p >= 0) setInt(children, p, getInt(children, p) + 1);
    const count = <f64>getInt(counts, j);
    factorEntries += count;
    factorWork += count * count;
  }
  const end = allocateInts(n);
  let total = 0;
  for (let j = 0; j < n; j++) {
    const continues =
      j > 0 &&
      getInt(parent, j - 1) == j &&
      getInt(counts, j - 1) == getInt(counts, j) + 1 &&
      getInt(children, j) == 1;
    if (!continues) setInt(first, total++, j);
    setInt(end, total - 1, j + 1);
  }
  total = mergeSupernodes(total, parent, counts, first, end, rowsStart);
  setInt(first, total, n);
  reset(before);
  return total;
}

/** Merge along last children, front to back, compacting as it goes: `top` supernodes stand finished. */
function mergeSupernodes(
  total: i32,
  parent: usize,
  counts: usize,
  first: usize,
  end: usize,
  rowsStart: usize,
): i32 {
  const before = mark();
  const below = allocateInts(total);
  const zeros = allocateReals(total);
  let top = 0;
  for (let s = 0; s < total; s++) {
    let begin = getInt(first, s);
    const stop = getInt(end, s);
    const rows = getInt(counts, begin) - (stop - begin);
    let padding: f64 = 0;
    while (top > 0) {
      const c = top - 1;
      const child = getInt(first, c);
      const p = getInt(parent, begin - 1);
      if (p < begin || p >= stop) break;
      const width = stop - begin;
      const childWidth = begin - child;
      const all = <f64>(width + childWidth);
      const merged = getReal(zeros, c) + padding + <f64>childWidth * <f64>(width + rows - getInt(below, c));
      if (!mayMerge(width + childWidth, merged, all * <f64>rows + (all * (all + 1)) / 2)) break;
      begin = child;
      padding = merged;
      top--;
    }
    setInt(first, top, begin);
    setInt(below, top, rows);
    setReal(zeros, top, padding);
    top++;
  }
  let start = 0;
  for (let s = 0; s < top; s++) {
    setInt(rowsStart, s, start);
    start += getInt(below, s);
  }
  setInt(rowsStart, top, start);
  reset(before);
  return top;
}

/**
 * Rows below each supernode, ascending: row i belongs to every supernode on the way from an entry (i, j) of the
 * matrix up the tree to the supernode of i. Rows come in ascending order, so the lists need no sorting.
 *
 * @param supernodeOf  out: supernode of each column
 * @param rows         out: the lists, one after the other
 */
export function listRows(
  n: i32,
  total: i32,
  rowStart: usize,
  columns: usize,
  parent: usize,
  first: usize,
  rowsStart: usize,
  supernodeOf: usize,
  rows: usize,
): void {
  const before = mark();
  const next = allocateInts(total);
  const seen = allocateInts(total);
  const up = allocateInts(total);
  for (let s = 0; s < total; s++)
    for (let j = getInt(first, s), stop = getInt(first, s + 1); j < stop; j++) setInt(supernodeOf, j, s);
  for (let s = 0; s < total; s++) {
    const p = getInt(parent, getInt(first, s + 1) - 1);
    setInt(up, s, p < 0 ? total : getInt(supernodeOf, p));
    setInt(next, s, getInt(rowsStart, s));
    setInt(seen, s, -1);
  }
  for (let i = 0; i < n; i++) {
    const own = getInt(supernodeOf, i);
    for (let q = getInt(rowStart, i); ; q++) {
      const j = getInt(columns, q);
      if (j >= i) break;
      for (let s = getInt(supernodeOf, j); s < own && getInt(seen, s) != i; s = getInt(up, s)) {
        setInt(seen, s, i);
        const place = getInt(next, s);
        setInt(rows, place, i);
        setInt(next, s, place + 1);
      }
    }
  }
  reset(before);
}
