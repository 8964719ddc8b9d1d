/** The quick estimates of a case: one temperature, and the series of the nearest simple body. */
import { filmConductance, lumpedHistory } from "../analytic/lumped.ts";
import type { LumpedStage } from "../analytic/lumped.ts";
import { ONE_TERM_FOURIER } from "../analytic/defaults.ts";
import { seriesHistory } from "../analytic/stagedSeries.ts";
import type { Direction, SeriesStage } from "../analytic/stagedSeries.ts";
import { formatDuration } from "../case/format.ts";
import { biotNumber, fourierNumber, thermalDiffusivity } from "../heat/groups.ts";
import { BRIDGED_SHARE } from "./defaults.ts";
import { estimateInstants } from "./instants.ts";
import type { CaseFacts } from "./facts.ts";
import { chooseShape, exchangingSides } from "./shape.ts";
import { lumpedStage, seriesStages } from "./surroundings.ts";
import type { Estimates, LumpedEstimate, SeriesEstimate } from "./types.ts";

/** Lumped and series estimates of a case, each with its own instants; what is missing is explained in the remarks. */
export function estimateCase(facts: CaseFacts): Estimates {
  const times = estimateInstants(facts.stages, facts.times);
  const remarks = [...(facts.remarks ?? [])];
  const lumped = estimateLumped(facts, times);
  const series = estimateSeries(facts, times);
  if (typeof lumped === "string") remarks.push(lumped);
  if (typeof series === "string") remarks.push(series);
  return {
    lumped: typeof lumped === "string" ? null : lumped,
    series: typeof series === "string" ? null : series,
    remarks,
  };
}

/** The one-temperature estimate, or why there is none. */
function estimateLumped(facts: CaseFacts, times: Float64Array): LumpedEstimate | string {
  const stages = facts.stages.map(lumpedStage);
  if (stages.some((stage) => stage === null))
    return "No one-temperature estimate: a held side has no film, so nothing would keep the part from being there at once.";
  const films = stages as LumpedStage[];
  const heatCapacity = facts.volumetricHeatCapacity * facts.volume;
  const area = exposedArea(facts);
  const length = facts.volume / area;
  // of the stage with the strongest films: there one temperature is furthest from the truth
  const conductance = Math.max(...films.map(filmConductance));
  return {
    length,
    biot: biotNumber(conductance / area, length, facts.conductivity),
    timeConstant: heatCapacity / conductance,
    history: { time: times, temperature: lumpedHistory({ heatCapacity, start: facts.start }, films, times) },
  };
}

/** Sides that let heat through, by film or flux, in any stage; all of them when none does [m2]. */
function exposedArea({ stages }: CaseFacts): number {
  const sides = stages[0]!.sides;
  const taking = new Set(
    stages
      .flatMap((stage) => stage.sides.filter(({ treatment }) => treatment.kind !== "insulated"))
      .map(({ name }) => name),
  );
  const exposed = taking.size === 0 ? sides : sides.filter(({ name }) => taking.has(name));
  return exposed.reduce((sum, side) => sum + side.area, 0);
}

/** The series estimate, or why there is none. */
function estimateSeries(facts: CaseFacts, times: Float64Array): SeriesEstimate | string {
  const exchanging = exchangingSides(facts);
  const chosen = chooseShape(facts, exchanging);
  if (chosen === null) return "No series estimate: no side exchanges heat with surroundings.";
  const found = seriesStages(facts, exchanging, chosen.facings);
  if ("reason" in found) return `No series estimate. ${found.reason}`;
  const { directions, shape, sizes } = chosen;
  const { conductivity, volumetricHeatCapacity, start } = facts;
  const got = seriesHistory({ directions, conductivity, volumetricHeatCapacity, start }, found.stages, times);
  const first = directions[0]!;
  const diffusivity = thermalDiffusivity(conductivity, volumetricHeatCapacity);
  const bridged =
    got.bridgedShare > BRIDGED_SHARE ? ["The first instants of a later stage are bridged, not summed."] : [];
  return {
    shape,
    sizes,
    biot: strongestBiot(found.stages, first, conductivity),
    fourier: fourierNumber(diffusivity, times.at(-1)!, first.length),
    history: { time: times, core: got.core, mean: got.mean, surface: got.surface, edge: got.edge },
    oneTermCore: got.oneTermCore,
    remark: [chosen.remark, ...found.remarks, oneTermRemark(directions, diffusivity), ...bridged].join(" "),
  };
}

/** Of the first direction, in the stage with the strongest film. */
function strongestBiot(stages: readonly SeriesStage[], first: Direction, conductivity: number): number {
  return biotNumber(Math.max(...stages.map((stage) => stage.films[0]!)), first.length, conductivity);
}

/** From when on one term is enough in each direction, the check that hand calculations need. */
function oneTermRemark(directions: readonly Direction[], diffusivity: number): string {
  const [wall, end] = directions.map(({ length }) =>
    formatDuration((ONE_TERM_FOURIER * length * length) / diffusivity),
  );
  const from =
    end === undefined ? `from ${wall!} on` : `from ${wall!} on across the round and from ${end} on along it`;
  return `One term of the series will do ${from} (Fourier number ${ONE_TERM_FOURIER}).`;
}
