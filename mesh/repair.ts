/**
 * Repair of what relaxation leaves: nodes of poor triangles are moved to lift the worst of their star; then short
 * edges lose a node and long ones gain one. There is no proof that this ends, so the rounds are bounded; what is
 * left is counted.
 */
import { LONG_EDGE, REPAIR_ANGLE, REPAIR_ROUNDS, SHORT_EDGE, THIN_PASSES } from "./defaults.ts";
import { removeNode, splitEdge } from "./editTriangles.ts";
import { slideNode, type Sliders } from "./slide.ts";
import { next, previous, type Triangulation } from "./triangulation.ts";

/** What repair works on; `size` and `fixed` have room for the nodes it adds. */
export interface RepairWork {
  readonly mesh: Triangulation;
  readonly size: Float64Array;
  readonly fixed: Uint8Array;
  /** most nodes */
  readonly room: number;
  readonly sliders: Sliders;
}

const BAR = Math.sin(REPAIR_ANGLE) / Math.sin(Math.PI / 3);

/** Rounds without any gain before repair gives up; each looks further around. */
const MOST_FRUITLESS = 4;

/** Returns the number of triangles still below the bar. */
export function repair(work: RepairWork): number {
  let poor = poorTriangles(work);
  let fruitless = 0;
  for (let round = 0; round < REPAIR_ROUNDS && poor.length > 0 && fruitless < MOST_FRUITLESS; round++) {
    liftAround(work, poor, 1 + fruitless);
    if (round % 2 === 0) changeNodes(work, poor);
    const before = poor.length;
    poor = poorTriangles(work);
    fruitless = poor.length < before ? 0 : fruitless + 1;
  }
  return poor.length / 3;
}

/** Corners of all triangles below the bar, 3 each; those of rows are thin by intent and have no node that may move. */
function poorTriangles({ mesh: { corner, used, xy }, fixed, sliders }: RepairWork): number[] {
  const poor: number[] = [];
  const isStuck = (v: number) => fixed[v] === 1 && !(v < sliders.piece.length && sliders.piece[v]! >= 0);
  for (let e = 0; e < used; e += 3) {
    const a = corner[e]!;
    if (a < 0) continue;
    const b = corner[e + 1]!;
    const c = corner[e + 2]!;
    if (shapeOf(xy, a, b, c) >= BAR || (isStuck(a) && isStuck(b) && isStuck(c))) continue;
    poor.push(a, b, c);
  }
  return poor;
}

/**
 * Shape of a triangle: the sine of its smallest angle over that of 60 degrees, or a measure of its widest angle
 * in which 110 degrees weighs like 33; the lesser of the two. Not positive when it is turned over.
 */
export function shapeOf(xy: Float64Array, a: number, b: number, c: number): number {
  const ax = xy[2 * a]!;
  const ay = xy[2 * a + 1]!;
  const ux = xy[2 * b]! - ax;
  const uy = xy[2 * b + 1]! - ay;
  const vx = xy[2 * c]! - ax;
  const vy = xy[2 * c + 1]! - ay;
  const area2 = ux * vy - uy * vx;
  if (!(area2 > 0)) return -1;
  const wx = vx - ux;
  const wy = vy - uy;
  const u = ux * ux + uy * uy;
  const v = vx * vx + vy * vy;
  const w = wx * wx + wy * wy;
  const shortest = Math.min(u, v, w);
  const longest = Math.max(u, v, w);
  const product = u * v * w;
  const sine = area2 / Math.sqrt(product / shortest);
  const cosine = (u + v + w - 2 * longest) / (2 * Math.sqrt(product / longest));
  return Math.min(sine / 0.8660254037844386, (1 + cosine) * (1.25 / 1.5));
}

/** Lifts the nodes of poor triangles and those up to so many edges away. */
function liftAround(
  { mesh, size, fixed, sliders }: RepairWork,
  poor: readonly number[],
  rings: number,
): void {
  let movable = new Set<number>(poor);
  for (let k = 0; k < rings; k++) {
    const wider = new Set(movable);
    for (const v of movable) for (const w of mesh.ringOf(v)) wider.add(w);
    movable = wider;
  }
  for (let k = 0; k < 3; k++) {
    let moved = false;
    for (const v of movable) {
      const isSlider = v < sliders.piece.length && sliders.piece[v]! >= 0;
      if (isSlider && slideNode(mesh, sliders, v, (star) => worstOf(mesh, v, star))) moved = true;
      if (!fixed[v] && liftNode(mesh, v, size[v]!)) moved = true;
    }
    mesh.settle();
    if (!moved) return;
  }
}

function worstOf({ xy }: Triangulation, v: number, star: readonly number[]): number {
  let worst = Infinity;
  for (let i = 0; i < star.length; i += 2) worst = Math.min(worst, shapeOf(xy, v, star[i]!, star[i + 1]!));
  return worst;
}

/**
 * Thin parts have few free nodes: their side nodes slide to raise the mean quality of their stars, free ones are
 * lifted, flips follow.
 */
export function evenOutThinPart({ mesh, size, fixed, sliders }: RepairWork): void {
  const value = (v: number) => (star: readonly number[]) => {
    const worst = worstOf(mesh, v, star);
    return worst <= 0 ? -1 : meanOfStar(mesh, v, star) + 0.5 * Math.min(worst, BAR);
  };
  for (let pass = 0; pass < THIN_PASSES; pass++) {
    for (let v = 0; v < sliders.piece.length; v++) {
      if (sliders.piece[v]! >= 0 && mesh.leaving[v]! >= 0) slideNode(mesh, sliders, v, value(v));
    }
    mesh.settle();
    for (let v = sliders.piece.length; v < mesh.nodes; v++) {
      if (!fixed[v] && mesh.leaving[v]! >= 0) liftNode(mesh, v, size[v]!);
    }
    mesh.settle();
  }
}

/** Mean of 4 sqrt(3) area / (sum of squared sides) over the star. */
function meanOfStar({ xy }: Triangulation, v: number, star: readonly number[]): number {
  let sum = 0;
  for (let i = 0; i < star.length; i += 2) {
    const b = 2 * star[i]!;
    const c = 2 * star[i + 1]!;
    const ux = xy[b]! - xy[2 * v]!;
    const uy = xy[b + 1]! - xy[2 * v + 1]!;
    const wx = xy[c]! - xy[2 * v]!;
    const wy = xy[c + 1]! - xy[2 * v + 1]!;
    const squares = ux * ux + uy * uy + wx * wx + wy * wy + (wx - ux) ** 2 + (wy - uy) ** 2;
    sum += (2 * Math.sqrt(3) * (ux * wy - uy * wx)) / squares;
  }
  return (2 * sum) / star.length;
}

const WAYS_X = [1, Math.SQRT1_2, 0, -Math.SQRT1_2, -1, -Math.SQRT1_2, 0, Math.SQRT1_2];
const WAYS_Y = [0, Math.SQRT1_2, 1, Math.SQRT1_2, 0, -Math.SQRT1_2, -1, -Math.SQRT1_2];

/** Moves a node to lift the worst triangle of its star (pattern search, steps halved); true when it moved. */
export function liftNode(mesh: Triangulation, v: number, size: number): boolean {
  const { xy } = mesh;
  const ring = mesh.ringOf(v);
  if (ring.length === 0) return false;
  const worstAt = (x: number, y: number): number => {
    xy[2 * v] = x;
    xy[2 * v + 1] = y;
    let worst = Infinity;
    for (let i = 0; i < ring.length; i++) {
      worst = Math.min(worst, shapeOf(xy, v, ring[i]!, ring[(i + 1) % ring.length]!));
    }
    return worst;
  };
  const startX = xy[2 * v]!;
  const startY = xy[2 * v + 1]!;
  let x = startX;
  let y = startY;
  const first = worstAt(x, y);
  let best = first;
  const tryAt = (px: number, py: number): boolean => {
    const q = worstAt(px, py);
    if (q <= best + 1e-9) return false;
    best = q;
    x = px;
    y = py;
    return true;
  };
  tryAt(meanOf(ring, xy, 0), meanOf(ring, xy, 1));
  for (let step = 0.2 * size, k = 0; k < 5; k++, step /= 2) {
    for (let again = true, n = 0; again && n < 4; n++) {
      again = false;
      const [cx, cy] = [x, y];
      for (let d = 0; d < 8; d++) if (tryAt(cx + step * WAYS_X[d]!, cy + step * WAYS_Y[d]!)) again = true;
    }
  }
  const isBetter = best > first + 1e-6;
  xy[2 * v] = isBetter ? x : startX;
  xy[2 * v + 1] = isBetter ? y : startY;
  if (!isBetter) return false;
  pushStar(mesh, v);
  return true;
}

function meanOf(ring: readonly number[], xy: Float64Array, offset: number): number {
  let sum = 0;
  for (const w of ring) sum += xy[2 * w + offset]!;
  return sum / ring.length;
}

function pushStar(mesh: Triangulation, v: number): void {
  const start = mesh.leaving[v]!;
  let e = start;
  do {
    mesh.push(e);
    mesh.push(next(e));
    e = mesh.twin[previous(e)]!;
  } while (e !== start && e >= 0);
}

function changeNodes(work: RepairWork, poor: readonly number[]): void {
  const { mesh, size } = work;
  const { xy, corner } = mesh;
  for (let i = 0; i < poor.length; i += 3) {
    const e = mesh.edge(poor[i]!, poor[i + 1]!);
    if (e < 0 || corner[previous(e)] !== poor[i + 2]) continue;
    const edges = [e, next(e), previous(e)];
    const [a, b, c] = edges.map((f) => corner[f]!) as [number, number, number];
    if (shapeOf(xy, a, b, c) >= BAR) continue;
    const lengths = edges.map((f) => edgeLength(mesh, f));
    const wanted = (size[a]! + size[b]! + size[c]!) / 3;
    const shortest = Math.min(...lengths);
    const longest = Math.max(...lengths);
    if (shortest < SHORT_EDGE * wanted && dropEnd(work, edges[lengths.indexOf(shortest)]!)) continue;
    if (longest > LONG_EDGE * wanted) addMiddle(work, edges[lengths.indexOf(longest)]!);
  }
}

function edgeLength({ corner, xy }: Triangulation, e: number): number {
  const a = 2 * corner[e]!;
  const b = 2 * corner[next(e)]!;
  return Math.hypot(xy[a]! - xy[b]!, xy[a + 1]! - xy[b + 1]!);
}

/** Takes out the free end of an edge that has fewer neighbours. */
function dropEnd(work: RepairWork, e: number): boolean {
  const { mesh, fixed } = work;
  const ends = [mesh.corner[e]!, mesh.corner[next(e)]!].filter((v) => !fixed[v]);
  if (ends.length === 0) return false;
  const rings = ends.map((v) => mesh.ringOf(v));
  const k = rings.length > 1 && rings[1]!.length < rings[0]!.length ? 1 : 0;
  if (!removeNode(mesh, ends[k]!)) {
    mesh.settle();
    return false;
  }
  mesh.settle();
  liftNodes(work, rings[k]!);
  return true;
}

/** Puts a node onto the middle of a free edge. */
function addMiddle(work: RepairWork, e: number): void {
  const { mesh, size, fixed, room } = work;
  const { xy, corner } = mesh;
  if (mesh.lock[e] || mesh.twin[e]! < 0 || mesh.nodes >= room) return;
  const a = corner[e]!;
  const b = corner[next(e)]!;
  const v = mesh.nodes++;
  xy[2 * v] = (xy[2 * a]! + xy[2 * b]!) / 2;
  xy[2 * v + 1] = (xy[2 * a + 1]! + xy[2 * b + 1]!) / 2;
  size[v] = (size[a]! + size[b]!) / 2;
  fixed[v] = 0;
  splitEdge(mesh, e, v);
  mesh.settle();
  liftNodes(work, [v, ...mesh.ringOf(v)]);
}

function liftNodes({ mesh, size, fixed }: RepairWork, nodes: readonly number[]): void {
  for (let k = 0; k < 3; k++) {
    for (const v of nodes) if (!fixed[v] && mesh.leaving[v]! >= 0) liftNode(mesh, v, size[v]!);
  }
  mesh.settle();
}
