import { describe, expect, it } from "vitest";
import { checkMesh } from "../../mesh/checkMesh.ts";
import { meshRegions } from "../../mesh/meshRegions.ts";
import { findOutlineFaults } from "../../mesh/outlineFaults.ts";
import type { OutlineRegion } from "../../mesh/types.ts";
import { regionOf } from "../helpers/outlines.ts";

/** Faulty outlines given to the mesher all the same: it ends, and says what is in its way. */
const faulty: Record<string, { regions: OutlineRegion[]; said: RegExp }> = {
  "sides that cross": {
    regions: [
      regionOf([
        [0, 0],
        [2, 0],
        [1, 2],
        [2, 2],
        [0, 1],
      ]),
    ],
    said: /crossed or covered by another near r/,
  },
  "a region laid upon itself": {
    regions: [
      regionOf([
        [0, 0],
        [1, 0],
        [1, 1],
        [0, 1],
      ]),
      regionOf([
        [0, 0],
        [1, 0],
        [1, 1],
        [0, 1],
      ]),
    ],
    said: /crossed or covered/,
  },
  "a void that is the whole region": {
    regions: [
      regionOf(
        [
          [0, 0],
          [1, 0],
          [1, 1],
          [0, 1],
        ],
        [
          [0, 0],
          [1, 0],
          [1, 1],
          [0, 1],
        ],
      ),
    ],
    said: /not enclosed/,
  },
  "no sides": { regions: [{ loops: [[]] }], said: /empty outline/ },
  "no regions": { regions: [], said: /empty outline/ },
  "places that are no numbers": {
    regions: [
      regionOf([
        [0, 0],
        [1, NaN],
        [1, 1],
      ]),
    ],
    said: /no number/,
  },
};

describe("a faulty outline ends the mesher with words", () => {
  for (const [name, { regions, said }] of Object.entries(faulty)) {
    it(name, () => {
      expect(() => meshRegions({ regions, nodes: 500 })).toThrow(said);
      if (regions.length > 0) expect(findOutlineFaults(regions).length).toBeGreaterThan(0);
    });
  }

  it("a wall of two millionths of the part does not fill the memory: it is meshed coarsely, in bounded time", () => {
    const hair = {
      regions: [
        regionOf([
          [1, 0],
          [1 + 2e-6, 0],
          [1 + 2e-6, 1],
          [1, 1],
        ]),
      ],
      nodes: 1000,
    };
    const mesh = meshRegions(hair);
    expect(checkMesh(mesh, hair)).toEqual([]);
    expect(mesh.nodes.length / 2).toBeLessThan(1500);
  });
});
