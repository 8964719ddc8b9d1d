import { LitElement, css, html } from "lit";
import type { TemplateResult } from "lit";
import { customElement, property, query } from "lit/decorators.js";
import type { CaseDocument, CaseProblem } from "../../case/types.ts";
import type { UnitSystem } from "../../case/units.ts";
import { NOTHING } from "../../editor/selection.ts";
import type { Selection } from "../../editor/selection.ts";
import type { CaseResult, RunFailure } from "../../run/result.ts";
import { send } from "../events.ts";
import type { Pane, Shown, Status } from "../state.ts";
import { shared } from "../styles/shared.ts";
import "./answers.ts";
import type { CorelagAnswers } from "./answers.ts";
import "./handover.ts";
import { hints, hintsStyle } from "./hints.ts";
import "./proof.ts";

const PAGES: readonly { readonly pane: Pane; readonly word: string }[] = [
  { pane: "answers", word: "Answers" },
  { pane: "proof", word: "Proof" },
  { pane: "hand", word: "Hand-over" },
];

/**
 * The pane beside the sheet: answers, proof, hand-over, one at a time.
 *
 * Sends corelag-pane, and what its pages send.
 */
@customElement("corelag-pane")
export class CorelagPane extends LitElement {
  static override styles = [
    shared,
    hintsStyle,
    css`
      :host {
        display: grid;
        grid-template-rows: var(--caption) minmax(0, 1fr);
        min-width: 0;
        min-height: 0;
        background: var(--ground);
      }
      .words {
        display: flex;
        gap: var(--s-4);
        padding: 0 var(--s-4);
        border-bottom: 1px solid var(--rule);
      }
      .words button {
        color: var(--ink-2);
        font-size: var(--t-ask);
        border-block: 2.5px solid transparent;
        min-width: 24px;
      }
      .words button:hover {
        color: var(--hand-strong);
      }
      .words button[aria-selected="true"] {
        color: var(--ink);
        font-weight: var(--w-firm);
        border-bottom-color: var(--ink);
      }
      .words button:focus-visible {
        outline-offset: -3px;
      }
      .page {
        overflow: auto;
        min-height: 0;
      }
      .page:focus-visible {
        outline-offset: -2px;
      }
      @media (max-width: 1000px) and (min-width: 761px) {
        corelag-answers,
        corelag-proof {
          columns: 2;
          column-gap: 0;
        }
      }
      @media (max-width: 1000px) {
        :host {
          grid-template-rows: var(--caption) auto;
        }
        .page {
          overflow: visible;
        }
      }
      @media (forced-colors: active) {
        .words button {
          border-block-color: Canvas;
        }
        .words button[aria-selected="true"] {
          border-bottom-color: CanvasText;
        }
      }
    `,
  ];

  @property({ attribute: false }) document: CaseDocument | null = null;
  @property({ attribute: false }) result: CaseResult | null = null;
  @property({ attribute: false }) problems: readonly CaseProblem[] = [];
  @property({ attribute: false }) failure: RunFailure | null = null;
  @property() status: Status = "empty";
  @property({ type: Boolean }) stale = false;
  @property({ type: Boolean }) dragging = false;
  @property({ type: Number }) cursor = 0;
  @property({ attribute: false }) selection: Selection = NOTHING;
  @property({ attribute: false }) focusedAnswer: number | null = null;
  @property({ attribute: false }) shown: Shown = { by: "temperature" };
  @property() units: UnitSystem = "si";
  @property() pane: Pane = "answers";
  @property({ type: Boolean }) meshShown = false;
  @query("corelag-answers") private answers!: CorelagAnswers | null;

  override connectedCallback(): void {
    super.connectedCallback();
    this.setAttribute("role", "region");
    this.setAttribute("aria-label", "Answers, proof and hand-over");
  }

  protected override render(): TemplateResult {
    return html`<div class="words" role="tablist" aria-label="Pane" @keydown=${this.keyed}>
        ${PAGES.map(({ pane, word }) => this.word(pane, word))}
      </div>
      <div class="page" id="page" role="tabpanel" aria-labelledby="word-${this.pane}" tabindex="0">
        ${this.page()}
      </div>`;
  }

  private word(pane: Pane, word: string): TemplateResult {
    const chosen = pane === this.pane;
    return html`<button
      id="word-${pane}"
      type="button"
      role="tab"
      aria-selected=${chosen ? "true" : "false"}
      aria-controls="page"
      tabindex=${chosen ? 0 : -1}
      @click=${() => send(this, "corelag-pane", pane)}
    >
      ${word}
    </button>`;
  }

  private page(): TemplateResult {
    const { document, result, stale, status, units } = this;
    if (this.pane === "proof")
      return html`<corelag-proof
        .document=${document}
        .result=${result}
        .stale=${stale}
        .units=${units}
        .meshShown=${this.meshShown}
      ></corelag-proof>`;
    if (this.pane === "hand")
      return html`<corelag-handover
        .document=${document}
        .result=${result}
        .status=${status}
        .stale=${stale}
        .cursor=${this.cursor}
      ></corelag-handover>`;
    if (document === null)
      return hints(() => send(this, "corelag-do", { kind: "preset", name: SOLVED_EXAMPLE }));
    return html`<corelag-answers
      .document=${document}
      .result=${result}
      .problems=${this.problems}
      .failure=${this.failure}
      .status=${status}
      .stale=${stale}
      .dragging=${this.dragging}
      .focusedAnswer=${this.focusedAnswer}
      .shown=${this.shown}
      .units=${units}
    ></corelag-answers>`;
  }

  /** Puts the focus on question `index` (from 0), for the keys 1 to 9. */
  goToAnswer(index: number): void {
    this.answers?.goTo(index);
  }

  private keyed(event: KeyboardEvent): void {
    const now = PAGES.findIndex(({ pane }) => pane === this.pane);
    const last = PAGES.length - 1;
    const to = {
      ArrowRight: now === last ? 0 : now + 1,
      ArrowLeft: now === 0 ? last : now - 1,
      Home: 0,
      End: last,
    }[event.key];
    if (to === undefined) return;
    event.preventDefault();
    event.stopPropagation();
    send(this, "corelag-pane", PAGES[to]!.pane);
    void this.updateComplete.then(() =>
      this.renderRoot.querySelector<HTMLElement>(`#word-${PAGES[to]!.pane}`)?.focus(),
    );
  }
}

/** Name of the preset that the first hint offers. */
const SOLVED_EXAMPLE = "tapered-ingot";

declare global {
  interface HTMLElementTagNameMap {
    "corelag-pane": CorelagPane;
  }
}
