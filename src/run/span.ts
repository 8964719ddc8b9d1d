/** The temperatures between which a run can move: the measure for accuracy and for the range check. */
import type { Case, Curve } from "../case/types.ts";
import type { Profile } from "../profile/types.ts";
import { conditionOf } from "./conditions.ts";

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

/**
 * Span of a run's temperatures [K], the measure for its accuracy: the range of start and surroundings, and where sources or
 * fluxes drive the part beyond it, the range that the field was seen to take, or a guess of it before any was seen.
 */
export function temperatureSpan(input: Case, profile: Profile, seen?: Seen): number {
  const { low, high } = temperatureRange(input);
  if (!drivenBeyondRange(input)) return Math.max(LEAST_SPAN, high - low);
  if (!seen) return Math.max(LEAST_SPAN, high - low + drivenRise(input, profile));
  return Math.max(LEAST_SPAN, Math.max(high, seen.high) - Math.min(low, seen.low));
}

export interface Seen {
  readonly low: number;
  readonly high: number;
}

/** K: accuracy is a share of the span, and a span of nothing would ask for the impossible. */
const LEAST_SPAN = 1;

/**
 * How far fluxes and sources may drive the part [K], to the right power of ten: heating up as one body, but no further
 * than its films carry off, plus the drop across the part.
 */
function drivenRise(input: Case, profile: Profile): number {
  const capacity = input.regions.reduce((sum, region, i) => {
    const { density, heatCapacity } = input.materials[region.material]!;
    return sum + density * least(heatCapacity) * profile.regions[i]!.volume;
  }, 0);
  const conductivity = Math.min(
    ...input.regions.map((region) => least(input.materials[region.material]!.conductivity)),
  );
  const released = input.regions.reduce(
    (sum, region, i) => sum + most(region.source) * profile.regions[i]!.volume,
    0,
  );
  return Math.max(
    ...input.stages.map((stage) => {
      let power = released;
      let film = 0;
      for (const side of profile.sides) {
        const condition = conditionOf(stage, side.name);
        if (condition?.kind === "flux") power += most(condition.flux) * side.exposedArea;
        if (condition?.kind === "film") film += least(condition.film) * side.exposedArea;
        if (condition?.kind === "held") film = Infinity;
      }
      const asOneBody = Math.min((power * stage.lasts) / capacity, film > 0 ? power / film : Infinity);
      return asOneBody + (power / profile.exposedArea) * (profile.characteristicLength / conductivity);
    }),
  );
}

const least = (curve: Curve): number => Math.min(...valuesOf(curve).map(Math.abs));
const most = (curve: Curve): number => Math.max(...valuesOf(curve).map(Math.abs));

/** Do sources or fluxes drive the part beyond its surroundings? */
export const drivenBeyondRange = (input: Case): boolean =>
  input.regions.some((region) => region.source !== 0) ||
  input.stages.some((stage) => Object.values(stage.sides).some((condition) => condition.kind === "flux"));

const valuesOf = (curve: Curve): number[] =>
  typeof curve === "number" ? [curve] : curve.points.map((point) => point[1]);
