// Analysis of a pattern: everything about the factor that does not depend on values. One instance of this module
// holds one analysis; several factors and matrices may stand on it.
import { allocateInts, allocateReals, fillInts, getInt, mark, reset, setInt } from "./memory";
import { dissect } from "./dissection";
import { columnCounts, eliminationTree, postorder } from "./eliminationTree";
import { findSupernodes, listRows } from "./supernodes";

/** unknowns and supernodes */
export let size: i32 = 0;
export let supernodes: i32 = 0;
/** outer number of each inner one, n ints */
export let outerOf: usize = 0;
/** the pattern in the inner numbering, and the place of each entry in the pattern given */
export let rowStart: usize = 0;
export let columns: usize = 0;
export let source: usize = 0;
/** first column of each supernode, and n */
export let first: usize = 0;
/** rows below each supernode: list `rows` from rowsStart[s] to rowsStart[s + 1] */
export let rowsStart: usize = 0;
export let rows: usize = 0;
/** place of each of these rows in the front of the parent supernode (columns first, then its rows) */
export let placeInParent: usize = 0;
/** where the panel of each supernode begins in the values of a factor, and their number behind the last */
export let panelStart: usize = 0;
/** children of each supernode as a linked list, -1 at its end */
export let firstChild: usize = 0;
export let nextSibling: usize = 0;
/** for each entry of the lower triangle, row by row: its place in the values of a factor */
export let lowerStart: usize = 0;
export let panelPlace: usize = 0;
/** place on the stack of the update matrix of each supernode, during a factorization */
export let updateStart: usize = 0;
/** stack of update matrices, and work vectors of n values */
export let stack: usize = 0;
export let workX: usize = 0;
export let workY: usize = 0;

/** values of the largest stack, known after the analysis */
let stackLength: i32 = 0;
let innerOf: usize = 0;

/**
 * Analyse a pattern.
 *
 * @param pattern      row starts (n + 1 ints), columns (ascending, diagonal and both triangles)
 * @param coordinates  f64 pairs
 */
export function analyze(n: i32, patternStart: usize, patternColumns: usize, coordinates: usize): void {
  size = n;
  const entries = getInt(patternStart, n);
  outerOf = allocateInts(n);
  innerOf = allocateInts(n);
  rowStart = allocateInts(n + 1);
  columns = allocateInts(entries);
  source = allocateInts(entries);
  first = allocateInts(n + 1);
  rowsStart = allocateInts(n + 1);
  const parent = allocateInts(n);
  dissect(n, patternStart, patternColumns, coordinates, outerOf);
  invert(n);
  eliminationTree(n, patternStart, patternColumns, outerOf, innerOf, parent);
  postorder(n, outerOf, parent);
  invert(n);
  renumber(n, patternStart, patternColumns);
  const counts = innerOf; // no longer needed as the inverse
  columnCounts(n, rowStart, columns, parent, counts);
  supernodes = findSupernodes(n, parent, counts, first, rowsStart);
  const total = getInt(rowsStart, supernodes);
  rows = allocateInts(total);
  placeInParent = allocateInts(total);
  panelStart = allocateInts(supernodes + 1);
  firstChild = allocateInts(supernodes);
  nextSibling = allocateInts(supernodes);
  updateStart = allocateInts(supernodes);
  lowerStart = allocateInts(n + 1);
  panelPlace = allocateInts((entries - n) / 2 + n);
  const before = mark();
  const supernodeOf = allocateInts(n);
  listRows(n, supernodes, rowStart, columns, parent, first, rowsStart, supernodeOf, rows);
  layOut(supernodeOf);
  locateEntries(n, supernodeOf);
  reset(before);
  stack = allocateReals(stackLength);
  workX = allocateReals(n);
  workY = allocateReals(n);
}

function invert(n: i32): void {
  for (let i = 0; i < n; i++) setInt(innerOf, getInt(outerOf, i), i);
}

/** The pattern by inner number; rows come out ascending because columns are handed out in ascending order. */
function renumber(n: i32, patternStart: usize, patternColumns: usize): void {
  const before = mark();
  const next = allocateInts(n);
  let place = 0;
  for (let i = 0; i < n; i++) {
    const v = getInt(outerOf, i);
    setInt(rowStart, i, place);
    setInt(next, i, place);
    place += getInt(patternStart, v + 1) - getInt(patternStart, v);
  }
  setInt(rowStart, n, place);
  for (let j = 0; j < n; j++) {
    const v = getInt(outerOf, j);
    for (let q = getInt(patternStart, v), end = getInt(patternStart, v + 1); q < end; q++) {
      const i = getInt(innerOf, getInt(patternColumns, q));
      const at = getInt(next, i);
      setInt(next, i, at + 1);
      setInt(columns, at, j);
      setInt(source, at, q);
    }
  }
  reset(before);
}

/** Tree of supernodes, places of rows in the parent's front, panel offsets, and how high the stack grows. */
function layOut(supernodeOf: usize): void {
  fillInts(firstChild, supernodes, 255);
  let values = 0;
  let height = 0;
  stackLength = 0;
  for (let s = 0; s < supernodes; s++) {
    const begin = getInt(first, s);
    const width = getInt(first, s + 1) - begin;
    const from = getInt(rowsStart, s);
    const count = getInt(rowsStart, s + 1) - from;
    setInt(panelStart, s, values);
    values += (width + count) * width;
    let freed = 0;
    for (let c = getInt(firstChild, s); c >= 0; c = getInt(nextSibling, c)) {
      const childCount = getInt(rowsStart, c + 1) - getInt(rowsStart, c);
      freed += childCount * childCount;
      placeRows(c, begin, width, from);
    }
    stackLength = max(stackLength, height + count * count);
    height += count * count - freed;
    if (count == 0) continue;
    const parent = getInt(supernodeOf, getInt(rows, from));
    setInt(nextSibling, s, getInt(firstChild, parent));
    setInt(firstChild, parent, s);
  }
  setInt(panelStart, supernodes, values);
}

/** Both lists ascend: one walk finds the rows of child c in the front that has `width` columns from `begin`. */
function placeRows(c: i32, begin: i32, width: i32, parentRows: usize): void {
  let at = <i32>parentRows;
  for (let q = getInt(rowsStart, c), end = getInt(rowsStart, c + 1); q < end; q++) {
    const i = getInt(rows, q);
    if (i < begin + width) setInt(placeInParent, q, i - begin);
    else {
      while (getInt(rows, at) < i) at++;
      setInt(placeInParent, q, width + at - <i32>parentRows);
    }
  }
}

/** Place in the panels of each entry of the lower triangle. */
function locateEntries(n: i32, supernodeOf: usize): void {
  const before = mark();
  // Rows ascend, so the row list of each supernode is passed once from front to back.
  const reached = allocateInts(supernodes);
  for (let s = 0; s < supernodes; s++) setInt(reached, s, getInt(rowsStart, s));
  let place = 0;
  for (let i = 0; i < n; i++) {
    setInt(lowerStart, i, place);
    for (let q = getInt(rowStart, i); ; q++) {
      const j = getInt(columns, q);
      if (j > i) break;
      const s = getInt(supernodeOf, j);
      const begin = getInt(first, s);
      const width = getInt(first, s + 1) - begin;
      let row = i - begin;
      if (row >= width) {
        let at = getInt(reached, s);
        while (getInt(rows, at) < i) at++;
        setInt(reached, s, at);
        row = width + at - getInt(rowsStart, s);
      }
      setInt(panelPlace, place++, getInt(panelStart, s) + row * width + j - begin);
      if (j == i) break;
    }
  }
  setInt(lowerStart, n, place);
  reset(before);
}
