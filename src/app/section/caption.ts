/** The sentence over the section: what is shown, when, and how far apart its lines are; all of it blanks. */
import { html, nothing } from "lit";
import type { TemplateResult } from "lit";
import { parseQuantity, shownUnit, toShown } from "../../case/units.ts";
import type { UnitSystem } from "../../case/units.ts";
import type { CaseResult } from "../../run/result.ts";
import { duration, temperature } from "../controls/figures.ts";
import type { MenuItem } from "../controls/menu.ts";
import { send } from "../events.ts";
import type { Shown } from "../state.ts";

export interface Caption {
  readonly host: HTMLElement;
  readonly result: CaseResult | null;
  readonly cursor: number;
  readonly shown: Shown;
  readonly units: UnitSystem;
  /** between two lines [K or s] */
  readonly step: number | null;
  readonly setStep: (step: number | null) => void;
  /** why the plain canvas paints, "" when it does not matter */
  readonly remark: string;
}

export function captionSentence(caption: Caption): TemplateResult {
  const { result, shown } = caption;
  if (!result) return html`<p class="says">Showing the outline</p>`;
  return html`<p class="says">
    Showing
    ${shownBlank(caption, result)}${shown.by === "temperature" ? html` at ${timeBlank(caption)}` : arrivalWords(caption, result)}<span
      class="lesser"
      >, a line every ${stepBlank(caption)}</span
    >${caption.remark === "" ? nothing : html`<span class="aside">&ensp;${caption.remark}</span>`}
  </p>`;
}

const rawOf = (event: Event): string => (event as CustomEvent<{ raw: string }>).detail.raw;

function shownBlank({ host, shown }: Caption, result: CaseResult): TemplateResult {
  const arrivals = result.answers.flatMap(({ question }, index): MenuItem[] =>
    question.ask === "when"
      ? [{ value: String(index), label: "when each point", note: `answers ${index + 1}` }]
      : [],
  );
  return html`<corelag-blank
    kind="choice"
    label="shown"
    .value=${shown.by === "temperature" ? "temperature" : String(shown.answer)}
    .options=${[{ value: "temperature", label: "temperature" }, ...arrivals]}
    @change=${(event: Event) => {
      const raw = rawOf(event);
      send(
        host,
        "corelag-show",
        raw === "temperature" ? { by: "temperature" } : { by: "arrival", answer: Number(raw) },
      );
    }}
  ></corelag-blank>`;
}

function arrivalWords({ shown, units }: Caption, result: CaseResult): TemplateResult | typeof nothing {
  const question = shown.by === "arrival" ? result.answers[shown.answer]?.question : undefined;
  if (question?.ask !== "when") return nothing;
  const falls =
    question.going === "down" || (question.going === undefined && result.history.mean[0]! > question.reaches);
  return html` has ${falls ? "fallen to" : "reached"} <b>${temperature(question.reaches, units).text}</b>`;
}

function timeBlank({ host, result, cursor }: Caption): TemplateResult {
  const end = result?.stages.at(-1)?.ended ?? 0;
  const move = (event: Event): void => {
    const read = parseQuantity(rawOf(event), "time", "s");
    if ("value" in read) send(host, "corelag-cursor", Math.min(end, Math.max(0, read.value)));
  };
  return html`<corelag-blank
    kind="number"
    label="time shown"
    .value=${duration(cursor)}
    .check=${(raw: string) => {
      const read = parseQuantity(raw, "time", "s");
      return "fault" in read ? read.fault : null;
    }}
    @change=${move}
  ></corelag-blank>`;
}

function stepBlank({ shown, step, units, setStep }: Caption): TemplateResult {
  const dimension = shown.by === "arrival" ? "time" : "temperatureDifference";
  const value = step ?? 0;
  const text =
    dimension === "time"
      ? duration(value, value < 600 ? 1 : 60)
      : `${Number(toShown(value, dimension, units).toPrecision(4))}\u202f${shownUnit(dimension, units)}`;
  return html`<corelag-blank
    kind="number"
    label="step between lines"
    .value=${text}
    .unit=${dimension === "time" ? "s" : shownUnit(dimension, units)}
    .check=${(raw: string) => checkStep(raw, dimension)}
    @change=${(event: Event) => {
      const read = parseQuantity(rawOf(event), dimension);
      if ("value" in read) setStep(read.value);
    }}
  ></corelag-blank>`;
}

function checkStep(
  raw: string,
  dimension: "time" | "temperatureDifference",
): { message: string; mend: string } | null {
  const read = parseQuantity(raw, dimension);
  if ("fault" in read) return read.fault;
  return read.value > 0
    ? null
    : { message: "The step has to be above zero.", mend: "Give for example 50 K." };
}
