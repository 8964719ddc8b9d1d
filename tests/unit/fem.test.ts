/** Element routines and assembly: sums, patch tests, symmetry; nothing of heat. */
import { describe, expect, it } from "vitest";
import { meshRegions } from "../../mesh/meshRegions.ts";
import { refineMesh } from "../../mesh/refineMesh.ts";
import { addFilm, assembleInterior, assemblyTarget, edgeAreas } from "../../src/fem/assemble.ts";
import { drawnTriangles, linearElements, quadraticElements } from "../../src/fem/elementMesh.ts";
import type { ElementMesh } from "../../src/fem/elementMesh.ts";
import { extremeOf, maximumOfQuadratic } from "../../src/fem/extremes.ts";
import { linearConductance, linearVolumes } from "../../src/fem/linearElement.ts";
import { quadraticMatrices } from "../../src/fem/quadraticElement.ts";
import { TRIANGLE_POINTS } from "../../src/fem/quadrature.ts";
import { multiply } from "../../src/linalg/pattern.ts";

const RADIUS = 0.06;
const HEIGHT = 0.1;
/** A cylinder with a rounded shoulder: straight sides, an axis and an arc. */
const shoulder = {
  loops: [
    [
      { from: [0, 0], to: [RADIUS, 0] },
      { from: [RADIUS, 0], to: [RADIUS, HEIGHT - 0.02] },
      {
        from: [RADIUS, HEIGHT - 0.02],
        to: [RADIUS - 0.02, HEIGHT],
        through: [RADIUS - 0.02 + 0.02 * Math.SQRT1_2, HEIGHT - 0.02 + 0.02 * Math.SQRT1_2],
      },
      { from: [RADIUS - 0.02, HEIGHT], to: [0, HEIGHT] },
      { from: [0, HEIGHT], to: [0, 0] },
    ],
  ],
} as const;
/** Pappus: cylinder below, ring of the quarter circle, core of the shoulder. */
const quarterCentroid = (4 * 0.02) / (3 * Math.PI);
const VOLUME =
  Math.PI * RADIUS ** 2 * (HEIGHT - 0.02) +
  Math.PI * (RADIUS - 0.02) ** 2 * 0.02 +
  2 * Math.PI * (RADIUS - 0.02 + quarterCentroid) * ((Math.PI * 0.02 ** 2) / 4);

/** Base, wall, shoulder (Pappus), top. */
const AREA =
  Math.PI * RADIUS ** 2 +
  2 * Math.PI * RADIUS * (HEIGHT - 0.02) +
  2 * Math.PI * (RADIUS - 0.02 + (2 * 0.02) / Math.PI) * (Math.PI / 2) * 0.02 +
  Math.PI * (RADIUS - 0.02) ** 2;

const mesh = meshRegions({ regions: [shoulder], nodes: 150 });
const finer = refineMesh(mesh);
/** name, elements, the same on the refined mesh, order to which volume and area follow the arc */
const CASES: [string, ElementMesh, ElementMesh, number][] = [
  ["linear", linearElements(mesh), linearElements(finer), 2],
  ["six-node", quadraticElements(mesh), quadraticElements(finer), 4],
];
const unit = { conductivity: [1], volumetricHeatCapacity: [1] };
const dot = (a: Float64Array, b: Float64Array): number => a.reduce((sum, value, i) => sum + value * b[i]!, 0);
const fieldOf = (elements: ElementMesh, f: (r: number, z: number) => number): Float64Array =>
  Float64Array.from({ length: elements.nodes.length / 2 }, (_, i) =>
    f(elements.nodes[2 * i]!, elements.nodes[2 * i + 1]!),
  );

describe("element matrices", () => {
  const corners = Float64Array.of(0.1, 0, 0.3, 0.05, 0.15, 0.2);
  const area = (0.2 * 0.2 - 0.05 * 0.05) / 2;

  it("linear volumes add up to the ring volume 2 pi rbar A", () => {
    const out = new Float64Array(3);
    linearVolumes(corners, out);
    expect(out[0]! + out[1]! + out[2]!).toBeCloseTo(2 * Math.PI * ((0.1 + 0.3 + 0.15) / 3) * area, 14);
  });

  it("rows of the linear conductance add up to zero", () => {
    const out = new Float64Array(9);
    linearConductance(corners, 3, out);
    for (let i = 0; i < 3; i++) expect(out[3 * i]! + out[3 * i + 1]! + out[3 * i + 2]!).toBeCloseTo(0, 14);
  });

  it("the triangle rule integrates degree 5 exactly, and no degree 6", () => {
    const integral = (a: number, b: number): number =>
      TRIANGLE_POINTS.reduce((sum, [l0, l1, w]) => sum + w * l0 ** a * l1 ** b, 0);
    // 2 a! b! / (a + b + 2)!, the mean of l0^a l1^b over the triangle
    const factorial = (n: number): number => (n < 2 ? 1 : n * factorial(n - 1));
    const exact = (a: number, b: number): number => (2 * factorial(a) * factorial(b)) / factorial(a + b + 2);
    for (const [a, b] of [
      [0, 0],
      [5, 0],
      [3, 2],
      [2, 2],
      [1, 4],
    ] as const)
      expect(integral(a, b)).toBeCloseTo(exact(a, b), 15);
    expect(Math.abs(integral(6, 0) - exact(6, 0))).toBeGreaterThan(1e-6);
  });

  it("a straight six-node element agrees with the linear one on a linear field", () => {
    const nodes = new Float64Array(12);
    nodes.set(corners);
    for (let c = 0; c < 3; c++)
      for (let d = 0; d < 2; d++)
        nodes[6 + 2 * c + d] = (corners[2 * c + d]! + corners[(2 * c + 2 + d) % 6]!) / 2;
    const k6 = new Float64Array(36);
    quadraticMatrices(nodes, k6, new Float64Array(36), new Float64Array(6));
    const k3 = new Float64Array(9);
    linearConductance(corners, 1, k3);
    const energy = (matrix: Float64Array, n: number, at: Float64Array): number => {
      let sum = 0;
      for (let i = 0; i < n; i++)
        for (let j = 0; j < n; j++)
          sum += matrix[n * i + j]! * (2 * at[2 * i]! + at[2 * i + 1]!) * (2 * at[2 * j]! + at[2 * j + 1]!);
      return sum;
    };
    expect(energy(k6, 6, nodes)).toBeCloseTo(energy(k3, 3, corners), 13);
  });

  it("refuses a six-node element that turns over", () => {
    const nodes = Float64Array.of(0.1, 0, 0.2, 0, 0.1, 0.1, 0.15, 0, 0.15, 0.05, 0.3, 0.05);
    expect(() =>
      quadraticMatrices(nodes, new Float64Array(36), new Float64Array(36), new Float64Array(6)),
    ).toThrow(/Jacobian/);
  });
});

const meshedVolume = (elements: ElementMesh): number =>
  assembleInterior(elements, assemblyTarget(elements), unit).volumes.reduce((sum, value) => sum + value, 0);
const everyEdge = (elements: ElementMesh): number[] =>
  Array.from({ length: elements.edges.length / elements.nodesPerEdge }, (_, i) => i);
const meshedArea = (elements: ElementMesh): number =>
  edgeAreas(elements, everyEdge(elements)).reduce((sum, value) => sum + value, 0);
const orderOf = (exact: number, coarse: number, fine: number): number =>
  Math.log2((coarse - exact) / (fine - exact));

describe.each(CASES)("assembly with %s triangles", (_, elements, refined, order) => {
  const target = assemblyTarget(elements);
  const { capacity, conduction, volumes } = assembleInterior(elements, target, unit);
  const ones = fieldOf(elements, () => 1);
  const apply = (values: Float64Array, x: Float64Array): Float64Array =>
    multiply(target.pattern, values, x, new Float64Array(x.length));
  const meshVolume = dot(volumes, ones);

  it("capacity and shape-function volumes add up to the meshed volume", () => {
    expect(dot(apply(capacity, ones), ones)).toBeCloseTo(meshVolume, 12);
  });

  it("volume and area tend to Pappus' with the order of the geometry", () => {
    expect(Math.abs(orderOf(VOLUME, meshVolume, meshedVolume(refined)) - order)).toBeLessThan(0.15);
    expect(Math.abs(orderOf(AREA, meshedArea(elements), meshedArea(refined)) - order)).toBeLessThan(0.15);
  });

  it("a uniform field conducts nothing", () => {
    for (const value of apply(conduction, ones)) expect(Math.abs(value)).toBeLessThan(1e-12);
  });

  it("a field linear in z has the energy of its volume and no residual inside (patch test)", () => {
    const z = fieldOf(elements, (_r, height) => height);
    const residual = apply(conduction, z);
    expect(dot(residual, z)).toBeCloseTo(meshVolume, 12);
    const onSide = new Set(elements.edges);
    residual.forEach((value, node) => {
      if (!onSide.has(node)) expect(Math.abs(value)).toBeLessThan(1e-14);
    });
  });

  it("film loads add up to film times area, and the film matrix to the same", () => {
    const edges = everyEdge(elements);
    const conductance = new Float64Array(conduction.length);
    const load = addFilm(elements, target.pattern, edges, 7, conductance);
    const areas = edgeAreas(elements, edges);
    expect(dot(load, ones)).toBeCloseTo(7 * dot(areas, ones), 12);
    expect(dot(apply(conductance, ones), ones)).toBeCloseTo(7 * dot(areas, ones), 12);
  });

  it("is drawn as triangles that cover the same section", () => {
    const { triangles, triangleRegion } = drawnTriangles(elements);
    expect(triangles.length).toBe(3 * triangleRegion.length);
    let area = 0;
    for (let t = 0; t < triangles.length; t += 3) {
      const [a, b, c] = [triangles[t]!, triangles[t + 1]!, triangles[t + 2]!].map((node) => [
        elements.nodes[2 * node]!,
        elements.nodes[2 * node + 1]!,
      ]) as [number[], number[], number[]];
      const twice = (b[0]! - a[0]!) * (c[1]! - a[1]!) - (c[0]! - a[0]!) * (b[1]! - a[1]!);
      expect(twice).toBeGreaterThan(0);
      area += twice / 2;
    }
    const exact = RADIUS * HEIGHT - (1 - Math.PI / 4) * 0.02 ** 2;
    expect(Math.abs(area / exact - 1)).toBeLessThan(2e-3);
  });
});

describe("extremes of a quadratic field", () => {
  it("agrees with a fine search over the triangle", () => {
    let seed = 12345;
    const random = (): number => ((seed = (seed * 48271) % 2147483647) / 2147483647) * 2 - 1;
    for (let trial = 0; trial < 200; trial++) {
      const t = Array.from({ length: 6 }, random);
      const found = maximumOfQuadratic(t);
      let best = -Infinity;
      for (let i = 0; i <= 60; i++)
        for (let j = 0; j <= 60 - i; j++) {
          const [l0, l1] = [i / 60, j / 60];
          const l2 = 1 - l0 - l1;
          const value =
            t[0]! * l0 * (2 * l0 - 1) +
            t[1]! * l1 * (2 * l1 - 1) +
            t[2]! * l2 * (2 * l2 - 1) +
            4 * (t[3]! * l0 * l1 + t[4]! * l1 * l2 + t[5]! * l2 * l0);
          best = Math.max(best, value);
        }
      expect(found.value).toBeGreaterThanOrEqual(best - 1e-12);
      expect(found.value).toBeLessThan(best + 5e-3);
    }
  });

  it("finds a hot spot between nodes, which nodes alone miss", () => {
    const elements = quadraticElements(mesh);
    const [r0, z0] = [0.0213, 0.0447];
    const field = fieldOf(elements, (r, z) => 100 - 1e4 * ((r - r0) ** 2 + (z - z0) ** 2));
    const found = extremeOf(elements, field, 1);
    expect(found.value).toBeCloseTo(100, 6);
    expect(Math.hypot(found.place[0] - r0, found.place[1] - z0)).toBeLessThan(1e-7);
    expect(Math.max(...field)).toBeLessThan(99.99);
  });
});
