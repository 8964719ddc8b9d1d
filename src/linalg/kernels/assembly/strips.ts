// A first numbering that keeps neighbours near: cells of a few points each, in strips across the longer extent.
import { allocateInts, fillInts, getInt, getReal, mark, reset, setInt } from "./memory";

const POINTS_PER_CELL: f64 = 4;

/**
 * @param coordinates  f64 pairs
 * @param out          n ints: point of each place
 */
export function numberAlongStrips(n: i32, coordinates: usize, out: usize): void {
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
  const width = right - left;
  const height = top - bottom;
  const cells = max<f64>(1, n / POINTS_PER_CELL);
  // Square cells; a box without extent in one direction is one row of them.
  const edge = max(Math.sqrt((width * height) / cells), max(width, height) / cells);
  if (!(edge > 0)) {
    for (let v = 0; v < n; v++) setInt(out, v, v);
    return;
  }
  const before = mark();
  const across = <i32>(min(width, height) / edge) + 1;
  const along = <i32>(max(width, height) / edge) + 1;
  const upright = height >= width;
  const cellOf = allocateInts(n);
  const start = allocateInts(across * along + 1);
  fillInts(start, across * along + 1, 0);
  for (let v = 0; v < n; v++) {
    const r = <i32>((getReal(coordinates, 2 * v) - left) / edge);
    const z = <i32>((getReal(coordinates, 2 * v + 1) - bottom) / edge);
    const cell = upright ? z * across + r : r * across + z;
    setInt(cellOf, v, cell);
    setInt(start, cell + 1, getInt(start, cell + 1) + 1);
  }
  for (let c = 0; c < across * along; c++) setInt(start, c + 1, getInt(start, c + 1) + getInt(start, c));
  for (let v = 0; v < n; v++) {
    const cell = getInt(cellOf, v);
    const place = getInt(start, cell);
    setInt(start, cell, place + 1);
    setInt(out, place, v);
  }
  reset(before);
}
