/** The tag of a point: its coordinates, what hangs on them, and the tools that work on a point. */
import { html, nothing } from "lit";
import type { TemplateResult } from "lit";
import { formatNumber, shownUnit, toShown } from "../../case/units.ts";
import { before, FEWEST_VERTICES, insertVertex, removeVertex, typeCoordinate } from "../../editor/outline.ts";
import type { LoopIndex } from "../../editor/outline.ts";
import { loopOf } from "../../editor/outline.ts";
import type { Selection } from "../../editor/selection.ts";
import { quantity } from "../controls/figures.ts";
import { send, sendEdit } from "../events.ts";
import { quantityBlank } from "./quantityBlank.ts";
import { coordinate } from "./rulers.ts";
import { alongSide, readSheet } from "./sheet.ts";
import type { SheetLoop, SheetSide } from "./sheet.ts";
import type { TagView } from "./tag.ts";

type VertexSelection = Extract<Selection, { kind: "vertex" }>;

export const loopAt = (loops: readonly SheetLoop[], place: LoopIndex): SheetLoop | undefined =>
  loops.find((loop) => loop.region === place.region && loop.loop === place.loop);

export function vertexTag(view: TagView, at: VertexSelection): TemplateResult | null {
  const loop = loopAt(view.sheet.loops, at);
  const vertex = loop?.vertices[at.index];
  if (!loop || !vertex) return null;
  const sides = [loop.sides[before(loop.sides, at.index)]!, loop.sides[at.index]!];
  return html`
    <h2>Point ${at.index + 1}<small>${cornerName(sides)}</small></h2>
    <p class="in">
      ${view.units === "si" ? "steps of 1 mm; hold Alt for any value" : "steps of 0.05 in; hold Alt for any value"}
    </p>
    <dl>
      ${entry(view, at, 0)}${entry(view, at, 1)}
      ${sides.filter((side) => !side.onAxis).map((side) => sideRow(view, side))}
      ${view.before === null ? nothing : amountRows(view)}
    </dl>
    ${view.before === null ? links(view, at, loop) : html`<p class="gives">Esc puts it back.</p>`}
  `;
}

/** "wall to top", or "on the axis". */
function cornerName([arriving, leaving]: readonly SheetSide[]): string {
  if (!arriving || !leaving) return "";
  if (arriving.onAxis || leaving.onAxis)
    return `${arriving.onAxis ? leaving.name : arriving.name}, on the axis`;
  return arriving.name === leaving.name ? arriving.name : `${arriving.name} to ${leaving.name}`;
}

function entry(view: TagView, at: VertexSelection, axis: 0 | 1): TemplateResult {
  const name = axis === 0 ? "r" : "z";
  const label = `move of point ${at.index + 1}`;
  const written = loopOf(view.document, at)[at.index]?.at[axis];
  const was = view.before && loopAt(readSheet(view.before).loops, at)?.vertices[at.index]?.at[axis];
  const type = (typed: string, gesture?: string): void =>
    sendEdit(view.host, label, (draft) => typeCoordinate(draft, at, axis, typed), gesture);
  return html`<div>
    <dt>${name}</dt>
    <dd>
      ${quantityBlank({
        label: `${name} of point ${at.index + 1}`,
        value: written,
        dimension: "length",
        units: view.units,
        step: view.units === "si" ? 1 : 0.05,
        decimals: view.units === "si" ? 1 : 3,
        ...(axis === 0 && { least: 0 }),
        way: (typed) => type(typed, "type-coordinate"),
        take: (typed) => {
          type(typed, "type-coordinate");
          send(view.host, "corelag-rest", null);
        },
        back: () => send(view.host, "corelag-back", null),
      })}
    </dd>
    <dd>
      ${typeof was === "number" ? `was ${coordinate(was, view.units)}` : shownUnit("length", view.units)}
    </dd>
  </div>`;
}

function sideRow(view: TagView, side: SheetSide): TemplateResult {
  const [from, to] = [side.points[0]!, side.points.at(-1)!];
  const tilt = Math.abs((Math.atan2(Math.abs(to[0] - from[0]), Math.abs(to[1] - from[1])) * 180) / Math.PI);
  return html`<div>
    <dt>${side.name}</dt>
    <dd>${quantity(side.length, "length", view.units).text}</dd>
    <dd>${side.curved ? "arc" : tilt > 0 && tilt < 90 ? `${tilt.toFixed(2)}°` : ""}</dd>
  </div>`;
}

function amountRows({ amounts, amountsBefore, units }: TagView): TemplateResult | typeof nothing {
  if (!amounts) return nothing;
  const change = (now: number, then: number | undefined, dimension: "mass" | "length"): string => {
    if (then === undefined || Math.abs(now - then) < 1e-9 * now) return "";
    const size = toShown(Math.abs(now - then), dimension, units);
    return `${now > then ? "+" : "\u2212"}${formatNumber(size, 2)}`;
  };
  return html`
    <div>
      <dt>mass</dt>
      <dd>${quantity(amounts.mass, "mass", units).text}</dd>
      <dd>${change(amounts.mass, amountsBefore?.mass, "mass")}</dd>
    </div>
    <div>
      <dt>V/A</dt>
      <dd>${quantity(amounts.length, "length", units).text}</dd>
      <dd>${change(amounts.length, amountsBefore?.length, "length")}</dd>
    </div>
  `;
}

function links(view: TagView, at: VertexSelection, loop: SheetLoop): TemplateResult {
  const insert = (): void => {
    const side = loop.sides[at.index]!;
    sendEdit(view.host, `point after point ${at.index + 1}`, (draft) =>
      insertVertex(draft, at, alongSide(side, 0.5)),
    );
    send(view.host, "corelag-select", { ...at, index: at.index + 1 });
  };
  const remove = (): void => {
    send(view.host, "corelag-select", { kind: "none" });
    sendEdit(view.host, `taking out point ${at.index + 1}`, (draft) => removeVertex(draft, at));
  };
  return html`<p class="links">
    <button class="link" @click=${insert}>Insert a point after it</button>
    ${loop.vertices.length > FEWEST_VERTICES ? html`<button class="link" @click=${remove}>Take it out</button>` : nothing}
  </p>`;
}
