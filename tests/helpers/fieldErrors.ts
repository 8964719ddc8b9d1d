/** Errors of a finite-element field against a formula, by quadrature finer than the assembly's. */
import type { ElementMesh } from "../../src/fem/elementMesh.ts";

export interface FieldErrors {
  /** root of the integral of (u_h - u)^2 over the revolved part */
  readonly l2: number;
  /** the same of the gradient */
  readonly gradient: number;
}

/** Each element is parted into 16 triangles in area coordinates; the midpoint rule of three points on each. */
export function fieldErrors(
  mesh: ElementMesh,
  field: Float64Array,
  exact: (r: number, z: number) => number,
  exactGradient: (r: number, z: number) => readonly [number, number],
): FieldErrors {
  const points = finePoints(4);
  const n = mesh.nodesPerElement;
  let l2 = 0;
  let gradient = 0;
  for (let e = 0; e < mesh.region.length; e++) {
    const nodes = mesh.elements.subarray(n * e, n * e + n);
    for (const [l0, l1, w] of points) {
      const shape = n === 6 ? quadratic(l0, l1) : linear(l0, l1);
      let [r, z, u, r0, r1, z0, z1, u0, u1] = [0, 0, 0, 0, 0, 0, 0, 0, 0];
      nodes.forEach((node, i) => {
        const [value, by0, by1] = shape[i]!;
        const [nr, nz, nu] = [mesh.nodes[2 * node]!, mesh.nodes[2 * node + 1]!, field[node]!];
        r += value * nr;
        z += value * nz;
        u += value * nu;
        r0 += by0 * nr;
        r1 += by1 * nr;
        z0 += by0 * nz;
        z1 += by1 * nz;
        u0 += by0 * nu;
        u1 += by1 * nu;
      });
      const jacobian = r0 * z1 - r1 * z0;
      const weight = Math.PI * r * jacobian * w;
      const [er, ez] = exactGradient(r, z);
      const dr = (u0 * z1 - u1 * z0) / jacobian - er;
      const dz = (r0 * u1 - r1 * u0) / jacobian - ez;
      l2 += weight * (u - exact(r, z)) ** 2;
      gradient += weight * (dr * dr + dz * dz);
    }
  }
  return { l2: Math.sqrt(l2), gradient: Math.sqrt(gradient) };
}

type Shape = readonly [value: number, byL0: number, byL1: number];

const linear = (l0: number, l1: number): Shape[] => [
  [l0, 1, 0],
  [l1, 0, 1],
  [1 - l0 - l1, -1, -1],
];

function quadratic(l0: number, l1: number): Shape[] {
  const l2 = 1 - l0 - l1;
  return [
    [l0 * (2 * l0 - 1), 4 * l0 - 1, 0],
    [l1 * (2 * l1 - 1), 0, 4 * l1 - 1],
    [l2 * (2 * l2 - 1), 1 - 4 * l2, 1 - 4 * l2],
    [4 * l0 * l1, 4 * l1, 4 * l0],
    [4 * l1 * l2, -4 * l1, 4 * (l2 - l1)],
    [4 * l2 * l0, 4 * (l2 - l0), -4 * l0],
  ];
}

/** Side middles of m x m equal sub-triangles: exact to degree 2 on each. */
function finePoints(m: number): [number, number, number][] {
  const points: [number, number, number][] = [];
  const add = (corners: [number, number][]): void => {
    for (let c = 0; c < 3; c++) {
      const [a, b] = [corners[c]!, corners[(c + 1) % 3]!];
      points.push([(a[0] + b[0]) / (2 * m), (a[1] + b[1]) / (2 * m), 1 / (3 * m * m)]);
    }
  };
  for (let i = 0; i < m; i++)
    for (let j = 0; j < m - i; j++) {
      add([
        [i, j],
        [i + 1, j],
        [i, j + 1],
      ]);
      if (i + j < m - 1)
        add([
          [i + 1, j + 1],
          [i, j + 1],
          [i + 1, j],
        ]);
    }
  return points;
}
