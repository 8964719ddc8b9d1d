import { describe, expect, it } from "vitest";
import { checkMesh } from "../../mesh/checkMesh.ts";
import { meshRegions } from "../../mesh/meshRegions.ts";
import { meshQuality } from "../../mesh/quality.ts";
import { refineMesh } from "../../mesh/refineMesh.ts";
import { firstRow } from "../../mesh/sizeField.ts";
import type { MeshRequest, TriangleMesh } from "../../mesh/types.ts";
import { meshFigures } from "../helpers/meshFigures.ts";
import { extremes, parts, regionOf, rowsEverywhere } from "../helpers/outlines.ts";

/** Depths below a place on a side at which a node lies, along the inner normal. */
function depthsBelow(mesh: TriangleMesh, r: number, z: number, nr: number, nz: number): number[] {
  const depths: number[] = [];
  for (let i = 0; i < mesh.nodes.length; i += 2) {
    const [dr, dz] = [mesh.nodes[i]! - r, mesh.nodes[i + 1]! - z];
    const depth = dr * nr + dz * nz;
    if (Math.abs(dr * nz - dz * nr) < 1e-9 && depth > -1e-12) depths.push(depth);
  }
  return depths.sort((p, q) => p - q);
}

/** Radius of the node on the wall nearest to a height. */
function wallNode(mesh: TriangleMesh, r: number, z: number): number {
  let best = Infinity;
  for (let i = 0; i < mesh.nodes.length; i += 2) {
    if (Math.abs(mesh.nodes[i]! - r) > 1e-12) continue;
    if (Math.abs(mesh.nodes[i + 1]! - z) < Math.abs(best - z)) best = mesh.nodes[i + 1]!;
  }
  return best;
}

describe("rows parallel to sides", () => {
  const request: MeshRequest = {
    regions: parts["shaft"]!,
    nodes: 1500,
    rows: rowsEverywhere(parts["shaft"]!, 0.001),
  };
  const mesh = meshRegions(request);

  it("lie at the depths asked for, straight below the side nodes", () => {
    const z = wallNode(mesh, 0.2, 0.15);
    const depths = depthsBelow(mesh, 0.2, z, -1, 0);
    for (const [k, depth] of [0, 0.001, 0.003, 0.007].entries()) expect(depths[k]).toBeCloseTo(depth, 12);
  });

  it("cost no soundness, and right-angled as they are hardly a wide angle", () => {
    expect(checkMesh(mesh, request)).toEqual([]);
    expect(meshQuality(mesh).maxAngleDeg).toBeLessThanOrEqual(120);
    expect(Math.abs(mesh.nodes.length / 3000 - 1)).toBeLessThan(0.15);
  });

  it("are Delaunay along straight sides with square corners, so that nothing overshoots", () => {
    expect(meshFigures(mesh, request).notDelaunay).toBe(0);
  });

  it("leave the axis alone: rows end on it", () => {
    const onAxis: number[] = [];
    for (let i = 0; i < mesh.nodes.length; i += 2) if (mesh.nodes[i] === 0) onAxis.push(mesh.nodes[i + 1]!);
    onAxis.sort((p, q) => p - q);
    for (const [k, z] of [0, 0.001, 0.003, 0.007].entries()) expect(onAxis[k]).toBeCloseTo(z, 12);
  });

  it("need no more nodes as triangles grow finer: none at all once triangles are as thin", () => {
    const plain = meshRegions({ regions: parts["shaft"]!, nodes: 60_000 });
    const rows = meshRegions({
      regions: parts["shaft"]!,
      nodes: 60_000,
      rows: rowsEverywhere(parts["shaft"]!, 0.02),
    });
    expect(rows).toEqual(plain);
  });

  it("one side alone: the others keep their spacing", () => {
    const one = { ...request, rows: [{ side: 1, thickness: 0.001, growth: 2 }] };
    const meshed = meshRegions(one);
    expect(checkMesh(meshed, one)).toEqual([]);
    const z = wallNode(meshed, 0.2, 0.15);
    expect(depthsBelow(meshed, 0.2, z, -1, 0)[1]).toBeCloseTo(0.001, 12);
    expect(meshQuality(meshed).maxAngleDeg).toBeLessThanOrEqual(120);
  });

  it("round a sphere every column points to the middle", () => {
    const sphere = { regions: parts["sphere"]!, nodes: 800, rows: rowsEverywhere(parts["sphere"]!, 0.0003) };
    const meshed = meshRegions(sphere);
    expect(checkMesh(meshed, sphere)).toEqual([]);
    const radii = new Set<string>();
    for (let i = 0; i < meshed.nodes.length; i += 2) {
      radii.add(Math.hypot(meshed.nodes[i]!, meshed.nodes[i + 1]!).toFixed(9));
    }
    for (const depth of [0, 0.0003, 0.0009, 0.0021]) expect(radii.has((0.05 - depth).toFixed(9))).toBe(true);
  });

  it("two regions side by side: rows of both end on the interface at the same nodes", () => {
    const regions = [
      regionOf([
        [0, 0],
        [0.1, 0],
        [0.1, 0.1],
        [0, 0.1],
      ]),
      regionOf([
        [0, 0.1],
        [0.1, 0.1],
        [0.1, 0.2],
        [0, 0.2],
      ]),
    ];
    const rows = [
      { side: 1, thickness: 0.0004, growth: 2 },
      { side: 5, thickness: 0.0008, growth: 2 },
    ];
    const stacked = { regions, nodes: 1200, rows };
    const meshed = meshRegions(stacked);
    expect(checkMesh(meshed, stacked)).toEqual([]);
    const depths = depthsBelow(meshed, 0.1, 0.1, -1, 0);
    for (const [k, depth] of [0, 0.0004, 0.0012, 0.0028].entries()) expect(depths[k]).toBeCloseTo(depth, 12);
    expect(meshQuality(meshed).maxAngleDeg).toBeLessThanOrEqual(120);
  });

  it("a requested point just below a side is a node, and rows keep off it", () => {
    const points = [[0.198, 0.1501] as const];
    const probed = { ...request, points };
    const meshed = meshRegions(probed);
    expect(checkMesh(meshed, probed)).toEqual([]);
    expect(meshQuality(meshed).maxAngleDeg).toBeLessThanOrEqual(125);
  });

  it("rows that would eat the nodes are made thicker, and the nodes asked for are met", () => {
    const greedy = { ...request, nodes: 600, rows: rowsEverywhere(parts["shaft"]!, 1e-6, 1.2) };
    const meshed = meshRegions(greedy);
    expect(checkMesh(meshed, greedy)).toEqual([]);
    expect(Math.abs(meshed.nodes.length / 1200 - 1)).toBeLessThan(0.15);
  });

  for (const [name, regions] of Object.entries({ ...parts, ...extremes })) {
    it(`${name}: rows of 1/300 and 1/3000 of the part stay sound`, () => {
      for (const share of [1 / 300, 1 / 3000]) {
        const asked = { regions, nodes: 3000, rows: rowsEverywhere(regions, share * sizeOf(regions)) };
        const meshed = meshRegions(asked);
        expect(checkMesh(meshed, asked)).toEqual([]);
        // Side nodes go to the true arc when refined: thin rows beside arcs must bear it.
        expect(checkMesh(refineMesh(meshed), asked)).toEqual([]);
        expect(meshQuality(meshed).maxAngleDeg).toBeLessThanOrEqual(130);
      }
    });
  }

  function sizeOf(regions: MeshRequest["regions"]): number {
    const zs = regions.flatMap(({ loops }) => loops.flat().map(({ from }) => from[1]));
    return Math.max(...zs) - Math.min(...zs) || 1;
  }

  it("thickness or growth that is no number is passed over", () => {
    const odd = {
      ...request,
      rows: [
        { side: 1, thickness: NaN, growth: 2 },
        { side: 2, thickness: -1, growth: 2 },
      ],
    };
    expect(meshRegions(odd)).toEqual(meshRegions({ ...request, rows: [] }));
  });
});

describe("first row from the numbers of a case", () => {
  const steel = { diffusivity: 1e-5, conductivity: 40, halfThickness: 0.1, film: 1000, instant: 1 };

  it("is one and a half diffusion lengths, growing by a half", () => {
    const row = firstRow(steel)!;
    expect(row.thickness).toBeCloseTo(1.5 * Math.sqrt(1e-5), 12);
    expect(row.growth).toBe(1.5);
  });

  it("grows with the square root of the first instant", () => {
    expect(firstRow({ ...steel, instant: 4 })!.thickness / firstRow(steel)!.thickness).toBeCloseTo(2, 12);
  });

  it("none below a Biot number of 0.1, none once the heat has gone a quarter of the way in", () => {
    expect(firstRow({ ...steel, film: 39 })).toBeNull();
    expect(firstRow({ ...steel, film: 41 })).not.toBeNull();
    expect(firstRow({ ...steel, instant: 63 })).toBeNull();
    expect(firstRow({ ...steel, instant: 62 })).not.toBeNull();
  });

  it("a held temperature is a film without limit; numbers without sense give none", () => {
    expect(firstRow({ ...steel, film: Infinity })).not.toBeNull();
    for (const wrong of [{ instant: 0 }, { diffusivity: NaN }, { conductivity: 0 }, { film: NaN }]) {
      expect(firstRow({ ...steel, ...wrong })).toBeNull();
    }
  });
});
