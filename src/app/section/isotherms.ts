/** Lines of equal value on linear triangles, and the places where their labels read well. */
import type { SectionMesh } from "../../run/result.ts";

/** One line level: its value and its segments as r, z, r, z [m]. */
export interface LevelLine {
  readonly value: number;
  readonly segments: Float32Array;
}

/** Round steps between lines; about this many lines are wanted across the range shown. */
export const WANTED_LINES = 8;

/** A round step (1, 2, 2.5 or 5 times a power of ten) that gives about `wanted` lines over `span`. */
export function roundStep(span: number, wanted = WANTED_LINES): number {
  const rough = span / wanted;
  const power = 10 ** Math.floor(Math.log10(rough));
  const lead = rough / power;
  return power * (lead < 1.5 ? 1 : lead < 2.2 ? 2 : lead < 3.5 ? 2.5 : lead < 7.5 ? 5 : 10);
}

/** Multiples of `step` strictly inside the range. */
export function levelsBetween(from: number, to: number, step: number): number[] {
  const first = Math.floor(from / step + 1 + 1e-9);
  const levels: number[] = [];
  for (let k = first; k * step < to - 1e-9 * step; k++) levels.push(k * step);
  return levels;
}

/** The lines at every level (ascending). Triangles with a value that is not a number are passed over. */
export function levelLines(mesh: SectionMesh, values: Float32Array, levels: readonly number[]): LevelLine[] {
  const found: number[][] = levels.map(() => []);
  const { triangles } = mesh;
  for (let t = 0; t < triangles.length; t += 3) {
    const [a, b, c] = [triangles[t]!, triangles[t + 1]!, triangles[t + 2]!];
    const low = Math.min(values[a]!, values[b]!, values[c]!);
    const high = Math.max(values[a]!, values[b]!, values[c]!);
    if (Number.isNaN(low) || low === high) continue;
    for (let k = firstAtLeast(levels, low); k < levels.length && levels[k]! < high; k++) {
      cut(mesh.nodes, values, a, b, levels[k]!, found[k]!);
      cut(mesh.nodes, values, b, c, levels[k]!, found[k]!);
      cut(mesh.nodes, values, c, a, levels[k]!, found[k]!);
    }
  }
  return levels.map((value, k) => ({ value, segments: Float32Array.from(found[k]!) }));
}

/** Adds the place where the level crosses one edge; a node exactly at the level counts as below it. */
function cut(
  nodes: Float64Array,
  values: Float32Array,
  a: number,
  b: number,
  level: number,
  out: number[],
): void {
  const [va, vb] = [values[a]!, values[b]!];
  if (va <= level === vb <= level) return;
  const part = (level - va) / (vb - va);
  out.push(
    nodes[2 * a]! + part * (nodes[2 * b]! - nodes[2 * a]!),
    nodes[2 * a + 1]! + part * (nodes[2 * b + 1]! - nodes[2 * a + 1]!),
  );
}

function firstAtLeast(levels: readonly number[], value: number): number {
  let k = 0;
  while (k < levels.length && levels[k]! < value) k++;
  return k;
}

export interface Label {
  readonly value: number;
  readonly x: number;
  readonly y: number;
}

export interface LabelRoom {
  /** size of one label [px] */
  readonly width: number;
  readonly height: number;
  /** the labels gather along the line between these two spots */
  readonly from: readonly [number, number];
  readonly to: readonly [number, number];
  /** whether a label centred here would stand wholly on the part */
  readonly fits: (x: number, y: number) => boolean;
}

/**
 * One label a level where there is room: on its line, as near to the label line as it gets, clear of the labels
 * already placed. A label that would touch is left out; its line stays.
 */
export function placeLabels(
  lines: readonly LevelLine[],
  project: (r: number, z: number) => readonly [number, number],
  room: LabelRoom,
): Label[] {
  const placed: Label[] = [];
  for (const line of lines) {
    const best = bestSpot(line, project, room, placed);
    if (best) placed.push({ value: line.value, x: best[0], y: best[1] });
  }
  return placed;
}

function bestSpot(
  line: LevelLine,
  project: (r: number, z: number) => readonly [number, number],
  room: LabelRoom,
  placed: readonly Label[],
): readonly [number, number] | null {
  let best: readonly [number, number] | null = null;
  let least = Infinity;
  const { segments } = line;
  for (let i = 0; i + 3 < segments.length; i += 4) {
    const spot = project((segments[i]! + segments[i + 2]!) / 2, (segments[i + 1]! + segments[i + 3]!) / 2);
    const distance = distanceTo(spot, room.from, room.to);
    if (distance >= least || !room.fits(...spot)) continue;
    if (
      placed.some(
        (p) => Math.abs(p.x - spot[0]) < room.width + 3 && Math.abs(p.y - spot[1]) < room.height + 2,
      )
    )
      continue;
    least = distance;
    best = spot;
  }
  return best;
}

/** Distance [px] of a spot from a stretch. */
function distanceTo(
  [x, y]: readonly [number, number],
  [ax, ay]: readonly [number, number],
  [bx, by]: readonly [number, number],
): number {
  const [dx, dy] = [bx - ax, by - ay];
  const along = Math.min(1, Math.max(0, ((x - ax) * dx + (y - ay) * dy) / (dx * dx + dy * dy || 1)));
  return Math.hypot(x - ax - along * dx, y - ay - along * dy);
}
