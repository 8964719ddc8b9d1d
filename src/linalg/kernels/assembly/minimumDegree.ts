// The order of elimination within a small piece.
import { allocate, allocateInts, getInt, setInt } from "./memory";
import { NUMBER, RECORD } from "./records";

/** most points of a piece: as many as a mask has bits */
export const LEAF: i32 = 64;

let masks: usize = 0;
let outside: usize = 0;
let degrees: usize = 0;

/** Room for the work; before the first piece. */
export function prepareLeaves(): void {
  masks = allocate(8 * LEAF);
  outside = allocateInts(LEAF);
  degrees = allocate(LEAF);
}

@inline function numberAt(records: usize, place: i32): i32 {
  return load<i32>(records + <usize>place * RECORD, NUMBER);
}

/**
 * Exact minimum degree on at most 64 points; neighbours in separators count by their number. Degrees are bytes, so that
 * the least of 64 is found with a few vector instructions; 255 marks what is done or absent.
 *
 * @param records  of the dissection: those of places lo .. hi - 1 are ordered
 * @param partner  by point number, -1 everywhere before and after
 * @param order    out: point numbers in places lo .. hi - 1
 */
export function orderLeaf(
  records: usize,
  lo: i32,
  hi: i32,
  rowStart: usize,
  columns: usize,
  partner: usize,
  order: usize,
): void {
  const count = hi - lo;
  for (let a = 0; a < count; a++) setInt(partner, numberAt(records, lo + a), a);
  memory.fill(degrees, 255, LEAF);
  for (let a = 0; a < count; a++) {
    const v = numberAt(records, lo + a);
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
    setInt(order, place, numberAt(records, lo + best));
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
  for (let a = 0; a < count; a++) setInt(partner, numberAt(records, lo + a), -1);
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
