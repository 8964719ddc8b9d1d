import { LitElement, css, html, nothing } from "lit";
import type { TemplateResult } from "lit";
import { customElement, property } from "lit/decorators.js";
import type { CaseDocument } from "../../case/types.ts";
import type { UnitSystem } from "../../case/units.ts";
import type { CaseResult } from "../../run/result.ts";
import { send } from "../events.ts";
import { icon } from "../icons.ts";
import { shared } from "../styles/shared.ts";
import { angleBars, meshQualityStyle, meshSwitch } from "./mesh-quality.ts";
import { MESH_TITLE, proofOf } from "./proof-facts.ts";
import type { Fact } from "./proof-facts.ts";

/** The proof: what was checked of the sums, in plain words, with a mark where a check was kept or broken. */
@customElement("corelag-proof")
export class CorelagProof extends LitElement {
  static override styles = [
    shared,
    meshQualityStyle,
    css`
      :host {
        display: block;
        padding-bottom: var(--s-4);
      }
      .lead {
        padding: var(--s-3) var(--s-4) 0;
      }
      section {
        break-inside: avoid;
      }
      h2 {
        font-size: var(--t-ask);
        font-weight: var(--w-firm);
        padding: var(--s-3) var(--s-4) 2px;
      }
      dl {
        border-top: 1px solid var(--rule-strong);
      }
      dl > div {
        display: grid;
        grid-template-columns: minmax(0, 1fr) minmax(0, max-content) 20px;
        column-gap: var(--s-2);
        align-items: baseline;
        padding: 3px var(--s-4);
        border-bottom: 1px solid var(--rule);
      }
      dt {
        color: var(--ink-2);
      }
      dd {
        text-align: right;
      }
      dd b {
        font-weight: var(--w-firm);
        text-wrap: balance;
      }
      dt small {
        font-size: var(--t-note);
        color: var(--ink-2);
        display: block;
        line-height: 1.25;
      }
      .mark {
        align-self: center;
        height: 20px;
      }
      .kept {
        color: var(--good);
      }
      .broken {
        color: var(--bad);
        --sheet: var(--ground);
      }
      .old dd {
        color: var(--stale);
      }
      ul {
        margin: var(--s-3) var(--s-4) 0;
      }
      li {
        display: flex;
        gap: var(--s-2);
        font-size: var(--t-note);
        padding: 3px 0;
      }
      li .icon {
        color: var(--care);
      }
    `,
  ];

  @property({ attribute: false }) document: CaseDocument | null = null;
  @property({ attribute: false }) result: CaseResult | null = null;
  @property({ type: Boolean }) stale = false;
  /** whether the mesh is laid over the section */
  @property({ type: Boolean }) meshShown = false;
  @property() units: UnitSystem = "si";

  protected override render(): TemplateResult {
    if (this.document === null || this.result === null)
      return html`<p class="lead">What was checked stands here once something has been worked out.</p>`;
    const groups = proofOf(this.document, this.result, this.units);
    return html`<p class="lead">
        ${this.stale ? "From the case before the last change." : "Checked on every run, whether or not anybody looks."}
      </p>
      ${groups.map(
        ({ title, facts }) =>
          html`<section class=${this.stale ? "old" : ""}>
            <h2>${title}</h2>
            <dl>${facts.map((fact) => this.fact(fact))}</dl>
            ${title === MESH_TITLE ? this.meshPicture(this.result!) : nothing}
          </section>`,
      )}
      ${this.warnings(this.result)}`;
  }

  private meshPicture({ mesh }: CaseResult): TemplateResult {
    return html`${angleBars(mesh)}${meshSwitch(this.meshShown, () => send(this, "corelag-mesh", !this.meshShown))}`;
  }

  private fact({ name, value, note, check }: Fact): TemplateResult {
    const mark = check === undefined ? nothing : icon(check === "kept" ? "good" : "bad");
    return html`<div>
      <dt>${name}${note === undefined ? nothing : html`<small>${note}</small>`}</dt>
      <dd><b>${value}</b></dd>
      <dd class="mark ${check ?? ""}">
        ${mark}${check === undefined ? nothing : html`<span class="heard">${check === "kept" ? "kept" : "broken"}</span>`}
      </dd>
    </div>`;
  }

  private warnings({ warnings }: CaseResult): TemplateResult | typeof nothing {
    if (warnings.length === 0) return nothing;
    return html`<ul aria-label="Remarks on this run">
      ${warnings.map((warning) => html`<li>${icon("care")}<span>${warning}</span></li>`)}
    </ul>`;
  }
}

declare global {
  interface HTMLElementTagNameMap {
    "corelag-proof": CorelagProof;
  }
}
