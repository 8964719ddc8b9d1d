/**
 * The whole run on one page: document -> profile -> mesh -> system -> march -> answers, refined until they stand
 * still. The worker, the command line and the tests all call it; no host is known here, so the same case gives the
 * same answers everywhere.
 */
import { findOutlineFaults } from "../mesh/outlineFaults.ts";
import type { MeshRequest } from "../mesh/types.ts";
import { readCase } from "./case/readCase.ts";
import type { MaterialLibrary } from "./case/readCase.ts";
import type { Case, CaseProblem } from "./case/types.ts";
import { buildProfile } from "./profile/buildProfile.ts";
import { outlineHints, outlineProblems } from "./profile/outlineProblems.ts";
import type { Profile } from "./profile/types.ts";
import type { ElementOrder } from "./fem/elementMesh.ts";
import type { SparsityPattern } from "./linalg/pattern.ts";
import { conditionProblems } from "./run/conditions.ts";
import { Cancelled } from "./run/context.ts";
import type { RunContext } from "./run/context.ts";
import { FIRST_MESH_CORNERS, FIRST_MESH_LINEAR, NODE_BUDGET, TIME_SHARE } from "./run/defaults.ts";
import { solveLevel } from "./run/level.ts";
import type { Level } from "./run/level.ts";
import { meshWithUnknowns } from "./run/meshCase.ts";
import { instantsAsked } from "./run/questions.ts";
import { assembleResult } from "./run/assembleResult.ts";
import type { CaseResult, SolveOutcome } from "./run/result.ts";
import { signalAt } from "./run/signals.ts";
import { KeptWork } from "./run/kept.ts";
import { buildPart } from "./run/partSystem.ts";
import { buildStage } from "./run/stageSystem.ts";
import { settled, statedUncertainty } from "./run/settle.ts";
import type { SolveOptions } from "./run/solveOptions.ts";
import { temperatureSpan } from "./run/span.ts";
import type { Seen } from "./run/span.ts";
import { thermalRows } from "./run/thermalRows.ts";
import { unsupportedFields } from "./run/unsupported.ts";

export type { MaterialLibrary } from "./case/readCase.ts";
export type { RunContext } from "./run/context.ts";
export { KeptWork } from "./run/kept.ts";
export type { SolveOptions } from "./run/solveOptions.ts";

/**
 * Solves a case document (an object, or its JSON text).
 *
 * @returns solved; refused with every fault of the document; failed with what was reached; cancelled with what was
 *          reached. Throws only where the program itself is at fault.
 */
export async function solveCase(
  document: unknown,
  library: MaterialLibrary,
  options: SolveOptions,
  context: RunContext,
): Promise<SolveOutcome> {
  const checked = checkDocument(document, library);
  if ("problems" in checked) return { kind: "refused", problems: checked.problems };
  const { input, profile } = checked;
  const kept: { result?: CaseResult } = {};
  const work = context.kept ?? new KeptWork();
  try {
    return await refineUntilSettled(input, profile, checked.warnings, options, context, work, kept);
  } catch (error) {
    if (error instanceof Cancelled) return { kind: "cancelled", ...kept };
    return { kind: "failed", failure: failureOf(error), ...kept };
  } finally {
    if (!context.kept) work.release();
  }
}

interface Checked {
  readonly input: Case;
  readonly profile: Profile;
  readonly warnings: readonly string[];
}

/** Reads the document and finds every fault of it: words, numbers, outline, conditions, what cannot be solved yet. */
export function checkDocument(
  document: unknown,
  library: MaterialLibrary,
): Checked | { readonly problems: readonly CaseProblem[] } {
  const reading = readCase(document, library);
  if ("problems" in reading) return reading;
  const input = reading.case;
  const profile = buildProfile(input);
  const points = input.probes.map((probe) => probe.at);
  const findings = findOutlineFaults(profile.regions, points);
  const problems = [
    ...outlineProblems(findings, input),
    ...conditionProblems(input, profile.sides),
    ...unsupportedFields(input),
  ];
  if (problems.length > 0) return { problems };
  const hints = outlineHints(findings, input).map(({ message, mend }) => `${message} ${mend}`);
  return { input, profile, warnings: [...reading.warnings, ...hints] };
}

/** Solves on a coarse mesh, then on its refinements, until the stated uncertainties meet the case's accuracy. */
async function refineUntilSettled(
  input: Case,
  profile: Profile,
  warnings: readonly string[],
  options: SolveOptions,
  context: RunContext,
  work: KeptWork,
  kept: { result?: CaseResult },
): Promise<SolveOutcome> {
  const began = context.clock();
  const element = options.element ?? 6;
  const accuracy = options.accuracy ?? input.accuracy;
  let aim = accuracy * temperatureSpan(input, profile);
  const settings = {
    scheme: options.scheme,
    asked: [...instantsAsked(input.questions), ...(options.at ?? [])],
  };
  const request = meshRequest(input, profile, settings.asked);
  const first = element === 6 ? 4 * FIRST_MESH_CORNERS : FIRST_MESH_LINEAR;
  const unknowns = options.nodes ?? first;
  const meshKey = JSON.stringify([request, unknowns, element]);
  let mesh = work.mesh(meshKey, () => meshWithUnknowns(request, unknowns, element));
  const levels: Level[] = [];
  for (;;) {
    const level = await solveLevel(
      input,
      profile.sides,
      mesh,
      element,
      { ...settings, tolerance: TIME_SHARE * aim },
      context,
      work,
    );
    if (!level) return { kind: "cancelled", ...kept };
    levels.push(level);
    aim = accuracy * temperatureSpan(input, profile, rangeOf(level));
    const stated = statedUncertainty(levels, element);
    const met = settled(levels, stated, aim);
    const spent = 4 * level.part.start.length > NODE_BUDGET;
    const last = met || spent || options.nodes !== undefined || options.previewOnly === true;
    const short = last && !met && spent && options.nodes === undefined;
    kept.result = assembleResult({
      input,
      profile,
      levels,
      element,
      stated,
      warnings: short ? [...warnings, shortfall(stated.temperature, aim)] : warnings,
      quality: last && options.previewOnly !== true ? "settled" : "preview",
      seconds: context.clock() - began,
    });
    if (!level.complete) return { kind: "cancelled", ...kept };
    if (last) return { kind: "solved", result: kept.result };
    context.preview?.(kept.result);
    mesh = work.refined(mesh);
  }
}

/** What the mesher is asked for: the outline, the probes as nodes, rows where a film first acts. */
const meshRequest = (
  input: Case,
  profile: Profile,
  asked: readonly number[],
): Omit<MeshRequest, "nodes"> => ({
  regions: profile.regions,
  points: input.probes.map((probe) => probe.at),
  rows: thermalRows(input, profile, asked),
});

const rangeOf = ({ recording: { history } }: Level): Seen => ({
  low: history.coldest.reduce((low, value) => Math.min(low, value), Infinity),
  high: history.hottest.reduce((high, value) => Math.max(high, value), -Infinity),
});

const shortfall = (reached: number | null, aim: number): string =>
  `The accuracy asked for (${aim.toPrecision(2)} K) was not met within ${NODE_BUDGET} unknowns; ${
    reached === null
      ? "the uncertainty could not be stated"
      : `the field is known to ${reached.toPrecision(2)} K`
  }. Each answer carries its own uncertainty.`;

function failureOf(error: unknown): { message: string; mend: string; reached: number } {
  const message = error instanceof Error ? error.message : String(error);
  return {
    message,
    mend: "Check materials and films for values far from ordinary ones, or try another scheme.",
    reached: 0,
  };
}

/** The semi-discrete system of the first stage at the start state. */
export interface CaseSystem {
  readonly pattern: SparsityPattern;
  /** J/K and W/K (films included), on the pattern */
  readonly capacity: Float64Array;
  readonly conductance: Float64Array;
  /** W, at the first instant */
  readonly load: Float64Array;
  /** degC */
  readonly start: Float64Array;
  /** r, z of each unknown [m] */
  readonly nodes: Float64Array;
}

/**
 * Assembles C dT/dt + K T = f of the first stage near a wanted number of unknowns, without solving it. Held
 * temperatures cannot be written as such a system and are refused.
 */
export function systemOfCase(
  document: unknown,
  library: MaterialLibrary,
  unknowns: number,
  element: ElementOrder,
): CaseSystem | { readonly problems: readonly CaseProblem[] } {
  const checked = checkDocument(document, library);
  if ("problems" in checked) return checked;
  const { input, profile } = checked;
  const mesh = meshWithUnknowns(meshRequest(input, profile, []), unknowns, element);
  const work = new KeptWork();
  const part = buildPart(input, profile.sides, mesh, element, work);
  const { linear } = buildStage(input, profile.sides, part, input.stages[0]!, work);
  if (linear.held.length > 0) return { problems: [heldInSystem] };
  const load = new Float64Array(part.start.length);
  for (const { vector, signal } of linear.loads)
    for (let i = 0; i < load.length; i++) load[i]! += signalAt(signal, 0) * vector[i]!;
  const { pattern, capacity, conductance } = linear;
  return { pattern, capacity, conductance, load, start: part.start, nodes: part.mesh.nodes };
}

const heldInSystem: CaseProblem = {
  code: "held-in-system",
  path: "stages[0].sides",
  message: "a held temperature cannot be written as a plain system of equations",
  mend: "give the side a film with a large coefficient instead",
};
