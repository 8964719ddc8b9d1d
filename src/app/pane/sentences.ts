/**
 * Questions as sentences with blanks. A sentence is a list of words and blanks; the same list is drawn, read aloud
 * and printed.
 */
import type { CaseDocument, Quantity, QuestionDocument } from "../../case/types.ts";
import { parseQuantity, shownUnit, toShown } from "../../case/units.ts";
import type { Dimension, UnitSystem } from "../../case/units.ts";
import { difference, lasting, temperature } from "../controls/figures.ts";
import type { MenuItem } from "../controls/menu.ts";
import { PLACES, whereName, whereWords } from "../controls/words.ts";

export type Ask = QuestionDocument["ask"];

export interface Choice {
  readonly kind: "choice";
  readonly field: string;
  /** as in the document; "" stands for a field left out */
  readonly value: string;
  readonly label: string;
  /** drawn in ink: may be changed, seldom is */
  readonly quiet: boolean;
  readonly options: readonly MenuItem[];
}
export interface Entry {
  readonly kind: "entry";
  readonly field: string;
  readonly dimension: Dimension;
  /** as in the document; undefined where the field is left out */
  readonly value: Quantity | undefined;
  readonly label: string;
  /** words for a field left out, which may be left out again by emptying it */
  readonly otherwise?: string;
}
export type Piece = string | Choice | Entry;

/** What a sentence needs to know of the case. */
export interface Setting {
  readonly document: CaseDocument;
  readonly units: UnitSystem;
  /** degC of the part at the start */
  readonly start: number;
}

/** SI value of a quantity; NaN where it cannot be read. */
export function siValue(value: Quantity | undefined, dimension: Dimension): number {
  if (value === undefined) return NaN;
  const read = parseQuantity(value, dimension);
  return "value" in read ? read.value : NaN;
}

export function settingOf(document: CaseDocument, units: UnitSystem): Setting {
  return { document, units, start: siValue(document.start, "temperature") };
}

export function sentenceOf(question: QuestionDocument, setting: Setting): Piece[] {
  switch (question.ask) {
    case "when":
      return [
        "When has ",
        where(question.where, setting, "points"),
        " ",
        going(question, setting),
        " ",
        level("reaches", question.reaches, "limit"),
        "?",
      ];
    case "reading":
      return [
        "How hot is ",
        where(question.where, setting, "places"),
        " at ",
        time("at", question.at, "time of the reading"),
        "?",
      ];
    case "spread":
      return ["How far apart do hottest and coldest get ", stage(question.stage, setting), "?"];
    case "passage":
      return [
        "How long does ",
        where(question.where, setting, "points"),
        " take from ",
        level("from", question.from, "from"),
        " to ",
        level("to", question.to, "to"),
        "?",
      ];
    case "rate":
      return [
        "How fast does ",
        where(question.where, setting, "places"),
        " pass ",
        level("at", question.at, "temperature passed"),
        "?",
      ];
    case "held-above":
    case "held-below":
      return [
        "How long is ",
        where(question.where, setting, "points"),
        " ",
        aboveBelow(question.ask),
        " ",
        level("level", question.level, "level"),
        "?",
      ];
    case "dose":
      return [
        "What dose does ",
        where(question.where, setting, "places"),
        " get, counted at ",
        level("reference", question.reference, "reference temperature"),
        " with z ",
        span("z", question.z, "z"),
        "?",
      ];
    case "heat":
      return [
        "How much heat has the part exchanged by ",
        time("until", question.until, "time", "the end"),
        "?",
      ];
  }
}

// --- blanks ---------------------------------------------------------------------------------------------------------

function where(value: string, { document }: Setting, kind: "points" | "places"): Choice {
  const places = kind === "points" ? PLACES : PLACES.filter((place) => !place.endsWith("-point"));
  const probes = (document.probes ?? []).map((probe) => probe.name);
  const known = [...places, ...probes];
  const options = (known.includes(value) ? known : [value, ...known]).map((name): MenuItem => {
    const note = PLACE_NOTES[name] ?? "probe";
    return name === probes[0]
      ? { value: name, label: name, note, parted: true }
      : { value: name, label: whereName(name), note };
  });
  return {
    kind: "choice",
    field: "where",
    value,
    label: "place",
    quiet: false,
    options: options.map(shownAs),
  };
}

const PLACE_NOTES: Readonly<Record<string, string>> = {
  "every-point": "the last to get there",
  "any-point": "the first to get there",
  mean: "by volume",
  "surface-mean": "by exposed area",
  coldest: "wherever it is",
  hottest: "wherever it is",
};

/** The chosen place stands in the sentence in its own words. */
const shownAs = (item: MenuItem): MenuItem => ({
  ...item,
  label: item.note === "probe" ? item.label : whereWords(item.value),
});

function going(question: Extract<QuestionDocument, { ask: "when" }>, setting: Setting): Choice {
  const inferred = siValue(question.reaches, "temperature") < setting.start ? "fallen to" : "reached";
  return {
    kind: "choice",
    field: "going",
    value: question.going ?? "",
    label: "direction",
    quiet: true,
    options: [
      { value: "", label: inferred, note: "as the case goes" },
      { value: "up", label: "reached", note: "on the way up" },
      { value: "down", label: "fallen to", note: "on the way down" },
    ],
  };
}

function aboveBelow(ask: "held-above" | "held-below"): Choice {
  const options = [
    { value: "held-above", label: "above" },
    { value: "held-below", label: "below" },
  ];
  return { kind: "choice", field: "ask", value: ask, label: "above or below", quiet: true, options };
}

function stage(value: string | undefined, { document }: Setting): Choice {
  const names = document.stages.map((each, i) => each.name ?? `Stage ${i + 1}`);
  const options = [
    { value: "", label: "in the whole run" },
    ...names.map((name) => ({ value: name, label: `in ${name}` })),
  ];
  return { kind: "choice", field: "stage", value: value ?? "", label: "stage", quiet: false, options };
}

const level = (field: string, value: Quantity, label: string): Entry => ({
  kind: "entry",
  field,
  dimension: "temperature",
  value,
  label,
});
const span = (field: string, value: Quantity, label: string): Entry => ({
  kind: "entry",
  field,
  dimension: "temperatureDifference",
  value,
  label,
});
const time = (field: string, value: Quantity | undefined, label: string, otherwise?: string): Entry => ({
  kind: "entry",
  field,
  dimension: "time",
  value,
  label,
  ...(otherwise === undefined ? {} : { otherwise }),
});

/** What stands in a blank. */
export function shownText(piece: Choice | Entry, units: UnitSystem): string {
  if (piece.kind === "choice")
    return piece.options.find(({ value }) => value === piece.value)?.label ?? piece.value;
  if (piece.value === undefined) return piece.otherwise ?? "";
  const si = siValue(piece.value, piece.dimension);
  if (Number.isNaN(si)) return String(piece.value);
  if (piece.dimension === "time") return lasting(si);
  return piece.dimension === "temperature" ? temperature(si, units).text : difference(si, units).text;
}

/** The whole question as plain text, for names and for the report. */
export function plainSentence(pieces: readonly Piece[], units: UnitSystem): string {
  return pieces
    .map((piece) => (typeof piece === "string" ? piece : shownText(piece, units)))
    .join("")
    .replace(/[\u00a0\u2009\u202f]/g, " ")
    .replace(/,( to| from|\?| at| pass| get)/g, "$1");
}

/** Unit, number and steps of an entry, for keys and scrubbing. */
export interface EntryScale {
  readonly number: number | undefined;
  readonly unit: string;
  readonly step: number;
  readonly least: number;
}

export function entryScale({ value, dimension }: Entry, units: UnitSystem): EntryScale {
  const si = siValue(value, dimension);
  if (dimension === "time") {
    const [unit, size] = !(si >= 600) ? ["s", 1] : si >= 7200 ? ["h", 3600] : ["min", 60];
    const number = Number.isNaN(si) ? undefined : Number((si / size).toPrecision(9));
    return { number, unit, step: unit === "h" ? 0.25 : 1, least: 0 };
  }
  const shown = Number.isNaN(si) ? undefined : Number(toShown(si, dimension, units).toPrecision(9));
  const difference = dimension === "temperatureDifference";
  return { number: shown, unit: shownUnit(dimension, units), step: 1, least: difference ? 1 : -Infinity };
}

// --- changing questions ---------------------------------------------------------------------------------------------

/** The question with one field set; an empty text leaves an optional field out. */
export function withField(question: QuestionDocument, field: string, value: string): QuestionDocument {
  const left = Object.entries(question).filter(([name]) => name !== field);
  const set = value === "" && field !== "where" ? [] : [[field, value]];
  return Object.fromEntries([...left, ...set]) as QuestionDocument;
}

/** Kinds of question in the order in which they are offered. */
export const OFFERED: readonly MenuItem[] = [
  { value: "when", label: "When does it get there?", note: "time" },
  { value: "reading", label: "How hot is it then?", note: "temperature" },
  { value: "spread", label: "How far apart do hottest and coldest get?", note: "K" },
  { value: "passage", label: "How long does it take from one to the other?", note: "time" },
  { value: "rate", label: "How fast does it pass?", note: "K/s" },
  { value: "held-above", label: "How long is it above?", note: "time" },
  { value: "dose", label: "What dose does it get?", note: "minutes" },
  { value: "heat", label: "How much heat does it exchange?", note: "energy" },
];

/** A new question of a kind, with levels that this case passes and times that lie in it. */
export function newQuestion(
  ask: Ask,
  range: readonly [low: number, high: number],
  end: number,
  units: UnitSystem,
): QuestionDocument {
  const at = (share: number): Quantity => {
    const shown = toShown(range[0] + share * (range[1] - range[0]), "temperature", units);
    return `${Math.round(shown / 5) * 5} ${units === "us" ? "degF" : "degC"}`;
  };
  const half: Quantity =
    end >= 7200 ? `${Math.max(1, Math.round(end / 7200))} h` : `${Math.max(1, Math.round(end / 2))} s`;
  switch (ask) {
    case "when":
      return { ask, where: "every-point", reaches: at(0.5) };
    case "reading":
      return { ask, where: "hottest", at: half };
    case "spread":
      return { ask };
    case "passage":
      return { ask, where: "mean", from: at(0.7), to: at(0.4) };
    case "rate":
      return { ask, where: "mean", at: at(0.5) };
    case "held-above":
    case "held-below":
      return { ask, where: "coldest", level: at(0.5) };
    case "dose":
      return { ask, where: "coldest", reference: at(0.8), z: units === "us" ? "18 degF" : "10 K" };
    case "heat":
      return { ask };
  }
}
