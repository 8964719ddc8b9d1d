import { LitElement, css, html } from "lit";
import type { TemplateResult } from "lit";
import { customElement, property } from "lit/decorators.js";
import type { UnitSystem } from "../../case/units.ts";
import type { CaseResult } from "../../run/result.ts";
import { shared } from "../styles/shared.ts";
import { tableOf } from "./table.ts";

/** The curves of the strip as a table: the same values, for those who would rather read than look. */
@customElement("corelag-curve-table")
export class CorelagCurveTable extends LitElement {
  static override styles = [
    shared,
    css`
      :host {
        display: block;
        background: var(--sheet);
        user-select: text;
        -webkit-user-select: text;
      }
      .bed {
        height: 100%;
        overflow: auto;
      }
      table {
        border-collapse: collapse;
        min-width: 100%;
        font-size: var(--t-note);
      }
      caption {
        text-align: left;
        padding: var(--s-2) var(--s-4);
        color: var(--ink-2);
      }
      th,
      td {
        padding: 3px var(--s-4) 3px 0;
        text-align: right;
        white-space: nowrap;
        border-bottom: 1px solid var(--rule);
      }
      th {
        font-weight: var(--w-firm);
      }
      thead th {
        position: sticky;
        top: 0;
        background: var(--sheet);
        border-bottom: 1px solid var(--rule-strong);
      }
      tr > :first-child {
        padding-left: var(--s-4);
        text-align: left;
      }
      tr.event th {
        color: var(--hand);
      }
    `,
  ];

  @property({ attribute: false }) result: CaseResult | null = null;
  @property() units: UnitSystem = "si";
  /** s between the rows */
  @property({ type: Number }) apart = 600;

  protected override render(): TemplateResult {
    if (this.result === null) return html`<p class="aside">Nothing has been worked out yet.</p>`;
    const table = tableOf(this.result, this.units, this.apart);
    return html`<div class="bed" tabindex="0" role="region" aria-label="Curves as a table">
      <table>
        <caption>
          ${table.caption}
        </caption>
        <thead>
          <tr>
            ${table.head.map((name) => html`<th scope="col">${name}</th>`)}
          </tr>
        </thead>
        <tbody>
          ${table.rows.map(
            ({ head, values, event }) =>
              html`<tr class=${event === "" ? "" : "event"}>
                <th scope="row">${head}${event === "" ? "" : `, ${event}`}</th>
                ${values.map((value) => html`<td>${value}</td>`)}
              </tr>`,
          )}
        </tbody>
      </table>
    </div>`;
  }
}

declare global {
  interface HTMLElementTagNameMap {
    "corelag-curve-table": CorelagCurveTable;
  }
}
