import { describe, expect, it } from "vitest";
import { checkMesh } from "../../mesh/checkMesh.ts";
import { meshRegions } from "../../mesh/meshRegions.ts";
import type { MeshRequest, TriangleMesh } from "../../mesh/types.ts";
import { parts } from "../helpers/outlines.ts";

const request: MeshRequest = { regions: parts["voided"]!, nodes: 300, points: [[0.08, 0.15]] };
const sound = meshRegions(request);
const twoRegions: MeshRequest = { regions: parts["sleeveInSocket"]!, nodes: 300 };

/** A copy whose arrays can be spoiled. */
function copyOf(mesh: TriangleMesh): TriangleMesh {
  return Object.fromEntries(
    Object.entries(mesh).map(([key, array]) => [key, array.slice()]),
  ) as unknown as TriangleMesh;
}

function faultsAfter(
  spoil: (mesh: TriangleMesh) => TriangleMesh | undefined,
  asked = request,
  mesh = sound,
): string {
  const copy = copyOf(mesh);
  return checkMesh(spoil(copy) ?? copy, asked).join("\n");
}

describe("the validator", () => {
  it("passes what is sound", () => {
    expect(checkMesh(sound, request)).toEqual([]);
  });

  it("finds a triangle turned over", () => {
    expect(
      faultsAfter(({ triangles }) => {
        [triangles[0], triangles[1]] = [triangles[1]!, triangles[0]!];
      }),
    ).toMatch(/turned triangle/);
  });

  it("finds a hole", () => {
    const cut = (mesh: TriangleMesh) => ({
      ...mesh,
      triangles: mesh.triangles.slice(300),
      triangleRegion: mesh.triangleRegion.slice(100),
    });
    expect(faultsAfter(cut)).toMatch(/unused node/);
    expect(faultsAfter(cut)).toMatch(/area/);
  });

  it("finds a node moved off its side", () => {
    const v = sound.edges[0]!;
    expect(
      faultsAfter(({ nodes }) => {
        nodes[2 * v]! += 1e-6;
        nodes[2 * v + 1]! += 1e-6;
      }),
    ).toMatch(/beside its side/);
  });

  it("finds a side edge left out and one named wrongly", () => {
    expect(
      faultsAfter((mesh) => ({
        ...mesh,
        edges: mesh.edges.slice(2),
        edgeSides: mesh.edgeSides.slice(2),
        edgeArc: mesh.edgeArc.slice(1),
      })),
    ).toMatch(/open edge[\s\S]*side not covered/);
    expect(
      faultsAfter(({ edgeSides }) => {
        edgeSides[0] = edgeSides[0] === 0 ? 1 : 0;
      }),
    ).toMatch(/beside its side/);
    expect(
      faultsAfter(({ edgeSides }) => {
        edgeSides[1] = 2;
      }),
    ).toMatch(/right hand/);
  });

  it("finds a side edge that runs the wrong way", () => {
    expect(
      faultsAfter(({ edges }) => {
        [edges[0], edges[1]] = [edges[1]!, edges[0]!];
      }),
    ).toMatch(/without a triangle on its left/);
  });

  it("finds a triangle of the wrong region", () => {
    const mesh = meshRegions(twoRegions);
    expect(
      faultsAfter(
        ({ triangleRegion }) => {
          triangleRegion[0] = 1 - triangleRegion[0]!;
        },
        twoRegions,
        mesh,
      ),
    ).toMatch(/untagged interface|another region/);
  });

  it("finds a hanging node", () => {
    const square: MeshRequest = {
      regions: [
        {
          loops: [
            [
              { from: [0, 0], to: [2, 0] },
              { from: [2, 0], to: [2, 1] },
              { from: [2, 1], to: [0, 1] },
              { from: [0, 1], to: [0, 0] },
            ],
          ],
        },
      ],
      nodes: 4,
    };
    // The left triangle's edge 1-3 has node 4 in its middle, where the right hand has two triangles.
    const hanging: TriangleMesh = {
      nodes: Float64Array.of(0, 0, 2, 0, 2, 1, 0, 1, 1, 0.5),
      triangles: Uint32Array.of(0, 1, 3, 1, 2, 4, 2, 3, 4),
      triangleRegion: Uint16Array.of(0, 0, 0),
      edges: Uint32Array.of(0, 1, 1, 2, 2, 3, 3, 0),
      edgeSides: Int32Array.of(0, -1, 1, -1, 2, -1, 3, -1),
      edgeArc: Int32Array.of(-1, -1, -1, -1),
      arcs: new Float64Array(0),
      pointNodes: new Uint32Array(0),
    };
    expect(checkMesh(hanging, square).join()).toMatch(/hanging node/);
  });

  it("finds a requested point that is not at its node", () => {
    expect(
      faultsAfter(({ pointNodes }) => {
        pointNodes[0] = 0;
      }),
    ).toMatch(/requested point/);
  });

  it("finds places that are not numbers and nodes that do not exist", () => {
    expect(
      faultsAfter(({ nodes }) => {
        nodes[5] = NaN;
      }),
    ).toMatch(/not a number/);
    expect(
      faultsAfter(({ triangles }) => {
        triangles[4] = 1e6;
      }),
    ).toMatch(/does not exist/);
  });
});
