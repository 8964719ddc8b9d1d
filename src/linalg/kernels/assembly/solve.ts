// Triangular solves with a factor, and products with a matrix.
import { columns, first, panelStart, rowStart, rows, rowsStart, size, supernodes } from "./analysis";
import {
  addProduct,
  backwardCorner,
  dotProduct,
  forwardCorner,
  solveLower,
  solveLowerTransposed,
  sumOf,
} from "./dense";
import { panelsOf } from "./factor";
import { getInt, getReal, intAt, realAt, setReal } from "./memory";

/** x := A^-1 x, in inner numbers. */
export function solve(factor: usize, x: usize): void {
  const panels = panelsOf(factor);
  for (let s = 0; s < supernodes; s++) forward(s, factor, panels, x);
  for (let s = supernodes - 1; s >= 0; s--) backward(s, factor, panels, x);
}

/** Offset of the unknown that row list entry `r` names. */
@inline function unknownAt(x: usize, r: usize): usize {
  return x + (<usize>load<i32>(r) << 3);
}
@inline function subtractFrom(at: usize, value: f64): void {
  store<f64>(at, load<f64>(at) - value);
}

function forward(s: i32, factor: usize, panels: usize, x: usize): void {
  const begin = getInt(first, s);
  const width = getInt(first, s + 1) - begin;
  const own = realAt(x, begin);
  const reciprocals = realAt(factor, begin);
  const row = realAt(panels, getInt(panelStart, s));
  const r = intAt(rows, getInt(rowsStart, s));
  const end = intAt(rows, getInt(rowsStart, s + 1));
  if (width == 1) forwardOne(row, reciprocals, own, r, end, x);
  else if (width == 2) forwardTwo(row, reciprocals, own, r, end, x);
  else if (width == 3) forwardThree(row, reciprocals, own, r, end, x);
  else if (width == 4) forwardFour(row, reciprocals, own, r, end, x);
  else {
    solveLower(row, width, reciprocals, own);
    forwardMany(row + ((<usize>width * width) << 3), width, own, r, end, x);
  }
}

// Panels of one to four columns are most of all: each is written out, with one loop down the rows.

@inline function forwardOne(row: usize, reciprocals: usize, own: usize, r: usize, end: usize, x: usize): void {
  const value = load<f64>(own) * load<f64>(reciprocals);
  store<f64>(own, value);
  for (row += 8; r < end; r += 4, row += 8) subtractFrom(unknownAt(x, r), load<f64>(row) * value);
}

@inline function forwardTwo(row: usize, reciprocals: usize, own: usize, r: usize, end: usize, x: usize): void {
  const x0 = load<f64>(own) * load<f64>(reciprocals);
  const x1 = (load<f64>(own, 8) - load<f64>(row, 16) * x0) * load<f64>(reciprocals, 8);
  const v = f64x2(x0, x1);
  v128.store(own, v);
  for (row += 32; r < end; r += 4, row += 16) subtractFrom(unknownAt(x, r), sumOf(f64x2.mul(v128.load(row), v)));
}

@inline function forwardThree(row: usize, reciprocals: usize, own: usize, r: usize, end: usize, x: usize): void {
  const x0 = load<f64>(own) * load<f64>(reciprocals);
  const x1 = (load<f64>(own, 8) - load<f64>(row, 24) * x0) * load<f64>(reciprocals, 8);
  const x2 = (load<f64>(own, 16) - load<f64>(row, 48) * x0 - load<f64>(row, 56) * x1) * load<f64>(reciprocals, 16);
  const v = f64x2(x0, x1);
  v128.store(own, v);
  store<f64>(own, x2, 16);
  for (row += 72; r < end; r += 4, row += 24)
    subtractFrom(unknownAt(x, r), sumOf(f64x2.mul(v128.load(row), v)) + load<f64>(row, 16) * x2);
}

@inline function forwardFour(row: usize, reciprocals: usize, own: usize, r: usize, end: usize, x: usize): void {
  forwardCorner(row, 32, reciprocals, own);
  const v = v128.load(own);
  const w = v128.load(own, 16);
  for (row += 128; r < end; r += 4, row += 32)
    subtractFrom(unknownAt(x, r), sumOf(addProduct(f64x2.mul(v128.load(row), v), v128.load(row, 16), w)));
}

function forwardMany(row: usize, width: i32, own: usize, r: usize, end: usize, x: usize): void {
  const stride = <usize>width << 3;
  const even = stride & ~15;
  const odd = (width & 1) != 0;
  const last = odd ? getReal(own, width - 1) : 0;
  for (; r + 12 < end; r += 16) {
    const row1 = row + stride;
    const row2 = row1 + stride;
    const row3 = row2 + stride;
    let s0 = f64x2.splat(0);
    let s1 = s0;
    let s2 = s0;
    let s3 = s0;
    for (let k: usize = 0; k < even; k += 16) {
      const v = v128.load(own + k);
      s0 = addProduct(s0, v128.load(row + k), v);
      s1 = addProduct(s1, v128.load(row1 + k), v);
      s2 = addProduct(s2, v128.load(row2 + k), v);
      s3 = addProduct(s3, v128.load(row3 + k), v);
    }
    let t0 = sumOf(s0);
    let t1 = sumOf(s1);
    let t2 = sumOf(s2);
    let t3 = sumOf(s3);
    if (odd) {
      t0 += load<f64>(row + even) * last;
      t1 += load<f64>(row1 + even) * last;
      t2 += load<f64>(row2 + even) * last;
      t3 += load<f64>(row3 + even) * last;
    }
    subtractFrom(unknownAt(x, r), t0);
    subtractFrom(unknownAt(x, r + 4), t1);
    subtractFrom(unknownAt(x, r + 8), t2);
    subtractFrom(unknownAt(x, r + 12), t3);
    row = row3 + stride;
  }
  for (; r < end; r += 4, row += stride) subtractFrom(unknownAt(x, r), dotProduct(row, own, width));
}

function backward(s: i32, factor: usize, panels: usize, x: usize): void {
  const begin = getInt(first, s);
  const width = getInt(first, s + 1) - begin;
  const own = realAt(x, begin);
  const reciprocals = realAt(factor, begin);
  const row = realAt(panels, getInt(panelStart, s));
  const r = intAt(rows, getInt(rowsStart, s));
  const end = intAt(rows, getInt(rowsStart, s + 1));
  if (width == 1) backwardOne(row, reciprocals, own, r, end, x);
  else if (width == 2) backwardTwo(row, reciprocals, own, r, end, x);
  else if (width == 3) backwardThree(row, reciprocals, own, r, end, x);
  else if (width == 4) backwardFour(row, reciprocals, own, r, end, x);
  else {
    const stride = <usize>width << 3;
    // Few columns: keep them in registers and run down the rows. Many: four rows at a time across all columns.
    if (width > 8) subtractManyColumns(r, end, row + stride * width, stride, own, x, width);
    else subtractFewColumns(r, end, row + stride * width, stride, own, x, width);
    solveLowerTransposed(row, width, reciprocals, own);
  }
}

@inline function backwardOne(row: usize, reciprocals: usize, own: usize, r: usize, end: usize, x: usize): void {
  let value = load<f64>(own);
  for (row += 8; r < end; r += 4, row += 8) value -= load<f64>(row) * load<f64>(unknownAt(x, r));
  store<f64>(own, value * load<f64>(reciprocals));
}

@inline function backwardTwo(row: usize, reciprocals: usize, own: usize, r: usize, end: usize, x: usize): void {
  let a = v128.load(own);
  const l10 = load<f64>(row, 16);
  for (row += 32; r < end; r += 4, row += 16)
    a = f64x2.sub(a, f64x2.mul(v128.load(row), v128.load64_splat(unknownAt(x, r))));
  const x1 = f64x2.extract_lane(a, 1) * load<f64>(reciprocals, 8);
  store<f64>(own, x1, 8);
  store<f64>(own, (f64x2.extract_lane(a, 0) - l10 * x1) * load<f64>(reciprocals));
}

@inline function backwardThree(row: usize, reciprocals: usize, own: usize, r: usize, end: usize, x: usize): void {
  let a = v128.load(own);
  let x2 = load<f64>(own, 16);
  const corner = row;
  for (row += 72; r < end; r += 4, row += 24) {
    const value = v128.load64_splat(unknownAt(x, r));
    a = f64x2.sub(a, f64x2.mul(v128.load(row), value));
    x2 -= load<f64>(row, 16) * f64x2.extract_lane(value, 0);
  }
  x2 *= load<f64>(reciprocals, 16);
  const x1 = (f64x2.extract_lane(a, 1) - load<f64>(corner, 56) * x2) * load<f64>(reciprocals, 8);
  store<f64>(own, x2, 16);
  store<f64>(own, x1, 8);
  store<f64>(
    own,
    (f64x2.extract_lane(a, 0) - load<f64>(corner, 48) * x2 - load<f64>(corner, 24) * x1) * load<f64>(reciprocals),
  );
}

@inline function backwardFour(row: usize, reciprocals: usize, own: usize, r: usize, end: usize, x: usize): void {
  let a = v128.load(own);
  let b = v128.load(own, 16);
  const corner = row;
  for (row += 128; r < end; r += 4, row += 32) {
    const value = v128.load64_splat(unknownAt(x, r));
    a = f64x2.sub(a, f64x2.mul(v128.load(row), value));
    b = f64x2.sub(b, f64x2.mul(v128.load(row, 16), value));
  }
  v128.store(own, a);
  v128.store(own, b, 16);
  backwardCorner(corner, 32, reciprocals, own);
}

function subtractFewColumns(
  from: usize,
  end: usize,
  below: usize,
  stride: usize,
  own: usize,
  x: usize,
  width: i32,
): void {
  let k = 0;
  for (; k + 3 < width; k += 4) {
    const at = realAt(own, k);
    let a = v128.load(at);
    let b = v128.load(at, 16);
    for (let r = from, row = realAt(below, k); r < end; r += 4, row += stride) {
      const value = v128.load64_splat(unknownAt(x, r));
      a = f64x2.sub(a, f64x2.mul(v128.load(row), value));
      b = f64x2.sub(b, f64x2.mul(v128.load(row, 16), value));
    }
    v128.store(at, a);
    v128.store(at, b, 16);
  }
  if (k + 1 < width) {
    const at = realAt(own, k);
    let a = v128.load(at);
    for (let r = from, row = realAt(below, k); r < end; r += 4, row += stride)
      a = f64x2.sub(a, f64x2.mul(v128.load(row), v128.load64_splat(unknownAt(x, r))));
    v128.store(at, a);
    k += 2;
  }
  if (k < width) {
    let value = getReal(own, k);
    for (let r = from, row = realAt(below, k); r < end; r += 4, row += stride)
      value -= load<f64>(row) * load<f64>(unknownAt(x, r));
    setReal(own, k, value);
  }
}

function subtractManyColumns(
  from: usize,
  end: usize,
  below: usize,
  stride: usize,
  own: usize,
  x: usize,
  width: i32,
): void {
  const even = stride & ~15;
  const odd = (width & 1) != 0;
  let r = from;
  let row = below;
  for (; r + 12 < end; r += 16) {
    const v0 = v128.load64_splat(unknownAt(x, r));
    const v1 = v128.load64_splat(unknownAt(x, r + 4));
    const v2 = v128.load64_splat(unknownAt(x, r + 8));
    const v3 = v128.load64_splat(unknownAt(x, r + 12));
    const row1 = row + stride;
    const row2 = row1 + stride;
    const row3 = row2 + stride;
    for (let k: usize = 0; k < even; k += 16) {
      let a = f64x2.mul(v128.load(row + k), v0);
      let b = f64x2.mul(v128.load(row1 + k), v1);
      a = addProduct(a, v128.load(row2 + k), v2);
      b = addProduct(b, v128.load(row3 + k), v3);
      v128.store(own + k, f64x2.sub(v128.load(own + k), f64x2.add(a, b)));
    }
    if (odd)
      subtractFrom(
        own + even,
        load<f64>(row + even) * f64x2.extract_lane(v0, 0) +
          load<f64>(row1 + even) * f64x2.extract_lane(v1, 0) +
          load<f64>(row2 + even) * f64x2.extract_lane(v2, 0) +
          load<f64>(row3 + even) * f64x2.extract_lane(v3, 0),
      );
    row = row3 + stride;
  }
  for (; r < end; r += 4, row += stride) {
    const v = v128.load64_splat(unknownAt(x, r));
    for (let k: usize = 0; k < even; k += 16)
      v128.store(own + k, f64x2.sub(v128.load(own + k), f64x2.mul(v128.load(row + k), v)));
    if (odd) subtractFrom(own + even, load<f64>(row + even) * f64x2.extract_lane(v, 0));
  }
}

/** y = A x + z on the inner pattern; z may be y */
export function multiplyAdd(values: usize, x: usize, z: usize, y: usize): void {
  let q = 0;
  for (let i = 0; i < size; i++) {
    const end = getInt(rowStart, i + 1);
    let even = getReal(z, i);
    let odd: f64 = 0;
    for (; q + 1 < end; q += 2) {
      even += getReal(values, q) * getReal(x, getInt(columns, q));
      odd += getReal(values, q + 1) * getReal(x, getInt(columns, q + 1));
    }
    if (q < end) {
      even += getReal(values, q) * getReal(x, getInt(columns, q));
      q++;
    }
    setReal(y, i, even + odd);
  }
}
