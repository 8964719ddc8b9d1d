/** The treatment as it is drawn: stages along the time, the lines of their surroundings, what each stage does in words. */
import type { CaseDocument, ConditionDocument, CurveDocument, StageDocument } from "../../case/types.ts";
import { parseQuantity } from "../../case/units.ts";
import type { Dimension, UnitSystem } from "../../case/units.ts";
import type { CaseResult } from "../../run/result.ts";
import { lasting, temperature } from "../controls/figures.ts";
import { whereName } from "../controls/words.ts";

export interface Knot {
  /** s from the start of the case */
  readonly at: number;
  readonly degC: number;
  /** number of the point in its table; null for a constant */
  readonly index: number | null;
  /** whether the hand can take it: the ends that only prolong a table cannot be moved */
  readonly held: boolean;
}

/** Where a line of surroundings stands in the document. */
export interface LinePlace {
  readonly stage: number;
  /** side whose own condition it is; null for the ambient of the stage */
  readonly side: string | null;
  readonly field: "ambient" | "held";
}

export interface SurroundingsLine {
  readonly name: string;
  readonly place: LinePlace;
  readonly knots: readonly Knot[];
}

export interface StageBlock {
  readonly index: number;
  readonly name: string;
  readonly began: number;
  readonly ended: number;
  /** limit of an "until" stage [degC]; null when the stage lasts a time */
  readonly limit: number | null;
  readonly until: { readonly where: string; readonly going: "up" | "down" | undefined } | null;
  readonly lines: readonly SurroundingsLine[];
  /** what the stage does, the fullest wording first; the last is empty */
  readonly does: readonly string[];
}

/** s that a stage gets on the drawing when neither the document nor a result says how long it lasts */
const UNKNOWN_LENGTH = 3600;

/** The stages of the document; ends of "until" stages are taken from the result where it has them. */
export function scheduleOf(
  document: CaseDocument,
  result: CaseResult | null,
  system: UnitSystem,
): StageBlock[] {
  let began = 0;
  return document.stages.map((stage, index) => {
    const ended = began + lengthOf(stage, index, result);
    const block: StageBlock = {
      index,
      name: stage.name ?? `Stage ${index + 1}`,
      began,
      ended,
      limit: stage.until === undefined ? null : (read(stage.until.reaches, "temperature") ?? null),
      until: stage.until === undefined ? null : { where: stage.until.where, going: stage.until.going },
      lines: linesOf(stage, index, began, ended),
      does: wordsOf(stage, ended - began, system),
    };
    began = ended;
    return block;
  });
}

export function endOf(schedule: readonly StageBlock[]): number {
  return schedule.at(-1)?.ended ?? 0;
}

function lengthOf(stage: StageDocument, index: number, result: CaseResult | null): number {
  const span = result?.stages[index];
  const solved = span === undefined ? undefined : span.ended - span.began;
  const asked = read(stage.until === undefined ? stage.lasts : undefined, "time");
  const length = asked ?? solved ?? read(stage.atMost, "time") ?? UNKNOWN_LENGTH;
  return length > 0 ? length : UNKNOWN_LENGTH;
}

function read(value: string | number | undefined, dimension: Dimension): number | undefined {
  if (value === undefined) return undefined;
  const found = parseQuantity(value, dimension);
  return "value" in found ? found.value : undefined;
}

// --- lines of the surroundings --------------------------------------------------------------------------------------

function linesOf(stage: StageDocument, index: number, began: number, ended: number): SurroundingsLine[] {
  const lines: SurroundingsLine[] = [];
  const add = (name: string, curve: CurveDocument | undefined, place: LinePlace): void => {
    const knots = curve === undefined ? null : knotsOf(curve, began, ended);
    if (knots !== null) lines.push({ name, place, knots });
  };
  add("surroundings", stage.ambient, { stage: index, side: null, field: "ambient" });
  for (const [side, condition] of Object.entries(stage.sides)) {
    const own = ownCurve(condition);
    if (own === null) continue;
    const whole = side === "*";
    const name =
      own.field === "held" ? (whole ? "held" : `${side} held`) : whole ? "surroundings" : `at ${side}`;
    add(name, own.curve, { stage: index, side, field: own.field });
  }
  return lines;
}

function ownCurve(condition: ConditionDocument): { field: "ambient" | "held"; curve: CurveDocument } | null {
  if (typeof condition === "string") return null;
  if ("held" in condition) return { field: "held", curve: condition.held };
  if ("film" in condition && condition.ambient !== undefined)
    return { field: "ambient", curve: condition.ambient };
  return null;
}

/** The knots of a curve over the time of its stage; null when it cannot be read or runs over temperature. */
function knotsOf(curve: CurveDocument, began: number, ended: number): Knot[] | null {
  if (typeof curve === "number" || typeof curve === "string") {
    const degC = read(curve, "temperature");
    if (degC === undefined) return null;
    return [
      { at: began, degC, index: null, held: false },
      { at: ended, degC, index: null, held: true },
    ];
  }
  if (!Array.isArray(curve) && curve.over === "temperature") return null;
  const points = Array.isArray(curve) ? curve : curve.points;
  const knots = points.map(([x, y], index) => ({
    at: began + (read(x, "time") ?? NaN),
    degC: read(y, "temperature") ?? NaN,
    index,
    held: true,
  }));
  if (knots.length === 0 || knots.some(({ at, degC }) => !Number.isFinite(at + degC))) return null;
  return prolonged(knots, began, ended);
}

/** A table is held constant beyond its ends; what lies beyond the stage is cut off. */
function prolonged(knots: readonly Knot[], began: number, ended: number): Knot[] {
  const inside = knots.filter(({ at }) => at >= began && at <= ended);
  const first = inside[0];
  const last = inside.at(-1);
  const start =
    first !== undefined && first.at <= began
      ? []
      : [{ at: began, degC: valueOn(knots, began), index: null, held: false }];
  const stop =
    last !== undefined && last.at >= ended
      ? []
      : [{ at: ended, degC: valueOn(knots, ended), index: null, held: false }];
  return [...start, ...inside, ...stop];
}

/** The piecewise linear value of ascending knots at a time, held beyond the ends. */
export function valueOn(knots: readonly Knot[], at: number): number {
  const after = knots.findIndex((knot) => knot.at >= at);
  if (after === -1) return knots.at(-1)?.degC ?? NaN;
  const [before, next] = [knots[after - 1], knots[after]!];
  if (before === undefined || next.at === before.at) return next.degC;
  return before.degC + ((at - before.at) / (next.at - before.at)) * (next.degC - before.degC);
}

// --- words ----------------------------------------------------------------------------------------------------------

function wordsOf(stage: StageDocument, length: number, system: UnitSystem): string[] {
  const around = aroundWords(stage, system);
  const comma = around === "" ? "" : `${around}, `;
  if (stage.until === undefined) {
    const time = `for ${lasting(length)}`;
    return [`${around} ${time}`.trim(), time, ""];
  }
  const limit = read(stage.until.reaches, "temperature");
  const reached = limit === undefined ? String(stage.until.reaches) : temperature(limit, system).text;
  const where = whereName(stage.until.where);
  const brief = stage.until.where === "every-point" ? "all" : where;
  return [
    `${comma}until ${where} has ${reached}`,
    `${comma}until ${brief} has ${reached}`,
    `until ${reached}`,
    "",
  ];
}

/** "25 °C", "150 to 1150 °C", "base held at 200 °C"; "" when nothing can be said in brief. */
function aroundWords(stage: StageDocument, system: UnitSystem): string {
  const [line] = linesOf(stage, 0, 0, 1e12);
  const values = line?.knots.filter((knot) => knot.held).map((knot) => knot.degC) ?? [];
  const [first, last] = [values[0], values.at(-1)];
  if (line === undefined || first === undefined || last === undefined) return "";
  const text = temperature(last, system).text;
  const range = first === last ? text : `${temperature(first, system).text.replace(/\s.*$/u, "")} to ${text}`;
  return line.place.field === "held" ? `held at ${range}` : range;
}
