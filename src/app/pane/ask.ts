import { LitElement, html, nothing } from "lit";
import type { TemplateResult } from "lit";
import { customElement, property, query } from "lit/decorators.js";
import type { CaseDocument, CaseProblem, QuestionDocument } from "../../case/types.ts";
import { parseQuantity } from "../../case/units.ts";
import type { Dimension, UnitSystem } from "../../case/units.ts";
import type { Answer, CaseResult } from "../../run/result.ts";
import "../controls/blank.ts";
import type { EntryFault } from "../controls/blank.ts";
import "../controls/calliper.ts";
import "../controls/menu.ts";
import type { CorelagMenu, MenuItem } from "../controls/menu.ts";
import { send, sendEdit } from "../events.ts";
import { icon } from "../icons.ts";
import { shared } from "../styles/shared.ts";
import { doubtOnCalliper, estimateLines, figureOf, onCalliper, wasWords, whereLine } from "./answer-words.ts";
import type { EstimateLine } from "./answer-words.ts";
import { askStyle } from "./ask-style.ts";
import { entryScale, plainSentence, sentenceOf, settingOf, shownText, withField } from "./sentences.ts";
import type { Choice, Entry, Piece } from "./sentences.ts";
import { faultOf } from "./verdict-words.ts";

/** What a question does beside being answered; the list of the pane carries it out. */
export type AskDeed = "up" | "down" | "out" | "show";

/**
 * One question as a sentence with blanks, and its answer: value, doubt, place, the picture of the doubt, what each
 * quick estimate says.
 *
 * @fires corelag-edit - a blank was changed
 * @fires corelag-ask - the question has the focus
 * @fires deed - CustomEvent<AskDeed>: move up or down, take out, show the arrival in the section
 * @fires lift - CustomEvent<PointerEvent>: the balloon was taken, to move the question among the others
 */
@customElement("corelag-ask")
export class CorelagAsk extends LitElement {
  static override styles = [shared, askStyle];

  @property({ attribute: false }) document!: CaseDocument;
  @property({ attribute: false }) question!: QuestionDocument;
  /** number of the question, from 0, and how many there are */
  @property({ type: Number }) index = 0;
  @property({ type: Number }) count = 1;
  @property({ attribute: false }) answer: Answer | null = null;
  @property({ attribute: false }) was: Answer | null = null;
  @property({ attribute: false }) result: CaseResult | null = null;
  @property({ attribute: false }) problems: readonly CaseProblem[] = [];
  @property() units: UnitSystem = "si";
  @property({ type: Boolean }) pale = false;
  @property({ type: Boolean, reflect: true }) lit = false;
  @query("corelag-menu") private menu!: CorelagMenu | null;
  @query("article") private article!: HTMLElement | null;

  /** Puts the focus on the question itself. */
  override focus(options?: FocusOptions): void {
    this.article?.focus(options);
  }

  protected override render(): TemplateResult {
    const pieces = sentenceOf(this.question, settingOf(this.document, this.units));
    const words = plainSentence(pieces, this.units);
    return html`<article
      class="ask ${this.pale ? "pale" : ""}"
      tabindex="0"
      aria-label="Question ${this.index + 1}: ${words}"
      @focusin=${() => send(this, "corelag-ask", this.index)}
      @keydown=${this.keyed}
    >
      <h3>
        <i
          class="ball ${this.lit ? "lit" : ""}"
          title="Drag to move this question"
          @pointerdown=${(event: PointerEvent) => this.dispatchEvent(new CustomEvent("lift", { detail: event }))}
          >${this.index + 1}</i
        ><span class="sentence">${this.sentence(pieces)}</span>
        <button
          class="tool more"
          type="button"
          aria-haspopup="menu"
          aria-label="More for question ${this.index + 1}"
          @click=${this.openMenu}
        >
          ${icon("more")}
        </button>
        <corelag-menu
          label="Question ${this.index + 1}"
          .items=${this.deeds()}
          @pick=${this.picked}
        ></corelag-menu>
      </h3>
      ${this.answered()}
    </article>`;
  }

  // --- the sentence -------------------------------------------------------------------------------------------------

  /** The last blank and the question mark stay together. */
  private sentence(pieces: readonly Piece[]): unknown[] {
    const drawn = pieces.map((piece) => this.piece(piece));
    return [...drawn.slice(0, -2), html`<span class="tail">${drawn.slice(-2)}</span>`];
  }

  private piece(piece: Piece): TemplateResult | string {
    if (typeof piece === "string") return piece;
    return piece.kind === "choice" ? this.choice(piece) : this.entry(piece);
  }

  private label(piece: Choice | Entry): string {
    return `${piece.label}, question ${this.index + 1}`;
  }

  private choice(piece: Choice): TemplateResult {
    return html`<corelag-blank
      kind="choice"
      label=${this.label(piece)}
      .value=${piece.value}
      .options=${piece.options}
      .quiet=${piece.quiet}
      .fault=${this.fault(piece.field)}
      @change=${(event: CustomEvent<{ raw: string }>) => this.set(piece, event.detail.raw)}
    ></corelag-blank>`;
  }

  private entry(piece: Entry): TemplateResult {
    const scale = entryScale(piece, this.units);
    return html`<corelag-blank
      kind="number"
      label=${this.label(piece)}
      .value=${shownText(piece, this.units)}
      .number=${scale.number}
      .unit=${scale.unit}
      .unitShown=${scale.unit}
      .step=${scale.step}
      .least=${scale.least}
      .fault=${this.fault(piece.field)}
      .check=${(raw: string) => checked(raw, piece)}
      @scrub=${(event: CustomEvent<{ raw: string }>) => this.set(piece, event.detail.raw, true)}
      @change=${(event: CustomEvent<{ raw: string }>) => this.accept(piece, event.detail.raw)}
      @putback=${() => send(this, "corelag-back", null)}
    ></corelag-blank>`;
  }

  private fault(field: string): EntryFault | null {
    return faultOf(this.problems, this.index, field);
  }

  private accept(piece: Entry, raw: string): void {
    this.set(piece, raw === piece.otherwise ? "" : raw);
    send(this, "corelag-rest", null);
  }

  private set(piece: Choice | Entry, raw: string, moving = false): void {
    const { index } = this;
    const gesture = piece.kind === "entry" ? `question-${index}-${piece.field}` : undefined;
    const recipe = (draft: CaseDocument): void => {
      const question = draft.questions?.[index];
      if (question !== undefined) draft.questions![index] = withField({ ...question }, piece.field, raw);
    };
    sendEdit(this, `${piece.label} of question ${index + 1}`, recipe, gesture);
    if (!moving && piece.kind === "choice") send(this, "corelag-rest", null);
  }

  // --- the answer ---------------------------------------------------------------------------------------------------

  private answered(): TemplateResult {
    const { answer } = this;
    if (answer === null)
      return html`<p class="answer waiting"><output aria-label="not worked out yet">&nbsp;</output></p>`;
    if (answer.value === null)
      return html`<p class="remark">${answer.remark || "The run does not contain the answer."}</p>`;
    const { text, doubt } = figureOf(answer.unit, answer.value, answer.numericalUncertainty, this.units);
    const was = wasWords(answer, this.was, this.units);
    const place = was === "" ? whereLine(answer, this.result?.stages ?? [], this.units) : was;
    return html`<p class="answer">
        <output>${text}</output><span class="pm">${doubt}</span><span class="where">${place}</span>
      </p>
      ${answer.remark === "" ? nothing : html`<p class="remark">${answer.remark}</p>`}
      ${this.calliper(answer)} ${this.estimates(answer)}`;
  }

  private calliper(answer: Answer): TemplateResult | typeof nothing {
    if (answer.lumped === null && answer.series === null) return nothing;
    const { unit, comparison } = answer;
    return html`<corelag-calliper
      kind=${unit === "s" ? "time" : "number"}
      .value=${onCalliper(unit, answer.value, this.units)}
      .doubt=${doubtOnCalliper(unit, answer.value ?? 0, answer.numericalUncertainty, this.units)}
      .lumped=${onCalliper(unit, answer.lumped, this.units)}
      .series=${onCalliper(unit, answer.series, this.units)}
      .lumpedUnsafe=${comparison.lumped?.side === "unsafe"}
      .seriesUnsafe=${comparison.series?.side === "unsafe"}
    ></corelag-calliper>`;
  }

  private estimates(answer: Answer): TemplateResult | typeof nothing {
    const estimates = this.result?.estimates;
    if (estimates === undefined) return nothing;
    const lines = estimateLines(answer, estimates.series, estimates.lumped !== null, this.units);
    if (lines.every((line) => line.value === "") && this.question.ask === "heat") return nothing;
    return html`<ul class="says-also">
      ${lines.map((line) => this.line(line))}
    </ul>`;
  }

  private line({ habit, name, value, verdict, unsafe }: EstimateLine): TemplateResult {
    const told = unsafe ? html`<em class="bad">${verdict}</em>` : verdict;
    const tip = unsafe ? "on the unsafe side" : nothing;
    return html`<li class="k-${habit}">
      <span>${name}</span
      ><span class="told" title=${tip}
        >${value}${told}${unsafe ? html`<span class="heard">, on the unsafe side</span>` : nothing}</span
      >
    </li>`;
  }

  // --- deeds --------------------------------------------------------------------------------------------------------

  private deeds(): MenuItem[] {
    return [
      ...(this.question.ask === "when"
        ? [{ value: "show", label: "Show when each point gets there", note: "A" }]
        : []),
      { value: "up", label: "Move up", note: "Alt \u2191", disabled: this.index === 0 },
      { value: "down", label: "Move down", note: "Alt \u2193", disabled: this.index === this.count - 1 },
      { value: "out", label: "Take this question out", note: "Delete", parted: true },
    ];
  }

  private openMenu(event: Event): void {
    this.menu?.show(event.currentTarget as HTMLElement);
  }

  private picked(event: CustomEvent<{ value: string }>): void {
    event.stopPropagation();
    this.do(event.detail.value as AskDeed);
  }

  private do(deed: AskDeed): void {
    this.dispatchEvent(new CustomEvent<AskDeed>("deed", { detail: deed }));
  }

  /** Keys of the question itself: they never act while one of its blanks is being typed into. */
  private keyed(event: KeyboardEvent): void {
    if (event.composedPath()[0] !== this.article || event.ctrlKey || event.metaKey) return;
    const deed: AskDeed | undefined = event.altKey
      ? ({ ArrowUp: "up", ArrowDown: "down" } as const)[event.key]
      : ({ Delete: "out", a: "show", A: "show" } as const)[event.key];
    if (deed === undefined || (deed === "show" && this.question.ask !== "when")) return;
    event.preventDefault();
    event.stopPropagation();
    this.do(deed);
  }
}

/** What speaks against an entry; a field that may be left out may be emptied. */
function checked(raw: string, piece: { dimension: Dimension; otherwise?: string }): EntryFault | null {
  if (piece.otherwise !== undefined && (raw === "" || raw === piece.otherwise)) return null;
  const read = parseQuantity(raw, piece.dimension);
  return "fault" in read ? read.fault : null;
}

declare global {
  interface HTMLElementTagNameMap {
    "corelag-ask": CorelagAsk;
  }
}
