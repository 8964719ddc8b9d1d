/** Commands on what is done to the sides, stage by stage, and on probes. Each changes a draft in place. */
import type { CaseDocument, ConditionDocument, Quantity, StageDocument } from "../case/types.ts";
import { writtenLike } from "./quantities.ts";
import type { Place } from "./arcs.ts";

export const EVERY_SIDE = "*";

export interface FoundCondition {
  readonly condition: ConditionDocument;
  /** said for this side by name, not for every side */
  readonly own: boolean;
}

/** What a stage does to a side; undefined where it says nothing. */
export function conditionOf(stage: StageDocument | undefined, side: string): FoundCondition | undefined {
  const own = stage?.sides?.[side];
  if (own !== undefined) return { condition: own, own: true };
  const every = stage?.sides?.[EVERY_SIDE];
  return every === undefined ? undefined : { condition: every, own: false };
}

export function setCondition(
  draft: CaseDocument,
  stage: number,
  side: string,
  condition: ConditionDocument,
): void {
  const sides = draft.stages[stage]?.sides;
  if (sides) sides[side] = condition;
}

/** Drops what was said for this side alone; what is said for every side holds again. */
export function dropCondition(draft: CaseDocument, stage: number, side: string): void {
  const held = draft.stages[stage];
  if (held && EVERY_SIDE in held.sides) held.sides = without(held.sides, side);
}

type FilmField = "film" | "ambient" | "emissivity" | "surroundings";

/** Writes one value of a film condition for this side alone; the other values are taken over from what held. */
export function setFilmValue(
  draft: CaseDocument,
  stage: number,
  side: string,
  field: FilmField,
  value: Quantity | undefined,
): void {
  const held = conditionOf(draft.stages[stage], side)?.condition;
  const film = typeof held === "object" && "film" in held ? held : { film: 0 };
  const changed = value === undefined ? without(film, field) : { ...film, [field]: value };
  setCondition(draft, stage, side, changed as ConditionDocument);
}

/** Gives every side of that name another one, in the part and in the stages. */
export function renameSide(draft: CaseDocument, region: number, from: string, to: string): void {
  for (const loop of [
    draft.part.regions[region]?.outline ?? [],
    ...(draft.part.regions[region]?.holes ?? []),
  ])
    loop.forEach((vertex, i) => {
      if ((vertex.side ?? `side ${i + 1}`) === from) vertex.side = to;
    });
  for (const stage of draft.stages) {
    const condition = stage.sides[from];
    if (condition !== undefined) stage.sides = { ...without(stage.sides, from), [to]: condition };
  }
}

function without<Value>(record: Readonly<Record<string, Value>>, key: string): Record<string, Value> {
  return Object.fromEntries(Object.entries(record).filter(([name]) => name !== key));
}

// --- probes ---------------------------------------------------------------------------------------------------------

/** Sets a probe and gives back its index. */
export function addProbe(draft: CaseDocument, at: Place): number {
  draft.probes ??= [];
  draft.probes.push({
    name: freeName(draft),
    at: [writtenLike(undefined, at[0], "length"), writtenLike(undefined, at[1], "length")],
  });
  return draft.probes.length - 1;
}

function freeName(document: CaseDocument): string {
  const taken = new Set(document.probes?.map((probe) => probe.name));
  let number = taken.size + 1;
  while (taken.has(`probe ${number}`)) number++;
  return `probe ${number}`;
}

export function moveProbe(draft: CaseDocument, index: number, [r, z]: Place): void {
  const probe = draft.probes?.[index];
  if (probe)
    probe.at = [writtenLike(probe.at[0], Math.max(0, r), "length"), writtenLike(probe.at[1], z, "length")];
}

export function typeProbe(draft: CaseDocument, index: number, axis: 0 | 1, typed: Quantity): void {
  const probe = draft.probes?.[index];
  if (probe) probe.at[axis] = typed;
}

/** Gives a probe another name, also in the questions and stages that ask for it. */
export function renameProbe(draft: CaseDocument, index: number, name: string): void {
  const probe = draft.probes?.[index];
  if (!probe) return;
  const asks = (where: { where: string }): void => {
    if (where.where === probe.name) where.where = name;
  };
  for (const question of draft.questions ?? []) if ("where" in question) asks(question);
  for (const stage of draft.stages) if (stage.until) asks(stage.until);
  probe.name = name;
}

/** Whether a question or the end of a stage asks for a probe: then it cannot be taken out. */
export function probeIsAsked(document: CaseDocument, index: number): boolean {
  const name = document.probes?.[index]?.name;
  return (
    (document.questions ?? []).some((question) => "where" in question && question.where === name) ||
    document.stages.some((stage) => stage.until?.where === name)
  );
}

/** Takes a probe out, unless it is asked for. */
export function removeProbe(draft: CaseDocument, index: number): void {
  if (!probeIsAsked(draft, index)) draft.probes?.splice(index, 1);
}
