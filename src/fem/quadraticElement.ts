/**
 * Element routines of the six-node triangle revolved about the z axis, isoparametric: its sides are parabolas through
 * their middle nodes, so an arc is followed to third order. Seven-point quadrature is exact for straight sides
 * (N_i N_j r has degree 5) and exact enough for curved ones: the observed order stays 3 in the L2 norm.
 *
 * Node order: corners 0, 1, 2 counter-clockwise, middles of 0-1, 1-2, 2-0.
 */
import { LINE_POINTS, TRIANGLE_POINTS } from "./quadrature.ts";

const POINTS = TRIANGLE_POINTS.length;

/** The six shape functions at area coordinates (l0, l1), into `out`. */
export function quadraticShape(l0: number, l1: number, out: Float64Array): void {
  const l2 = 1 - l0 - l1;
  out[0] = l0 * (2 * l0 - 1);
  out[1] = l1 * (2 * l1 - 1);
  out[2] = l2 * (2 * l2 - 1);
  out[3] = 4 * l0 * l1;
  out[4] = 4 * l1 * l2;
  out[5] = 4 * l2 * l0;
}

/** Derivatives of the six shape functions by l0 and by l1 (l2 = 1 - l0 - l1), 6 values each. */
function quadraticSlopes(l0: number, l1: number, byL0: Float64Array, byL1: Float64Array): void {
  const l2 = 1 - l0 - l1;
  byL0.set([4 * l0 - 1, 0, 1 - 4 * l2, 4 * l1, -4 * l1, 4 * (l2 - l0)]);
  byL1.set([0, 4 * l1 - 1, 1 - 4 * l2, 4 * l0, 4 * (l2 - l1), -4 * l0]);
}

/** Values and slopes at the quadrature points: the same for every element. */
const SHAPE = new Float64Array(6 * POINTS);
const SLOPE0 = new Float64Array(6 * POINTS);
const SLOPE1 = new Float64Array(6 * POINTS);
TRIANGLE_POINTS.forEach(([l0, l1], q) => {
  quadraticShape(l0, l1, SHAPE.subarray(6 * q, 6 * q + 6));
  quadraticSlopes(l0, l1, SLOPE0.subarray(6 * q, 6 * q + 6), SLOPE1.subarray(6 * q, 6 * q + 6));
});
const gradR = new Float64Array(6);
const gradZ = new Float64Array(6);

/**
 * Conductance, consistent capacity and volumes of one element in one pass, for unit properties:
 *
 *   K_ij = integral of grad N_i . grad N_j 2 pi r dA  [m]
 *   C_ij = integral of N_i N_j 2 pi r dA              [m3]
 *   V_i  = integral of N_i 2 pi r dA                  [m3], may be zero or negative at corners
 *
 * @param nodes r, z of the six nodes [m], 12 values
 * @throws when the mapping turns over (a middle node so far off that the Jacobian is not positive)
 */
export function quadraticMatrices(
  nodes: Float64Array,
  conductance: Float64Array,
  capacity: Float64Array,
  volumes: Float64Array,
): void {
  conductance.fill(0);
  capacity.fill(0);
  volumes.fill(0);
  for (let q = 0; q < POINTS; q++) {
    let r = 0;
    let r0 = 0;
    let r1 = 0;
    let z0 = 0;
    let z1 = 0;
    for (let i = 0; i < 6; i++) {
      r += SHAPE[6 * q + i]! * nodes[2 * i]!;
      r0 += SLOPE0[6 * q + i]! * nodes[2 * i]!;
      r1 += SLOPE1[6 * q + i]! * nodes[2 * i]!;
      z0 += SLOPE0[6 * q + i]! * nodes[2 * i + 1]!;
      z1 += SLOPE1[6 * q + i]! * nodes[2 * i + 1]!;
    }
    const jacobian = r0 * z1 - r1 * z0;
    if (!(jacobian > 0)) throw new Error(`six-node element turns over: Jacobian ${jacobian} near r ${r} m`);
    const weight = Math.PI * r * jacobian * TRIANGLE_POINTS[q]![2];
    for (let i = 0; i < 6; i++) {
      const s0 = SLOPE0[6 * q + i]!;
      const s1 = SLOPE1[6 * q + i]!;
      gradR[i] = (s0 * z1 - s1 * z0) / jacobian;
      gradZ[i] = (s1 * r0 - s0 * r1) / jacobian;
    }
    for (let i = 0; i < 6; i++) {
      const shape = weight * SHAPE[6 * q + i]!;
      volumes[i]! += shape;
      for (let j = 0; j <= i; j++) {
        conductance[6 * i + j]! += weight * (gradR[i]! * gradR[j]! + gradZ[i]! * gradZ[j]!);
        capacity[6 * i + j]! += shape * SHAPE[6 * q + j]!;
      }
    }
  }
  mirrorLowerTriangle(conductance, 6);
  mirrorLowerTriangle(capacity, 6);
}

/**
 * Film matrix and areas of one revolved edge for unit film coefficient: integrals of N_i N_j and N_i over
 * 2 pi r ds, three-point Gauss.
 *
 * @param nodes r, z of first end, second end and middle [m], 6 values
 * @param film  9 values, row-major [m2]; overwritten
 * @param areas 3 values [m2]; overwritten
 */
export function quadraticEdge(nodes: Float64Array, film: Float64Array, areas: Float64Array): void {
  film.fill(0);
  areas.fill(0);
  for (const [s, w] of LINE_POINTS) {
    const shape = [(s * (s - 1)) / 2, (s * (s + 1)) / 2, 1 - s * s];
    const slope = [s - 0.5, s + 0.5, -2 * s];
    let r = 0;
    let dr = 0;
    let dz = 0;
    for (let i = 0; i < 3; i++) {
      r += shape[i]! * nodes[2 * i]!;
      dr += slope[i]! * nodes[2 * i]!;
      dz += slope[i]! * nodes[2 * i + 1]!;
    }
    const weight = 2 * Math.PI * r * Math.hypot(dr, dz) * w;
    for (let i = 0; i < 3; i++) {
      areas[i]! += weight * shape[i]!;
      for (let j = 0; j < 3; j++) film[3 * i + j]! += weight * shape[i]! * shape[j]!;
    }
  }
}

function mirrorLowerTriangle(matrix: Float64Array, size: number): void {
  for (let i = 0; i < size; i++) for (let j = 0; j < i; j++) matrix[size * j + i] = matrix[size * i + j]!;
}
