/**
 * Commands on the outline: each changes a draft of the document in place. Places are (r, z) [m]; r never leaves the
 * half plane. Coordinates keep the unit they were written in.
 */
import type { CaseDocument, Quantity, VertexDocument } from "../case/types.ts";
import { arcMiddle, arcThrough } from "./arcs.ts";
import type { Arc, Place } from "./arcs.ts";
import { FIRST_RISE } from "./defaults.ts";
import { siOf, writtenLike } from "./quantities.ts";
import type { LoopPlace } from "./selection.ts";

export interface LoopIndex extends LoopPlace {
  readonly index: number;
}

/** A vertex as it stands on the sheet; the side starts here and goes to the next vertex. */
export interface SheetVertex {
  readonly at: Place;
  /** name of the side: as written, else "side 3" */
  readonly side: string;
  readonly through?: Place;
}

/** The vertices of one loop as written; an empty list where there is no such loop. */
export function loopOf(document: CaseDocument, { region, loop }: LoopPlace): VertexDocument[] {
  const found = document.part.regions[region];
  return (loop === 0 ? found?.outline : found?.holes?.[loop - 1]) ?? [];
}

/** Every loop of the part, outlines before their holes. */
export function loopPlaces(document: CaseDocument): LoopPlace[] {
  return document.part.regions.flatMap((region, number) =>
    Array.from({ length: 1 + (region.holes?.length ?? 0) }, (_, loop) => ({ region: number, loop })),
  );
}

/** One loop in SI. A coordinate that cannot be read is NaN. */
export function sheetLoop(loop: readonly VertexDocument[]): SheetVertex[] {
  return loop.map((vertex, i) => ({
    at: placeOf(vertex.at),
    side: vertex.side ?? defaultSide(i),
    ...(vertex.through && { through: placeOf(vertex.through) }),
  }));
}

export const defaultSide = (index: number): string => `side ${index + 1}`;

function placeOf(pair: readonly [Quantity, Quantity]): Place {
  return [siOf(pair[0], "length"), siOf(pair[1], "length")];
}

function writePlace(old: readonly [Quantity, Quantity], [r, z]: Place): [Quantity, Quantity] {
  return [writtenLike(old[0], Math.max(0, r), "length"), writtenLike(old[1], z, "length")];
}

/** Puts a vertex somewhere else; arcs that end there keep their shape (the same bulge over the new chord). */
export function moveVertex(draft: CaseDocument, { index, ...place }: LoopIndex, to: Place): void {
  const loop = loopOf(draft, place);
  const vertex = loop[index];
  if (!vertex) return;
  const bulges = [before(loop, index), index].map((side) => bulgeOf(loop, side));
  vertex.at = writePlace(vertex.at, to);
  [before(loop, index), index].forEach((side, k) => setBulge(loop, side, bulges[k] ?? null));
}

/** Writes one coordinate as it was typed, unit and all. */
export function typeCoordinate(
  draft: CaseDocument,
  { index, ...place }: LoopIndex,
  axis: 0 | 1,
  typed: Quantity,
): void {
  const vertex = loopOf(draft, place)[index];
  if (!vertex) return;
  const value = siOf(typed, "length");
  const [r, z] = placeOf(vertex.at);
  if (Number.isFinite(value)) moveVertex(draft, { index, ...place }, axis === 0 ? [value, z] : [r, value]);
  vertex.at[axis] = typed;
}

/** Sets a new vertex on a side; both halves keep the side's name, and with it what happens there. */
export function insertVertex(draft: CaseDocument, { index, ...place }: LoopIndex, at: Place): void {
  const loop = loopOf(draft, place);
  const vertex = loop[index];
  if (!vertex) return;
  keepNames(draft, place);
  const arc = arcOfSide(loop, index);
  const fresh: VertexDocument = { at: writePlace(vertex.at, at) };
  if (vertex.side !== undefined) fresh.side = vertex.side;
  loop.splice(index + 1, 0, fresh);
  if (arc === null) return;
  const next = placeOf(loop[(index + 2) % loop.length]!.at);
  vertex.through = writePlace(vertex.at, arcMiddle(arc, placeOf(vertex.at), at));
  fresh.through = writePlace(vertex.at, arcMiddle(arc, at, next));
}

/** Fewest vertices of a loop: two sides make one only where both are curved, so three. */
export const FEWEST_VERTICES = 3;

/** Takes a vertex out; the side before it goes on to the next vertex, straight. */
export function removeVertex(draft: CaseDocument, { index, ...place }: LoopIndex): void {
  const loop = loopOf(draft, place);
  if (loop.length <= FEWEST_VERTICES || !loop[index]) return;
  keepNames(draft, place);
  delete loop[before(loop, index)]!.through;
  loop.splice(index, 1);
}

/** Puts both ends of a side on the axis: closes the gap that it left. */
export function closeToAxis(draft: CaseDocument, { index, ...place }: LoopIndex): void {
  const loop = loopOf(draft, place);
  const vertex = loop[index];
  if (!vertex) return;
  delete vertex.through;
  for (const end of [vertex, loop[(index + 1) % loop.length]!])
    end.at = writePlace(end.at, [0, siOf(end.at[1], "length")]);
}

/** Makes a side an arc through a place, or one that bulges outwards a little. */
export function bendSide(draft: CaseDocument, { index, ...place }: LoopIndex, through?: Place): void {
  const loop = loopOf(draft, place);
  const vertex = loop[index];
  if (!vertex) return;
  vertex.through = vertex.at;
  if (through) vertex.through = writePlace(vertex.at, through);
  else setBulge(loop, index, [0.5, FIRST_RISE * outwards(loop)]);
}

export function straightenSide(draft: CaseDocument, { index, ...place }: LoopIndex): void {
  delete loopOf(draft, place)[index]?.through;
}

/** Height of an arc over its chord [m], positive outwards; 0 for a straight side. */
export function riseOf(loop: readonly VertexDocument[], index: number): number {
  const arc = arcOfSide(loop, index);
  if (arc === null) return 0;
  const [from, to] = [placeOf(loop[index]!.at), placeOf(loop[(index + 1) % loop.length]!.at)];
  const top = arcMiddle(arc, from, to);
  const chord = Math.hypot(to[0] - from[0], to[1] - from[1]);
  const left = ((to[0] - from[0]) * (top[1] - from[1]) - (to[1] - from[1]) * (top[0] - from[0])) / chord;
  return left * outwards(loop);
}

/** Gives an arc a height over its chord [m], positive outwards. Zero straightens it. */
export function setRise(draft: CaseDocument, { index, ...place }: LoopIndex, rise: number): void {
  const loop = loopOf(draft, place);
  const vertex = loop[index];
  if (!vertex) return;
  if (rise === 0) return straightenSide(draft, { index, ...place });
  const [from, to] = [placeOf(vertex.at), placeOf(loop[(index + 1) % loop.length]!.at)];
  vertex.through ??= vertex.at;
  setBulge(loop, index, [0.5, (rise * outwards(loop)) / Math.hypot(to[0] - from[0], to[1] - from[1])]);
}

/**
 * Moves a side square to itself by `distance` [m], positive outwards. Its ends slide along straight neighbours
 * that meet it at a fair angle, and are carried along otherwise; ends on the axis stay on it.
 */
export function moveSide(draft: CaseDocument, { index, ...place }: LoopIndex, distance: number): void {
  const loop = loopOf(draft, place);
  const end = (index + 1) % loop.length;
  const [from, to] = [placeOf(loop[index]!.at), placeOf(loop[end]!.at)];
  const chord = Math.hypot(to[0] - from[0], to[1] - from[1]);
  if (chord === 0) return;
  const out = -outwards(loop);
  const normal: Place = [(out * (to[1] - from[1])) / chord, (-out * (to[0] - from[0])) / chord];
  const ends = [
    slide(
      from,
      placeOf(loop[before(loop, index)]!.at),
      normal,
      distance,
      arcOfSide(loop, before(loop, index)) !== null,
    ),
    slide(to, placeOf(loop[(end + 1) % loop.length]!.at), normal, distance, arcOfSide(loop, end) !== null),
  ] as const;
  moveVertex(draft, { index, ...place }, ends[0]);
  moveVertex(draft, { index: end, ...place }, ends[1]);
}

/** Least cosine between the way of a side and its neighbour for an end to slide along the neighbour. */
const FAIR_ANGLE = 0.25;

function slide(at: Place, neighbour: Place, normal: Place, distance: number, curved: boolean): Place {
  const [dr, dz] = [at[0] - neighbour[0], at[1] - neighbour[1]];
  const length = Math.hypot(dr, dz);
  const along = length > 0 ? (dr * normal[0] + dz * normal[1]) / length : 0;
  const onAxis = at[0] === 0 && neighbour[0] === 0;
  if ((curved && !onAxis) || Math.abs(along) < FAIR_ANGLE)
    return [onAxis ? 0 : at[0] + distance * normal[0], at[1] + distance * normal[1]];
  const travel = distance / along / length;
  return [at[0] + travel * dr, at[1] + travel * dz];
}

/** Index of the vertex (and side) before. */
export function before(loop: readonly unknown[], index: number): number {
  return (index + loop.length - 1) % loop.length;
}

/** Writes the default names down once somebody refers to them, so that a new vertex does not shift them. */
function keepNames(draft: CaseDocument, place: LoopPlace): void {
  const used = new Set(draft.stages.flatMap((stage) => Object.keys(stage.sides ?? {})));
  loopOf(draft, place).forEach((vertex, i) => {
    if (vertex.side === undefined && used.has(defaultSide(i))) vertex.side = defaultSide(i);
  });
}

/** The arc of a side, or null where it is straight. */
export function arcOfSide(loop: readonly VertexDocument[], index: number): Arc | null {
  const vertex = loop[index];
  if (!vertex?.through) return null;
  return arcThrough(
    placeOf(vertex.at),
    placeOf(vertex.through),
    placeOf(loop[(index + 1) % loop.length]!.at),
  );
}

/** Where `through` stands over the chord: share along it and share of its length to the left. */
function bulgeOf(loop: readonly VertexDocument[], index: number): Place | null {
  const vertex = loop[index]!;
  if (!vertex.through) return null;
  const [from, to] = [placeOf(vertex.at), placeOf(loop[(index + 1) % loop.length]!.at)];
  const through = placeOf(vertex.through);
  const [cr, cz, tr, tz] = [to[0] - from[0], to[1] - from[1], through[0] - from[0], through[1] - from[1]];
  const square = cr * cr + cz * cz;
  return square > 0 ? [(tr * cr + tz * cz) / square, (cr * tz - cz * tr) / square] : null;
}

function setBulge(loop: readonly VertexDocument[], index: number, bulge: Place | null): void {
  const vertex = loop[index]!;
  if (!vertex.through || !bulge) return;
  const [from, to] = [placeOf(vertex.at), placeOf(loop[(index + 1) % loop.length]!.at)];
  const [cr, cz] = [to[0] - from[0], to[1] - from[1]];
  const [along, left] = bulge;
  vertex.through = writePlace(vertex.through, [
    from[0] + along * cr - left * cz,
    from[1] + along * cz + left * cr,
  ]);
}

/** Sign of "to the left of the way of travel" when seen as outwards: -1 for loops that run counter-clockwise. */
function outwards(loop: readonly VertexDocument[]): 1 | -1 {
  let twiceArea = 0;
  loop.forEach((vertex, i) => {
    const [a, b] = [placeOf(vertex.at), placeOf(loop[(i + 1) % loop.length]!.at)];
    twiceArea += a[0] * b[1] - b[0] * a[1];
  });
  return twiceArea > 0 ? -1 : 1;
}
