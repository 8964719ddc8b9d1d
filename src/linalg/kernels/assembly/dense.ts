// Dense kernels on row-major blocks, two 64-bit lanes at a time. Rows are `stride` values apart.
import { getReal, realAt, setReal } from "./memory";

@inline export function sumOf(v: v128): f64 {
  return f64x2.extract_lane(v, 0) + f64x2.extract_lane(v, 1);
}
@inline export function addProduct(sum: v128, a: v128, b: v128): v128 {
  return f64x2.add(sum, f64x2.mul(a, b));
}
/** the sums of the lanes of a and of b, side by side */
@inline function bothSums(a: v128, b: v128): v128 {
  return f64x2.add(v128.shuffle<f64>(a, b, 0, 2), v128.shuffle<f64>(a, b, 1, 3));
}

/**
 * c -= a b', where a has `rows` and b has `count` rows of `depth` values and c is `rows` x `count`. With `lower` only
 * the lower triangle of a square c matters: a bit more may be written above its diagonal.
 *
 * Blocks of 4 x 2 products keep 8 running sums in registers.
 */
export function subtractProducts(
  c: usize,
  cStride: usize,
  a: usize,
  rows: i32,
  b: usize,
  count: i32,
  stride: usize,
  depth: i32,
  lower: bool,
): void {
  const even = <usize>(depth & ~1) << 3;
  const odd = (depth & 1) != 0;
  let i = 0;
  for (; i + 3 < rows; i += 4) {
    const a0 = a + stride * i;
    const a1 = a0 + stride;
    const a2 = a1 + stride;
    const a3 = a2 + stride;
    const c0 = c + cStride * i;
    const c1 = c0 + cStride;
    const c2 = c1 + cStride;
    const c3 = c2 + cStride;
    const stop = lower ? min(count, i + 4) : count;
    let j = 0;
    for (; j + 1 < stop; j += 2) {
      const b0 = b + stride * j;
      const b1 = b0 + stride;
      let s00 = f64x2.splat(0);
      let s01 = s00;
      let s10 = s00;
      let s11 = s00;
      let s20 = s00;
      let s21 = s00;
      let s30 = s00;
      let s31 = s00;
      for (let k: usize = 0; k < even; k += 16) {
        const x = v128.load(b0 + k);
        const y = v128.load(b1 + k);
        let p = v128.load(a0 + k);
        s00 = addProduct(s00, p, x);
        s01 = addProduct(s01, p, y);
        p = v128.load(a1 + k);
        s10 = addProduct(s10, p, x);
        s11 = addProduct(s11, p, y);
        p = v128.load(a2 + k);
        s20 = addProduct(s20, p, x);
        s21 = addProduct(s21, p, y);
        p = v128.load(a3 + k);
        s30 = addProduct(s30, p, x);
        s31 = addProduct(s31, p, y);
      }
      let d0 = bothSums(s00, s01);
      let d1 = bothSums(s10, s11);
      let d2 = bothSums(s20, s21);
      let d3 = bothSums(s30, s31);
      if (odd) {
        const last = f64x2.replace_lane(f64x2.splat(load<f64>(b0 + even)), 1, load<f64>(b1 + even));
        d0 = addProduct(d0, v128.load64_splat(a0 + even), last);
        d1 = addProduct(d1, v128.load64_splat(a1 + even), last);
        d2 = addProduct(d2, v128.load64_splat(a2 + even), last);
        d3 = addProduct(d3, v128.load64_splat(a3 + even), last);
      }
      const shift = <usize>j << 3;
      v128.store(c0 + shift, f64x2.sub(v128.load(c0 + shift), d0));
      v128.store(c1 + shift, f64x2.sub(v128.load(c1 + shift), d1));
      v128.store(c2 + shift, f64x2.sub(v128.load(c2 + shift), d2));
      v128.store(c3 + shift, f64x2.sub(v128.load(c3 + shift), d3));
    }
    if (j < stop) {
      const b0 = b + stride * j;
      setReal(c0, j, getReal(c0, j) - dotProduct(a0, b0, depth));
      setReal(c1, j, getReal(c1, j) - dotProduct(a1, b0, depth));
      setReal(c2, j, getReal(c2, j) - dotProduct(a2, b0, depth));
      setReal(c3, j, getReal(c3, j) - dotProduct(a3, b0, depth));
    }
  }
  for (; i < rows; i++) {
    const row = a + stride * i;
    const target = c + cStride * i;
    const stop = lower ? min(count, i + 1) : count;
    for (let j = 0; j < stop; j++)
      setReal(target, j, getReal(target, j) - dotProduct(row, b + stride * j, depth));
  }
}

/** Rows of b and values of each that are worked on at a time: 32 KiB, so that they stay in the first-level cache. */
const TILE_ROWS: i32 = 32;
const TILE_DEPTH: i32 = 128;

/** The same for blocks of any size, tile by tile. */
export function subtractProductsTiled(
  c: usize,
  cStride: usize,
  a: usize,
  rows: i32,
  b: usize,
  count: i32,
  stride: usize,
  depth: i32,
  lower: bool,
): void {
  for (let k = 0; k < depth; k += TILE_DEPTH) {
    const left = <usize>k << 3;
    const part = min(TILE_DEPTH, depth - k);
    for (let j = 0; j < count; j += TILE_ROWS) {
      // Of a lower triangle, the rows above the tile have nothing in its columns.
      const skip = lower ? j : 0;
      subtractProducts(
        c + cStride * skip + (<usize>j << 3),
        cStride,
        a + stride * skip + left,
        rows - skip,
        b + stride * j + left,
        min(TILE_ROWS, count - j),
        stride,
        part,
        lower,
      );
    }
  }
}

export function dotProduct(x: usize, y: usize, count: i32): f64 {
  let a = f64x2.splat(0);
  let b = a;
  const four = <usize>(count & ~3) << 3;
  let k: usize = 0;
  for (; k < four; k += 32) {
    a = addProduct(a, v128.load(x + k), v128.load(y + k));
    b = addProduct(b, v128.load(x + k, 16), v128.load(y + k, 16));
  }
  if ((count & 2) != 0) {
    a = addProduct(a, v128.load(x + k), v128.load(y + k));
    k += 16;
  }
  let sum = sumOf(f64x2.add(a, b));
  if ((count & 1) != 0) sum += load<f64>(x + k) * load<f64>(y + k);
  return sum;
}

/** What stopped `factorPanel`: the column within the panel, the pivot and the diagonal entry of the matrix there. */
export let failedColumn: i32 = -1;
export let failedPivot: f64 = 0;
export let failedDiagonal: f64 = 0;

/**
 * Columns worked on at a time, on two levels: what lies left of a wide block is subtracted from it as one product of
 * tiles, what lies left of a narrow one within its wide block as one product of few columns.
 */
const WIDE_BLOCK: i32 = 64;
const BLOCK: i32 = 4;

/**
 * Cholesky of a panel in place: its first `width` rows become the lower factor, the `rows - width` below are solved
 * with it. The diagonal of the factor is kept as its reciprocal in `reciprocals`, which on entry holds the diagonal of
 * the matrix, so that a pivot can be told from rounding.
 *
 * @returns false when a pivot is not above `least` times its diagonal entry; see the `failed` values
 */
export function factorPanel(panel: usize, rows: i32, width: i32, reciprocals: usize, least: f64): bool {
  const stride = <usize>width << 3;
  let wide = 0;
  for (let begin = 0; begin < width; begin += BLOCK) {
    const count = min(BLOCK, width - begin);
    const corner = panel + stride * begin;
    const shift = <usize>begin << 3;
    if (begin == wide + WIDE_BLOCK) {
      wide = begin;
      const columns = min(WIDE_BLOCK, width - wide);
      subtractProductsTiled(corner + shift, stride, corner, rows - wide, corner, columns, stride, wide, false);
    } else if (begin > wide) {
      const left = corner + (<usize>wide << 3);
      subtractProducts(corner + shift, stride, left, rows - begin, left, count, stride, begin - wide, false);
    }
    if (!factorCorner(corner + shift, stride, count, reciprocals + shift, least)) {
      failedColumn += begin;
      return false;
    }
    solveBelow(corner + shift, stride, count, rows - begin, reciprocals + shift);
  }
  return true;
}

/** Scalar Cholesky of at most BLOCK rows. */
function factorCorner(corner: usize, stride: usize, count: i32, reciprocals: usize, least: f64): bool {
  for (let j = 0; j < count; j++) {
    const row = corner + stride * j;
    let pivot = getReal(row, j);
    for (let i = 0; i < j; i++) {
      const other = corner + stride * i;
      let value = getReal(row, i);
      for (let k = 0; k < i; k++) value -= getReal(row, k) * getReal(other, k);
      value *= getReal(reciprocals, i);
      setReal(row, i, value);
      pivot -= value * value;
    }
    const diagonal = getReal(reciprocals, j);
    if (!(pivot > least * diagonal) || !(pivot < Infinity)) {
      failedColumn = j;
      failedPivot = pivot;
      failedDiagonal = diagonal;
      return false;
    }
    const root = Math.sqrt(pivot);
    setReal(row, j, root);
    setReal(reciprocals, j, 1 / root);
  }
  return true;
}

/** Rows count .. rows - 1 of a block of at most BLOCK columns, solved with the corner above them. */
function solveBelow(corner: usize, stride: usize, count: i32, rows: i32, reciprocals: usize): void {
  if (count == 4) {
    const row1 = corner + stride;
    const row2 = row1 + stride;
    const row3 = row2 + stride;
    const l10 = getReal(row1, 0);
    const l20 = getReal(row2, 0);
    const l21 = getReal(row2, 1);
    const l30 = getReal(row3, 0);
    const l31 = getReal(row3, 1);
    const l32 = getReal(row3, 2);
    const d0 = getReal(reciprocals, 0);
    const d1 = getReal(reciprocals, 1);
    const d2 = getReal(reciprocals, 2);
    const d3 = getReal(reciprocals, 3);
    for (let row = row3 + stride, end = corner + stride * rows; row < end; row += stride) {
      const x0 = load<f64>(row) * d0;
      const x1 = (load<f64>(row, 8) - x0 * l10) * d1;
      const x2 = (load<f64>(row, 16) - x0 * l20 - x1 * l21) * d2;
      const x3 = (load<f64>(row, 24) - x0 * l30 - x1 * l31 - x2 * l32) * d3;
      store<f64>(row, x0);
      store<f64>(row, x1, 8);
      store<f64>(row, x2, 16);
      store<f64>(row, x3, 24);
    }
    return;
  }
  for (let i = count; i < rows; i++) {
    const row = corner + stride * i;
    for (let j = 0; j < count; j++) {
      const other = corner + stride * j;
      let value = getReal(row, j);
      for (let k = 0; k < j; k++) value -= getReal(row, k) * getReal(other, k);
      setReal(row, j, value * getReal(reciprocals, j));
    }
  }
}

// Triangular solves go by blocks of four rows, whose own triangle is written out: short loops of unforeseeable length
// cost more than the arithmetic in them.

@inline export function forwardCorner(row: usize, stride: usize, reciprocals: usize, x: usize): void {
  const row1 = row + stride;
  const row2 = row1 + stride;
  const row3 = row2 + stride;
  const x0 = load<f64>(x) * load<f64>(reciprocals);
  const x1 = (load<f64>(x, 8) - load<f64>(row1) * x0) * load<f64>(reciprocals, 8);
  const x2 = (load<f64>(x, 16) - load<f64>(row2) * x0 - load<f64>(row2, 8) * x1) * load<f64>(reciprocals, 16);
  const x3 =
    (load<f64>(x, 24) - load<f64>(row3) * x0 - load<f64>(row3, 8) * x1 - load<f64>(row3, 16) * x2) *
    load<f64>(reciprocals, 24);
  store<f64>(x, x0);
  store<f64>(x, x1, 8);
  store<f64>(x, x2, 16);
  store<f64>(x, x3, 24);
}

@inline export function backwardCorner(row: usize, stride: usize, reciprocals: usize, x: usize): void {
  const row1 = row + stride;
  const row2 = row1 + stride;
  const row3 = row2 + stride;
  const x3 = load<f64>(x, 24) * load<f64>(reciprocals, 24);
  const x2 = (load<f64>(x, 16) - load<f64>(row3, 16) * x3) * load<f64>(reciprocals, 16);
  const x1 = (load<f64>(x, 8) - load<f64>(row3, 8) * x3 - load<f64>(row2, 8) * x2) * load<f64>(reciprocals, 8);
  const x0 =
    (load<f64>(x) - load<f64>(row3) * x3 - load<f64>(row2) * x2 - load<f64>(row1) * x1) * load<f64>(reciprocals);
  store<f64>(x, x0);
  store<f64>(x, x1, 8);
  store<f64>(x, x2, 16);
  store<f64>(x, x3, 24);
}

/** x := L^-1 x for the lower triangle of `width` rows whose reciprocal diagonal is given */
export function solveLower(triangle: usize, width: i32, reciprocals: usize, x: usize): void {
  const stride = <usize>width << 3;
  let row = triangle;
  let j = 0;
  for (; j + 3 < width; j += 4) {
    const at = realAt(x, j);
    const left = <usize>j << 3;
    if (j > 0) {
      const row1 = row + stride;
      const row2 = row1 + stride;
      const row3 = row2 + stride;
      let s0 = f64x2.splat(0);
      let s1 = s0;
      let s2 = s0;
      let s3 = s0;
      for (let k: usize = 0; k < left; k += 16) {
        const v = v128.load(x + k);
        s0 = addProduct(s0, v128.load(row + k), v);
        s1 = addProduct(s1, v128.load(row1 + k), v);
        s2 = addProduct(s2, v128.load(row2 + k), v);
        s3 = addProduct(s3, v128.load(row3 + k), v);
      }
      v128.store(at, f64x2.sub(v128.load(at), bothSums(s0, s1)));
      v128.store(at, f64x2.sub(v128.load(at, 16), bothSums(s2, s3)), 16);
    }
    forwardCorner(row + left, stride, realAt(reciprocals, j), at);
    row += stride << 2;
  }
  for (; j < width; j++, row += stride) {
    let value = getReal(x, j);
    for (let k = 0; k < j; k++) value -= getReal(row, k) * getReal(x, k);
    setReal(x, j, value * getReal(reciprocals, j));
  }
}

/** x := L^-T x */
export function solveLowerTransposed(triangle: usize, width: i32, reciprocals: usize, x: usize): void {
  const stride = <usize>width << 3;
  const blocks = width & ~3;
  for (let j = width - 1; j >= blocks; j--) {
    const row = triangle + stride * j;
    const value = getReal(x, j) * getReal(reciprocals, j);
    setReal(x, j, value);
    for (let i = 0; i < j; i++) setReal(x, i, getReal(x, i) - getReal(row, i) * value);
  }
  for (let j = blocks - 4; j >= 0; j -= 4) {
    const row = triangle + stride * j;
    const left = <usize>j << 3;
    const at = x + left;
    backwardCorner(row + left, stride, reciprocals + left, at);
    if (j == 0) return;
    const row1 = row + stride;
    const row2 = row1 + stride;
    const row3 = row2 + stride;
    const v0 = v128.load64_splat(at);
    const v1 = v128.load64_splat(at, 8);
    const v2 = v128.load64_splat(at, 16);
    const v3 = v128.load64_splat(at, 24);
    for (let k: usize = 0; k < left; k += 16) {
      let a = f64x2.mul(v128.load(row + k), v0);
      let b = f64x2.mul(v128.load(row1 + k), v1);
      a = addProduct(a, v128.load(row2 + k), v2);
      b = addProduct(b, v128.load(row3 + k), v3);
      v128.store(x + k, f64x2.sub(v128.load(x + k), f64x2.add(a, b)));
    }
  }
}
