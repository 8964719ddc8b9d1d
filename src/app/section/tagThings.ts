/** The tags of a region and of a probe. */
import { html } from "lit";
import type { TemplateResult } from "lit";
import { shownUnit } from "../../case/units.ts";
import { probeIsAsked, removeProbe, renameProbe, typeProbe } from "../../editor/conditions.ts";
import { temperature } from "../controls/figures.ts";
import { send, sendEdit } from "../events.ts";
import { materialBlank } from "./materialBlank.ts";
import { quantityBlank } from "./quantityBlank.ts";
import type { TagView } from "./tag.ts";

const rawOf = (event: Event): string => (event as CustomEvent<{ raw: string }>).detail.raw;

export function regionTag(view: TagView, index: number): TemplateResult | null {
  const region = view.document.part.regions[index];
  if (!region) return null;
  const start = (typed: string): void =>
    sendEdit(
      view.host,
      `start temperature of ${region.name}`,
      (draft) => {
        draft.part.regions[index]!.start = typed;
      },
      "type-start",
    );
  return html`
    <h2>${region.name}<small>region ${index + 1}</small></h2>
    <dl>
      <div>
        <dt>made of</dt>
        <dd class="wide">${materialBlank(view.host, view.document, index, view.library)}</dd>
      </div>
      <div>
        <dt>starts at</dt>
        <dd>
          ${quantityBlank({
            label: `start temperature of ${region.name}`,
            value: region.start ?? view.document.start,
            dimension: "temperature",
            units: view.units,
            step: 5,
            take: (typed) => {
              start(typed);
              send(view.host, "corelag-rest", null);
            },
            way: start,
            back: () => send(view.host, "corelag-back", null),
          })}
        </dd>
        <dd>${shownUnit("temperature", view.units)}</dd>
      </div>
    </dl>
  `;
}

export function probeTag(view: TagView, index: number): TemplateResult | null {
  const probe = view.document.probes?.[index];
  if (!probe) return null;
  const type = (axis: 0 | 1, typed: string): void =>
    sendEdit(
      view.host,
      `move of ${probe.name}`,
      (draft) => typeProbe(draft, index, axis, typed),
      "type-probe",
    );
  const row = (axis: 0 | 1): TemplateResult =>
    html`<div>
      <dt>${axis === 0 ? "r" : "z"}</dt>
      <dd>
        ${quantityBlank({
          label: `${axis === 0 ? "r" : "z"} of ${probe.name}`,
          value: probe.at[axis],
          dimension: "length",
          units: view.units,
          step: view.units === "si" ? 1 : 0.05,
          decimals: view.units === "si" ? 1 : 3,
          ...(axis === 0 && { least: 0 }),
          way: (typed) => type(axis, typed),
          take: (typed) => {
            type(axis, typed);
            send(view.host, "corelag-rest", null);
          },
          back: () => send(view.host, "corelag-back", null),
        })}
      </dd>
      <dd>${shownUnit("length", view.units)}</dd>
    </div>`;
  const rename = (event: Event): void =>
    sendEdit(view.host, `name of ${probe.name}`, (draft) => renameProbe(draft, index, rawOf(event)));
  const remove = (): void => {
    send(view.host, "corelag-select", { kind: "none" });
    sendEdit(view.host, `taking out ${probe.name}`, (draft) => removeProbe(draft, index));
  };
  return html`
    <h2>
      Probe
      <corelag-blank
        kind="words"
        .value=${probe.name}
        label="name of the probe"
        @change=${rename}
      ></corelag-blank>
    </h2>
    <dl>${row(0)}${row(1)}</dl>
    <p class="gives">
      ${
        Number.isFinite(view.temperature)
          ? html`Now <b>${temperature(view.temperature, view.units).text}</b>.`
          : "Outside the part: it reads nothing."
      }
    </p>
    <p class="links">
      ${
        probeIsAsked(view.document, index)
          ? html`<span class="aside">A question asks for it.</span>`
          : html`<button class="link" @click=${remove}>Take it out</button>`
      }
    </p>
  `;
}
