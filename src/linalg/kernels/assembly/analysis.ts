// Analysis of a pattern: everything about the factor that does not depend on values. One instance of this module
// holds one analysis; several factors and matrices may stand on it.
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
import { dissect } from "./dissection";
import { numberAlongStrips } from "./strips";
import { columnCounts, eliminationTree, postorder } from "./eliminationTree";
import { findSupernodes, listRows } from "./supernodes";

/** unknowns and supernodes */
export let size: i32 = 0;
export let supernodes: i32 = 0;
/** outer number of each inner one and inner number of each outer one, n ints each */
export let outerOf: usize = 0;
export let innerOf: usize = 0;
/** the pattern in the inner numbering, and the place of each entry in the pattern given */
export let rowStart: usize = 0;
export let columns: usize = 0;
export let source: usize = 0;
/** place of each diagonal entry in the inner pattern */
export let diagonal: usize = 0;
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
  diagonal = allocateInts(n);
  rowStart = allocateInts(n + 1);
  columns = allocateInts(entries);
  source = allocateInts(entries);
  first = allocateInts(n + 1);
  rowsStart = allocateInts(n + 1);
  const parent = allocateInts(n);
  order(n, entries, patternStart, patternColumns, coordinates, parent);
  const counts = allocateInts(n);
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

/**
 * The inner numbering, the pattern in it, and the elimination tree. Points are first numbered along strips, whatever
 * numbering they come in: every later pass then finds neighbours in the cache.
 */
function order(
  n: i32,
  entries: i32,
  patternStart: usize,
  patternColumns: usize,
  coordinates: usize,
  parent: usize,
): void {
  const before = mark();
  const strips = allocateInts(n);
  const inverse = allocateInts(n);
  const stripStart = allocateInts(n + 1);
  const stripColumns = allocateInts(entries);
  // `source` is free until the end: until then it takes the places in the strip pattern, which nobody needs.
  const stripCoordinates = allocateReals(2 * n);
  const own = allocateInts(n);
  numberAlongStrips(n, coordinates, strips);
  invert(n, strips, inverse);
  for (let i = 0; i < n; i++) {
    const v = getInt(strips, i);
    setReal(stripCoordinates, 2 * i, getReal(coordinates, 2 * v));
    setReal(stripCoordinates, 2 * i + 1, getReal(coordinates, 2 * v + 1));
  }
  renumber(n, patternStart, patternColumns, strips, inverse, stripStart, stripColumns, source);
  dissect(n, stripStart, stripColumns, stripCoordinates, own);
  invert(n, own, inverse);
  eliminationTree(n, stripStart, stripColumns, own, inverse, parent);
  postorder(n, own, parent);
  for (let i = 0; i < n; i++) setInt(outerOf, i, getInt(strips, getInt(own, i)));
  invert(n, outerOf, innerOf);
  renumber(n, patternStart, patternColumns, outerOf, innerOf, rowStart, columns, source);
  reset(before);
}

function invert(n: i32, list: usize, out: usize): void {
  for (let i = 0; i < n; i++) setInt(out, getInt(list, i), i);
}

/**
 * A pattern renumbered; rows come out ascending because columns are handed out in ascending order.
 *
 * @param list     old number of each new one
 * @param inverse  new number of each old one
 * @param places   out: old place of each new entry
 */
function renumber(
  n: i32,
  oldStart: usize,
  oldColumns: usize,
  list: usize,
  inverse: usize,
  newStart: usize,
  newColumns: usize,
  places: usize,
): void {
  const before = mark();
  const next = allocateInts(n);
  let place = 0;
  for (let i = 0; i < n; i++) {
    const v = getInt(list, i);
    setInt(newStart, i, place);
    setInt(next, i, place);
    place += getInt(oldStart, v + 1) - getInt(oldStart, v);
  }
  setInt(newStart, n, place);
  for (let j = 0; j < n; j++) {
    const v = getInt(list, j);
    for (let q = getInt(oldStart, v), end = getInt(oldStart, v + 1); q < end; q++) {
      const i = getInt(inverse, getInt(oldColumns, q));
      const at = getInt(next, i);
      setInt(next, i, at + 1);
      setInt(newColumns, at, j);
      setInt(places, at, q);
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
      if (j == i) {
        setInt(diagonal, i, q);
        break;
      }
    }
  }
  setInt(lowerStart, n, place);
  reset(before);
}
