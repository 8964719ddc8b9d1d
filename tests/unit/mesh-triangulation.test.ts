import Constrainautor from "@kninnug/constrainautor";
import Delaunator from "delaunator";
import { describe, expect, it } from "vitest";
import { packTriangles, removeNode, splitEdge } from "../../mesh/editTriangles.ts";
import { windingNumber } from "../../mesh/insideRegion.ts";
import { recoverEdge } from "../../mesh/recoverEdge.ts";
import { next, previous, Triangulation } from "../../mesh/triangulation.ts";
import { randomNumbers } from "../helpers/randomOutlines.ts";

/** A star polygon of n corners and m points strewn about, none of them on a side. */
function starAndPoints(seed: number, n: number, m: number): { xy: Float64Array; n: number } {
  const draw = randomNumbers(seed);
  const xy: number[] = [];
  for (let i = 0; i < n; i++) {
    const angle = ((i + 0.4 * draw()) / n) * 2 * Math.PI;
    const radius = 0.3 + 0.7 * draw();
    xy.push(radius * Math.cos(angle), radius * Math.sin(angle));
  }
  for (let i = 0; i < m; i++) xy.push(2 * draw() - 1, 2 * draw() - 1);
  return { xy: Float64Array.from(xy), n };
}

function triangleKey(a: number, b: number, c: number): string {
  return [a, b, c].sort((p, q) => p - q).join();
}

/** Triangles whose centroid lies inside the star. */
function trianglesInside(corners: ArrayLike<number>, xy: Float64Array, n: number): string[] {
  const ring = Array.from({ length: n }, (_, i) => {
    const j = (i + 1) % n;
    return { ax: xy[2 * i]!, ay: xy[2 * i + 1]!, bx: xy[2 * j]!, by: xy[2 * j + 1]!, arc: null };
  });
  const keys: string[] = [];
  for (let e = 0; e < corners.length; e += 3) {
    const [a, b, c] = [corners[e]!, corners[e + 1]!, corners[e + 2]!];
    if (Math.max(a, b, c) >= xy.length / 2) continue;
    const x = (xy[2 * a]! + xy[2 * b]! + xy[2 * c]!) / 3;
    const y = (xy[2 * a + 1]! + xy[2 * b + 1]! + xy[2 * c + 1]!) / 3;
    if (windingNumber(ring, x, y) !== 0) keys.push(triangleKey(a, b, c));
  }
  return keys.sort();
}

function checkLinks(mesh: Triangulation): void {
  for (let e = 0; e < mesh.used; e++) {
    if (mesh.corner[e]! < 0) continue;
    const o = mesh.twin[e]!;
    if (o < 0) continue;
    expect(mesh.twin[o]).toBe(e);
    expect(mesh.corner[o]).toBe(mesh.corner[next(e)]);
    expect(mesh.lock[o]).toBe(mesh.lock[e]);
  }
  for (let v = 0; v < mesh.nodes; v++) {
    if (mesh.leaving[v]! >= 0) expect(mesh.corner[mesh.leaving[v]!]).toBe(v);
  }
  for (let e = 0; e < mesh.used; e += 3) {
    if (mesh.corner[e]! >= 0)
      expect(mesh.turn(mesh.corner[e]!, mesh.corner[e + 1]!, mesh.corner[e + 2]!)).toBeGreaterThan(0);
  }
}

describe("constrained Delaunay triangulation", () => {
  for (let seed = 1; seed <= 40; seed++) {
    it(`seed ${seed}: the same triangles inside a star as Constrainautor finds`, () => {
      const { xy, n } = starAndPoints(seed, 5 + (seed % 20), 60);
      const mesh = new Triangulation(xy, xy.length / 2, xy.length / 2);
      for (let i = 0; i < n; i++) {
        const j = (i + 1) % n;
        expect(mesh.lockEdge(i, j, 1) || recoverEdge(mesh, i, j, 1)).toBe(true);
      }
      mesh.pushAll();
      mesh.settle();
      checkLinks(mesh);
      const oracle = new Delaunator(xy);
      new Constrainautor(
        oracle,
        Array.from({ length: n }, (_, i): [number, number] => [i, (i + 1) % n]),
      );
      expect(trianglesInside(mesh.corner.subarray(0, mesh.used), xy, n)).toEqual(
        trianglesInside(oracle.triangles, xy, n),
      );
    });
  }

  it("an edge through a node or across a locked edge is refused", () => {
    const cross = Float64Array.of(0, 0, 2, 0, 1, 0, 1, 1, 1, -1, 0.3, 0.4, 1.7, -0.3);
    const mesh = new Triangulation(cross, 7, 7);
    expect(mesh.edge(0, 1)).toBe(-1);
    expect(recoverEdge(mesh, 0, 1, 1)).toBe(false);
    const other = new Triangulation(Float64Array.of(0, 0, 2, 0.1, 1, 1, 1, -1), 4, 4);
    expect(other.lockEdge(2, 3, 1) || recoverEdge(other, 2, 3, 1)).toBe(true);
    expect(recoverEdge(other, 0, 1, 2)).toBe(false);
  });
});

describe("local changes", () => {
  it("nodes put onto edges and taken out again leave a sound Delaunay triangulation", () => {
    const { xy } = starAndPoints(7, 12, 80);
    const count = xy.length / 2;
    const mesh = new Triangulation(xy, count, count + 20);
    // The far points around go first: their numbers are needed for new nodes.
    for (let t = 0; t < mesh.used / 3; t++) {
      mesh.region[t] = Math.max(...mesh.corner.subarray(3 * t, 3 * t + 3)) < count ? 0 : -1;
    }
    packTriangles(mesh);
    const before = mesh.used - 3 * mesh.free.length;
    const draw = randomNumbers(3);
    for (let k = 0; k < 20; k++) {
      let e = Math.floor(draw() * mesh.used);
      while (mesh.twin[e]! < 0 || mesh.corner[e]! < 0) e = (e + 1) % mesh.used;
      const [a, b] = [2 * mesh.corner[e]!, 2 * mesh.corner[next(e)]!];
      const v = mesh.nodes++;
      // A little beside the edge: a node exactly between two others could not be turned out by flips.
      const c = 2 * mesh.corner[previous(e)]!;
      for (const k of [0, 1]) {
        mesh.xy[2 * v + k] = 0.475 * (mesh.xy[a + k]! + mesh.xy[b + k]!) + 0.05 * mesh.xy[c + k]!;
      }
      splitEdge(mesh, e, v);
      mesh.settle();
    }
    for (let v = mesh.nodes - 1; v >= count; v--) {
      expect(removeNode(mesh, v)).toBe(true);
      mesh.settle();
    }
    checkLinks(mesh);
    expect(mesh.used - 3 * mesh.free.length).toBe(before);
    mesh.pushAll();
    expect(mesh.settle()).toBe(0);
  });

  it("a node with a locked edge stays", () => {
    const { xy } = starAndPoints(2, 8, 30);
    const mesh = new Triangulation(xy, xy.length / 2, xy.length / 2);
    const e = mesh.leaving[20]!;
    mesh.lockEdge(20, mesh.corner[next(e)]!, 1);
    expect(removeNode(mesh, 20)).toBe(false);
    expect(mesh.corner[previous(mesh.leaving[20]!)]).toBeGreaterThanOrEqual(0);
  });
});
