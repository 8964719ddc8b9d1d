import { LitElement, css, html, nothing } from "lit";
import type { TemplateResult } from "lit";
import { customElement, property } from "lit/decorators.js";
import type { CaseDocument } from "../../case/types.ts";
import { cautionsFor } from "../../report/cautions.ts";
import type { CaseResult } from "../../run/result.ts";
import { duration } from "../controls/figures.ts";
import { download } from "../download.ts";
import { send } from "../events.ts";
import { icon } from "../icons.ts";
import type { Status } from "../state.ts";
import { shared } from "../styles/shared.ts";
import { curvesFile, nearestFrame, nodesFile, snapshotsFile } from "./files.ts";
import type { OutFile } from "./files.ts";
import { unsourced } from "./sources.ts";

interface Out {
  readonly name: string;
  readonly note: string;
  readonly save: () => void;
  /** the case file may leave at any time; everything else belongs to a result that stands */
  readonly needsResult: boolean;
}

/**
 * The hand-over: what can be given to somebody who has to follow this without asking.
 *
 * Sends corelag-do (save the case file, save the picture of the section).
 */
@customElement("corelag-handover")
export class CorelagHandover extends LitElement {
  static override styles = [
    shared,
    css`
      :host {
        display: block;
        padding: var(--s-3) 0 var(--s-4);
      }
      .lead {
        padding: 0 var(--s-4) var(--s-3);
      }
      .outs {
        border-top: 1px solid var(--rule);
      }
      .outs li {
        display: flex;
        align-items: center;
        gap: var(--s-3);
        padding: 7px var(--s-4);
        border-bottom: 1px solid var(--rule);
      }
      .outs div {
        flex: 1;
        min-width: 0;
      }
      .outs small {
        display: block;
        color: var(--ink-2);
        font-size: var(--t-note);
        line-height: 1.25;
      }
      .verdict {
        margin-top: var(--s-4);
      }
      .verdict p + p {
        margin-top: var(--s-1);
      }
      .law {
        padding: var(--s-3) var(--s-4) 0;
      }
    `,
  ];

  @property({ attribute: false }) document: CaseDocument | null = null;
  @property({ attribute: false }) result: CaseResult | null = null;
  @property() status: Status = "empty";
  @property({ type: Boolean }) stale = false;
  @property({ type: Number }) cursor = 0;

  protected override render(): TemplateResult {
    const ready = this.result !== null && !this.stale && this.result.quality === "settled";
    return html`<p class="lead">
        For the colleague, customer or auditor who has to follow this without asking.
      </p>
      <ul class="outs">
        ${this.outs().map((out) => this.row(out, ready))}
      </ul>
      ${ready ? nothing : html`<p class="law aside" role="status">${this.waiting()}</p>`} ${this.sources()}
      ${this.cautions()}
      <p class="law aside">
        These numbers stand behind local codes, the rules of the site and the judgement of whoever is licensed
        for such work. They replace none of them.
      </p>`;
  }

  private outs(): Out[] {
    const result = this.result;
    const frame =
      result === null ? 0 : (result.frames.times[nearestFrame(result.frames.times, this.cursor)] ?? 0);
    const count = result?.frames.times.length ?? 0;
    const out = (make: (result: CaseResult) => OutFile) => () => result !== null && saveFile(make(result));
    return [
      {
        name: "Case file",
        note: "runs again to the last printed figure",
        needsResult: false,
        save: () => send(this, "corelag-do", { kind: "save" }),
      },
      { name: "Curves", note: "CSV, a line for each kept instant", needsResult: true, save: out(curvesFile) },
      {
        name: "Section picture",
        note: `PNG, as it stands, at ${duration(this.cursor)}`,
        needsResult: true,
        save: () => send(this, "corelag-do", { kind: "picture" }),
      },
      {
        name: "Temperatures at every node",
        note: `CSV with its triangles, at ${duration(frame)}, for stress work`,
        needsResult: true,
        save: out((each) => nodesFile(each, this.cursor)),
      },
      {
        name: "Field snapshots",
        note: `VTK, ${count} instants and their series`,
        needsResult: true,
        save: out(snapshotsFile),
      },
    ];
  }

  private row({ name, note, save, needsResult }: Out, ready: boolean): TemplateResult {
    return html`<li>
      <div><b>${name}</b><small>${note}</small></div>
      <button
        class="act"
        type="button"
        aria-label="Save: ${name}"
        ?disabled=${this.document === null || (needsResult && !ready)}
        @click=${save}
      >
        Save
      </button>
    </li>`;
  }

  private waiting(): string {
    if (this.status === "waiting")
      return "Results can be saved once the case on the sheet is sound and worked out again.";
    if (this.status === "failed") return "Results can be saved once the case has been worked out.";
    return "Results can be saved once the answers have settled.";
  }

  /** Inputs that do not say where they come from. */
  private sources(): TemplateResult | typeof nothing {
    if (this.document === null) return nothing;
    const missing = unsourced(this.document);
    if (missing.length === 0) return nothing;
    return html`<div class="verdict care">
      <h2>
        ${icon("care")}${missing.length === 1 ? "One input has no source yet" : `${missing.length} inputs have no source yet`}
      </h2>
      <p>${missing.join("; ")}. Whoever reads the case cannot tell where they come from.</p>
    </div>`;
  }

  private cautions(): TemplateResult | typeof nothing {
    const cautions = this.result === null || this.stale ? [] : cautionsFor(this.result);
    if (cautions.length === 0) return nothing;
    return html`<div class="verdict care">
      <h2>${icon("care")}To be minded</h2>
      ${cautions.map((caution) => html`<p>${caution}</p>`)}
    </div>`;
  }
}

const saveFile = ({ name, type, content }: OutFile): void => download(new Blob([content], { type }), name);

declare global {
  interface HTMLElementTagNameMap {
    "corelag-handover": CorelagHandover;
  }
}
