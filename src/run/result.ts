/**
 * What one run hands over: plain data and typed arrays, so that it crosses a worker as it is. The page, the command
 * line and the report read this and nothing else.
 */
import type { CaseProblem, Question } from "../case/types.ts";
import type { Comparison, Estimates } from "../compare/types.ts";
import type { MarchFacts } from "../march/types.ts";

/** Facts of the mesh that carried the answers. */
export interface MeshFacts {
  /** unknowns of the system */
  readonly nodes: number;
  readonly triangles: number;
  readonly minAngleDeg: number;
  /** mean of 4 sqrt(3) A / (l1^2 + l2^2 + l3^2): 1 for equilateral triangles */
  readonly meanQuality: number;
  readonly maxAngleDeg: number;
  /** triangles by their smallest angle, in equal steps from 0 to 60 degrees */
  readonly angleHistogram: readonly number[];
  /** middle of the triangle with the smallest angle: r, z [m] */
  readonly worstPlace: readonly [number, number];
  /** of the part, from its outline (Pappus) [m3], [m2] */
  readonly volume: number;
  readonly exposedArea: number;
  /** the same of the meshed part */
  readonly meshVolume: number;
  readonly meshExposedArea: number;
}

/** The mesh as it is drawn: linear triangles (a six-node element is drawn as four). */
export interface SectionMesh {
  /** r, z pairs [m] */
  readonly nodes: Float64Array;
  readonly triangles: Uint32Array;
  readonly triangleRegion: Uint16Array;
  /** corner nodes of the elements themselves, 3 each: the mesh as it was solved */
  readonly elements: Uint32Array;
}

/** The field at chosen instants, ascending; linear in time between them is good enough to look at. */
export interface Frames {
  /** s from the start of the case */
  readonly times: Float64Array;
  /** degC, one array per instant, one value per node of the section mesh */
  readonly temperatures: readonly Float32Array[];
}

export interface RunFacts extends MarchFacts {
  readonly element: 3 | 6;
  /** wall clock, for information only */
  readonly seconds: number;
  /** |stored - through the sides - from sources| over the largest heat exchanged */
  readonly energyImbalance: number;
  /** J at the end: taken up by the part, come in through the sides, released by sources */
  readonly heatStored: number;
  readonly heatThroughSides: number;
  readonly heatFromSources: number;
  /** unknowns of each mesh that was solved, coarse to fine */
  readonly levels: readonly number[];
  /** K: largest numerical uncertainty of a temperature, space and time together; null when one mesh only was solved */
  readonly temperatureUncertainty: number | null;
}

export interface StageSpan {
  readonly name: string;
  /** s from the start of the case */
  readonly began: number;
  readonly ended: number;
}

/** Curves over time; degC, J. All arrays have the length of `time`. */
export interface History {
  readonly time: Float64Array;
  readonly coldest: Float64Array;
  readonly hottest: Float64Array;
  readonly mean: Float64Array;
  readonly surfaceMean: Float64Array;
  /** J taken up by the part since the start */
  readonly heat: Float64Array;
  readonly probes: Readonly<Record<string, Float64Array>>;
  /** where the slowest point lies (the last to follow its surroundings) and its curve: what people call the core */
  readonly core: { readonly place: readonly [number, number]; readonly temperature: Float64Array };
}

export interface Answer {
  readonly question: Question;
  /** null when the run does not contain the answer; `remark` then says why */
  readonly value: number | null;
  readonly unit: "s" | "degC" | "K" | "K/s" | "min" | "J";
  /** s from the start of the case at which the value holds; null where that has no meaning */
  readonly at: number | null;
  /** r, z [m] of the point that decides, for every-point, any-point, hottest, coldest, spread */
  readonly place: readonly [number, number] | null;
  /** in the unit of the value; null when one mesh only was solved */
  readonly numericalUncertainty: number | null;
  readonly lumped: number | null;
  readonly series: number | null;
  readonly comparison: { readonly lumped: Comparison | null; readonly series: Comparison | null };
  readonly remark: string;
}

export interface CaseResult {
  readonly title: string;
  readonly mesh: MeshFacts;
  readonly section: SectionMesh;
  readonly frames: Frames;
  readonly run: RunFacts;
  readonly stages: readonly StageSpan[];
  readonly history: History;
  readonly estimates: Estimates;
  readonly answers: readonly Answer[];
  readonly warnings: readonly string[];
  /** "preview" came from the coarse mesh alone; "settled" met the accuracy or the node budget */
  readonly quality: "preview" | "settled";
}

/** Why a run broke off, as plain data. */
export interface RunFailure {
  readonly message: string;
  readonly mend: string;
  /** s from the start of the case that was reached */
  readonly reached: number;
}

export type SolveOutcome =
  | { readonly kind: "solved"; readonly result: CaseResult }
  | { readonly kind: "refused"; readonly problems: readonly CaseProblem[] }
  | { readonly kind: "failed"; readonly failure: RunFailure; readonly result?: CaseResult }
  | { readonly kind: "cancelled"; readonly result?: CaseResult };
