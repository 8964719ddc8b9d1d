/** The line of facts under the section: what the part is made of, its mass, volume, exposed area and V/A. */
import { LitElement, css, html, nothing } from "lit";
import type { TemplateResult } from "lit";
import { customElement, property } from "lit/decorators.js";
import type { MaterialLibrary } from "../../case/library.ts";
import type { CaseDocument } from "../../case/types.ts";
import type { UnitSystem } from "../../case/units.ts";
import type { Profile } from "../../profile/types.ts";
import { digits, joined, quantity } from "../controls/figures.ts";
import { send } from "../events.ts";
import { shared } from "../styles/shared.ts";
import { materialBlank } from "./materialBlank.ts";

@customElement("corelag-facts")
export class CorelagFacts extends LitElement {
  static override styles = [
    shared,
    css`
      :host {
        display: flex;
        flex-wrap: wrap;
        gap: 0 var(--s-4);
        font-size: var(--t-note);
        color: var(--ink-2);
        pointer-events: none;
      }
      span {
        white-space: nowrap;
        pointer-events: auto;
      }
      @media (max-width: 760px) {
        span:nth-child(n + 4) {
          display: none;
        }
      }
    `,
  ];

  @property({ attribute: false }) document: CaseDocument | null = null;
  @property({ attribute: false }) profile: Profile | null = null;
  @property() units: UnitSystem = "si";
  @property({ attribute: false }) library: MaterialLibrary = {};

  protected override render(): TemplateResult | typeof nothing {
    const { document, profile, units } = this;
    if (!document) return nothing;
    const select = (region: number) => (): void => send(this, "corelag-select", { kind: "region", region });
    return html`
      ${document.part.regions.map(
        (region, i) =>
          html`<span
            ><button class="blank quiet" @click=${select(i)}>${region.name}</button> of
            ${materialBlank(this, document, i, this.library)}</span
          >`,
      )}
      ${profile ? amounts(profile, units).map((text) => html`<span>${text}</span>`) : nothing}
    `;
  }
}

function amounts(profile: Profile, units: UnitSystem): string[] {
  const exposed = Number.isFinite(profile.characteristicLength);
  return [
    quantity(profile.mass, "mass", units).text,
    volume(profile.volume, units),
    exposed ? `exposed ${area(profile.exposedArea, units)}` : "nothing exposed",
    ...(exposed ? [`V/A ${quantity(profile.characteristicLength, "length", units).text}`] : []),
  ];
}

const LITRE = 1e-3;

/** Litres (dm3) from a tenth of one on, as people name the size of a workpiece. */
function volume(cubicMetres: number, units: UnitSystem): string {
  if (units === "us" || cubicMetres < LITRE / 10) return quantity(cubicMetres, "volume", units).text;
  return cubicMetres < 1 ? joined(figure(cubicMetres / LITRE), "dm³") : joined(figure(cubicMetres), "m³");
}

function area(squareMetres: number, units: UnitSystem): string {
  if (units === "us" || squareMetres < 0.1) return quantity(squareMetres, "area", units).text;
  return joined(figure(squareMetres), "m²");
}

const figure = (value: number): string => digits(value, value < 10 ? 2 : value < 100 ? 1 : 0);

declare global {
  interface HTMLElementTagNameMap {
    "corelag-facts": CorelagFacts;
  }
}
