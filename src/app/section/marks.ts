/** Condition marks along the outline: insulated hatched, held temperature a row of solid triangles, flux arrows. */
import type { ConditionDocument } from "../../case/types.ts";
import type { Spot } from "./view.ts";

export type Mark = "film" | "insulated" | "held" | "flux" | "none";

export function markOf(condition: ConditionDocument | undefined): Mark {
  if (condition === undefined) return "none";
  if (condition === "insulated") return "insulated";
  if ("held" in condition) return "held";
  return "flux" in condition ? "flux" : "film";
}

/** px between two hatch lines, triangles, arrows; depth of the band they stand in */
const SPACING = { insulated: 7, held: 14, flux: 22 } as const;
const DEPTH = 9;

/**
 * Path of the marks along a side drawn through `spots`, on the side of the way where `left` says (true: on the left
 * hand as one goes, with y downwards on the screen).
 */
export function markPath(mark: Mark, spots: readonly Spot[], left: boolean): string {
  if (mark !== "insulated" && mark !== "held" && mark !== "flux") return "";
  const pieces = evenly(spots, SPACING[mark]).map(({ at, along }) => {
    const out: Spot = left ? [along[1], -along[0]] : [-along[1], along[0]];
    return mark === "insulated"
      ? hatch(at, along, out)
      : mark === "held"
        ? triangle(at, along, out)
        : arrow(at, along, out);
  });
  return pieces.join("");
}

const point = ([x, y]: Spot, [ux, uy]: Spot, u: number, [vx, vy]: Spot, v: number): string =>
  `${(x + u * ux + v * vx).toFixed(1)} ${(y + u * uy + v * vy).toFixed(1)}`;

function hatch(at: Spot, along: Spot, out: Spot): string {
  return `M${point(at, along, 0, out, 1)}L${point(at, along, -DEPTH, out, DEPTH + 1)}`;
}

function triangle(at: Spot, along: Spot, out: Spot): string {
  return `M${point(at, along, 0, out, 2)}L${point(at, along, -3.5, out, DEPTH)}L${point(at, along, 3.5, out, DEPTH)}Z`;
}

/** Into the part. */
function arrow(at: Spot, along: Spot, out: Spot): string {
  return `M${point(at, along, 0, out, 15)}L${point(at, along, 0, out, 8)}M${point(at, along, 0, out, 2)}L${point(at, along, -3, out, 9)}L${point(at, along, 3, out, 9)}Z`;
}

/** Spots at even distances along a line, with the unit way of going there. */
function evenly(spots: readonly Spot[], spacing: number): { at: Spot; along: Spot }[] {
  const found: { at: Spot; along: Spot }[] = [];
  let left = spacing / 2;
  for (let i = 1; i < spots.length; i++) {
    const [a, b] = [spots[i - 1]!, spots[i]!];
    const length = Math.hypot(b[0] - a[0], b[1] - a[1]);
    if (length === 0) continue;
    const along: Spot = [(b[0] - a[0]) / length, (b[1] - a[1]) / length];
    for (; left <= length; left += spacing)
      found.push({ at: [a[0] + left * along[0], a[1] + left * along[1]], along });
    left -= length;
  }
  return found;
}

/** Whether the outside lies to the left of the way of travel on the screen (y downwards). */
export function outsideIsLeft(loop: readonly Spot[], hole: boolean): boolean {
  let twiceArea = 0;
  loop.forEach(([x, y], i) => {
    const [nx, ny] = loop[(i + 1) % loop.length]!;
    twiceArea += x * ny - nx * y;
  });
  // y downwards: a positive area runs clockwise as seen, so the outside is on the left hand
  return twiceArea > 0 !== hole;
}
