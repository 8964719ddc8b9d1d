// Where to cut a piece: two histograms, one per axis, count for every line of a grid how many points lie on either side
// and how many links cross it, so that the necks of a part are found, not only its middle.
import { allocate, getInt } from "./memory";
import { OWN, RECORD } from "./records";

/** most lines per axis that are looked at, a power of two */
const BINS: i32 = 64;
/** a cut must leave at least this share of the points on either side */
const LEAST_SHARE: f64 = 0.2;
/** weight of imbalance against the size of the separator */
const IMBALANCE_WEIGHT: f64 = 3;
/** the shorter extent of a piece is looked at too when it has this share of the longer */
const SQUARE_SHARE: f64 = 0.6;

/** for two axes: points per bin, changes of the number of links crossing each line, from below and from above */
let histogram: usize = 0;
const HISTOGRAM: usize = (BINS + 2) << 2;

/** The cut chosen last: points with a coordinate of at least `line` along `axis` lie above. */
export let axis: usize = 0;
export let line: i32 = 0;

/** Room for the work; before the first cut. */
export function prepareCuts(): void {
  histogram = allocate(6 * HISTOGRAM);
}

@inline function pointsOf(a: usize): usize {
  return histogram + a * 3 * HISTOGRAM;
}
@inline function change(list: usize, bin: i32, by: i32): void {
  const at = list + (<usize>bin << 2);
  store<i32>(at, load<i32>(at) + by);
}

/** Choose axis and line for the records lo .. hi - 1 in a box; false when no line has points on both sides. */
export function chooseCut(records: usize, lo: i32, hi: i32, box: v128): bool {
  const width = i32x4.extract_lane(box, 2) - i32x4.extract_lane(box, 0);
  const height = i32x4.extract_lane(box, 3) - i32x4.extract_lane(box, 1);
  const longer = max(width, height);
  if (longer <= 0) return false;
  // As many bins as fit below BINS when their length is a power of two.
  let shift = 0;
  while (longer >> shift >= BINS) shift++;
  const slender = <f64>min(width, height) < SQUARE_SHARE * <f64>longer;
  fillHistogram(records, lo, hi, box, shift, slender && height > width, slender && width > height);
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

function fillHistogram(
  records: usize,
  lo: i32,
  hi: i32,
  box: v128,
  shift: i32,
  skipR: bool,
  skipZ: bool,
): void {
  memory.fill(histogram, 0, 6 * HISTOGRAM);
  const origin = v128.shuffle<i64>(box, box, 0, 0);
  const most = i32x4.splat(BINS - 1);
  const zero = i32x4.splat(0);
  for (let i = lo; i < hi; i++) {
    const record = records + <usize>i * RECORD;
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
