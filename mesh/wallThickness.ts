/**
 * Local wall thickness: the diameter of the largest circle inside the part that touches the side at a place.
 */
import type { Chords } from "./chords.ts";
import { WALL_CONTACT_COSINE } from "./defaults.ts";

/**
 * Thickness of the material behind a place on the outline.
 *
 * The circle touches at (x, y) with its centre along the inner unit normal (nx, ny). A far contact counts only when
 * both contacts are seen from the centre at more than about 115 degrees: otherwise every corner would be a wall.
 *
 * @param skip  1 for pieces that are left out: the place's own side and its neighbours
 * @returns     thickness [m], Infinity where nothing lies opposite
 */
export function wallThickness(
  x: number,
  y: number,
  nx: number,
  ny: number,
  chords: Chords,
  skip: Uint8Array,
): number {
  const { ends, piece, count } = chords;
  let radius = Infinity;
  for (let c = 0; c < count; c++) {
    if (skip[piece[c]!]) continue;
    const i = 4 * c;
    const r = radiusToChord(ends[i]! - x, ends[i + 1]! - y, ends[i + 2]! - x, ends[i + 3]! - y, nx, ny);
    if (r < radius) radius = r;
  }
  return 2 * radius;
}

/** Radius of the circle through the origin, centred along the normal n, that touches the chord p-q. */
function radiusToChord(px: number, py: number, qx: number, qy: number, nx: number, ny: number): number {
  const dx = qx - px;
  const dy = qy - py;
  const length = Math.sqrt(dx * dx + dy * dy);
  let mx = -dy / length;
  let my = dx / length;
  let distance = px * mx + py * my;
  if (distance < 0) {
    distance = -distance;
    mx = -mx;
    my = -my;
  }
  const cosine = nx * mx + ny * my;
  if (cosine > WALL_CONTACT_COSINE && distance > 0) {
    const r = distance / (1 + cosine);
    const along = ((nx + mx) * r - px) * dx + ((ny + my) * r - py) * dy;
    if (along >= 0 && along <= length * length) return r;
  }
  return Math.min(radiusToPoint(px, py, nx, ny), radiusToPoint(qx, qy, nx, ny));
}

/** Radius of the circle through the origin, centred along n, that passes through the point q. */
function radiusToPoint(qx: number, qy: number, nx: number, ny: number): number {
  const ahead = qx * nx + qy * ny;
  if (ahead <= 0) return Infinity;
  const r = (qx * qx + qy * qy) / (2 * ahead);
  const cosine = (nx * (qx - nx * r) + ny * (qy - ny * r)) / r;
  return cosine > WALL_CONTACT_COSINE ? r : Infinity;
}
