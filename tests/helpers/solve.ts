/** Solving in tests: the real core, the real material library, no host. */
import { LIBRARY } from "../../presets/materials/index.ts";
import type { CaseDocument, CaseProblem, VertexDocument } from "../../src/case/types.ts";
import { solveCase } from "../../src/solveCase.ts";
import type { RunContext, SolveOptions } from "../../src/solveCase.ts";
import type { Answer, CaseResult } from "../../src/run/result.ts";

export const quietContext: RunContext = {
  cancelled: () => false,
  progress: () => undefined,
  clock: () => 0,
};

/** The result of a case that must be solvable. */
export async function solved(document: CaseDocument, options: SolveOptions = {}): Promise<CaseResult> {
  const outcome = await solveCase(document, LIBRARY, options, quietContext);
  if (outcome.kind !== "solved") throw new Error(`not solved: ${JSON.stringify(outcome, null, 1)}`);
  return outcome.result;
}

/** The problems of a case that must be refused. */
export async function refused(document: unknown): Promise<readonly CaseProblem[]> {
  const outcome = await solveCase(document, LIBRARY, {}, quietContext);
  if (outcome.kind !== "refused") throw new Error(`not refused: ${outcome.kind}`);
  return outcome.problems;
}

/** The only answer of a kind. */
export function answerOf(result: CaseResult, ask: Answer["question"]["ask"]): Answer {
  const found = result.answers.filter((answer) => answer.question.ask === ask);
  if (found.length !== 1) throw new Error(`${found.length} answers to "${ask}"`);
  return found[0]!;
}

/** Readings in the order of the questions. */
export const readings = (result: CaseResult): number[] =>
  result.answers.filter((answer) => answer.question.ask === "reading").map((answer) => answer.value!);

export interface Simple {
  outline: VertexDocument[];
  k?: number;
  rho?: number;
  c?: number;
  start: number;
  lasts: number;
  sides: CaseDocument["stages"][number]["sides"];
  ambient?: number;
  probes?: CaseDocument["probes"];
  questions?: CaseDocument["questions"];
  accuracy?: number;
}

/** One region, one material, one stage. */
export function simpleCase(given: Simple): CaseDocument {
  return {
    corelag: 1,
    title: "Test case (invented)",
    part: { regions: [{ name: "part", material: "stuff", outline: given.outline }] },
    materials: {
      stuff: { density: given.rho ?? 7850, conductivity: given.k ?? 40, heatCapacity: given.c ?? 600 },
    },
    start: given.start,
    stages: [{ name: "stage", lasts: given.lasts, ambient: given.ambient, sides: given.sides }],
    probes: given.probes ?? [],
    questions: given.questions ?? [],
    ...(given.accuracy === undefined ? {} : { accuracy: given.accuracy }),
  };
}

/** A cylinder of radius R from z = 0 to H: base, wall, top, axis. */
export const cylinder = (radius: number, height: number): VertexDocument[] => [
  { at: [0, 0], side: "base" },
  { at: [radius, 0], side: "wall" },
  { at: [radius, height], side: "top" },
  { at: [0, height], side: "axis" },
];

/** A tube: base, wall, top, bore. */
export const tube = (inner: number, outer: number, height: number): VertexDocument[] => [
  { at: [inner, 0], side: "base" },
  { at: [outer, 0], side: "wall" },
  { at: [outer, height], side: "top" },
  { at: [inner, height], side: "bore" },
];

/** A sphere about the origin. */
export const sphere = (radius: number): VertexDocument[] => [
  { at: [0, -radius], side: "skin", through: [radius, 0] },
  { at: [0, radius], side: "axis" },
];
