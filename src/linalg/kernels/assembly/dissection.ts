// Nested dissection (George 1973) with the help of coordinates: cut the points in two by a straight line, take out
// the fewest points whose removal separates the halves, number them last, go on with each half.
//
// - The cut is the best of a grid of lines (cut.ts).
// - The separator is a minimum vertex cover of the links that cross the line, by augmenting paths (Koenig's theorem).
// - Pieces of at most LEAF points are ordered by minimum degree (minimumDegree.ts).
//
// Coordinates are whole numbers on a fine grid, and each point travels as one record, so that every pass over a piece
// reads memory in order and bins are found by shifting.
import { allocate, allocateInts, fillInts, getInt, getReal, mark, reset, setInt } from "./memory";
import { axis, chooseCut, line, prepareCuts } from "./cut";
import { LEAF, orderLeaf, prepareLeaves } from "./minimumDegree";
import { HIGH, LOW, NUMBER, OWN, RECORD } from "./records";

/** steps of the grid across the longer side of the box */
const GRID: f64 = 8388608;

let rowStart: usize = 0;
let columns: usize = 0;
/** r, z pairs by point number: the same values as in the records */
let places: usize = 0;
let records: usize = 0;
/** by point number: 1 when it lies in some separator already */
let removed: usize = 0;
/** by point number: partner in the matching, or local number in a leaf; -1 outside */
let partner: usize = 0;
let visited: usize = 0;
let visit: i32 = 0;
/** boundary points below the line in use, and above it */
let boundaryBelow: usize = 0;
let boundaryAbove: usize = 0;
let below: i32 = 0;
let above: i32 = 0;
let order: usize = 0;

// Boxes of the points below and above, found while they are parted: lowest r, z and highest r, z.
let boxBelow: v128 = i32x4.splat(0);
let boxAbove: v128 = i32x4.splat(0);

/**
 * Order of elimination of n points.
 *
 * @param coordinates  f64 pairs
 * @param out          n ints: point number of each place in the order
 */
export function dissect(n: i32, rowStart_: usize, columns_: usize, coordinates: usize, out: usize): void {
  const before = mark();
  rowStart = rowStart_;
  columns = columns_;
  order = out;
  places = allocateInts(2 * n);
  records = allocate(<usize>n * RECORD);
  removed = allocate(n);
  partner = allocateInts(n);
  visited = allocateInts(n);
  boundaryBelow = allocateInts(n);
  boundaryAbove = allocateInts(n);
  prepareCuts();
  prepareLeaves();
  memory.fill(removed, 0, n);
  fillInts(partner, n, 255);
  fillInts(visited, n, 0);
  visit = 0;
  divide(0, n, fillRecords(n, coordinates));
  reset(before);
}

/** Coordinates to the grid, and the records in the order of the points; returns the box of all. */
function fillRecords(n: i32, coordinates: usize): v128 {
  let left = Infinity;
  let right = -Infinity;
  let bottom = Infinity;
  let top = -Infinity;
  for (let v = 0; v < n; v++) {
    const r = getReal(coordinates, 2 * v);
    const z = getReal(coordinates, 2 * v + 1);
    left = min(left, r);
    right = max(right, r);
    bottom = min(bottom, z);
    top = max(top, z);
  }
  const extent = max(right - left, top - bottom);
  const scale = extent > 0 ? GRID / extent : 0;
  for (let v = 0; v < n; v++) {
    setInt(places, 2 * v, <i32>((getReal(coordinates, 2 * v) - left) * scale));
    setInt(places, 2 * v + 1, <i32>((getReal(coordinates, 2 * v + 1) - bottom) * scale));
  }
  for (let v = 0; v < n; v++) {
    const own = v128.load64_splat(placeOf(v));
    let low = own;
    let high = own;
    for (let q = getInt(rowStart, v), end = getInt(rowStart, v + 1); q < end; q++) {
      const other = v128.load64_splat(placeOf(getInt(columns, q)));
      low = i32x4.min_s(low, other);
      high = i32x4.max_s(high, other);
    }
    const record = recordAt(v);
    v128.store(record, v128.shuffle<i64>(low, high, 0, 2));
    v128.store(record, i32x4.replace_lane(own, 2, v), 16);
  }
  return i32x4(0, 0, <i32>((right - left) * scale), <i32>((top - bottom) * scale));
}

@inline function recordAt(i: i32): usize {
  return records + <usize>i * RECORD;
}
@inline function placeOf(v: i32): usize {
  return places + (<usize>v << 3);
}
@inline function idAt(i: i32): i32 {
  return load<i32>(recordAt(i), NUMBER);
}
@inline function swapRecords(i: i32, j: i32): void {
  const a = recordAt(i);
  const b = recordAt(j);
  const x = v128.load(a);
  const y = v128.load(a, 16);
  v128.store(a, v128.load(b));
  v128.store(a, v128.load(b, 16), 16);
  v128.store(b, x);
  v128.store(b, y, 16);
}
@inline function isRemoved(v: i32): bool {
  return load<u8>(removed + v) != 0;
}

/** Order the records lo .. hi - 1, which lie in `box`, into the same places of `order`. */
function divide(lo: i32, hi: i32, box: v128): void {
  if (hi - lo <= LEAF) {
    orderLeaf(records, lo, hi, rowStart, columns, partner, order);
    return;
  }
  if (!chooseCut(records, lo, hi, box)) {
    // All points in one place: no line parts them.
    for (let i = lo; i < hi; i++) setInt(order, i, idAt(i));
    return;
  }
  const middle = partition(lo, hi);
  const lower = boxBelow;
  const upper = boxAbove;
  match();
  const begin = hi - markCover();
  const half = moveCoverLast(lo, middle, hi);
  sortAlongCut(begin, hi);
  for (let i = begin; i < hi; i++) setInt(order, i, idAt(i));
  divide(lo, half, lower);
  divide(half, begin, upper);
}

// --- the two sides ---------------------------------------------------------------------------------------------------

/**
 * Records below the line first. On the way the boxes of both sides and the points linked across the line are found.
 *
 * @returns where the points above begin
 */
function partition(lo: i32, hi: i32): i32 {
  const own = OWN + (axis << 2);
  let lowBelow = i32x4.splat(i32.MAX_VALUE);
  let highBelow = i32x4.splat(i32.MIN_VALUE);
  let lowAbove = lowBelow;
  let highAbove = highBelow;
  let i = lo;
  let j = hi - 1;
  below = 0;
  above = 0;
  for (; i <= j; ) {
    let record = recordAt(i);
    while (i <= j && load<i32>(record + own) < line) {
      const place = v128.load(record, OWN);
      lowBelow = i32x4.min_s(lowBelow, place);
      highBelow = i32x4.max_s(highBelow, place);
      if (load<i32>(record + HIGH + (axis << 2)) >= line) noteBelow(load<i32>(record, NUMBER));
      record = recordAt(++i);
    }
    record = recordAt(j);
    while (i <= j && load<i32>(record + own) >= line) {
      const place = v128.load(record, OWN);
      lowAbove = i32x4.min_s(lowAbove, place);
      highAbove = i32x4.max_s(highAbove, place);
      if (load<i32>(record + LOW + (axis << 2)) < line) noteAbove(load<i32>(record, NUMBER));
      record = recordAt(--j);
    }
    if (i < j) swapRecords(i, j);
  }
  boxBelow = v128.shuffle<i64>(lowBelow, highBelow, 0, 2);
  boxAbove = v128.shuffle<i64>(lowAbove, highAbove, 0, 2);
  return i;
}

// --- the separator ---------------------------------------------------------------------------------------------------

/** Whether a point that is not in a separator yet lies above the line; neighbours are in the piece or removed. */
@inline function livesAbove(v: i32): bool {
  return load<i32>(placeOf(v) + (axis << 2)) >= line && !isRemoved(v);
}
@inline function livesBelow(v: i32): bool {
  return load<i32>(placeOf(v) + (axis << 2)) < line && !isRemoved(v);
}

function noteBelow(v: i32): void {
  for (let q = getInt(rowStart, v), end = getInt(rowStart, v + 1); q < end; q++)
    if (livesAbove(getInt(columns, q))) {
      setInt(boundaryBelow, below++, v);
      return;
    }
}
function noteAbove(v: i32): void {
  for (let q = getInt(rowStart, v), end = getInt(rowStart, v + 1); q < end; q++)
    if (livesBelow(getInt(columns, q))) {
      setInt(boundaryAbove, above++, v);
      return;
    }
}

/** Largest matching between the boundary points below the line and those above. */
function match(): void {
  for (let k = 0; k < below; k++) {
    const v = getInt(boundaryBelow, k);
    for (let q = getInt(rowStart, v), end = getInt(rowStart, v + 1); q < end; q++) {
      const u = getInt(columns, q);
      if (getInt(partner, u) < 0 && livesAbove(u)) {
        setInt(partner, u, v);
        setInt(partner, v, u);
        break;
      }
    }
  }
  for (let k = 0; k < below; k++) {
    const v = getInt(boundaryBelow, k);
    if (getInt(partner, v) < 0) {
      visit++;
      augment(v);
    }
  }
}

/** Find a partner for v, moving others where that helps. */
function augment(v: i32): bool {
  for (let q = getInt(rowStart, v), end = getInt(rowStart, v + 1); q < end; q++) {
    const u = getInt(columns, q);
    if (!livesAbove(u) || getInt(visited, u) == visit) continue;
    setInt(visited, u, visit);
    const other = getInt(partner, u);
    if (other < 0 || augment(other)) {
      setInt(partner, u, v);
      setInt(partner, v, u);
      return true;
    }
  }
  return false;
}

/**
 * Mark the cover as removed: boundary points below that no alternating path from an unmatched one reaches, and those
 * above that one reaches (Koenig). Returns its size and clears the matching.
 */
function markCover(): i32 {
  visit++;
  for (let k = 0; k < below; k++) {
    const v = getInt(boundaryBelow, k);
    if (getInt(partner, v) < 0 && getInt(visited, v) != visit) reach(v);
  }
  let size = 0;
  for (let k = 0; k < below; k++) {
    const v = getInt(boundaryBelow, k);
    setInt(partner, v, -1);
    if (getInt(visited, v) != visit) {
      store<u8>(removed + v, 1);
      size++;
    }
  }
  for (let k = 0; k < above; k++) {
    const v = getInt(boundaryAbove, k);
    setInt(partner, v, -1);
    if (getInt(visited, v) == visit) {
      store<u8>(removed + v, 1);
      size++;
    }
  }
  return size;
}

function reach(v: i32): void {
  setInt(visited, v, visit);
  for (let q = getInt(rowStart, v), end = getInt(rowStart, v + 1); q < end; q++) {
    const u = getInt(columns, q);
    if (!livesAbove(u) || getInt(visited, u) == visit) continue;
    setInt(visited, u, visit);
    const other = getInt(partner, u);
    if (other >= 0 && getInt(visited, other) != visit) reach(other);
  }
}

/**
 * Records of removed points to the end: below | above | separator.
 *
 * @returns where the points above begin
 */
function moveCoverLast(lo: i32, middle: i32, hi: i32): i32 {
  const endBelow = moveRemovedLast(lo, middle);
  const endAbove = moveRemovedLast(middle, hi);
  const fromBelow = middle - endBelow;
  // below | its removed | above | its removed: the removed in the middle change places with the last of above.
  const moved = min(fromBelow, endAbove - middle);
  for (let k = 0; k < moved; k++) swapRecords(endBelow + k, endAbove - 1 - k);
  return endBelow;
}

function moveRemovedLast(lo: i32, hi: i32): i32 {
  let i = lo;
  let end = hi;
  while (i < end) {
    if (isRemoved(idAt(i))) swapRecords(i, --end);
    else i++;
  }
  return end;
}

/** Neighbours along the cut get near numbers (gaps shrink as Shell 1959 proposed). */
function sortAlongCut(lo: i32, hi: i32): void {
  const shift = OWN + ((1 - axis) << 2);
  for (let gap = (hi - lo) >> 1; gap > 0; gap = gap > 2 ? (gap * 5) / 11 : gap - 1)
    for (let i = lo + gap; i < hi; i++)
      for (
        let j = i;
        j >= lo + gap && load<i32>(recordAt(j - gap) + shift) > load<i32>(recordAt(j) + shift);
        j -= gap
      )
        swapRecords(j, j - gap);
}
