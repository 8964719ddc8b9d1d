// Nested dissection (George 1973) with the help of coordinates: cut the points in two by a straight line, take out
// the fewest points whose removal separates the halves, number them last, go on with each half.
//
// - The cut is chosen from two histograms (one per axis) that count, for every line of a grid, how many points lie
//   on either side and how many links cross it: it finds the necks of a part, not only its middle.
// - The separator is a minimum vertex cover of the links that cross the line, by augmenting paths (Koenig's theorem).
// - Pieces of at most LEAF points are ordered by exact minimum degree on 64-bit masks.
//
// Coordinates are whole numbers on a fine grid, and each point travels as one record, so that every pass over a piece
// reads memory in order and bins are found by shifting.
import { allocate, allocateInts, fillInts, getInt, getReal, mark, reset, setInt } from "./memory";

const LEAF: i32 = 64;
/** most lines per axis that are looked at, a power of two */
const BINS: i32 = 64;
/** steps of the grid across the longer side of the box */
const GRID: f64 = 8388608;
/** a cut must leave at least this share of the points on either side */
const LEAST_SHARE: f64 = 0.2;
/** weight of imbalance against the size of the separator */
const IMBALANCE_WEIGHT: f64 = 3;
/** the shorter extent of a piece is looked at too when it has this share of the longer */
const SQUARE_SHARE: f64 = 0.6;

// Record, all 32-bit: lowest r, z and highest r, z of the point and its neighbours; its own r, z; its number.
const RECORD: usize = 32;
const LOW: usize = 0;
const HIGH: usize = 8;
const OWN: usize = 16;
const NUMBER: usize = 24;

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
/** for two axes: points per bin, changes of the number of links crossing each line, from below and from above */
let histogram: usize = 0;
const HISTOGRAM: usize = (BINS + 2) << 2;
let masks: usize = 0;
let outside: usize = 0;
let degrees: usize = 0;

// The cut in use: points with a coordinate of at least `line` along `axis` lie above.
let axis: usize = 0;
let line: i32 = 0;

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
  histogram = allocate(6 * HISTOGRAM);
  masks = allocate(8 * LEAF);
  outside = allocateInts(LEAF);
  degrees = allocate(LEAF);
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
    orderLeaf(lo, hi);
    return;
  }
  if (!chooseCut(lo, hi, box)) {
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

// --- the cut ---------------------------------------------------------------------------------------------------------

@inline function pointsOf(a: usize): usize {
  return histogram + a * 3 * HISTOGRAM;
}
@inline function change(list: usize, bin: i32, by: i32): void {
  const at = list + (<usize>bin << 2);
  store<i32>(at, load<i32>(at) + by);
}

/** Choose axis and line for the records lo .. hi - 1 in a box; false when no line has points on both sides. */
function chooseCut(lo: i32, hi: i32, box: v128): bool {
  const width = i32x4.extract_lane(box, 2) - i32x4.extract_lane(box, 0);
  const height = i32x4.extract_lane(box, 3) - i32x4.extract_lane(box, 1);
  const longer = max(width, height);
  if (longer <= 0) return false;
  // As many bins as fit below BINS when their length is a power of two.
  let shift = 0;
  while (longer >> shift >= BINS) shift++;
  const slender = <f64>min(width, height) < SQUARE_SHARE * <f64>longer;
  fillHistogram(lo, hi, box, shift, slender && height > width, slender && width > height);
  const count = hi - lo;
  for (let turn = 0; turn < 2; turn++) {
    // Second turn, for very uneven pieces (a hub far from a cluster): any line with points on both sides.
    const least = turn == 0 ? LEAST_SHARE : 0;
    let best: f64 = Infinity;
    if (!(slender && height > width)) best = bestLine(0, count, least, best, i32x4.extract_lane(box, 0), shift);
    if (!(slender && width > height)) best = bestLine(1, count, least, best, i32x4.extract_lane(box, 1), shift);
    if (best < Infinity) return true;
  }
  return false;
}

function fillHistogram(lo: i32, hi: i32, box: v128, shift: i32, skipR: bool, skipZ: bool): void {
  memory.fill(histogram, 0, 6 * HISTOGRAM);
  const origin = v128.shuffle<i64>(box, box, 0, 0);
  const most = i32x4.splat(BINS - 1);
  const zero = i32x4.splat(0);
  for (let i = lo; i < hi; i++) {
    const record = recordAt(i);
    const span = i32x4.min_s(most, i32x4.max_s(zero, i32x4.shr_s(i32x4.sub(v128.load(record), origin), shift)));
    const own = i32x4.shr_s(i32x4.sub(v128.load(record, OWN), origin), shift);
    if (!skipR)
      count(pointsOf(0), i32x4.extract_lane(span, 0), i32x4.extract_lane(own, 0), i32x4.extract_lane(span, 2));
    if (!skipZ)
      count(pointsOf(1), i32x4.extract_lane(span, 1), i32x4.extract_lane(own, 1), i32x4.extract_lane(span, 3));
  }
}

/** A point crosses the lines own + 1 .. high upwards and low + 1 .. own downwards: marked where counts change. */
@inline function count(points: usize, low: i32, own: i32, high: i32): void {
  change(points, own, 1);
  if (high > own) {
    change(points + HISTOGRAM, own + 1, 1);
    change(points + HISTOGRAM, high + 1, -1);
  }
  if (low < own) {
    change(points + 2 * HISTOGRAM, low + 1, 1);
    change(points + 2 * HISTOGRAM, own + 1, -1);
  }
}

/** Score of the best line of one axis; becomes the cut in use when it beats `limit`. */
function bestLine(a: usize, count: i32, leastShare: f64, limit: f64, origin: i32, shift: i32): f64 {
  const points = pointsOf(a);
  const up = points + HISTOGRAM;
  const down = up + HISTOGRAM;
  let best: f64 = limit;
  let under = 0;
  let upward = 0;
  let downward = 0;
  const least = max<f64>(1, leastShare * count);
  for (let k = 1; k < BINS; k++) {
    under += getInt(points, k - 1);
    upward += getInt(up, k);
    downward += getInt(down, k);
    const over = count - under;
    if (<f64>min(under, over) < least) continue;
    const imbalance = <f64>(under - over) / <f64>count;
    const score = <f64>(min(upward, downward) + 1) * (1 + IMBALANCE_WEIGHT * imbalance * imbalance);
    if (score < best) {
      best = score;
      axis = a;
      line = origin + (k << shift);
    }
  }
  return best;
}

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

// --- leaves ----------------------------------------------------------------------------------------------------------

/**
 * Exact minimum degree on at most 64 points; neighbours in separators count by their number. Degrees are bytes, so that
 * the least of 64 is found with a few vector instructions; 255 marks what is done or absent.
 */
function orderLeaf(lo: i32, hi: i32): void {
  const count = hi - lo;
  for (let a = 0; a < count; a++) setInt(partner, idAt(lo + a), a);
  memory.fill(degrees, 255, LEAF);
  for (let a = 0; a < count; a++) {
    const v = idAt(lo + a);
    let mask: u64 = 0;
    let beyond = 0;
    for (let q = getInt(rowStart, v), end = getInt(rowStart, v + 1); q < end; q++) {
      const local = getInt(partner, getInt(columns, q));
      if (local < 0) beyond++;
      else mask |= (<u64>1) << local;
    }
    store<u64>(masks + (<usize>a << 3), mask & ~((<u64>1) << a));
    setInt(outside, a, beyond);
    setDegree(a, <i32>popcnt(mask) - 1 + beyond);
  }
  let alive: u64 = count == 64 ? ~(<u64>0) : ((<u64>1) << count) - 1;
  for (let place = lo; place < hi; place++) {
    const best = leastDegree();
    setInt(order, place, idAt(lo + best));
    alive &= ~((<u64>1) << best);
    store<u8>(degrees + best, 255);
    const neighbours = load<u64>(masks + (<usize>best << 3)) & alive;
    const beyond = getInt(outside, best);
    for (let rest = neighbours; rest != 0; rest &= rest - 1) {
      const a = <i32>ctz(rest);
      const slot = masks + (<usize>a << 3);
      const joined = (load<u64>(slot) | neighbours) & alive & ~((<u64>1) << a);
      store<u64>(slot, joined);
      // The eliminated point hands its outer neighbours on; how many are shared is not known: take the larger number.
      const most = max(beyond, getInt(outside, a));
      setInt(outside, a, most);
      setDegree(a, <i32>popcnt(joined) + most);
    }
  }
  for (let a = 0; a < count; a++) setInt(partner, idAt(lo + a), -1);
}

@inline function setDegree(a: i32, degree: i32): void {
  store<u8>(degrees + a, <u8>min(degree, 254));
}

/** Place of the least of the 64 degrees. */
@inline function leastDegree(): i32 {
  const v0 = v128.load(degrees);
  const v1 = v128.load(degrees, 16);
  const v2 = v128.load(degrees, 32);
  const v3 = v128.load(degrees, 48);
  let least = i8x16.min_u(i8x16.min_u(v0, v1), i8x16.min_u(v2, v3));
  least = i8x16.min_u(least, i64x2.shr_u(least, 8));
  least = i8x16.min_u(least, i64x2.shr_u(least, 16));
  least = i8x16.min_u(least, i64x2.shr_u(least, 32));
  const value = min(<u32>i8x16.extract_lane_u(least, 0), <u32>i8x16.extract_lane_u(least, 8));
  const wanted = i8x16.splat(<i8>value);
  const low = i8x16.bitmask(i8x16.eq(v0, wanted)) | (i8x16.bitmask(i8x16.eq(v1, wanted)) << 16);
  if (low != 0) return <i32>ctz(low);
  return 32 + <i32>ctz(i8x16.bitmask(i8x16.eq(v2, wanted)) | (i8x16.bitmask(i8x16.eq(v3, wanted)) << 16));
}
