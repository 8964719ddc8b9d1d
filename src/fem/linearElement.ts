/**
 * Element routines of the linear triangle revolved about the z axis. Pure functions of numbers: they know nothing of
 * meshes or assembly. Integrals are exact for values constant on the element (area coordinates, [ZT00]).
 */

/**
 * Conductance matrix, k constant on the element:
 *
 *   K_ij = 2 pi k rbar A (grad N_i . grad N_j),     rbar = (r_1 + r_2 + r_3) / 3
 *
 * Exact: the gradients are constant and r is linear. Every row adds up to zero.
 *
 * @param corners      r, z of three corners, counter-clockwise [m], 6 values
 * @param conductivity k [W/(m K)]
 * @param out          9 values, row-major [W/K], overwritten
 */
export function linearConductance(corners: Float64Array, conductivity: number, out: Float64Array): void {
  const [r0, z0, r1, z1, r2, z2] = corners as unknown as [number, number, number, number, number, number];
  const twiceArea = (r1 - r0) * (z2 - z0) - (r2 - r0) * (z1 - z0);
  const b = [z1 - z2, z2 - z0, z0 - z1];
  const c = [r2 - r1, r0 - r2, r1 - r0];
  const factor = (2 * Math.PI * conductivity * (r0 + r1 + r2)) / (6 * twiceArea);
  for (let i = 0; i < 3; i++)
    for (let j = 0; j < 3; j++) out[3 * i + j] = factor * (b[i]! * b[j]! + c[i]! * c[j]!);
}

/**
 * Integrals of the three shape functions over the ring: 2 pi A (2 r_i + r_j + r_k) / 12. They are the rows of the
 * lumped capacity matrix for unit heat capacity, and the load of a unit source.
 *
 * @param out 3 values [m3]; they add up to the ring's volume
 */
export function linearVolumes(corners: Float64Array, out: Float64Array): void {
  const [r0, z0, r1, z1, r2, z2] = corners as unknown as [number, number, number, number, number, number];
  const area = ((r1 - r0) * (z2 - z0) - (r2 - r0) * (z1 - z0)) / 2;
  const sum = r0 + r1 + r2;
  const factor = (2 * Math.PI * area) / 12;
  out[0] = factor * (sum + r0);
  out[1] = factor * (sum + r1);
  out[2] = factor * (sum + r2);
}

/**
 * Integrals of the two edge shape functions over the revolved edge: 2 pi L (2 r_i + r_j) / 6. They are the diagonal of
 * the lumped film matrix for unit film coefficient, and the load of a unit flux.
 *
 * The film is lumped as the capacity is: with a consistent film the skin can leave the range between start and
 * surroundings in the first instants, which lumping both excludes on meshes without obtuse angles.
 *
 * @param ends r, z of the two ends [m], 4 values
 * @param out  2 values [m2]; they add up to the frustum's area
 */
export function linearEdgeAreas(ends: Float64Array, out: Float64Array): void {
  const [ra, za, rb, zb] = ends as unknown as [number, number, number, number];
  const factor = (2 * Math.PI * Math.hypot(rb - ra, zb - za)) / 6;
  out[0] = factor * (2 * ra + rb);
  out[1] = factor * (ra + 2 * rb);
}
