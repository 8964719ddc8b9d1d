/** Outlines on which the mesher once failed, each also scaled, mirrored and shifted. */
import { describe, expect, it } from "vitest";
import { checkMesh } from "../../mesh/checkMesh.ts";
import { meshRegions } from "../../mesh/meshRegions.ts";
import type { MeshRequest, Point } from "../../mesh/types.ts";
import { meshFigures } from "../helpers/meshFigures.ts";
import { extremes, mapOutline, parts, regionOf, rowsEverywhere } from "../helpers/outlines.ts";
import { randomCase } from "../helpers/randomOutlines.ts";

const seeds = (seed: number): MeshRequest => {
  const { regions, points, nodes } = randomCase(seed);
  return { regions, points, nodes };
};

interface Entry {
  /** what went wrong */
  readonly story: string;
  readonly request: MeshRequest;
  /** far fewer nodes than the outline needs: only soundness can be asked for */
  readonly isStarved?: boolean;
}

const corpus: Entry[] = [
  {
    story: "size grew at different rates along the two sides of a re-entrant corner: 25 degrees beside it",
    request: seeds(224),
  },
  { story: "the same, 28 degrees", request: seeds(35) },
  { story: "a wall of one triangle, nodes of its faces opposite each other: mean quality 0.85", request: seeds(10_201) },
  { story: "240 given vertices and 521 nodes asked for: 629 came", request: seeds(68) },
  { story: "a node taken out left an edge that was not Delaunay", request: seeds(14_242) },
  { story: "a wall of one triangle with an angle of 28 degrees that repair gave up", request: seeds(256) },
  {
    story: "arc chords longer than the wall behind the arc is thick reached across it",
    request: { regions: extremes["round wall of 1/200"]!, nodes: 300 },
    isStarved: true,
  },
  {
    story: "arcs bulged beyond the cells taken for inside",
    request: { regions: parts["torus"]!, nodes: 100 },
  },
  {
    story: "long chords of a coarse mesh filled the look-up",
    request: { regions: extremes["wall of 1/1000"]!, nodes: 500 },
    isStarved: true,
  },
  {
    story: "a void that touches nothing but fills half of the part",
    request: {
      regions: [
        regionOf(
          [
            [0, 0],
            [1, 0],
            [1, 1],
            [0, 1],
          ],
          [
            [0.05, 0.05],
            [0.05, 0.95],
            [0.95, 0.95],
            [0.95, 0.05],
          ],
        ),
      ],
      nodes: 800,
    },
  },
];

const maps: Record<string, (p: Point) => Point> = {
  "as it is": (p) => p,
  "in thousandths": ([r, z]) => [1e-3 * r, 1e-3 * z],
  "in thousands": ([r, z]) => [1e3 * r, 1e3 * z],
  "mirrored in z": ([r, z]) => [r, -z],
  "shifted in z": ([r, z]) => [r, z + 7],
};

describe("once failed", () => {
  for (const { story, request, isStarved } of corpus) {
    for (const [how, map] of Object.entries(maps)) {
      it(`${story} (${how})`, () => {
        const copy = {
          ...request,
          regions: mapOutline(request.regions, map),
          points: (request.points ?? []).map(map),
        };
        const mesh = meshRegions(copy);
        expect(checkMesh(mesh, copy)).toEqual([]);
        const figures = meshFigures(mesh, copy);
        expect(figures.notDelaunay).toBe(0);
        expect(Math.abs(figures.nodes / request.nodes - 1)).toBeLessThan(0.15);
        if (isStarved) return;
        expect(figures.leastAngle).toBeGreaterThanOrEqual(31);
        expect(figures.widestAngle).toBeLessThanOrEqual(120);
        expect(figures.meanQuality).toBeGreaterThanOrEqual(0.92);
      });
    }
  }

  const withRows: [string, number, number][] = [
    ["a requested point a hair above the top of the rows: an angle of 180 degrees", 50, 1 / 1000],
    ["tops of rows from opposite sides nearly met: 172 degrees", 573, 1 / 200],
    ["rows stepped up steeply beside a small fillet", 3, 1 / 5000],
    ["rows' grids in corners took more nodes than were asked for", 251, 1 / 5000],
  ];
  for (const [story, seed, share] of withRows) {
    it(story, () => {
      const request = seeds(seed);
      const rs = request.regions.flatMap(({ loops }) => loops.flat().map(({ from }) => Math.max(...from)));
      const asked = { ...request, rows: rowsEverywhere(request.regions, share * Math.max(...rs)) };
      const mesh = meshRegions(asked);
      expect(checkMesh(mesh, asked)).toEqual([]);
      expect(Math.abs(mesh.nodes.length / 2 / request.nodes - 1)).toBeLessThan(0.2);
      expect(meshFigures(mesh, asked).widestAngle).toBeLessThan(150);
    });
  }
});
