// Nested dissection (George 1973) with the help of coordinates: cut the points in two by a straight line, take out
// the fewest points whose removal separates the halves, number them last, go on with each half.
//
// - The cut is chosen from two histograms (one per axis) that count, for every line of a grid, how many points lie
//   on either side and how many links cross it: it finds the necks of a part, not only its middle.
// - The separator is a minimum vertex cover of the links that cross the line, by augmenting paths (Koenig's theorem).
// - Pieces of at most LEAF points are ordered by exact minimum degree on 64-bit masks.
//
// Each point travels as one record, so that every pass over a piece reads memory in order.
import { allocate, allocateInts, fillInts, getInt, getReal, mark, reset, setInt } from "./memory";

const LEAF: i32 = 64;
const BINS: i32 = 64;
/** a cut must leave at least this share of the points on either side */
const LEAST_SHARE: f64 = 0.2;
/** weight of imbalance against the size of the separator */
const IMBALANCE_WEIGHT: f64 = 3;

// Record: number, coordinates, and the span of coordinates of the point and its neighbours.
const RECORD: usize = 32;
const COORDINATE: usize = 4;
const LOW: usize = 12;
const HIGH: usize = 16;

let rowStart: usize = 0;
let columns: usize = 0;
/** f32 pairs by point number: the same values as in the records */
let places: usize = 0;
let records: usize = 0;
/** by point number: 1 when it lies in some separator already */
let removed: usize = 0;
/** by point number: partner in the matching, or local number in a leaf; -1 outside */
let partner: usize = 0;
let visited: usize = 0;
let visit: i32 = 0;
let queue: usize = 0;
let order: usize = 0;
/** BINS + 2 ints each, for two axes: points per bin, links crossing each line seen from below and from above */
let histogram: usize = 0;
let masks: usize = 0;
let outside: usize = 0;

// The cut in use.
let axis: usize = 0;
let origin: f32 = 0;
let binsPerLength: f32 = 0;
let line: i32 = 0;

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
  queue = allocateInts(n);
  histogram = allocateInts(6 * (BINS + 2));
  masks = allocate(8 * LEAF);
  outside = allocateInts(LEAF);
  memory.fill(removed, 0, n);
  fillInts(partner, n, 255);
  fillInts(visited, n, 0);
  visit = 0;
  fillRecords(n, coordinates);
  divide(0, n);
  reset(before);
}

/** Single precision is enough to cut; coordinates are taken relative to the box so that none is lost to an offset. */
function fillRecords(n: i32, coordinates: usize): void {
  let left = Infinity;
  let bottom = Infinity;
  for (let v = 0; v < n; v++) {
    left = min(left, getReal(coordinates, 2 * v));
    bottom = min(bottom, getReal(coordinates, 2 * v + 1));
  }
  for (let v = 0; v < n; v++) {
    const place = places + (<usize>v << 3);
    store<f32>(place, <f32>(getReal(coordinates, 2 * v) - left));
    store<f32>(place, <f32>(getReal(coordinates, 2 * v + 1) - bottom), 4);
  }
  for (let v = 0; v < n; v++) {
    const place = places + (<usize>v << 3);
    const r = load<f32>(place);
    const z = load<f32>(place, 4);
    let rLow = r;
    let rHigh = r;
    let zLow = z;
    let zHigh = z;
    for (let q = getInt(rowStart, v), end = getInt(rowStart, v + 1); q < end; q++) {
      const other = places + (<usize>getInt(columns, q) << 3);
      const r2 = load<f32>(other);
      const z2 = load<f32>(other, 4);
      rLow = min(rLow, r2);
      rHigh = max(rHigh, r2);
      zLow = min(zLow, z2);
      zHigh = max(zHigh, z2);
    }
    const record = recordAt(v);
    store<i32>(record, v);
    store<f32>(record, r, COORDINATE);
    store<f32>(record, z, COORDINATE + 4);
    store<f32>(record, rLow, LOW);
    store<f32>(record, rHigh, HIGH);
    store<f32>(record, zLow, LOW + 8);
    store<f32>(record, zHigh, HIGH + 8);
  }
}

@inline function recordAt(i: i32): usize {
  return records + <usize>i * RECORD;
}
@inline function idAt(i: i32): i32 {
  return load<i32>(recordAt(i));
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

/** Order the records lo .. hi - 1 into the same places of `order`. */
function divide(lo: i32, hi: i32): void {
  const count = hi - lo;
  if (count <= LEAF) {
    orderLeaf(lo, hi);
    return;
  }
  if (!chooseCut(lo, hi)) {
    // All points in one place: no line parts them.
    for (let i = lo; i < hi; i++) setInt(order, i, idAt(i));
    return;
  }
  const middle = partition(lo, hi);
  const below = collectBoundary(lo, middle, true, queue);
  const above = collectBoundary(middle, hi, false, queue + (<usize>below << 2));
  match(below);
  const separator = markCover(below, above);
  const half = moveCoverLast(lo, middle, hi);
  const begin = hi - separator;
  sortAlongCut(begin, hi);
  for (let i = begin; i < hi; i++) setInt(order, i, idAt(i));
  divide(lo, half);
  divide(half, begin);
}

// --- the cut ---------------------------------------------------------------------------------------------------------

@inline function binOf(x: f32, from: f32, scale: f32): i32 {
  return min(BINS - 1, max(0, <i32>((x - from) * scale)));
}
/** Side of the cut in use: false below the line, true above. */
@inline function liesAbove(x: f32): bool {
  return binOf(x, origin, binsPerLength) >= line;
}
@inline function countsOf(a: usize): usize {
  return histogram + a * 3 * ((BINS + 2) << 2);
}

/** Choose axis and line for records lo .. hi - 1; false when no line has points on both sides. */
function chooseCut(lo: i32, hi: i32): bool {
  let r0 = f32.MAX_VALUE;
  let r1 = -f32.MAX_VALUE;
  let z0 = f32.MAX_VALUE;
  let z1 = -f32.MAX_VALUE;
  for (let i = lo; i < hi; i++) {
    const record = recordAt(i);
    const r = load<f32>(record, COORDINATE);
    const z = load<f32>(record, COORDINATE + 4);
    r0 = min(r0, r);
    r1 = max(r1, r);
    z0 = min(z0, z);
    z1 = max(z1, z);
  }
  let best: f64 = Infinity;
  const count = hi - lo;
  // A cut across the short extent is looked for first; the other axis only where the piece is not slender.
  const tall = z1 - z0 >= r1 - r0;
  for (let turn = 0; turn < 2; turn++) {
    const a: usize = tall == (turn == 0) ? 1 : 0;
    const from = a == 1 ? z0 : r0;
    const extent = a == 1 ? z1 - z0 : r1 - r0;
    if (!(extent > 0)) continue;
    if (turn == 1 && extent < 0.5 * (a == 1 ? r1 - r0 : z1 - z0)) continue;
    const scale = <f32>BINS / extent;
    fillHistogram(lo, hi, a, from, scale);
    const score = bestLine(a, count, LEAST_SHARE, best, from, scale);
    best = min(best, score);
  }
  if (best < Infinity) return true;
  // Very uneven pieces (a hub far from a cluster): take any line that has points on both sides.
  for (let a: usize = 0; a < 2; a++) {
    const from = a == 1 ? z0 : r0;
    const extent = a == 1 ? z1 - z0 : r1 - r0;
    if (!(extent > 0)) continue;
    const scale = <f32>BINS / extent;
    fillHistogram(lo, hi, a, from, scale);
    best = min(best, bestLine(a, count, 0, best, from, scale));
  }
  return best < Infinity;
}

function fillHistogram(lo: i32, hi: i32, a: usize, from: f32, scale: f32): void {
  const points = countsOf(a);
  const up = points + ((BINS + 2) << 2);
  const down = up + ((BINS + 2) << 2);
  fillInts(points, 3 * (BINS + 2), 0);
  for (let i = lo; i < hi; i++) {
    const record = recordAt(i);
    const bin = binOf(load<f32>(record + (a << 2), COORDINATE), from, scale);
    const low = binOf(load<f32>(record + (a << 3), LOW), from, scale);
    const high = binOf(load<f32>(record + (a << 3), HIGH), from, scale);
    setInt(points, bin, getInt(points, bin) + 1);
    // A point crosses the lines bin + 1 .. high upwards and low + 1 .. bin downwards: marked by where counts change.
    setInt(up, bin + 1, getInt(up, bin + 1) + 1);
    setInt(up, high + 1, getInt(up, high + 1) - 1);
    setInt(down, low + 1, getInt(down, low + 1) + 1);
    setInt(down, bin + 1, getInt(down, bin + 1) - 1);
  }
}

/** Score of the best line of one axis; becomes the cut in use when it beats `limit`. */
function bestLine(a: usize, count: i32, leastShare: f64, limit: f64, from: f32, scale: f32): f64 {
  const points = countsOf(a);
  const up = points + ((BINS + 2) << 2);
  const down = up + ((BINS + 2) << 2);
  let best: f64 = limit;
  let below = 0;
  let upward = 0;
  let downward = 0;
  const least = max<f64>(1, leastShare * count);
  for (let k = 1; k < BINS; k++) {
    below += getInt(points, k - 1);
    upward += getInt(up, k);
    downward += getInt(down, k);
    const above = count - below;
    if (below < least || above < least) continue;
    const imbalance = <f64>(below - above) / <f64>count;
    const score = <f64>(min(upward, downward) + 1) * (1 + IMBALANCE_WEIGHT * imbalance * imbalance);
    if (score < best) {
      best = score;
      axis = a;
      origin = from;
      binsPerLength = scale;
      line = k;
    }
  }
  return best;
}

/** Records below the line first; @returns where the others begin. */
function partition(lo: i32, hi: i32): i32 {
  let i = lo;
  let j = hi - 1;
  const shift = COORDINATE + (axis << 2);
  while (i <= j) {
    if (!liesAbove(load<f32>(recordAt(i) + shift))) i++;
    else if (liesAbove(load<f32>(recordAt(j) + shift))) j--;
    else swapRecords(i++, j--);
  }
  return i;
}

// --- the separator ---------------------------------------------------------------------------------------------------

@inline function pointLiesAbove(v: i32): bool {
  return liesAbove(load<f32>(places + (<usize>v << 3) + (axis << 2)));
}

/** Numbers of the points in lo .. hi - 1 that are linked across the line, into `out`; returns how many. */
function collectBoundary(lo: i32, hi: i32, fromBelow: bool, out: usize): i32 {
  let count = 0;
  const shift = (fromBelow ? HIGH : LOW) + (axis << 3);
  for (let i = lo; i < hi; i++) {
    const record = recordAt(i);
    if (liesAbove(load<f32>(record + shift)) != fromBelow) continue;
    const v = load<i32>(record);
    for (let q = getInt(rowStart, v), end = getInt(rowStart, v + 1); q < end; q++) {
      const u = getInt(columns, q);
      if (u != v && !isRemoved(u) && pointLiesAbove(u) == fromBelow) {
        setInt(out, count++, v);
        break;
      }
    }
  }
  return count;
}

/** Largest matching between the boundary below (first `below` of `queue`) and the points above. */
function match(below: i32): void {
  for (let k = 0; k < below; k++) {
    const v = getInt(queue, k);
    for (let q = getInt(rowStart, v), end = getInt(rowStart, v + 1); q < end; q++) {
      const u = getInt(columns, q);
      if (getInt(partner, u) < 0 && !isRemoved(u) && pointLiesAbove(u)) {
        setInt(partner, u, v);
        setInt(partner, v, u);
        break;
      }
    }
  }
  for (let k = 0; k < below; k++) {
    const v = getInt(queue, k);
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
    if (isRemoved(u) || !pointLiesAbove(u) || getInt(visited, u) == visit) continue;
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
function markCover(below: i32, above: i32): i32 {
  visit++;
  for (let k = 0; k < below; k++) {
    const v = getInt(queue, k);
    if (getInt(partner, v) < 0 && getInt(visited, v) != visit) reach(v);
  }
  let size = 0;
  for (let k = 0; k < below + above; k++) {
    const v = getInt(queue, k);
    const reached = getInt(visited, v) == visit;
    if (k < below ? !reached : reached) {
      store<u8>(removed + v, 1);
      size++;
    }
  }
  for (let k = 0; k < below + above; k++) setInt(partner, getInt(queue, k), -1);
  return size;
}

function reach(v: i32): void {
  setInt(visited, v, visit);
  for (let q = getInt(rowStart, v), end = getInt(rowStart, v + 1); q < end; q++) {
    const u = getInt(columns, q);
    if (isRemoved(u) || !pointLiesAbove(u) || getInt(visited, u) == visit) continue;
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
  const shift = COORDINATE + ((1 - axis) << 2);
  for (let gap = (hi - lo) >> 1; gap > 0; gap = gap > 2 ? (gap * 5) / 11 : gap - 1)
    for (let i = lo + gap; i < hi; i++)
      for (
        let j = i;
        j >= lo + gap && load<f32>(recordAt(j - gap) + shift) > load<f32>(recordAt(j) + shift);
        j -= gap
      )
        swapRecords(j, j - gap);
}

// --- leaves ----------------------------------------------------------------------------------------------------------

/** Exact minimum degree on at most 64 points; neighbours in separators count by their number. */
function orderLeaf(lo: i32, hi: i32): void {
  const count = hi - lo;
  for (let a = 0; a < count; a++) setInt(partner, idAt(lo + a), a);
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
  }
  let alive: u64 = count == 64 ? ~(<u64>0) : ((<u64>1) << count) - 1;
  for (let place = lo; place < hi; place++) {
    let best = -1;
    let least = i32.MAX_VALUE;
    for (let rest = alive; rest != 0; rest &= rest - 1) {
      const a = <i32>ctz(rest);
      const degree = <i32>popcnt(load<u64>(masks + (<usize>a << 3)) & alive) + getInt(outside, a);
      if (degree < least) {
        least = degree;
        best = a;
      }
    }
    setInt(order, place, idAt(lo + best));
    alive &= ~((<u64>1) << best);
    const neighbours = load<u64>(masks + (<usize>best << 3)) & alive;
    const beyond = getInt(outside, best);
    for (let rest = neighbours; rest != 0; rest &= rest - 1) {
      const a = <i32>ctz(rest);
      const slot = masks + (<usize>a << 3);
      store<u64>(slot, load<u64>(slot) | (neighbours & ~((<u64>1) << a)));
      // The eliminated point hands its outer neighbours on; how many are shared is not known: take the larger number.
      if (beyond > getInt(outside, a)) setInt(outside, a, beyond);
    }
  }
  for (let a = 0; a < count; a++) setInt(partner, idAt(lo + a), -1);
}
