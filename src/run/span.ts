/** The temperatures between which a run can move: the measure for accuracy and for the range check. */
import type { Case, Curve } from "../case/types.ts";

/** Lowest and highest of start, surroundings and held temperatures [degC]; sources and fluxes may leave this range. */
export function temperatureRange(input: Case): { readonly low: number; readonly high: number } {
  const values = input.regions.map((region) => region.start);
  for (const stage of input.stages)
    for (const condition of Object.values(stage.sides)) {
      if (condition.kind === "film") values.push(...valuesOf(condition.ambient));
      if (condition.kind === "held") values.push(...valuesOf(condition.held));
    }
  return { low: Math.min(...values), high: Math.max(...values) };
}

/** Span of that range [K]; at least 1 K, for parts driven by sources and fluxes alone. */
export function temperatureSpan(input: Case): number {
  const { low, high } = temperatureRange(input);
  return Math.max(1, high - low);
}

/** Do sources or fluxes drive the part beyond its surroundings? */
export const drivenBeyondRange = (input: Case): boolean =>
  input.regions.some((region) => region.source !== 0) ||
  input.stages.some((stage) => Object.values(stage.sides).some((condition) => condition.kind === "flux"));

const valuesOf = (curve: Curve): number[] =>
  typeof curve === "number" ? [curve] : curve.points.map((point) => point[1]);
