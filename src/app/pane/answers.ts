import { LitElement, css, html, nothing } from "lit";
import type { PropertyValues, TemplateResult } from "lit";
import { customElement, property, query, state } from "lit/decorators.js";
import { repeat } from "lit/directives/repeat.js";
import type { CaseDocument, CaseProblem, QuestionDocument } from "../../case/types.ts";
import type { UnitSystem } from "../../case/units.ts";
import { cautionsFor } from "../../report/cautions.ts";
import { verdictOf } from "../../report/verdictOf.ts";
import type { CaseResult, RunFailure } from "../../run/result.ts";
import { temperatureRange } from "../colours.ts";
import "../controls/menu.ts";
import type { CorelagMenu } from "../controls/menu.ts";
import { send, sendEdit } from "../events.ts";
import { icon } from "../icons.ts";
import type { Shown, Status } from "../state.ts";
import { shared } from "../styles/shared.ts";
import { matchAnswers } from "./answer-words.ts";
import "./ask.ts";
import type { AskDeed, CorelagAsk } from "./ask.ts";
import { liftQuestion } from "./lift.ts";
import { OFFERED, newQuestion, siValue } from "./sentences.ts";
import type { Ask } from "./sentences.ts";
import { KEPT, bandOf, failureBand, faultsToTell } from "./verdict-words.ts";
import type { Band } from "./verdict-words.ts";

/**
 * The answers: the verdict, each question with its answer, and what has to be minded. Questions are asked, changed,
 * moved and taken out here.
 *
 * Sends corelag-edit, corelag-rest, corelag-ask, corelag-show and corelag-do (retry).
 */
@customElement("corelag-answers")
export class CorelagAnswers extends LitElement {
  static override styles = [
    shared,
    css`
      :host {
        display: block;
      }
      .faults li {
        padding: 2px 0;
      }
      .faults b {
        color: var(--bad);
      }
      .faults ul {
        padding-left: 28px;
        font-size: var(--t-note);
        line-height: 1.36;
      }
      .verdict .act {
        margin: var(--s-1) 0 0 28px;
      }
      .more-ask {
        padding: var(--s-2) var(--s-4);
      }
      .mind {
        padding: var(--s-3) var(--s-4);
        font-size: var(--t-note);
        line-height: 1.4;
        border-top: 1px solid var(--rule);
      }
      .mind li {
        display: flex;
        gap: var(--s-2);
        padding: 3px 0;
      }
      .mind .icon {
        color: var(--care);
        margin-top: 1px;
      }
      .verdict,
      .mind,
      .more-ask {
        break-inside: avoid;
      }
      corelag-ask.drop-before {
        box-shadow: 0 -2px 0 var(--hand);
      }
      corelag-ask.drop-after {
        box-shadow: 0 2px 0 var(--hand);
      }
      corelag-ask.lifted {
        opacity: 0.55;
      }
      .none {
        padding: var(--s-3) var(--s-4);
        color: var(--ink-2);
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
  @property({ attribute: false }) focusedAnswer: number | null = null;
  @property({ attribute: false }) shown: Shown = { by: "temperature" };
  @property() units: UnitSystem = "si";

  /** result before the running gesture, for "was ..." */
  @state() private was: CaseResult | null = null;
  @query("corelag-menu") private menu!: CorelagMenu | null;

  protected override willUpdate(changed: PropertyValues<this>): void {
    if (changed.has("dragging") && this.dragging) this.was = changed.get("result") ?? this.result;
    if (!this.dragging && !this.stale && this.status === "settled") this.was = null;
  }

  /** The keys 1 to 9 put an answer into focus from anywhere: the focus of the page follows. */
  protected override updated(changed: PropertyValues<this>): void {
    if (!changed.has("focusedAnswer") || this.focusedAnswer === null) return;
    const ask = this.asks()[this.focusedAnswer];
    if (ask !== undefined && !ask.matches(":focus-within")) ask.focus();
  }

  private readonly left = (event: FocusEvent): void => {
    const next = event.relatedTarget;
    if (!(next instanceof Node) || !this.renderRoot.contains(next)) send(this, "corelag-ask", null);
  };

  protected override render(): TemplateResult | typeof nothing {
    if (this.document === null) return nothing;
    const questions = this.document.questions ?? [];
    const answers = matchAnswers(questions, this.result?.answers ?? []);
    const before = matchAnswers(questions, this.was?.answers ?? []);
    const pale = this.result !== null && (this.stale || this.result.quality === "preview");
    return html`${this.band()}${this.faults()}
      ${questions.length === 0 ? html`<p class="none">Nothing is asked yet.</p>` : nothing}
      ${repeat(
        questions,
        (_, index) => index,
        (question, index) =>
          html`<corelag-ask
            .document=${this.document!}
            .question=${question}
            .index=${index}
            .count=${questions.length}
            .answer=${answers[index] ?? null}
            .was=${before[index] ?? null}
            .result=${this.result}
            .problems=${this.problems}
            .units=${this.units}
            .pale=${pale}
            .lit=${this.shown.by === "arrival" ? this.shown.answer === index : this.focusedAnswer === index}
            @focusout=${this.left}
            @deed=${(event: CustomEvent<AskDeed>) => this.deed(index, event.detail)}
            @lift=${(event: CustomEvent<PointerEvent>) => this.lift(index, event.detail)}
          ></corelag-ask>`,
      )}
      <p class="more-ask">
        <button class="act plain" type="button" aria-haspopup="menu" @click=${this.offer}>
          ${icon("add")}Ask something else
        </button>
        <corelag-menu label="Ask something else" .items=${OFFERED} @pick=${this.asked}></corelag-menu>
      </p>
      ${this.mind()}`;
  }

  // --- bands --------------------------------------------------------------------------------------------------------

  private band(): TemplateResult | typeof nothing {
    if (this.failure !== null && this.status === "failed")
      return this.drawBand(failureBand(this.failure), true);
    if (this.status === "waiting" && this.result !== null) return this.drawBand(KEPT);
    if (this.result === null) return nothing;
    return this.drawBand(bandOf(verdictOf(this.result)));
  }

  private drawBand(band: Band, retry = false): TemplateResult {
    const pale = band.tone !== "stale" && (this.stale || this.result?.quality === "preview") && !retry;
    const tone = pale ? `${band.tone} stale` : band.tone;
    const mark = band.tone === "stale" ? "bad" : band.tone;
    // polite, and quiet while the hand moves something
    return html`<div
      class="verdict ${tone}"
      role="status"
      aria-live=${this.dragging || pale ? "off" : "polite"}
    >
      <h2>${icon(mark)}${band.heading}</h2>
      ${band.text === "" ? nothing : html`<p>${band.text}</p>`}
      ${
        retry
          ? html`<button
              class="act"
              type="button"
              @click=${() => send(this, "corelag-do", { kind: "retry" })}
            >
              Work it out again
            </button>`
          : nothing
      }
    </div>`;
  }

  private faults(): TemplateResult | typeof nothing {
    const told = faultsToTell(this.problems);
    if (told.length === 0) return nothing;
    return html`<div class="verdict bad faults" role="status">
      <h2>
        ${icon("bad")}${told.length === 1 ? "This has to be mended as well" : `${told.length} more things have to be mended`}
      </h2>
      <ul>
        ${told.map(({ message, mend, path }) => html`<li title=${path}><b>${message}</b> ${mend}</li>`)}
      </ul>
    </div>`;
  }

  /** Cautions where they bite, under the numbers they belong to. */
  private mind(): TemplateResult | typeof nothing {
    if (this.result === null || this.stale) return nothing;
    const cautions = cautionsFor(this.result);
    if (cautions.length === 0) return nothing;
    return html`<ul class="mind" aria-label="To be minded">
      ${cautions.map((caution) => html`<li>${icon("care")}<span>${caution}</span></li>`)}
    </ul>`;
  }

  // --- asking, moving, taking out -----------------------------------------------------------------------------------

  private offer(event: Event): void {
    this.menu?.show(event.currentTarget as HTMLElement);
  }

  private asked(event: CustomEvent<{ value: string }>): void {
    event.stopPropagation();
    const question = newQuestion(event.detail.value as Ask, this.range(), this.end(), this.units);
    const at = this.document?.questions?.length ?? 0;
    this.change("a further question", (questions) => questions.push(question));
    void this.focusOn(at);
  }

  /** Levels between which a new question may ask: those of the run, else from the start to boiling water. */
  private range(): readonly [number, number] {
    if (this.result !== null) {
      const { from, to } = temperatureRange(this.result);
      return [from, to];
    }
    const start = siValue(this.document?.start, "temperature");
    return Number.isFinite(start) && start > 100 ? [20, start] : [20, 100];
  }

  private end(): number {
    return this.result?.stages.at(-1)?.ended ?? 3600;
  }

  private deed(index: number, deed: AskDeed): void {
    const label = `question ${index + 1}`;
    if (deed === "show") {
      const on = this.shown.by === "arrival" && this.shown.answer === index;
      send(this, "corelag-show", on ? { by: "temperature" } : { by: "arrival", answer: index });
    } else if (deed === "out") {
      this.change(`taking out of ${label}`, (questions) => questions.splice(index, 1));
      void this.focusOn(Math.max(0, index - 1));
    } else this.move(index, deed === "up" ? index - 1 : index + 1);
  }

  private move(from: number, to: number): void {
    const count = this.document?.questions?.length ?? 0;
    if (to < 0 || to >= count || to === from) return;
    this.change(`move of question ${from + 1}`, (questions) => {
      const [moved] = questions.splice(from, 1);
      if (moved !== undefined) questions.splice(to, 0, moved);
    });
    void this.focusOn(to);
  }

  private change(label: string, change: (questions: QuestionDocument[]) => unknown): void {
    sendEdit(this, label, (draft) => {
      draft.questions ??= [];
      change(draft.questions);
    });
    send(this, "corelag-rest", null);
    if (this.shown.by === "arrival") send(this, "corelag-show", { by: "temperature" });
  }

  private async focusOn(index: number): Promise<void> {
    await new Promise(requestAnimationFrame); // the owner hands the changed document down first
    await this.updateComplete;
    this.asks()[index]?.focus();
  }

  /** Puts the focus on question `index`, for the keys 1 to 9. */
  goTo(index: number): void {
    this.asks()[index]?.focus();
  }

  private asks(): CorelagAsk[] {
    return [...this.renderRoot.querySelectorAll("corelag-ask")];
  }

  private lift(index: number, event: PointerEvent): void {
    liftQuestion(this.asks(), index, event, (to) => this.move(index, to));
  }
}

declare global {
  interface HTMLElementTagNameMap {
    "corelag-answers": CorelagAnswers;
  }
}
