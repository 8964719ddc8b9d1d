/** Where the heat went: what the part holds, what came through its sides, what its sources released. */
import { multiply } from "../linalg/pattern.ts";
import type { PartSystem } from "./partSystem.ts";
import type { StageRun, Timeline } from "./timeline.ts";
import { dot } from "./tracks.ts";

export interface Ledger {
  /** J, from the start to the end of the case */
  readonly stored: number;
  readonly throughSides: number;
  readonly fromSources: number;
  /** |stored - through sides - from sources| over the largest heat exchanged */
  readonly imbalance: number;
}

/** Heat per kelvin that each unknown stands for: row sums of the capacity matrix [J/K]. */
export function heatWeights(part: PartSystem): Float64Array {
  const ones = new Float64Array(part.start.length).fill(1);
  return multiply(part.target.pattern, part.interior.capacity, ones, new Float64Array(ones.length));
}

/**
 * Balances each stage at the last instant its scheme computed, with integrals weighed as the scheme weighs them: the
 * imbalance then shows unsolved equations and wrong bookkeeping, not how finely time was cut.
 */
export function heatLedger(part: PartSystem, timeline: Timeline): Ledger {
  const weights = heatWeights(part);
  let stored = 0;
  let throughSides = 0;
  let fromSources = 0;
  let largest = 0;
  for (const stage of timeline.stages) {
    const heat = stageHeat(stage, weights);
    stored += heat.stored;
    throughSides += heat.throughSides;
    fromSources += heat.fromSources;
    largest = Math.max(
      largest,
      ...[heat.stored, heat.throughSides, heat.fromSources, stored, throughSides, fromSources].map(Math.abs),
    );
  }
  const imbalance = largest > 0 ? Math.abs(stored - throughSides - fromSources) / largest : 0;
  return { stored, throughSides, fromSources, imbalance };
}

function stageHeat(stage: StageRun, weights: Float64Array): Omit<Ledger, "imbalance"> {
  const { history, system } = stage;
  const size = weights.length;
  const until =
    history.times.findLast((time) => time <= stage.ended - stage.began + 1e-12 * stage.ended) ?? 0;
  const rise = history.at(until, new Float64Array(size));
  const first = history.at(0, new Float64Array(size));
  for (let i = 0; i < size; i++) rise[i]! -= first[i]!;
  // held unknowns jump at the first instant: heat that the part takes up at once, through those sides
  let jump = 0;
  for (let i = 0; i < size; i++) jump += weights[i]! * (first[i]! - stage.start[i]!);
  const integral = history.integral(until, new Float64Array(size));
  let throughSides = jump - dot(system.filmWeights, integral);
  let fromSources = 0;
  const loadHeat = new Float64Array(size);
  system.linear.loads.forEach((load, i) => {
    const share = history.signalIntegral(load.signal, until);
    const heat = share * load.vector.reduce((sum, value) => sum + value, 0);
    if (i < system.sideLoads) throughSides += heat;
    else fromSources += heat;
    for (let j = 0; j < size; j++) loadHeat[j]! += share * load.vector[j]!;
  });
  throughSides += heatThroughHeldSides(stage, rise, integral, loadHeat);
  return { stored: jump + dot(weights, rise), throughSides, fromSources };
}

/** What it took to hold the held unknowns: their own equations, C rise + K integral - loads. */
function heatThroughHeldSides(
  stage: StageRun,
  rise: Float64Array,
  integral: Float64Array,
  loadHeat: Float64Array,
): number {
  const { pattern, capacity, conductance, held } = stage.system.linear;
  if (held.length === 0) return 0;
  const capacityHeat = multiply(pattern, capacity, rise, new Float64Array(rise.length));
  const flow = multiply(pattern, conductance, integral, new Float64Array(rise.length));
  let total = 0;
  for (const group of held)
    for (const unknown of group.unknowns)
      total += capacityHeat[unknown]! + flow[unknown]! - loadHeat[unknown]!;
  return total;
}
