/** Films and surroundings of a part boiled down to those of a simple body, stage by stage. */
import type { SeriesStage } from "../analytic/stagedSeries.ts";
import type { LumpedStage } from "../analytic/lumped.ts";
import type { Curve } from "../case/types.ts";
import { formatRange } from "../case/format.ts";
import { curveKnots, evaluateCurve } from "../heat/curve.ts";
import { addCurves } from "../heat/signal.ts";
import { SAME_FILM, SAME_SURROUNDINGS } from "./defaults.ts";
import type { CaseFacts, Facing, SideFacts, StageFacts } from "./facts.ts";

/** The stage as the one-temperature estimate takes it; null when a side is held, which leaves no film to reckon with. */
export function lumpedStage(stage: StageFacts): LumpedStage | null {
  if (stage.sides.some(({ treatment }) => treatment.kind === "held")) return null;
  const sides = stage.sides.map(({ area, treatment }) => ({
    area,
    film: treatment.kind === "film" ? treatment.film : 0,
    ambient: treatment.kind === "film" ? treatment.ambient : 0,
    flux: treatment.kind === "flux" ? treatment.flux : 0,
  }));
  return { duration: stage.duration, sides, source: stage.source };
}

export type SeriesStages =
  | { readonly stages: readonly SeriesStage[]; readonly remarks: readonly string[] }
  | { readonly reason: string };

/**
 * The stages as a simple body goes through them: per direction the mean film over the sides that belong to it, and one
 * temperature of the surroundings, the mean over all weighted by film and area. Or the reason why there is no such
 * thing.
 */
export function seriesStages(
  facts: CaseFacts,
  exchanging: ReadonlySet<string>,
  facings: readonly (readonly Facing[])[],
): SeriesStages {
  const stages: SeriesStage[] = [];
  const remarks: string[] = [];
  for (const stage of facts.stages) {
    const driven = drivenBy(stage);
    if (driven !== null) return { reason: driven };
    const open = stage.sides.filter((side) => exchanging.has(side.name));
    const directions = facings.map((which) => sidesOf(open, which));
    const films = directions.map(directionFilm);
    if (films.some((film) => film === null))
      return { reason: "Held sides and sides with a film look the same way: no simple body has that." };
    const weighted = surroundingsOf(open);
    const apart = spreadOf(weighted, stage.duration);
    if (apart.high - apart.low > SAME_SURROUNDINGS) {
      if (films.includes(Infinity))
        return {
          reason: `Held sides and other surroundings differ in stage "${stage.name}": no simple body has that.`,
        };
      remarks.push(
        `In stage "${stage.name}" the surroundings differ from side to side, ${formatRange(apart.low, apart.high, "temperature")}; the series takes their mean, weighted by film and area.`,
      );
    }
    remarks.push(...new Set(directions.flatMap((sides) => filmRemarks(stage, sides))));
    stages.push({ duration: stage.duration, films: films as number[], ambient: meanCurve(weighted) });
  }
  return { stages, remarks };
}

/** Why a stage has no answer in terms of its surroundings alone. */
function drivenBy(stage: StageFacts): string | null {
  if (stage.sides.some(({ treatment }) => treatment.kind === "flux" && treatment.flux !== 0))
    return `Stage "${stage.name}" puts heat in through a side: the series follows surroundings only.`;
  if (stage.source !== 0)
    return `Stage "${stage.name}" has a heat source: the series follows surroundings only.`;
  return null;
}

/** Sides that look the given ways; all of them when none does, as on a body of arcs alone. */
function sidesOf(open: readonly SideFacts[], facings: readonly Facing[]): readonly SideFacts[] {
  const own = open.filter((side) => facings.includes(side.facing));
  return own.length > 0 ? own : open;
}

/** Mean film over sides [W/(m2 K)]; Infinity when they are held; null when some are held and the others are not. */
function directionFilm(sides: readonly SideFacts[]): number | null {
  const total = sides.reduce((sum, side) => sum + side.area, 0);
  const held = sides.reduce((sum, side) => sum + (side.treatment.kind === "held" ? side.area : 0), 0);
  if (held > 0) return held === total ? Infinity : null;
  return sides.reduce((sum, side) => sum + side.area * filmOf(side), 0) / total;
}

export function filmOf({ treatment }: SideFacts): number {
  return treatment.kind === "film" ? treatment.film : 0;
}

interface WeightedAmbient {
  readonly weight: number;
  readonly curve: Curve;
}

/** Surroundings with film times area as their weight; held sides, where there are any, outweigh all films. */
function surroundingsOf(open: readonly SideFacts[]): WeightedAmbient[] {
  const held = open.flatMap(({ area, treatment }) =>
    treatment.kind === "held" ? [{ weight: area, curve: treatment.held }] : [],
  );
  const films = open.flatMap(({ area, treatment }) =>
    treatment.kind === "film" && treatment.film > 0
      ? [{ weight: area * treatment.film, curve: treatment.ambient }]
      : [],
  );
  const total = films.reduce((sum, { weight }) => sum + weight, 0);
  const heldTotal = held.reduce((sum, { weight }) => sum + weight, 0);
  // films stay in the list, with next to no weight, so that surroundings at another temperature are noticed
  return [
    ...held,
    ...films.map(({ weight, curve }) => ({ weight: heldTotal > 0 ? 0 : weight / total, curve })),
  ];
}

function meanCurve(weighted: readonly WeightedAmbient[]): Curve {
  const total = weighted.reduce((sum, { weight }) => sum + weight, 0);
  return total > 0 ? addCurves(weighted.map(({ weight, curve }) => ({ weight: weight / total, curve }))) : 0;
}

/** Lowest and highest surroundings at that instant of the stage at which they differ most [degC]. */
function spreadOf(weighted: readonly WeightedAmbient[], duration: number): { low: number; high: number } {
  const knots = weighted.flatMap(({ curve }) => curveKnots(curve)).filter((time) => time < duration);
  const instants = [0, duration, ...knots];
  let widest = { low: 0, high: 0 };
  for (const instant of instants) {
    const values = weighted.map(({ curve }) => evaluateCurve(curve, instant));
    const [low, high] = [Math.min(...values), Math.max(...values)];
    if (high - low > widest.high - widest.low) widest = { low, high };
  }
  return widest;
}

/** Says so when sides that look the same way have different films. */
function filmRemarks(stage: StageFacts, sides: readonly SideFacts[]): string[] {
  const films = sides.filter((side) => side.treatment.kind !== "held").map(filmOf);
  const [low, high] = [Math.min(...films), Math.max(...films)];
  if (films.length === 0 || high <= low * (1 + SAME_FILM)) return [];
  const range = formatRange(low, high, "filmCoefficient");
  return [
    `In stage "${stage.name}" films differ from side to side, ${range}; the series takes their mean by area.`,
  ];
}
