/**
 * Which simple body stands for the part, and how large it is. Wherever that makes sense the simple body keeps the
 * part's volume over exchanging area (V/A), so that series and one-temperature estimate agree for small Biot numbers.
 */
import type { Direction } from "../analytic/stagedSeries.ts";
import { formatRange } from "../case/format.ts";
import { BALL_FIT, FLAT_DISC, LONG_ROUND, ROUND_FILL, SHELL_SHARE } from "./defaults.ts";
import type { CaseFacts, Facing, SideFacts } from "./facts.ts";
import type { SeriesShape } from "./types.ts";

export interface ChosenShape {
  readonly shape: SeriesShape;
  readonly directions: readonly Direction[];
  /** m */
  readonly sizes: Readonly<Record<string, number>>;
  /** sides that each direction's film is the mean of */
  readonly facings: readonly (readonly Facing[])[];
  /** how it was chosen, in a sentence */
  readonly remark: string;
}

/** Names of the sides that let heat through by a film or are held in any stage. */
export function exchangingSides(facts: CaseFacts): ReadonlySet<string> {
  const names = facts.stages.flatMap((stage) => stage.sides.filter(exchanges).map((side) => side.name));
  return new Set(names);
}

function exchanges({ treatment }: SideFacts): boolean {
  return treatment.kind === "held" || (treatment.kind === "film" && treatment.film > 0);
}

/** The simple body for a part of which the named sides exchange heat; null when none does. */
export function chooseShape(facts: CaseFacts, exchanging: ReadonlySet<string>): ChosenShape | null {
  const sides = facts.stages[0]!.sides;
  const open = sides.filter((side) => exchanging.has(side.name));
  const area = (which: readonly SideFacts[]) => which.reduce((sum, side) => sum + side.area, 0);
  if (!(area(open) > 0)) return null;
  const length = facts.volume / area(open);
  const looking = (facing: Facing) => open.some((side) => side.facing === facing);
  if (open.length === sides.length && isBall(facts, length)) return ball(facts);
  if (facts.boreRadius > 0) return wall(length, "the part has a bore, so its thickness counts");
  if (isShell(facts, facts.volume / area(sides)))
    return wall(length, "the part is a shell, so its thickness counts");
  if (!looking("wall") && !looking("askew")) return wall(length, "heat passes by the ends alone");
  if (!looking("end") && !looking("askew")) return longRound(length, "heat passes by the wall alone");
  return solidRound(facts, length);
}

function isBall({ volume, outerRadius, height, boreRadius }: CaseFacts, length: number): boolean {
  const fits = (value: number, ideal: number) => Math.abs(value / ideal - 1) < BALL_FIT;
  const ballVolume = (4 / 3) * Math.PI * outerRadius ** 3;
  return (
    boreRadius === 0 &&
    fits(height, 2 * outerRadius) &&
    fits(volume, ballVolume) &&
    fits(3 * length, outerRadius)
  );
}

/** Far more surface than a solid round of the same volume and height has. */
function isShell({ volume, height }: CaseFacts, length: number): boolean {
  const radius = Math.sqrt(volume / (Math.PI * height));
  return length < SHELL_SHARE * roundLength(radius, height / 2);
}

/** V/A of a round that exchanges all round: R H / (2 H + R), H its half height. */
function roundLength(radius: number, halfHeight: number): number {
  return (radius * halfHeight) / (2 * halfHeight + radius);
}

function ball({ volume }: CaseFacts): ChosenShape {
  const radius = Math.cbrt((3 * volume) / (4 * Math.PI));
  return {
    shape: "sphere",
    directions: [{ geometry: "sphere", length: radius }],
    sizes: { radius },
    facings: [["wall", "end", "askew", "bore"]],
    remark: `Taken as a ball of radius ${millimetres(radius)}, which has the part's volume.`,
  };
}

function wall(halfThickness: number, reason: string): ChosenShape {
  return {
    shape: "slab",
    directions: [{ geometry: "slab", length: halfThickness }],
    sizes: { halfThickness },
    facings: [["wall", "end", "askew", "bore"]],
    remark: `Taken as a slab of half thickness ${millimetres(halfThickness)}, the part's volume over the area that exchanges heat: ${reason}.`,
  };
}

function longRound(length: number, reason: string): ChosenShape {
  const radius = 2 * length;
  return {
    shape: "cylinder",
    directions: [{ geometry: "cylinder", length: radius }],
    sizes: { radius },
    facings: [["wall", "end", "askew", "bore"]],
    remark: `Taken as a long round of radius ${millimetres(radius)}, twice the part's volume over the area that exchanges heat: ${reason}.`,
  };
}

/**
 * A finite round. One of its sizes is measured on the part (its radius, or that of the thickest spot, which is half
 * the thickness of a squat part), the other follows from V/A = R H / (2 H + R). An insulated end is a plane of
 * symmetry: V/A then gives the whole height for H by itself.
 */
function solidRound(facts: CaseFacts, length: number): ChosenShape {
  const { volume, outerRadius, height } = facts;
  const meanRadius = Math.sqrt(volume / (Math.PI * height));
  const isRound = meanRadius ** 2 >= ROUND_FILL * outerRadius ** 2;
  const squat = height < 2 * meanRadius;
  const thickest = isRound ? undefined : facts.thickestRadius;
  if (squat && thickest !== undefined) return squatRound(thickest, length);
  const radius = isRound ? outerRadius : (thickest ?? meanRadius);
  const halfHeight = (length * radius) / (radius - 2 * length);
  if (!(radius > 2 * length) || halfHeight > LONG_ROUND * radius)
    return longRound(length, "it is so long, or so little passes by its ends, that they do not count");
  if (halfHeight < FLAT_DISC * radius) return wall(length, "it is so flat that its rim does not count");
  const source = isRound
    ? "the part's own"
    : thickest === undefined
      ? "as of its mean section"
      : "its thickest spot";
  return finiteRound(radius, halfHeight, `radius ${millimetres(radius)}, ${source}`);
}

function squatRound(halfHeight: number, length: number): ChosenShape {
  const radius = (2 * halfHeight * length) / (halfHeight - length);
  if (!(halfHeight > length) || halfHeight < FLAT_DISC * radius)
    return wall(length, "it is so flat that its rim does not count");
  return finiteRound(radius, halfHeight, `half height ${millimetres(halfHeight)}, its thickest spot`);
}

function finiteRound(radius: number, halfHeight: number, measured: string): ChosenShape {
  return {
    shape: "finite-cylinder",
    directions: [
      { geometry: "cylinder", length: radius },
      { geometry: "slab", length: halfHeight },
    ],
    sizes: { radius, halfHeight },
    facings: [
      ["wall", "askew"],
      ["end", "askew"],
    ],
    remark: `Taken as a round of ${measured}; radius ${millimetres(radius)} and half height ${millimetres(halfHeight)} together have the part's volume over the area that exchanges heat.`,
  };
}

function millimetres(length: number): string {
  return formatRange(length, length, "length");
}
