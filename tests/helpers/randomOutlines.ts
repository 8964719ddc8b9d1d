/** Random outlines in families that have broken meshers, each from its seed alone. */
import type { OutlineRegion, Point } from "../../mesh/types.ts";
import { isInRegion, regionCurves } from "../../mesh/insideRegion.ts";
import { regionOf, type Corner } from "./outlines.ts";

/** A generator of numbers in [0, 1) from a whole seed (Mulberry, 32 bits of state). */
export function randomNumbers(seed: number): () => number {
  let state = seed | 0;
  return () => {
    state = (state + 0x6d2b79f5) | 0;
    let t = Math.imul(state ^ (state >>> 15), 1 | state);
    t = (t + Math.imul(t ^ (t >>> 7), 61 | t)) ^ t;
    return ((t ^ (t >>> 14)) >>> 0) / 4294967296;
  };
}

export interface RandomCase {
  readonly kind: string;
  readonly regions: OutlineRegion[];
  readonly points: Point[];
  readonly nodes: number;
}

class Dice {
  private readonly draw: () => number;
  constructor(seed: number) {
    this.draw = randomNumbers(seed);
  }
  /** between a and b */
  between(a: number, b: number): number {
    return a + (b - a) * this.draw();
  }
  /** whole, from a to b */
  whole(a: number, b: number): number {
    return Math.floor(this.between(a, b + 1));
  }
  chance(p: number): boolean {
    return this.draw() < p;
  }
}

const families: Record<string, (d: Dice) => OutlineRegion[]> = {
  star,
  stair,
  round: (d) => rounded(d, 0.1, 0.45),
  "small fillets": (d) => rounded(d, 0.003, 0.03),
  thin,
  tilted,
  stacked,
  nested,
  "notched fit": notchedFit,
};

export const familyNames = Object.keys(families);

/** The case of a seed: a family in turn, a number of nodes between 500 and 10,000, now and then requested points. */
export function randomCase(seed: number): RandomCase {
  const d = new Dice(seed);
  const kind = familyNames[seed % familyNames.length]!;
  const regions = families[kind]!(d);
  const nodes = Math.round(500 * Math.pow(20, d.between(0, 1)));
  return { kind, regions, nodes, points: d.chance(0.3) ? pointsInside(regions, d) : [] };
}

function pointsInside(regions: readonly OutlineRegion[], d: Dice): Point[] {
  const points: Point[] = [];
  const region = regions[d.whole(0, regions.length - 1)]!;
  const curves = regionCurves(region);
  const outer = region.loops[0]!;
  const rs = outer.map(({ from }) => from[0]);
  const zs = outer.map(({ from }) => from[1]);
  for (let k = 0; k < 20 && points.length < 3; k++) {
    const r = d.between(Math.min(...rs), Math.max(...rs));
    const z = d.between(Math.min(...zs), Math.max(...zs));
    if (isInRegion(curves, r, z)) points.push([r, z]);
  }
  const { from, to, through } = outer[d.whole(0, outer.length - 1)]!;
  if (!through) points.push([0.7 * from[0] + 0.3 * to[0], 0.7 * from[1] + 0.3 * to[1]]);
  return points;
}

function ringOfCorners(d: Dice, n: number, waver: number, least: number): [number, number][] {
  return Array.from({ length: n }, (_, i) => {
    const angle = ((i + d.between(-waver, waver)) / n) * 2 * Math.PI;
    const radius = d.between(least, 1);
    return [2 + radius * Math.cos(angle), radius * Math.sin(angle)];
  });
}

function star(d: Dice): OutlineRegion[] {
  return [regionOf(ringOfCorners(d, d.whole(5, 29), 0.3, 0.35))];
}

function stair(d: Dice): OutlineRegion[] {
  const corners: Corner[] = [[0, 0]];
  let r = d.between(0.2, 1);
  let z = 0;
  corners.push([r, 0]);
  for (let left = d.whole(2, 9); left > 0; left--) {
    z += d.between(0.02, 0.5);
    corners.push([r, z]);
    if (left === 1) break;
    const before = r;
    while (Math.abs(r - before) < 0.01) r = d.between(0.15, 1);
    corners.push([r, z]);
  }
  corners.push([0, z]);
  return [regionOf(corners)];
}

/** A polygon with its corners rounded by arcs that take the given shares of the sides. */
function rounded(d: Dice, least: number, most: number): OutlineRegion[] {
  const vertices = ringOfCorners(d, d.whole(4, 9), 0.2, 0.6);
  const n = vertices.length;
  const corners: Corner[] = [];
  vertices.forEach((q, i) => {
    const [ax, ay, la] = direction(q, vertices[(i + n - 1) % n]!);
    const [bx, by, lb] = direction(q, vertices[(i + 1) % n]!);
    const half = Math.acos(ax * bx + ay * by) / 2;
    const cut = d.between(least, most) * Math.min(la, lb);
    if (half > (85 * Math.PI) / 180) {
      corners.push(q);
      return;
    }
    const depth = cut / Math.cos(half) - cut * Math.tan(half);
    const [mx, my] = direction([0, 0], [ax + bx, ay + by]);
    corners.push([q[0] + ax * cut, q[1] + ay * cut, q[0] + mx * depth, q[1] + my * depth]);
    corners.push([q[0] + bx * cut, q[1] + by * cut]);
  });
  return [regionOf(corners)];
}

function direction(from: readonly number[], to: readonly number[]): [number, number, number] {
  const [x, y] = [to[0]! - from[0]!, to[1]! - from[1]!];
  const length = Math.hypot(x, y);
  return [x / length, y / length, length];
}

/** A wall of even thickness along a broken line. */
function thin(d: Dice): OutlineRegion[] {
  const bends = d.whole(3, 6);
  const width = d.between(0.006, 0.04);
  const middle: [number, number][] = [[4, 0]];
  let heading = d.between(0, 6);
  for (let k = 0; k < bends; k++) {
    const [x, y] = middle[k]!;
    const length = d.between(0.3, 0.6);
    middle.push([x + length * Math.cos(heading), y + length * Math.sin(heading)]);
    heading += d.between(-1, 1);
  }
  const aside = (hand: number) =>
    middle.map((q, i): [number, number] => {
      const [ax, ay] = direction(middle[Math.max(0, i - 1)]!, middle[Math.max(1, i)]!);
      const [bx, by] = direction(middle[Math.min(bends - 1, i)]!, middle[Math.min(bends, i + 1)]!);
      const [mx, my] = [-(ay + by), ax + bx];
      const k = (hand * width) / (mx * mx + my * my);
      return [q[0] + k * mx, q[1] + k * my];
    });
  return [regionOf([...aside(-1), ...aside(1).reverse()])];
}

/** Tilted straight sides with many vertices on them. */
function tilted(d: Dice): OutlineRegion[] {
  const vertices = [
    [d.between(0.2, 0.4), 0],
    [d.between(0.8, 1), d.between(0, 0.2)],
    [d.between(0.7, 0.9), d.between(0.8, 1)],
    [d.between(0.1, 0.3), d.between(0.7, 0.9)],
  ] as const;
  const corners: Corner[] = [];
  vertices.forEach((p, i) => {
    const q = vertices[(i + 1) % 4]!;
    const n = d.whole(2, 61);
    for (let k = 0; k < n; k++)
      corners.push([p[0] + ((q[0] - p[0]) * k) / n, p[1] + ((q[1] - p[1]) * k) / n]);
  });
  return [regionOf(corners)];
}

function roundVoid(r: number, z: number, radius: number): Corner[] {
  return [
    [r + radius, z, r, z - radius],
    [r - radius, z, r, z + radius],
  ];
}

/** Regions on top of each other with sides shared in part, some with a void. */
function stacked(d: Dice): OutlineRegion[] {
  let z = 0;
  return Array.from({ length: d.whole(2, 4) }, () => {
    const [a, b, h] = [d.between(0.1, 0.4), d.between(0.5, 1), d.between(0.1, 0.6)];
    const loops: Corner[][] = [block(a, z, b, z + h)];
    if (d.chance(0.5))
      loops.push(roundVoid((a + b) / 2, z + h / 2, d.between(0.1, 0.3) * Math.min(h, b - a)));
    z += h;
    return regionOf(...loops);
  });
}

function block(r0: number, z0: number, r1: number, z1: number): Corner[] {
  return [
    [r0, z0],
    [r1, z0],
    [r1, z1],
    [r0, z1],
  ];
}

/** A region that fills another's void, with a void of its own. */
function nested(d: Dice): OutlineRegion[] {
  const [z, core, shell] = [d.between(-1, 1), d.between(0.2, 0.5), d.between(0.6, 1)];
  const hole = d.between(0.2, 0.8) * core;
  const outer = roundVoid(1.5, z, shell);
  const middle = roundVoid(1.5, z, core);
  const regions = [regionOf(outer, middle), regionOf(middle, roundVoid(1.5, z, hole))];
  return d.chance(0.5) ? [...regions, regionOf(roundVoid(1.5, z, hole))] : regions;
}

/** A block in the notch of another, shorter or longer than the notch is deep. */
function notchedFit(d: Dice): OutlineRegion[] {
  const [width, height] = [d.between(0.4, 1), d.between(0.4, 1)];
  const [z0, z1] = [d.between(0.1, 0.3) * height, d.between(0.5, 0.9) * height];
  const depth = d.between(0.2, 0.7) * width;
  const notched = regionOf([
    [0, 0],
    [width, 0],
    [width, z0],
    [width - depth, z0],
    [width - depth, z1],
    [width, z1],
    [width, height],
    [0, height],
  ]);
  return [notched, regionOf(block(width - depth, z0, width - depth + d.between(0.5, 1.5) * depth, z1))];
}
