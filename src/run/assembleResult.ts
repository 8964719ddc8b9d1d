/** Everything a run found, put into the shape that is handed over. */
import { meshQuality } from "../../mesh/quality.ts";
import type { TriangleMesh } from "../../mesh/types.ts";
import type { Case } from "../case/types.ts";
import { answerByEstimates } from "../compare/compareAnswer.ts";
import type { ComparisonContext } from "../compare/compareAnswer.ts";
import { estimateCase } from "../compare/estimateCase.ts";
import type { CaseFacts } from "../compare/facts.ts";
import type { Estimates } from "../compare/types.ts";
import { drawnTriangles } from "../fem/elementMesh.ts";
import type { ElementOrder } from "../fem/elementMesh.ts";
import type { MarchFacts } from "../march/types.ts";
import type { Profile } from "../profile/types.ts";
import { estimateFacts } from "./estimateFacts.ts";
import type { Level } from "./level.ts";
import type { FieldAnswer } from "./questions.ts";
import type { Answer, CaseResult, MeshFacts, RunFacts } from "./result.ts";
import type { StatedUncertainty } from "./settle.ts";
import { timeErrorOf } from "./settle.ts";
import { temperatureSpan } from "./span.ts";

export interface Gathered {
  readonly input: Case;
  readonly profile: Profile;
  /** coarse to fine, at least one */
  readonly levels: readonly Level[];
  readonly element: ElementOrder;
  readonly stated: StatedUncertainty;
  readonly warnings: readonly string[];
  readonly quality: CaseResult["quality"];
  readonly seconds: number;
}

export function assembleResult(gathered: Gathered): CaseResult {
  const { input, profile, levels, stated } = gathered;
  const level = levels.at(-1)!;
  const { history, frames } = level.recording;
  const facts = estimateFacts(input, profile, level.timeline, history.time);
  const estimates = estimatesBeside(facts);
  const context = comparisonContext(gathered, level, facts.volumetricHeatCapacity * facts.volume);
  const axisReach = ON_AXIS * profile.high[0];
  const { triangles, triangleRegion } = drawnTriangles(level.part.mesh);
  return {
    title: input.title,
    mesh: meshFacts(level, profile),
    section: { nodes: level.part.mesh.nodes, triangles, triangleRegion, elements: level.mesh.triangles },
    frames,
    run: runFacts(gathered, level),
    stages: level.timeline.stages.map(({ name, began, ended }) => ({ name, began, ended })),
    history,
    estimates,
    answers: level.answers.map((answer, i) =>
      answerBeside(answer, stated.answers[i] ?? null, estimates, context, axisReach),
    ),
    warnings: [...gathered.warnings, ...level.warnings],
    quality: gathered.quality,
  };
}

/** The field does not depend on the estimates: where they break down, it stands without them and says so. */
function estimatesBeside(facts: CaseFacts): Estimates {
  try {
    return estimateCase(facts);
  } catch (error) {
    const reason = error instanceof Error ? error.message : String(error);
    return {
      lumped: null,
      series: null,
      remarks: [`The quick estimates could not be worked out: ${reason}.`],
    };
  }
}

function meshFacts(level: Level, profile: Profile): MeshFacts {
  const { minAngleDeg, maxAngleDeg, meanQuality, histogram, worstTriangle } = meshQuality(level.mesh);
  return {
    nodes: level.part.start.length,
    triangles: level.mesh.triangles.length / 3,
    minAngleDeg,
    meanQuality,
    maxAngleDeg,
    angleHistogram: Array.from(histogram),
    worstPlace: middleOf(level.mesh, worstTriangle),
    volume: profile.volume,
    exposedArea: profile.exposedArea,
    meshVolume: level.part.volume,
    meshExposedArea: level.part.exposedArea,
  };
}

function middleOf({ nodes, triangles }: TriangleMesh, triangle: number): [number, number] {
  const corners = [0, 1, 2].map((corner) => 2 * triangles[3 * triangle + corner]!);
  const mean = (offset: number): number => corners.reduce((sum, at) => sum + nodes[at + offset]!, 0) / 3;
  return [mean(0), mean(1)];
}

function runFacts({ levels, element, stated, seconds }: Gathered, level: Level): RunFacts {
  const stages = level.timeline.stages.map((stage) => stage.history.facts);
  const total = (pick: (facts: MarchFacts) => number): number =>
    stages.reduce((sum, facts) => sum + pick(facts), 0);
  return {
    scheme: stages[0]!.scheme,
    steps: total((facts) => facts.steps),
    rejectedSteps: total((facts) => facts.rejectedSteps),
    factorizations: total((facts) => facts.factorizations),
    solves: total((facts) => facts.solves),
    linearIterations: total((facts) => facts.linearIterations),
    timeError: timeErrorOf(level),
    element,
    seconds,
    energyImbalance: level.ledger.imbalance,
    heatStored: level.ledger.stored,
    heatThroughSides: level.ledger.throughSides,
    heatFromSources: level.ledger.fromSources,
    levels: levels.map((each) => each.part.start.length),
    temperatureUncertainty: stated.temperature,
  };
}

/** What comparing needs besides the curves. Probes within this share of the part's size of the slowest point are it. */
const AT_CORE = 0.02;

function comparisonContext(
  { input, profile }: Gathered,
  level: Level,
  heatCapacity: number,
): ComparisonContext {
  const { place } = level.recording.history.core;
  const near = AT_CORE * Math.hypot(profile.high[0] - profile.low[0], profile.high[1] - profile.low[1]);
  const atCore = input.probes.filter(
    (probe) => Math.hypot(probe.at[0] - place[0], probe.at[1] - place[1]) <= near,
  );
  return {
    stages: level.timeline.stages,
    heatCapacity,
    coreProbes: new Set(atCore.map((probe) => probe.name)),
    span: temperatureSpan(input, profile, {
      low: Math.min(...level.recording.history.coldest),
      high: Math.max(...level.recording.history.hottest),
    }),
  };
}

/** An answer of the field with its uncertainty and what each estimate says. */
function answerBeside(
  answer: FieldAnswer,
  numericalUncertainty: number | null,
  estimates: Estimates,
  context: ComparisonContext,
  axisReach: number,
): Answer {
  const { slope, ...found } = answer;
  const field = { ...found, place: snapToAxis(found.place, axisReach) };
  const reading = { ...field, slope, numericalUncertainty };
  return {
    ...field,
    numericalUncertainty,
    ...answerByEstimates(answer.question, reading, estimates, context),
  };
}

/** Share of the part's radius within which a place found inside an element is told as on the axis. */
const ON_AXIS = 1e-3;

const snapToAxis = (place: Answer["place"], reach: number): Answer["place"] =>
  place && place[0] < reach ? [0, place[1]] : place;
