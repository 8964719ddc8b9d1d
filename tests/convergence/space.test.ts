/**
 * Observed order in space. The field J0(r) exp(z) (lengths in units of the part) satisfies Laplace's equation in (r, z);
 * its values are prescribed on the surface and the inside is solved for, on nested meshes of a sphere (curved sides), a
 * cone frustum (straight, tilted) and a ring off the axis. L2 and energy errors by quadrature against the formula.
 */
import besselj0 from "@stdlib/math-base-special-besselj0";
import besselj1 from "@stdlib/math-base-special-besselj1";
import { describe, expect, it } from "vitest";
import { checkMesh } from "../../mesh/checkMesh.ts";
import { meshRegions } from "../../mesh/meshRegions.ts";
import { refineMesh } from "../../mesh/refineMesh.ts";
import type { OutlineSide } from "../../mesh/types.ts";
import { assembleInterior, assemblyTarget } from "../../src/fem/assemble.ts";
import { linearElements, quadraticElements } from "../../src/fem/elementMesh.ts";
import type { ElementMesh } from "../../src/fem/elementMesh.ts";
import {
  conjugateGradients,
  conjugateGradientsWork,
  diagonalPreconditioner,
} from "../../src/linalg/conjugateGradients.ts";
import { multiply } from "../../src/linalg/pattern.ts";
import { fieldErrors } from "../helpers/fieldErrors.ts";
import { observedOrders } from "../helpers/observedOrder.ts";

const exact = (r: number, z: number): number => besselj0(r) * Math.exp(z);
const exactGradient = (r: number, z: number): [number, number] => [-besselj1(r) * Math.exp(z), exact(r, z)];

const PARTS: Record<string, OutlineSide[]> = {
  sphere: [
    { from: [0, -1], to: [0, 1], through: [1, 0] },
    { from: [0, 1], to: [0, -1] },
  ],
  "cone frustum": [
    { from: [0, 0], to: [1, 0] },
    { from: [1, 0], to: [0.5, 1.2] },
    { from: [0.5, 1.2], to: [0, 1.2] },
    { from: [0, 1.2], to: [0, 0] },
  ],
  "ring with a rounded side": [
    { from: [0.5, 0], to: [1, 0] },
    { from: [1, 0], to: [1, 0.8], through: [1.3, 0.4] },
    { from: [1, 0.8], to: [0.5, 0.8] },
    { from: [0.5, 0.8], to: [0.5, 0] },
  ],
};

/** Solves K u = 0 inside for the exact values on the surface. */
function solveInside(elements: ElementMesh, onAxis: (r: number) => boolean): Float64Array {
  const target = assemblyTarget(elements);
  const { pattern } = target;
  const { conduction } = assembleInterior(elements, target, {
    conductivity: [1],
    volumetricHeatCapacity: [1],
  });
  const held = new Uint8Array(pattern.size);
  for (let edge = 0; edge < elements.edgeSides.length / 2; edge++) {
    const nodes = elements.edges.subarray(elements.nodesPerEdge * edge, elements.nodesPerEdge * (edge + 1));
    if (nodes.every((node) => onAxis(elements.nodes[2 * node]!))) continue;
    for (const node of nodes) held[node] = 1;
  }
  const u = Float64Array.from(held, (on, i) =>
    on ? exact(elements.nodes[2 * i]!, elements.nodes[2 * i + 1]!) : 0,
  );
  const load = new Float64Array(pattern.size);
  for (let row = 0; row < pattern.size; row++)
    for (let k = pattern.rowStart[row]!; k < pattern.rowStart[row + 1]!; k++) {
      const column = pattern.columns[k]!;
      if (held[row]) conduction[k] = column === row ? 1 : 0;
      else if (held[column]) {
        load[row]! -= conduction[k]! * u[column]!;
        conduction[k] = 0;
      }
      if (held[row] && column === row) load[row] = u[row]!;
    }
  const solution = u.slice();
  const work = conjugateGradientsWork(pattern.size);
  const preconditioner = diagonalPreconditioner(pattern, conduction);
  conjugateGradients(
    { multiply: (x, out) => multiply(pattern, conduction, x, out) },
    load,
    preconditioner,
    work,
    { relativeResidual: 1e-13, iterationLimit: 5000 },
    solution,
  );
  return solution;
}

describe.each(Object.entries(PARTS))("on a %s", (_, sides) => {
  const request = { regions: [{ loops: [sides] }], nodes: 110 };
  const meshes = [meshRegions(request)];
  while (meshes.length < 4) meshes.push(refineMesh(meshes.at(-1)!));

  it("every mesh of the ladder is sound", () => {
    for (const mesh of meshes) expect(checkMesh(mesh, request)).toEqual([]);
  });

  it.each([
    ["linear triangles: order 2 in L2, 1 in the gradient", linearElements, 2],
    ["six-node triangles: order 3 in L2, 2 in the gradient", quadraticElements, 3],
  ] as const)("%s", (_name, build, order) => {
    const errors = meshes.map((mesh) => {
      const elements = build(mesh);
      return fieldErrors(
        elements,
        solveInside(elements, (r) => r < 1e-12),
        exact,
        exactGradient,
      );
    });
    const inL2 = observedOrders(errors.map((error) => error.l2)).at(-1)!;
    const inGradient = observedOrders(errors.map((error) => error.gradient)).at(-1)!;
    expect(Math.abs(inL2 - order)).toBeLessThan(0.1);
    expect(Math.abs(inGradient - (order - 1))).toBeLessThan(0.1);
  });
});
