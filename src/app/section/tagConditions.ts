/** What a stage does to one side, or to every side: rows of blanks, and words that change the kind of condition. */
import { html, nothing } from "lit";
import type { TemplateResult } from "lit";
import type { CaseDocument, ConditionDocument, CurveDocument, Quantity } from "../../case/types.ts";
import { shownUnit } from "../../case/units.ts";
import type { Dimension } from "../../case/units.ts";
import {
  conditionOf,
  dropCondition,
  EVERY_SIDE,
  setCondition,
  setFilmValue,
} from "../../editor/conditions.ts";
import type { FoundCondition } from "../../editor/conditions.ts";
import { siOf, tidy } from "../../editor/quantities.ts";
import { send, sendEdit } from "../events.ts";
import { quantityBlank } from "./quantityBlank.ts";
import type { TagView } from "./tag.ts";

/** The tag of a stage: what it does to every side that is not named. */
export function stageTag(view: TagView, stage: number): TemplateResult | null {
  const found = view.document.stages[stage];
  if (!found) return null;
  return html`
    <h2>${found.name ?? `Stage ${stage + 1}`}<small>every side not said otherwise</small></h2>
    ${conditions({ ...view, stage }, EVERY_SIDE)}
  `;
}

export function conditions(view: TagView, side: string): TemplateResult {
  const found = conditionOf(view.document.stages[view.stage], side);
  return html`
    ${
      found === undefined
        ? html`<p class="lack">Needs a condition: pick one below.</p>`
        : html`<dl>${rows(view, side, found.condition)}</dl>`
    }
    ${conditionLinks(view, side, found)}
  `;
}

interface Row {
  readonly name: string;
  readonly value: CurveDocument | undefined;
  readonly dimension: Dimension;
  readonly step: number;
  readonly least?: number;
  readonly most?: number;
  readonly write: (draft: CaseDocument, typed: Quantity | undefined) => void;
}

function rows(view: TagView, side: string, condition: ConditionDocument): TemplateResult[] | TemplateResult {
  const { stage } = view;
  if (condition === "insulated")
    return html`<div>
      <dt>insulated</dt>
      <dd class="wide">no heat passes</dd>
    </div>`;
  if ("held" in condition)
    return [
      row(view, side, {
        name: "held at",
        value: condition.held,
        dimension: "temperature",
        step: 5,
        write: (draft, typed) => setCondition(draft, stage, side, { held: typed ?? 0 }),
      }),
    ];
  if ("flux" in condition)
    return [
      row(view, side, {
        name: "flux in",
        value: condition.flux,
        dimension: "heatFlux",
        step: 100,
        write: (draft, typed) => setCondition(draft, stage, side, { flux: typed ?? 0 }),
      }),
    ];
  const film =
    (field: "film" | "ambient" | "emissivity" | "surroundings") =>
    (draft: CaseDocument, typed: Quantity | undefined) =>
      setFilmValue(draft, stage, side, field, typed);
  const ambient = condition.ambient ?? view.document.stages[stage]?.ambient;
  const emissivity = condition.emissivity;
  return [
    row(view, side, {
      name: "film",
      value: condition.film,
      dimension: "filmCoefficient",
      step: 1,
      least: 0,
      write: film("film"),
    }),
    row(view, side, {
      name: "air or bath",
      value: ambient,
      dimension: "temperature",
      step: 5,
      write: film("ambient"),
    }),
    ...(emissivity === undefined
      ? []
      : [
          row(view, side, {
            name: "emissivity",
            value: emissivity,
            dimension: "share",
            step: 0.05,
            least: 0,
            most: 1,
            write: film("emissivity"),
          }),
          row(view, side, {
            name: "sees walls at",
            value: condition.surroundings ?? ambient,
            dimension: "temperature",
            step: 5,
            write: film("surroundings"),
          }),
        ]),
  ];
}

function row(
  view: TagView,
  side: string,
  { name, value, dimension, step, least, most, write }: Row,
): TemplateResult {
  const spoken = side === EVERY_SIDE ? "every side" : side;
  if (typeof value === "object")
    return html`<div>
      <dt>${name}</dt>
      <dd class="wide">as its table says</dd>
    </div>`;
  const type = (typed: string): void =>
    sendEdit(
      view.host,
      `${name} of ${spoken}`,
      (draft) => write(draft, typed.trim() === "" ? undefined : typed),
      `type-${name}`,
    );
  return html`<div>
    <dt>${name}</dt>
    <dd>
      ${quantityBlank({
        label: `${name} of ${spoken}`,
        value,
        dimension,
        units: view.units,
        step,
        ...(least !== undefined && { least }),
        ...(most !== undefined && { most }),
        placeholder: "none",
        way: type,
        take: (typed) => {
          type(typed);
          send(view.host, "corelag-rest", null);
        },
        back: () => send(view.host, "corelag-back", null),
      })}
    </dd>
    <dd>${shownUnit(dimension, view.units)}</dd>
  </div>`;
}

/** A film to begin with when a side had none: still air on a bare vertical wall, W/(m2 K), a plain start value. */
const FIRST_FILM = 10;

function conditionLinks(view: TagView, side: string, found: FoundCondition | undefined): TemplateResult {
  const { stage, host } = view;
  const spoken = side === EVERY_SIDE ? "every side" : side;
  const kind =
    found === undefined
      ? "none"
      : found.condition === "insulated"
        ? "insulated"
        : Object.keys(found.condition)[0];
  const set = (label: string, condition: ConditionDocument) => (): void =>
    sendEdit(host, `${label} of ${spoken}`, (draft) => setCondition(draft, stage, side, condition));
  const ambient = siOf(
    typeof view.document.stages[stage]?.ambient === "object"
      ? undefined
      : (view.document.stages[stage]?.ambient as Quantity | undefined),
    "temperature",
  );
  const warm = tidy(Number.isFinite(ambient) ? ambient : 20);
  const forAll = (): void =>
    sendEdit(host, "condition of every side", (draft) => {
      setCondition(draft, stage, EVERY_SIDE, found!.condition);
      dropCondition(draft, stage, side);
    });
  return html`<p class="links">
    ${kind === "film" || kind === "ambient" ? nothing : html`<button class="link" @click=${set("film", Number.isFinite(ambient) ? { film: FIRST_FILM } : { film: FIRST_FILM, ambient: warm })}>Give it a film</button>`}
    ${kind === "insulated" ? nothing : html`<button class="link" @click=${set("insulation", "insulated")}>Insulate</button>`}
    ${kind === "held" ? nothing : html`<button class="link" @click=${set("held temperature", { held: warm })}>Hold at…</button>`}
    ${kind === "flux" ? nothing : html`<button class="link" @click=${set("flux", { flux: 0 })}>Flux…</button>`}
    ${
      found?.own && side !== EVERY_SIDE && EVERY_SIDE in (view.document.stages[stage]?.sides ?? {})
        ? html`<button
            class="link"
            @click=${() => sendEdit(host, `condition of ${spoken}`, (draft) => dropCondition(draft, stage, side))}
          >
            As the other sides
          </button>`
        : nothing
    }
    ${found?.own && side !== EVERY_SIDE ? html`<button class="link" @click=${forAll}>The same for every side</button>` : nothing}
  </p>`;
}
