// Numeric phase: multifrontal Cholesky (Duff and Reid 1983; Liu 1992).
//
// A factor is one block of memory: n reciprocals of its diagonal, then the panels of all supernodes, row-major, columns
// of the supernode first, then its rows below.
import {
  first,
  firstChild,
  lowerStart,
  nextSibling,
  panelPlace,
  panelStart,
  placeInParent,
  rowStart,
  rowsStart,
  size,
  stack,
  supernodes,
  updateStart,
} from "./analysis";
import { factorPanel, failedColumn, subtractProductsTiled } from "./dense";
import { allocateReals, getInt, getReal, intAt, realAt, setInt, setReal } from "./memory";

/** A new, empty factor. */
export function newFactor(): usize {
  return allocateReals(size + 8 + getInt(panelStart, supernodes));
}
@inline export function panelsOf(factor: usize): usize {
  return (realAt(factor, size) + 63) & ~63;
}

/** first column that failed, in inner numbers */
export let failedUnknown: i32 = -1;

// A factorization goes in stretches, so that whoever waits for it can look up in between.
let nextSupernode: i32 = 0;
let stackTop: i32 = 0;
let workDone: f64 = 0;

export const FAILED: i32 = 0;
export const DONE: i32 = 1;
export const MORE: i32 = 2;

/** multiply-adds of the factorization so far, roughly */
export function factorizationWork(): f64 {
  return workDone;
}

/** Begin a numeric factorization of a matrix given by its values on the inner pattern. */
export function beginFactorization(factor: usize, values: usize): void {
  const panels = panelsOf(factor);
  memory.fill(panels, 0, <usize>getInt(panelStart, supernodes) << 3);
  scatterValues(factor, panels, values);
  nextSupernode = 0;
  stackTop = 0;
  workDone = 0;
}

/**
 * Go on with the factorization for about so many multiply-adds.
 *
 * @param least  share of its diagonal entry below which a pivot counts as zero
 * @returns FAILED when the matrix is not positive definite (see failedUnknown and the values in dense.ts), DONE or MORE
 */
export function continueFactorization(factor: usize, least: f64, work: f64): i32 {
  const panels = panelsOf(factor);
  const until = workDone + work;
  for (; nextSupernode < supernodes; nextSupernode++) {
    if (workDone >= until) return MORE;
    if (!eliminate(nextSupernode, factor, panels, least)) return FAILED;
  }
  return DONE;
}

/** Assemble and eliminate one front, and put its update matrix on the stack. */
function eliminate(s: i32, factor: usize, panels: usize, least: f64): bool {
  const begin = getInt(first, s);
  const width = getInt(first, s + 1) - begin;
  const count = getInt(rowsStart, s + 1) - getInt(rowsStart, s);
  const panel = realAt(panels, getInt(panelStart, s));
  const update = realAt(stack, stackTop);
  const bytes = <usize>(count * count) << 3;
  let base = stackTop;
  memory.fill(update, 0, bytes);
  for (let c = getInt(firstChild, s); c >= 0; c = getInt(nextSibling, c)) {
    base = min(base, getInt(updateStart, c));
    addChild(c, panel, width, update, count);
  }
  if (!factorPanel(panel, width + count, width, realAt(factor, begin), least)) {
    failedUnknown = begin + failedColumn;
    return false;
  }
  if (count > 0) {
    const stride = <usize>width << 3;
    const below = panel + stride * width;
    subtractProductsTiled(update, <usize>count << 3, below, count, below, count, stride, width, true);
    // The updates of the children are used up: move this one down to where they began.
    if (base < stackTop) memory.copy(realAt(stack, base), update, bytes);
  }
  setInt(updateStart, s, base);
  stackTop = base + count * count;
  workDone += 0.5 * <f64>width * <f64>(width + count) * <f64>(width + count);
  return true;
}

/** Values of the lower triangle to their places in the panels; the diagonal also to the reciprocals, as a yardstick. */
function scatterValues(factor: usize, panels: usize, values: usize): void {
  for (let i = 0; i < size; i++) {
    const begin = getInt(lowerStart, i);
    const count = getInt(lowerStart, i + 1) - begin;
    const from = realAt(values, getInt(rowStart, i));
    const places = intAt(panelPlace, begin);
    for (let k = 0; k < count; k++) setReal(panels, getInt(places, k), getReal(from, k));
    setReal(factor, i, getReal(from, count - 1));
  }
}

/** Add the update matrix of child c (lower triangle, row-major) into the front of its parent. */
function addChild(c: i32, panel: usize, width: i32, update: usize, count: i32): void {
  const start = getInt(rowsStart, c);
  const childCount = getInt(rowsStart, c + 1) - start;
  const places = intAt(placeInParent, start);
  let inPanel = 0;
  while (inPanel < childCount && getInt(places, inPanel) < width) inPanel++;
  let row = realAt(stack, getInt(updateStart, c));
  const rowBytes = <usize>childCount << 3;
  const panelBytes = <usize>width << 3;
  for (let a = 0; a < childCount; a++, row += rowBytes) {
    const place = getInt(places, a);
    const target = panel + panelBytes * place;
    const stop = min(a + 1, inPanel);
    for (let b = 0; b < stop; b++) {
      const at = realAt(target, getInt(places, b));
      store<f64>(at, load<f64>(at) + getReal(row, b));
    }
    if (a < inPanel) continue;
    // columns of the update matrix are counted behind those of the panel
    const other = update + ((<usize>count * (place - width)) << 3) - panelBytes;
    for (let b = inPanel; b <= a; b++) {
      const at = realAt(other, getInt(places, b));
      store<f64>(at, load<f64>(at) + getReal(row, b));
    }
  }
}
