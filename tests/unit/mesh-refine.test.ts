import { describe, expect, it } from "vitest";
import { checkMesh } from "../../mesh/checkMesh.ts";
import { edgeMidpoint } from "../../mesh/edgeMidpoint.ts";
import { meshRegions } from "../../mesh/meshRegions.ts";
import { meshQuality } from "../../mesh/quality.ts";
import { refineMesh } from "../../mesh/refineMesh.ts";
import type { OutlineRegion } from "../../mesh/types.ts";
import { meshExposedArea, meshVolume } from "../helpers/meshBody.ts";
import { parts, regionOf } from "../helpers/outlines.ts";

describe("four from one", () => {
  for (const name of ["bottle", "ingot", "torus", "sleeveInSocket", "voided", "fillet"]) {
    it(`${name}: three times refined it stays sound, keeps nodes, tags and quality`, () => {
      const request = { regions: parts[name]!, nodes: 500 };
      let mesh = meshRegions(request);
      const first = meshQuality(mesh);
      for (let level = 0; level < 3; level++) {
        const finer = refineMesh(mesh);
        expect(checkMesh(finer, request)).toEqual([]);
        expect(finer.triangles.length).toBe(4 * mesh.triangles.length);
        expect(finer.edges.length).toBe(2 * mesh.edges.length);
        expect(finer.nodes.subarray(0, mesh.nodes.length)).toEqual(mesh.nodes);
        expect(finer.pointNodes).toEqual(mesh.pointNodes);
        mesh = finer;
      }
      const last = meshQuality(mesh);
      expect(last.minAngleDeg).toBeGreaterThanOrEqual(Math.min(31, first.minAngleDeg - 1));
      expect(last.meanQuality).toBeGreaterThanOrEqual(first.meanQuality - 0.002);
    });
  }

  it("edgeMidpoint gives the node that refinement puts there", () => {
    const mesh = meshRegions({ regions: parts["torus"]!, nodes: 200 });
    const finer = refineMesh(mesh);
    const p = [0, 0];
    for (let k = 0; k < mesh.edgeArc.length; k++) {
      edgeMidpoint(mesh, k, p);
      const v = 2 * finer.edges[4 * k + 1]!;
      expect([finer.nodes[v], finer.nodes[v + 1]]).toEqual(p);
      expect(Math.hypot(p[0]! - 0.1, p[1]!)).toBeCloseTo(0.04, 14);
    }
  });
});

/** An ogive: the arc of radius rho meets the base at a right angle and the axis in a point at height L. */
const ogive = { base: 0.1, height: 0.3, rho: (0.1 ** 2 + 0.3 ** 2) / (2 * 0.1) };
const ogiveThrough = (z: number): [number, number] => [
  Math.sqrt(ogive.rho ** 2 - z ** 2) - (ogive.rho - ogive.base),
  z,
];

/**
 * Closed forms of the textbooks; that of the ogive from its integral,
 * V = pi (L rho^2 - L^3 / 3 - (rho - R) rho^2 asin(L / rho)), A = 2 pi rho ((R - rho) asin(L / rho) + L).
 */
const bodies: Record<string, { regions: OutlineRegion[]; volume: number; area: number }> = {
  sphere: {
    regions: parts["sphere"]!,
    volume: (4 / 3) * Math.PI * 0.05 ** 3,
    area: 4 * Math.PI * 0.05 ** 2,
  },
  torus: {
    regions: parts["torus"]!,
    volume: 2 * Math.PI ** 2 * 0.1 * 0.04 ** 2,
    area: 4 * Math.PI ** 2 * 0.1 * 0.04,
  },
  frustum: {
    regions: [
      regionOf([
        [0, 0],
        [0.2, 0],
        [0.1, 0.3],
        [0, 0.3],
      ]),
    ],
    volume: ((Math.PI * 0.3) / 3) * (0.2 ** 2 + 0.2 * 0.1 + 0.1 ** 2),
    area: Math.PI * (0.2 ** 2 + 0.1 ** 2 + (0.2 + 0.1) * Math.hypot(0.1, 0.3)),
  },
  ogive: {
    regions: [
      regionOf([
        [0, 0],
        [ogive.base, 0, ...ogiveThrough(0.15)],
        [0, ogive.height],
      ]),
    ],
    volume:
      Math.PI *
      (ogive.height * ogive.rho ** 2 -
        ogive.height ** 3 / 3 -
        (ogive.rho - ogive.base) * ogive.rho ** 2 * Math.asin(ogive.height / ogive.rho)),
    area:
      Math.PI * ogive.base ** 2 +
      2 *
        Math.PI *
        ogive.rho *
        ((ogive.base - ogive.rho) * Math.asin(ogive.height / ogive.rho) + ogive.height),
  },
};

describe("volume and exposed area of the revolved mesh", () => {
  for (const [name, { regions, volume, area }] of Object.entries(bodies)) {
    it(`${name}: exact on straight sides, order 2 on arcs`, () => {
      let mesh = meshRegions({ regions, nodes: 300 });
      const errors: [number, number][] = [];
      for (let level = 0; level < 4; level++) {
        errors.push([meshVolume(mesh) / volume - 1, meshExposedArea(mesh) / area - 1]);
        mesh = refineMesh(mesh);
      }
      for (const kind of [0, 1]) {
        const [first, last] = [Math.abs(errors[0]![kind]!), Math.abs(errors[3]![kind]!)];
        if (name === "frustum") {
          expect(last).toBeLessThan(1e-12);
          continue;
        }
        expect(first).toBeLessThan(0.01);
        expect(Math.log2(first / last) / 3).toBeCloseTo(2, 1);
      }
    });
  }
});
