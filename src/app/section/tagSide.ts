/** The tag of a side: what is done to it in a stage, and its shape. */
import { html, nothing } from "lit";
import type { TemplateResult } from "lit";
import type { CaseDocument } from "../../case/types.ts";
import { shownUnit } from "../../case/units.ts";
import { EVERY_SIDE, renameSide } from "../../editor/conditions.ts";
import { bendSide, insertVertex, loopOf, riseOf, setRise, straightenSide } from "../../editor/outline.ts";
import { siOf, tidy } from "../../editor/quantities.ts";
import type { Selection } from "../../editor/selection.ts";
import { quantity } from "../controls/figures.ts";
import { send, sendEdit } from "../events.ts";
import { quantityBlank } from "./quantityBlank.ts";
import { alongSide } from "./sheet.ts";
import type { SheetSide } from "./sheet.ts";
import { conditions } from "./tagConditions.ts";
import { loopAt } from "./tagVertex.ts";
import type { TagView } from "./tag.ts";

type SideSelection = Extract<Selection, { kind: "side" }>;

export function sideTag(view: TagView, at: SideSelection): TemplateResult | null {
  const side = loopAt(view.sheet.loops, at)?.sides[at.index];
  if (!side) return null;
  const rename = (event: Event): void => {
    const to = (event as CustomEvent<{ raw: string }>).detail.raw.trim();
    if (to !== "" && to !== EVERY_SIDE)
      sendEdit(view.host, `name of ${side.name}`, (draft) => renameSide(draft, at.region, side.name, to));
  };
  return html`
    <h2>
      <corelag-blank
        kind="words"
        quiet
        .value=${side.name}
        label="name of the side"
        @change=${rename}
      ></corelag-blank>
      <small>side ${at.index + 1}, ${quantity(side.length, "length", view.units).text} long</small>
    </h2>
    ${side.onAxis ? html`<p class="in">The axis: nothing passes through it.</p>` : nothing}
    ${side.joint ? html`<p class="in">Touches the next region.</p>` : nothing}
    ${side.onAxis || side.joint ? nothing : treatment(view, side.name)}
    ${side.curved ? html`<dl>${riseRow(view, at, side)}</dl>` : nothing} ${shapeLinks(view, at, side)}
  `;
}

function treatment(view: TagView, side: string): TemplateResult {
  const stages = view.document.stages.map((stage, i) => ({
    value: String(i),
    label: stageName(view.document, i, stage.name),
  }));
  return html`
    <p class="in">
      in stage
      <corelag-blank
        kind="choice"
        label="stage"
        .value=${String(view.stage)}
        .options=${stages}
        @change=${(event: CustomEvent<{ raw: string }>) => view.setStage(Number(event.detail.raw))}
      ></corelag-blank>
    </p>
    ${conditions(view, side)}
  `;
}

const LETTERS = "ABCDEFGHIJKLMNOPQRSTUVWXYZ";
const stageName = (document: CaseDocument, index: number, name: string | undefined): string =>
  document.stages.length > 1 ? `${LETTERS[index % 26]}, ${name ?? "no name"}` : (name ?? "A");

// --- shape ----------------------------------------------------------------------------------------------------------

function riseRow(view: TagView, at: SideSelection, side: SheetSide): TemplateResult {
  const rise = riseOf(loopOf(view.document, at), at.index);
  const type = (typed: string): void =>
    sendEdit(
      view.host,
      `rise of ${side.name}`,
      (draft) => {
        const value = siOf(typed, "length");
        if (Number.isFinite(value) && value !== 0) setRise(draft, at, value);
      },
      "type-rise",
    );
  return html`<div>
    <dt>rises</dt>
    <dd>
      ${quantityBlank({
        label: `rise of ${side.name} over its chord`,
        value: tidy(rise),
        dimension: "length",
        units: view.units,
        step: view.units === "si" ? 1 : 0.05,
        way: type,
        take: (typed) => {
          type(typed);
          send(view.host, "corelag-rest", null);
        },
        back: () => send(view.host, "corelag-back", null),
      })}
    </dd>
    <dd>${shownUnit("length", view.units)} outwards</dd>
  </div>`;
}

function shapeLinks(view: TagView, at: SideSelection, side: SheetSide): TemplateResult {
  const { host } = view;
  const insert = (): void => {
    sendEdit(host, `point on ${side.name}`, (draft) => insertVertex(draft, at, alongSide(side, 0.5)));
    send(host, "corelag-select", { ...at, kind: "vertex", index: at.index + 1 });
  };
  return html`<p class="links">
    ${
      side.curved
        ? html`<button
            class="link"
            @click=${() => sendEdit(host, `straightening ${side.name}`, (draft) => straightenSide(draft, at))}
          >
            Straighten
          </button>`
        : side.onAxis
          ? nothing
          : html`<button
              class="link"
              @click=${() => sendEdit(host, `bending ${side.name}`, (draft) => bendSide(draft, at))}
            >
              Bend to arc
            </button>`
    }
    <button class="link" @click=${insert}>Insert a point</button>
  </p>`;
}
