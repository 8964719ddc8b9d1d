/**
 * Hottest and coldest place of a field. A linear field has them at nodes; a quadratic one may have them inside an
 * element or on its sides, and asking nodes only costs up to two digits of a time to target.
 */
import type { ElementMesh } from "./elementMesh.ts";

export interface Extreme {
  readonly value: number;
  /** r, z [m] */
  readonly place: readonly [number, number];
}

/** Largest value of the field (`sign` 1) or smallest (`sign` -1), sought inside elements when they are quadratic. */
export function extremeOf(mesh: ElementMesh, field: Float64Array, sign: 1 | -1): Extreme {
  let best = 0;
  for (let i = 1; i < field.length; i++) if (sign * field[i]! > sign * field[best]!) best = i;
  const nodal: Extreme = { value: field[best]!, place: [mesh.nodes[2 * best]!, mesh.nodes[2 * best + 1]!] };
  return mesh.nodesPerElement === 6 ? insideElements(mesh, field, sign, nodal) : nodal;
}

/**
 * A quadratic passes its largest nodal value by at most a third of the spread of its nodes (the Lebesgue constant of
 * the six nodes is 5/3, reached at the centroid), so few elements need a closer look.
 */
function insideElements(mesh: ElementMesh, field: Float64Array, sign: 1 | -1, nodal: Extreme): Extreme {
  let best = nodal;
  const t = new Float64Array(6);
  for (let e = 0; e < mesh.region.length; e++) {
    let top = -Infinity;
    let bottom = Infinity;
    for (let i = 0; i < 6; i++) {
      const value = sign * field[mesh.elements[6 * e + i]!]!;
      t[i] = value;
      if (value > top) top = value;
      if (value < bottom) bottom = value;
    }
    if (top + (top - bottom) / 3 <= sign * best.value) continue;
    const found = maximumOfQuadratic(t);
    if (found.value > sign * best.value)
      best = { value: sign * found.value, place: placeIn(mesh, e, found.l0, found.l1) };
  }
  return best;
}

/**
 * Maximum of a quadratic over the triangle from its six nodal values (corners, then middles of 0-1, 1-2, 2-0):
 * the inner stationary point where it is a maximum, else the best of the three sides. Closed form.
 *
 * @returns the value and area coordinates of corners 0 and 1
 */
export function maximumOfQuadratic(t: ArrayLike<number>): { value: number; l0: number; l1: number } {
  let best = { value: t[0]!, l0: 1, l1: 0 };
  const offer = (value: number, l0: number, l1: number): void => {
    if (value > best.value) best = { value, l0, l1 };
  };
  offer(t[1]!, 0, 1);
  offer(t[2]!, 0, 0);
  // T = c + a x + b y + p x^2 + q x y + s y^2 with x = l0, y = l1
  const c = t[2]!;
  const a = -t[0]! - 3 * c + 4 * t[5]!;
  const p = 2 * t[0]! + 2 * c - 4 * t[5]!;
  const b = -t[1]! - 3 * c + 4 * t[4]!;
  const s = 2 * t[1]! + 2 * c - 4 * t[4]!;
  const q = 4 * (t[3]! + c - t[4]! - t[5]!);
  const value = (x: number, y: number): number => c + a * x + b * y + p * x * x + q * x * y + s * y * y;
  const determinant = 4 * p * s - q * q;
  if (determinant > 0 && p < 0) {
    const x = (q * b - 2 * s * a) / determinant;
    const y = (q * a - 2 * p * b) / determinant;
    if (x > 0 && y > 0 && x + y < 1) offer(value(x, y), x, y);
  }
  if (p < 0) offerWithin(-a / (2 * p), (x) => offer(value(x, 0), x, 0));
  if (s < 0) offerWithin(-b / (2 * s), (y) => offer(value(0, y), 0, y));
  const along = p - q + s; // on the side 0-1: y = 1 - x
  if (along < 0) offerWithin(-(a - b + q - 2 * s) / (2 * along), (x) => offer(value(x, 1 - x), x, 1 - x));
  return best;
}

function offerWithin(at: number, offer: (at: number) => void): void {
  if (at > 0 && at < 1) offer(at);
}

/** Place of area coordinates in a six-node element, by its own mapping. */
function placeIn(mesh: ElementMesh, element: number, l0: number, l1: number): [number, number] {
  const l2 = 1 - l0 - l1;
  const shape = [
    l0 * (2 * l0 - 1),
    l1 * (2 * l1 - 1),
    l2 * (2 * l2 - 1),
    4 * l0 * l1,
    4 * l1 * l2,
    4 * l2 * l0,
  ];
  let r = 0;
  let z = 0;
  for (let i = 0; i < 6; i++) {
    const node = mesh.elements[6 * element + i]!;
    r += shape[i]! * mesh.nodes[2 * node]!;
    z += shape[i]! * mesh.nodes[2 * node + 1]!;
  }
  return [r, z];
}
