import { describe, expect, it } from "vitest";
import { checkMesh } from "../../mesh/checkMesh.ts";
import { MOST_NODES } from "../../mesh/defaults.ts";
import { meshRegions } from "../../mesh/meshRegions.ts";
import { HISTOGRAM_STEP_DEG, meshQuality } from "../../mesh/quality.ts";
import { refineMesh } from "../../mesh/refineMesh.ts";
import type { MeshRequest, Point } from "../../mesh/types.ts";
import { meshFigures } from "../helpers/meshFigures.ts";
import { extremes, mapOutline, parts, regionOf } from "../helpers/outlines.ts";

describe("parts of the work, from 500 to 10,000 nodes", () => {
  for (const [name, regions] of Object.entries(parts)) {
    it(`${name}: sound, near the nodes asked for, of the promised quality`, () => {
      for (const nodes of [500, 2000, 10_000]) {
        const request = { regions, nodes };
        const mesh = meshRegions(request);
        expect(checkMesh(mesh, request)).toEqual([]);
        const figures = meshFigures(mesh, request);
        expect(Math.abs(figures.nodes / nodes - 1)).toBeLessThan(0.15);
        expect(figures.leastAngle).toBeGreaterThanOrEqual(31);
        expect(figures.widestAngle).toBeLessThanOrEqual(120);
        expect(figures.meanQuality).toBeGreaterThanOrEqual(0.96);
        expect(figures.sizeJump).toBeLessThanOrEqual(2);
        expect(figures.notDelaunay).toBe(0);
      }
    });
  }
});

describe("size on demand", () => {
  for (const [name, nodes] of [
    ["shaft", 60_000],
    ["bottle", 60_000],
    ["ingot", 300_000],
  ] as const) {
    it(`${name}: ${nodes} nodes within 15 %, of the promised quality`, () => {
      const mesh = meshRegions({ regions: parts[name]!, nodes });
      expect(Math.abs(mesh.nodes.length / 2 / nodes - 1)).toBeLessThan(0.15);
      const quality = meshQuality(mesh);
      expect(quality.minAngleDeg).toBeGreaterThanOrEqual(31);
      expect(quality.maxAngleDeg).toBeLessThanOrEqual(120);
      expect(quality.meanQuality).toBeGreaterThanOrEqual(0.96);
    });
  }

  it("fewer nodes than an outline has use for give the coarsest sound mesh, refinable", () => {
    for (const regions of Object.values({ ...parts, ...extremes })) {
      for (const nodes of [3, 30, 120]) {
        const request = { regions, nodes };
        const mesh = meshRegions(request);
        expect(checkMesh(mesh, request)).toEqual([]);
        expect(checkMesh(refineMesh(mesh), request)).toEqual([]);
      }
    }
  });
});

describe("outlines at the edge of what is promised", () => {
  for (const [name, regions] of Object.entries(extremes)) {
    it(`${name}: sound, and good away from its sharp corners`, () => {
      const request = { regions, nodes: 5000 };
      const mesh = meshRegions(request);
      expect(checkMesh(mesh, request)).toEqual([]);
      const figures = meshFigures(mesh, request);
      expect(figures.leastAngle).toBeGreaterThanOrEqual(31);
      expect(figures.widestAngle).toBeLessThanOrEqual(120);
      expect(figures.meanQuality).toBeGreaterThanOrEqual(0.9);
      expect(Math.abs(figures.nodes / 5000 - 1)).toBeLessThan(0.15);
    });
  }
});

describe("copies", () => {
  const maps: Record<string, (p: Point) => Point> = {
    "in thousandths": ([r, z]) => [1e-3 * r, 1e-3 * z],
    "in thousands": ([r, z]) => [1e3 * r, 1e3 * z],
    "mirrored in z": ([r, z]) => [r, -z],
    "shifted in z by 500 sizes": ([r, z]) => [r, z + 100],
  };
  for (const name of ["bottle", "fillet", "sleeveInSocket", "acute", "torus"]) {
    for (const [how, map] of Object.entries(maps)) {
      it(`${name} ${how} meshes alike`, () => {
        const plain = meshFiguresOf({ regions: parts[name]!, nodes: 2000 });
        const copy = meshFiguresOf({ regions: mapOutline(parts[name]!, map), nodes: 2000 });
        expect(Math.abs(copy.nodes / plain.nodes - 1)).toBeLessThan(0.02);
        expect(Math.abs(copy.meanQuality - plain.meanQuality)).toBeLessThan(0.01);
        expect(copy.leastAngle).toBeGreaterThanOrEqual(31);
      });
    }
  }

  function meshFiguresOf(request: MeshRequest) {
    const mesh = meshRegions(request);
    expect(checkMesh(mesh, request)).toEqual([]);
    return meshFigures(mesh, request);
  }
});

describe("what a request fixes", () => {
  it("the same request gives the same mesh, number for number", () => {
    const request = { regions: parts["bottle"]!, nodes: 1500 };
    expect(meshRegions(request)).toEqual(meshRegions(request));
  });

  it("either direction of travel gives the same part", () => {
    const forward = parts["voided"]!;
    const backward = forward.map(({ loops }) => ({
      loops: loops.map((loop) =>
        loop.map(({ from, to, ...rest }) => ({ from: to, to: from, ...rest })).reverse(),
      ),
    }));
    const request = { regions: backward, nodes: 800 };
    const mesh = meshRegions(request);
    expect(checkMesh(mesh, request)).toEqual([]);
    expect(Math.abs(mesh.nodes.length / 2 / 800 - 1)).toBeLessThan(0.15);
  });

  it("points inside and on sides become nodes exactly there", () => {
    const points: Point[] = [
      [0.05, 0.1],
      [0.2, 0.123],
      [0.0001, 0.5],
      [0.11, 0.6],
      [0.05, 0.1],
      [0.199, 0.05],
    ];
    const request = { regions: parts["shaft"]!, nodes: 900, points };
    const mesh = meshRegions(request);
    expect(checkMesh(mesh, request)).toEqual([]);
    points.forEach(([r, z], k) => {
      const v = 2 * mesh.pointNodes[k]!;
      expect([mesh.nodes[v], mesh.nodes[v + 1]]).toEqual([r, z]);
    });
    expect(mesh.pointNodes[4]).toBe(mesh.pointNodes[0]);
    expect(meshQuality(mesh).minAngleDeg).toBeGreaterThanOrEqual(31);
  });

  it("points 1/1000 of the part apart, and that near to a side, keep the quality", () => {
    const points: Point[] = [
      [0.1, 0.2],
      [0.1002, 0.2],
      [0.1999, 0.1],
    ];
    const request = { regions: parts["shaft"]!, nodes: 3000, points };
    const mesh = meshRegions(request);
    expect(checkMesh(mesh, request)).toEqual([]);
    expect(meshQuality(mesh).minAngleDeg).toBeGreaterThanOrEqual(31);
  });

  it("a point outside the part throws", () => {
    expect(() => meshRegions({ regions: parts["shaft"]!, nodes: 500, points: [[0.5, 0.5]] })).toThrow(
      /outside/,
    );
  });

  it("node numbers out of range throw with the number", () => {
    for (const nodes of [0, 2, NaN, MOST_NODES + 1]) {
      expect(() => meshRegions({ regions: parts["shaft"]!, nodes })).toThrow(String(nodes));
    }
  });

  it("interfaces carry the side of either region, exposed edges -1 on the right", () => {
    const mesh = meshRegions({ regions: parts["sleeveInSocket"]!, nodes: 500 });
    const interfaces = new Set<string>();
    for (let k = 0; k < mesh.edgeArc.length; k++) {
      const [left, right] = [mesh.edgeSides[2 * k]!, mesh.edgeSides[2 * k + 1]!];
      if (right >= 0) interfaces.add([left, right].sort().join());
    }
    // Side 1 of the sleeve is its outer wall, side 7 the socket's bore.
    expect([...interfaces]).toEqual(["1,7"]);
  });

  it("tagged edges of a two-region part: interface length and exposed length", () => {
    const mesh = meshRegions({ regions: parts["sleeveInSocket"]!, nodes: 500 });
    let [shared, exposed] = [0, 0];
    for (let k = 0; k < mesh.edgeArc.length; k++) {
      const [a, b] = [2 * mesh.edges[2 * k]!, 2 * mesh.edges[2 * k + 1]!];
      const length = Math.hypot(mesh.nodes[a]! - mesh.nodes[b]!, mesh.nodes[a + 1]! - mesh.nodes[b + 1]!);
      if (mesh.edgeSides[2 * k + 1]! >= 0) shared += length;
      else exposed += length;
    }
    expect(shared).toBeCloseTo(0.08, 12);
    expect(exposed).toBeCloseTo(2 * (0.05 + 0.12) + 2 * (0.06 + 0.11) - 2 * 0.08, 12);
  });
});

describe("size field", () => {
  it("a wall gets four triangles across at the default of 500 nodes and more", () => {
    const tube = [
      regionOf([
        [0.1, 0],
        [0.11, 0],
        [0.11, 0.05],
        [0.1, 0.05],
      ]),
    ];
    const mesh = meshRegions({ regions: tube, nodes: 500 });
    const end = mesh.edgeArc.reduce((n, _, k) => n + (mesh.edgeSides[2 * k] === 0 ? 1 : 0), 0);
    expect(end).toBeGreaterThanOrEqual(4);
  });

  it("a re-entrant corner is graded: its triangles are less than half as large as those far away", () => {
    const mesh = meshRegions({ regions: parts["shaft"]!, nodes: 2000 });
    const sizes = [0.11, 0.02].map((r) => smallestEdgeNear(mesh, r, 0.3));
    expect(sizes[0]!).toBeLessThan(0.5 * sizes[1]!);
  });

  function smallestEdgeNear(mesh: ReturnType<typeof meshRegions>, r: number, z: number): number {
    let least = Infinity;
    for (let e = 0; e < mesh.triangles.length; e++) {
      const a = 2 * mesh.triangles[e]!;
      const b = 2 * mesh.triangles[e % 3 === 2 ? e - 2 : e + 1]!;
      if (Math.hypot(mesh.nodes[a]! - r, mesh.nodes[a + 1]! - z) > 0.02) continue;
      least = Math.min(
        least,
        Math.hypot(mesh.nodes[a]! - mesh.nodes[b]!, mesh.nodes[a + 1]! - mesh.nodes[b + 1]!),
      );
    }
    return least;
  }
});

describe("quality figures", () => {
  it("are those of known triangles", () => {
    const mesh = {
      ...meshRegions({ regions: parts["shaft"]!, nodes: 10 }),
      nodes: Float64Array.of(0, 0, 1, 0, 0.5, Math.sqrt(0.75), 0, -1),
      triangles: Uint32Array.of(0, 1, 2, 0, 3, 1),
      triangleRegion: Uint16Array.of(0, 0),
    };
    const { minAngleDeg, maxAngleDeg, meanQuality, worstTriangle, histogram } = meshQuality(mesh);
    expect(minAngleDeg).toBeCloseTo(45, 12);
    expect(maxAngleDeg).toBeCloseTo(90, 12);
    expect(meanQuality).toBeCloseTo((1 + Math.sqrt(3) / 2) / 2, 12);
    expect(worstTriangle).toBe(1);
    expect(histogram.reduce((sum, n) => sum + n, 0)).toBe(2);
    expect(histogram[45 / HISTOGRAM_STEP_DEG]! + histogram[45 / HISTOGRAM_STEP_DEG - 1]!).toBe(1);
  });
});
