/**
 * The outline as straight chords, for the questions that need no exact arc: how thick is the wall, is a cell inside.
 */
import { curveAt } from "./plane.ts";
import type { Outline, Piece } from "./outline.ts";

/** Chords of at most 12 degrees: their sagitta stays below 0.6 % of the radius. */
const CHORD_TURN = (12 * Math.PI) / 180;

export interface Chords {
  readonly count: number;
  /** x, y of both ends, 4 per chord */
  readonly ends: Float64Array;
  /** piece of each chord */
  readonly piece: Int32Array;
  /** how far the true side may lie beside its chord [m] */
  readonly bulge: Float64Array;
  /** 1 where nothing of the part lies on one hand: only these tell inside from outside */
  readonly outer: Uint8Array;
  readonly bands: Bands;
}

/** Outer chords by the horizontal bands that they reach, so that a ray meets few of them. */
interface Bands {
  readonly low: number;
  readonly perMetre: number;
  /** where each band's chords begin in `chords`, one more than bands */
  readonly first: Int32Array;
  readonly chords: Int32Array;
}

const MOST_BANDS = 1024;

export function chordsOf(outline: Outline): Chords {
  const counts = outline.pieces.map(chordCount);
  const count = counts.reduce((sum, n) => sum + n, 0);
  const ends = new Float64Array(4 * count);
  const piece = new Int32Array(count);
  const bulge = new Float64Array(count);
  const outer = new Uint8Array(count);
  const p = [0, 0];
  let c = 0;
  outline.pieces.forEach((side, k) => {
    const n = counts[k]!;
    for (let i = 0; i < n; i++, c++) {
      curveAt(side, i / n, p);
      ends.set(p, 4 * c);
      curveAt(side, (i + 1) / n, p);
      ends.set(p, 4 * c + 2);
      piece[c] = k;
      if (side.arc) bulge[c] = 1.02 * side.arc.radius * (1 - Math.cos(side.arc.turn / 2 / n));
      outer[c] = side.left < 0 || side.right < 0 ? 1 : 0;
    }
  });
  return { count, ends, piece, bulge, outer, bands: bandsOf(ends, outer) };
}

function bandsOf(ends: Float64Array, outer: Uint8Array): Bands {
  let [low, high] = [Infinity, -Infinity];
  for (let i = 1; i < ends.length; i += 2) {
    low = Math.min(low, ends[i]!);
    high = Math.max(high, ends[i]!);
  }
  const count = Math.min(MOST_BANDS, Math.ceil(8 * Math.sqrt(outer.length)));
  const perMetre = high > low ? count / (high - low) : 0;
  const bandOf = (y: number) => Math.min(count - 1, Math.max(0, Math.floor((y - low) * perMetre)));
  const forAll = (visit: (band: number, chord: number) => void) => {
    for (let c = 0; c < outer.length; c++) {
      if (!outer[c]) continue;
      const [y0, y1] = [ends[4 * c + 1]!, ends[4 * c + 3]!];
      for (let b = bandOf(Math.min(y0, y1)); b <= bandOf(Math.max(y0, y1)); b++) visit(b, c);
    }
  };
  const first = new Int32Array(count + 1);
  forAll((band) => first[band + 1]!++);
  for (let b = 0; b < count; b++) first[b + 1]! += first[b]!;
  const chords = new Int32Array(first[count]!);
  const next = first.slice();
  forAll((band, chord) => {
    chords[next[band]!++] = chord;
  });
  return { low, perMetre, first, chords };
}

function chordCount(piece: Piece): number {
  return piece.arc ? Math.max(3, Math.ceil(Math.abs(piece.arc.turn) / CHORD_TURN)) : 1;
}

/** True when the place lies in some region: the ray to the right crosses an odd number of outer chords. */
export function isInside({ ends, bands }: Chords, x: number, y: number): boolean {
  const { first, chords } = bands;
  const band = Math.min(first.length - 2, Math.floor((y - bands.low) * bands.perMetre));
  if (!(band >= 0)) return false;
  let inside = false;
  for (let k = first[band]!; k < first[band + 1]!; k++) {
    const i = 4 * chords[k]!;
    const y0 = ends[i + 1]!;
    const y1 = ends[i + 3]!;
    if (y0 > y === y1 > y) continue;
    if (x < ends[i]! + ((ends[i + 2]! - ends[i]!) * (y - y0)) / (y1 - y0)) inside = !inside;
  }
  return inside;
}

/** True when the chord comes into the square around x, y of the given half width. */
export function chordMeetsSquare(ends: Float64Array, i: number, x: number, y: number, half: number): boolean {
  const x0 = ends[i]!;
  const y0 = ends[i + 1]!;
  const x1 = ends[i + 2]!;
  const y1 = ends[i + 3]!;
  if (x0 < x - half && x1 < x - half) return false;
  if (x0 > x + half && x1 > x + half) return false;
  if (y0 < y - half && y1 < y - half) return false;
  if (y0 > y + half && y1 > y + half) return false;
  const nx = y0 - y1;
  const ny = x1 - x0;
  return Math.abs(nx * (x - x0) + ny * (y - y0)) <= half * (Math.abs(nx) + Math.abs(ny));
}
