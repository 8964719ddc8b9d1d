/** The outline as the board draws it, from the document as edited: sound or not, it has to stand on the sheet. */
import type { CaseDocument } from "../../case/types.ts";
import { arcOfSide, loopOf, loopPlaces, sheetLoop } from "../../editor/outline.ts";
import type { SheetVertex } from "../../editor/outline.ts";
import { onArc } from "../../editor/arcs.ts";
import type { Place } from "../../editor/arcs.ts";
import { siOf } from "../../editor/quantities.ts";
import type { LoopPlace } from "../../editor/selection.ts";

export interface SheetSide {
  readonly index: number;
  readonly name: string;
  /** from end to end, arcs in short steps [m] */
  readonly points: readonly Place[];
  readonly curved: boolean;
  /** lies on r = 0: never takes a condition */
  readonly onAxis: boolean;
  /** another region has the same side: a joint, not exposed */
  readonly joint: boolean;
  /** m */
  readonly length: number;
}

export interface SheetLoop extends LoopPlace {
  readonly vertices: readonly SheetVertex[];
  readonly sides: readonly SheetSide[];
}

export interface SheetProbe {
  readonly name: string;
  readonly at: Place;
}

export interface Sheet {
  readonly loops: readonly SheetLoop[];
  readonly probes: readonly SheetProbe[];
}

/** Steps in which a full turn is drawn. */
const STEPS_PER_TURN = 96;
/** Closer than this to the axis counts as on it [m]. */
export const ON_AXIS = 1e-9;

export function readSheet(document: CaseDocument | null): Sheet {
  if (!document) return { loops: [], probes: [] };
  const loops = loopPlaces(document).map((place) => readLoop(document, place));
  const probes = (document.probes ?? []).map((probe) => ({
    name: probe.name,
    at: [siOf(probe.at[0], "length"), siOf(probe.at[1], "length")] as Place,
  }));
  return { loops: markJoints(loops), probes };
}

function readLoop(document: CaseDocument, place: LoopPlace): SheetLoop {
  const written = loopOf(document, place);
  const vertices = sheetLoop(written);
  const sides = vertices.map((vertex, index): SheetSide => {
    const end = vertices[(index + 1) % vertices.length]!;
    const points = sidePoints(vertex.at, end.at, arcOfSide(written, index));
    const onAxis = Math.abs(vertex.at[0]) < ON_AXIS && Math.abs(end.at[0]) < ON_AXIS && points.length === 2;
    return {
      index,
      name: vertex.side,
      points,
      curved: points.length > 2,
      onAxis,
      joint: false,
      length: lengthOf(points),
    };
  });
  return { ...place, vertices, sides };
}

function sidePoints(from: Place, to: Place, arc: ReturnType<typeof arcOfSide>): Place[] {
  if (arc === null) return [from, to];
  const steps = Math.max(6, Math.ceil((STEPS_PER_TURN * Math.abs(arc.to - arc.from)) / (2 * Math.PI)));
  const between = Array.from({ length: steps - 1 }, (_, k) =>
    onArc(arc, arc.from + ((k + 1) / steps) * (arc.to - arc.from)),
  );
  return [from, ...between, to];
}

function lengthOf(points: readonly Place[]): number {
  let length = 0;
  for (let i = 1; i < points.length; i++)
    length += Math.hypot(points[i]![0] - points[i - 1]![0], points[i]![1] - points[i - 1]![1]);
  return length;
}

function markJoints(loops: readonly SheetLoop[]): SheetLoop[] {
  const key = (points: readonly Place[]): string =>
    [points[0]!, points.at(-1)!]
      .map(([r, z]) => `${r.toFixed(9)} ${z.toFixed(9)}`)
      .sort()
      .join(", ");
  const count = new Map<string, number>();
  for (const side of loops.flatMap((loop) => loop.sides))
    count.set(key(side.points), (count.get(key(side.points)) ?? 0) + 1);
  return loops.map((loop) => ({
    ...loop,
    sides: loop.sides.map((side) => ({
      ...side,
      joint: !side.onAxis && (count.get(key(side.points)) ?? 0) > 1,
    })),
  }));
}

/** Every place of the outline, for bounds. */
export function sheetPlaces(sheet: Sheet): Place[] {
  return sheet.loops
    .flatMap((loop) => loop.sides.flatMap((side) => side.points))
    .filter(([r, z]) => Number.isFinite(r) && Number.isFinite(z));
}

/** The place on a side at a share of its length. */
export function alongSide(side: SheetSide, share: number): Place {
  let left = share * side.length;
  for (let i = 1; i < side.points.length; i++) {
    const [a, b] = [side.points[i - 1]!, side.points[i]!];
    const step = Math.hypot(b[0] - a[0], b[1] - a[1]);
    if (left <= step && step > 0)
      return [a[0] + (left / step) * (b[0] - a[0]), a[1] + (left / step) * (b[1] - a[1])];
    left -= step;
  }
  return side.points.at(-1)!;
}

/** The place of a side nearest to a place of the half plane, and how far it is [m]. */
export function nearestOn(side: SheetSide, [r, z]: Place): { readonly at: Place; readonly distance: number } {
  let best: { at: Place; distance: number } = { at: side.points[0]!, distance: Infinity };
  for (let i = 1; i < side.points.length; i++) {
    const [a, b] = [side.points[i - 1]!, side.points[i]!];
    const [dr, dz] = [b[0] - a[0], b[1] - a[1]];
    const share = Math.min(1, Math.max(0, ((r - a[0]) * dr + (z - a[1]) * dz) / (dr * dr + dz * dz || 1)));
    const at: Place = [a[0] + share * dr, a[1] + share * dz];
    const distance = Math.hypot(at[0] - r, at[1] - z);
    if (distance < best.distance) best = { at, distance };
  }
  return best;
}

/** Whether a place lies inside the part. */
export function insidePart(sheet: Sheet, place: Place): boolean {
  const regions = new Set(sheet.loops.map((loop) => loop.region));
  return [...regions].some((region) => insideRegion(sheet, region, place));
}

/** Whether a place lies inside one region: an odd number of its sides lie beyond the place. */
export function insideRegion(sheet: Sheet, region: number, place: Place): boolean {
  let count = 0;
  for (const loop of sheet.loops)
    if (loop.region === region) for (const side of loop.sides) count += crossings(side.points, place);
  return count % 2 === 1;
}

function crossings(points: readonly Place[], [r, z]: Place): number {
  let count = 0;
  for (let i = 1; i < points.length; i++) {
    const [a, b] = [points[i - 1]!, points[i]!];
    if (a[1] > z !== b[1] > z && r < a[0] + ((z - a[1]) / (b[1] - a[1])) * (b[0] - a[0])) count++;
  }
  return count;
}
