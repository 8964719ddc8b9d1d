/** The place of the section farthest from every exposed side: where the part is thickest. */
import { curveOf, nearestOn, placeAt } from "./curve.ts";
import type { Curve } from "./curve.ts";
import { INSIDE_CHORDS, SPOT_SHARE } from "./defaults.ts";
import type { Place, Profile } from "./types.ts";

export interface Spot {
  readonly at: Place;
  /** m, to the nearest exposed side: radius of the largest circle inside the full section */
  readonly radius: number;
}

interface Square extends Spot {
  readonly half: number;
  /** no place of the square lies deeper than this */
  readonly bound: number;
}

/**
 * Squares that may hold a deeper place are split until none may be deeper by more than 1 %; from there the deepest
 * place is climbed to. The axis is no surface, so a plain round is deepest on its axis.
 *
 * @returns undefined when nothing is exposed
 */
export function thickestSpot(profile: Profile): Spot | undefined {
  const skin = profile.sides.filter((side) => side.exposed.length > 0).map(curveOf);
  if (skin.length === 0) return undefined;
  const rings = profile.regions.map((region) =>
    region.loops.map((loop) => loop.flatMap((line) => chords(curveOf(line)))),
  );
  const depth = (at: Place): number => {
    const distance = Math.min(...skin.map((curve) => nearestOn(curve, at).distance));
    return rings.some((loops) => isInside(loops, at)) ? distance : -distance;
  };
  const { low, high } = profile;
  const square = (r: number, z: number, half: number): Square => {
    const at: Place = [r, z];
    const radius = depth(at);
    return { at, radius, half, bound: radius + half * Math.SQRT2 };
  };
  return deepest(firstSquares(low, high, square), square);
}

type MakeSquare = (r: number, z: number, half: number) => Square;

function firstSquares(low: Place, high: Place, square: MakeSquare): Square[] {
  const half =
    Math.max(
      Math.min(high[0] - low[0], high[1] - low[1]),
      Math.max(high[0] - low[0], high[1] - low[1]) / 50,
    ) / 2;
  const squares: Square[] = [];
  for (let r = low[0]; r < high[0]; r += 2 * half) {
    for (let z = low[1]; z < high[1]; z += 2 * half) squares.push(square(r + half, z + half, half));
  }
  // places on the axis are corners of squares, never their middles: one row of them beside, of no size
  if (low[0] <= 0)
    for (let k = 0; k <= 200; k++) squares.push(square(0, low[1] + ((high[1] - low[1]) * k) / 200, 0));
  return squares;
}

/** Splits, level by level, the squares that may hold a deeper place; then climbs from the best one. */
function deepest(first: Square[], square: MakeSquare): Spot {
  let best = first.reduce((a, b) => (b.radius > a.radius ? b : a));
  let open = first.filter((one) => one.half > 0);
  while (open.length > 0) {
    const promising = open.filter((one) => one.bound > best.radius * (1 + SPOT_SHARE));
    open = promising.flatMap((one) => quarters(one, square));
    for (const part of open) if (part.radius > best.radius) best = part;
  }
  return climb(best, square);
}

function quarters({ at, half }: Square, square: MakeSquare): Square[] {
  const h = half / 2;
  return [
    square(at[0] - h, at[1] - h, h),
    square(at[0] + h, at[1] - h, h),
    square(at[0] - h, at[1] + h, h),
    square(at[0] + h, at[1] + h, h),
  ];
}

/** Steps to the deepest of eight neighbours, the step halved where none is deeper. */
function climb(start: Spot, square: MakeSquare): Spot {
  let best = start;
  let step = SPOT_SHARE * start.radius;
  while (step > 1e-6 * start.radius) {
    const around = Array.from({ length: 8 }, (_, k) => {
      const angle = (k * Math.PI) / 4;
      return square(Math.max(0, best.at[0] + step * Math.cos(angle)), best.at[1] + step * Math.sin(angle), 0);
    });
    const next = around.reduce((a, b) => (b.radius > a.radius ? b : a));
    if (next.radius > best.radius) best = next;
    else step /= 2;
  }
  return { at: best.at, radius: best.radius };
}

function chords(curve: Curve): Place[] {
  const count = curve.arc ? INSIDE_CHORDS : 1;
  return Array.from({ length: count }, (_, i) => placeAt(curve, i / count));
}

/** Even-odd rule over all loops of a region: inside the outline and in no hole. Places on r = 0 count as inside. */
function isInside(loops: readonly (readonly Place[])[], at: Place): boolean {
  let inside = false;
  const r = Math.max(at[0], 1e-12);
  for (const loop of loops) {
    for (let i = 0; i < loop.length; i++) {
      const [ar, az] = loop[i]!;
      const [br, bz] = loop[(i + 1) % loop.length]!;
      if (az > at[1] === bz > at[1]) continue;
      if (r < ar + ((at[1] - az) / (bz - az)) * (br - ar)) inside = !inside;
    }
  }
  return inside;
}
