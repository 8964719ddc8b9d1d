/** Outlines for the mesher's tests: short forms, parts with invented sizes, and random families. */
import type { OutlineRegion, OutlineSide, Point } from "../../mesh/types.ts";

/** r, z of a vertex; with two more numbers the side that starts there is an arc through them. */
export type Corner = readonly [number, number] | readonly [number, number, number, number];

/** A closed loop of sides from its corners. */
export function loopOf(corners: readonly Corner[]): OutlineSide[] {
  return corners.map((corner, i) => {
    const [r, z, throughR, throughZ] = corner;
    const after = corners[(i + 1) % corners.length]!;
    const side = { from: [r, z] as Point, to: [after[0], after[1]] as Point };
    return throughR === undefined ? side : { ...side, through: [throughR, throughZ!] as Point };
  });
}

export function regionOf(...loops: (readonly Corner[])[]): OutlineRegion {
  return { loops: loops.map(loopOf) };
}

const HALF = Math.SQRT1_2;
const tan = (degrees: number) => Math.tan((degrees * Math.PI) / 180);

/** Parts that stand for the work: sizes in metres, invented. */
export const parts: Record<string, OutlineRegion[]> = {
  shaft: [
    regionOf([
      [0, 0],
      [0.2, 0],
      [0.2, 0.3],
      [0.11, 0.3],
      [0.11, 0.6],
      [0, 0.6],
    ]),
  ],
  ingot: [
    regionOf([
      [0, 0],
      [0.22, 0, 0.242426, 0.008787],
      [0.25, 0.03],
      [0.19, 1.17, 0.181, 1.192],
      [0.16, 1.2],
      [0, 1.2],
    ]),
  ],
  bottle: [
    regionOf([
      [0, 0.004],
      [0.028, 0, 0.0345, 0.0027],
      [0.037, 0.009],
      [0.037, 0.13, 0.0355, 0.143],
      [0.0315, 0.15],
      [0.0165, 0.172, 0.0145, 0.1755],
      [0.014, 0.18],
      [0.014, 0.2],
      [0.011, 0.2],
      [0.011, 0.18, 0.0117, 0.1745],
      [0.014, 0.17],
      [0.029, 0.1478, 0.0327, 0.1415],
      [0.034, 0.13],
      [0.034, 0.0105, 0.0328, 0.0075],
      [0.0295, 0.0065],
      [0, 0.01],
    ]),
  ],
  torus: [
    regionOf([
      [0.14, 0, 0.1, 0.04],
      [0.06, 0, 0.1, -0.04],
    ]),
  ],
  sleeveInSocket: [
    regionOf([
      [0.05, 0],
      [0.1, 0],
      [0.1, 0.12],
      [0.05, 0.12],
    ]),
    regionOf([
      [0.1, -0.03],
      [0.16, -0.03],
      [0.16, 0.08],
      [0.1, 0.08],
    ]),
  ],
  voided: [
    regionOf(
      [
        [0, 0],
        [0.1, 0],
        [0.1, 0.2],
        [0, 0.2],
      ],
      [
        [0.05, 0.07, 0.03, 0.09],
        [0.05, 0.11, 0.07, 0.09],
      ],
    ),
  ],
  acute: [
    regionOf([
      [0.02, 0],
      [0.22, 0],
      [0.22, 0.2 * tan(10)],
    ]),
  ],
  tilted: [
    regionOf([
      [0.03, 0],
      [0.1, 0.013],
      [0.0831, 0.2123],
      [0.011, 0.19],
    ]),
  ],
  fillet: [
    regionOf([
      [0, 0],
      [0.2, 0],
      [0.2, 0.3],
      [0.1112, 0.3, 0.1112 - 0.0012 * HALF, 0.3012 - 0.0012 * HALF],
      [0.11, 0.3012],
      [0.11, 0.6],
      [0, 0.6],
    ]),
  ],
  sphere: [
    regionOf([
      [0, -0.05, 0.05, 0],
      [0, 0.05],
    ]),
  ],
};

/** Outlines at the edge of what is promised. */
export const extremes: Record<string, OutlineRegion[]> = {
  "corner of 5 degrees": [
    regionOf([
      [0.02, 0],
      [0.22, 0],
      [0.22, 0.2 * tan(5)],
    ]),
  ],
  "corner of 2 degrees": [
    regionOf([
      [0.02, 0],
      [0.22, 0],
      [0.22, 0.2 * tan(2)],
    ]),
  ],
  "wall of 1/200": [
    regionOf([
      [0.1, 0],
      [0.101, 0],
      [0.101, 0.2],
      [0.1, 0.2],
    ]),
  ],
  "wall of 1/1000": [
    regionOf([
      [0.1, 0],
      [0.1002, 0],
      [0.1002, 0.2],
      [0.1, 0.2],
    ]),
  ],
  "round wall of 1/200": [
    regionOf(
      [
        [3, 0, 2, 1],
        [1, 0, 2, -1],
      ],
      [
        [2.99, 0, 2, -0.99],
        [1.01, 0, 2, 0.99],
      ],
    ),
  ],
  "fillet of 1/5000": [
    regionOf([
      [0, 0],
      [0.2, 0],
      [0.2, 0.3],
      [0.11012, 0.3, 0.11012 - 0.00012 * HALF, 0.30012 - 0.00012 * HALF],
      [0.11, 0.30012],
      [0.11, 0.6],
      [0, 0.6],
    ]),
  ],
  "saw cut": [
    regionOf([
      [0, 0],
      [0.2, 0],
      [0.2, 0.1],
      [0.05, 0.1],
      [0.05, 0.1004],
      [0.2, 0.1004],
      [0.2, 0.3],
      [0, 0.3],
    ]),
  ],
  "8 regions round a vertex": fan(8),
  "24 regions round a vertex": fan(24),
  "nearly tangent arc": [
    regionOf([
      [1, 0],
      [2, 0],
      [2, 1],
      [1.001, 1, 1.4, 0.5],
    ]),
  ],
};

function fan(n: number): OutlineRegion[] {
  return Array.from({ length: n }, (_, i) => {
    const at = (k: number): Corner => {
      const angle = (2 * Math.PI * k) / n;
      return [1 + 0.5 * Math.cos(angle), 0.5 * Math.sin(angle)];
    };
    return regionOf([[1, 0], at(i), at((i + 1) % n)]);
  });
}

/** A copy with every place moved by the function. */
export function mapOutline(regions: readonly OutlineRegion[], f: (p: Point) => Point): OutlineRegion[] {
  return regions.map(({ loops }) => ({
    loops: loops.map((loop) =>
      loop.map(({ from, to, through }) => ({
        from: f(from),
        to: f(to),
        ...(through ? { through: f(through) } : {}),
      })),
    ),
  }));
}

/** Rows of one schedule on every side that does not lie along the axis. */
export function rowsEverywhere(
  regions: readonly OutlineRegion[],
  thickness: number,
  growth = 2,
): { side: number; thickness: number; growth: number }[] {
  const isOnAxis = ({ from, to, through }: OutlineSide) =>
    Math.abs(from[0]) < 1e-12 && Math.abs(to[0]) < 1e-12 && (!through || Math.abs(through[0]) < 1e-12);
  return regions
    .flatMap(({ loops }) => loops.flat())
    .map((side, k) => ({ side: k, thickness, growth, skip: isOnAxis(side) }))
    .filter(({ skip }) => !skip)
    .map(({ side }) => ({ side, thickness, growth }));
}
