import { LitElement, html, nothing } from "lit";
import type { PropertyValues, TemplateResult } from "lit";
import { customElement, property, query, state } from "lit/decorators.js";
import { blankStyle } from "./blank-style.ts";
import { moved, plainNumber, strideOf, withUnit } from "./entry.ts";
import "./menu.ts";
import type { CorelagMenu, MenuItem } from "./menu.ts";

/** What is wrong with an entry and how to mend it, shown below the blank. */
export interface EntryFault {
  readonly message: string;
  readonly mend: string;
}

/** px of travel for one step while a number is scrubbed */
const SCRUB_PIXELS = 5;
/** px before a press becomes a scrub rather than a click */
const SCRUB_DEAD_ZONE = 4;

/**
 * The one control of the page: a word of a sentence that the hand can change.
 *
 * - `kind="number"`: `value` is what stands in the sentence ("1120 °C"); `number` the same in the unit shown, for
 *   arrow keys (Up, Down; Shift ten, Alt a tenth) and for scrubbing left and right; `unit` is put behind a number
 *   that is typed alone, so "450 degF" and "450" may both be typed.
 * - `kind="choice"`: `options`, `value` the chosen option's value.
 * - `kind="words"`: free text.
 *
 * @fires change - CustomEvent<{ raw: string }>: accepted (Enter, leaving the field, end of a scrub, a choice)
 * @fires scrub - CustomEvent<{ raw: string }>: on the way, while arrow keys or a scrub move the number
 * @fires putback - CustomEvent<{ raw: string }>: Esc after a scrub had begun; raw is the entry before it
 */
@customElement("corelag-blank")
export class CorelagBlank extends LitElement {
  static override styles = blankStyle;

  @property() kind: "number" | "choice" | "words" = "number";
  @property() value = "";
  /** name for those who listen, for example "limit of question 2" */
  @property() label = "";
  @property({ attribute: false }) number: number | undefined = undefined;
  /** unit as the case document writes it, put behind a bare number */
  @property() unit = "";
  /** unit as it is shown behind a number that moves */
  @property({ attribute: "unit-shown" }) unitShown = "";
  @property({ type: Number }) step = 1;
  @property({ type: Number }) least = -Infinity;
  @property({ type: Number }) most = Infinity;
  @property({ attribute: false }) options: readonly MenuItem[] = [];
  @property() placeholder = "";
  /** fault that the owner found, for example in the document; shown until the next entry */
  @property({ attribute: false }) fault: EntryFault | null = null;
  /** looked at before an entry is accepted; null accepts */
  @property({ attribute: false }) check: ((raw: string) => EntryFault | null) | null = null;
  @property({ type: Boolean }) quiet = false;
  @property({ type: Boolean, reflect: true }) disabled = false;

  /** what stands in the field while it differs from `value` */
  @state() private draft: string | null = null;
  @state() private ownFault: EntryFault | null = null;
  @state() private open = false;
  @query("input") private field!: HTMLInputElement | null;
  @query("corelag-menu") private menu!: CorelagMenu | null;
  @query("button") private opener!: HTMLButtonElement | null;

  /** number on its way, while keys or a scrub move it */
  private moving: number | null = null;
  private plain = "";
  private press: { x: number; from: number; scrubbing: boolean } | null = null;

  override focus(options?: FocusOptions): void {
    (this.field ?? this.opener)?.focus(options);
  }

  protected override willUpdate(changed: PropertyValues<this>): void {
    if (!changed.has("value") || this.press?.scrubbing) return;
    this.draft = null;
    this.moving = null;
    this.ownFault = null;
  }

  protected override render(): TemplateResult {
    const fault = this.ownFault ?? this.fault;
    return html`${this.kind === "choice" ? this.choice(fault) : this.entry(fault)}${
      fault === null
        ? nothing
        : html`<span class="fault" id="fault" role="alert"><b>${fault.message}</b> ${fault.mend}</span>`
    }`;
  }

  private classes(fault: EntryFault | null, shown: string): string {
    return [
      "blank",
      this.kind,
      this.quiet ? "quiet" : "",
      shown === "" && fault === null ? "empty" : "",
      fault === null ? "" : "faulty",
      this.disabled ? "disabled" : "",
    ].join(" ");
  }

  // --- number and words ---------------------------------------------------------------------------------------------

  private entry(fault: EntryFault | null): TemplateResult {
    const shown = this.draft ?? this.value;
    return html`<span
      class=${this.classes(fault, shown)}
      @pointerdown=${this.pressed}
      @pointermove=${this.dragged}
      @pointerup=${this.released}
      @pointercancel=${this.released}
      ><span class="sizer" aria-hidden="true">${shown === "" ? this.placeholder : shown}</span
      ><input
        part="field"
        .value=${shown}
        size="1"
        type="text"
        autocomplete="off"
        spellcheck="false"
        placeholder=${this.placeholder}
        aria-label=${this.label}
        aria-invalid=${fault === null ? "false" : "true"}
        aria-describedby=${fault === null ? nothing : "fault"}
        ?disabled=${this.disabled}
        @input=${this.typed}
        @change=${this.swallow}
        @focus=${this.entered}
        @blur=${this.accept}
        @keydown=${this.keyed}
        @keyup=${this.keyUp}
    /></span>`;
  }

  private swallow(event: Event): void {
    event.stopPropagation();
  }

  private typed(event: Event): void {
    event.stopPropagation();
    this.draft = (event.target as HTMLInputElement).value;
    this.moving = null;
    this.ownFault = null;
  }

  private entered(event: FocusEvent): void {
    (event.target as HTMLInputElement).select();
  }

  private keyed(event: KeyboardEvent): void {
    if (event.key === "Enter") {
      event.preventDefault();
      this.accept();
      this.field?.select();
    } else if (event.key === "Escape" && this.draft !== null) {
      event.preventDefault();
      event.stopPropagation();
      this.putBack();
    } else if (event.key === "ArrowUp" || event.key === "ArrowDown") {
      this.stepped(event, event.key === "ArrowUp" ? 1 : -1);
    }
    // letters and digits act on the page only outside fields
    if (event.key.length === 1) event.stopPropagation();
  }

  private stepped(event: KeyboardEvent, count: number): void {
    if (this.kind !== "number" || this.number === undefined) return;
    event.preventDefault();
    event.stopPropagation();
    this.moveTo(
      moved(this.moving ?? this.number, count, strideOf(this.step, event), this.least, this.most),
      event,
    );
  }

  private keyUp(event: KeyboardEvent): void {
    if ((event.key === "ArrowUp" || event.key === "ArrowDown") && this.moving !== null) this.accept();
  }

  private moveTo(number: number, keys: { shiftKey: boolean; altKey: boolean }): void {
    const plain = plainNumber(number, strideOf(this.step, keys));
    this.plain = plain;
    this.moving = number;
    this.draft = this.unitShown === "" ? plain : `${plain}\u00a0${this.unitShown}`;
    this.ownFault = null;
    this.tell("scrub", withUnit(plain, this.unit));
  }

  /** Enter, leaving the field, the end of a scrub: the entry goes up if it differs and nothing speaks against it. */
  private accept(): void {
    if (this.draft === null || this.press?.scrubbing) return;
    const raw = withUnit(this.moving === null ? this.draft : this.plain, this.unit);
    if (this.moving === null && this.draft.trim() === this.value.trim()) return this.forget();
    this.ownFault = this.check?.(raw) ?? null;
    if (this.ownFault !== null) return;
    this.forget(); // from here on the owner's value counts
    this.tell("change", raw);
  }

  private putBack(): void {
    const moved = this.moving !== null;
    this.forget();
    if (moved) this.tell("putback", this.value);
    void this.updateComplete.then(() => this.field?.select());
  }

  private forget(): void {
    this.draft = null;
    this.moving = null;
    this.ownFault = null;
  }

  private tell(name: "change" | "scrub" | "putback", raw: string): void {
    this.dispatchEvent(new CustomEvent(name, { detail: { raw }, bubbles: true, composed: true }));
  }

  // --- scrubbing ----------------------------------------------------------------------------------------------------

  private pressed(event: PointerEvent): void {
    if (this.kind !== "number" || this.number === undefined || this.disabled || event.button !== 0) return;
    if (this.shadowRoot?.activeElement === this.field) return; // in the field a drag marks text
    this.press = { x: event.clientX, from: this.moving ?? this.number, scrubbing: false };
    (event.currentTarget as HTMLElement).setPointerCapture(event.pointerId);
    event.preventDefault(); // focus waits for the release, so that a scrub does not open the field
  }

  private dragged(event: PointerEvent): void {
    if (this.press === null) return;
    const travel = event.clientX - this.press.x;
    if (!this.press.scrubbing && Math.abs(travel) < SCRUB_DEAD_ZONE) return;
    this.press.scrubbing = true;
    const count = Math.trunc(travel / SCRUB_PIXELS);
    this.moveTo(moved(this.press.from, count, strideOf(this.step, event), this.least, this.most), event);
  }

  private released(event: PointerEvent): void {
    if (this.press === null) return;
    const scrubbed = this.press.scrubbing;
    this.press = null;
    if (event.type === "pointercancel") this.putBack();
    else if (scrubbed) this.accept();
    else this.field?.focus();
  }

  // --- choice -------------------------------------------------------------------------------------------------------

  private choice(fault: EntryFault | null): TemplateResult {
    const chosen = this.options.find((option) => option.value === this.value);
    const shown = chosen?.label ?? this.value;
    // no space inside the button: it would stand in the sentence
    return html`<button
        class=${this.classes(fault, shown)}
        type="button"
        role="combobox"
        aria-haspopup="listbox"
        aria-expanded=${this.open ? "true" : "false"}
        aria-controls="menu"
        aria-label=${this.label === "" ? nothing : `${this.label}: ${shown}`}
        aria-describedby=${fault === null ? nothing : "fault"}
        ?disabled=${this.disabled}
        @click=${this.show}
        @keydown=${this.choiceKeyed}
      >
        ${shown === "" ? this.placeholder : shown}</button
      ><corelag-menu
        id="menu"
        kind="listbox"
        label=${this.label}
        .items=${this.options}
        .value=${this.value}
        @pick=${this.picked}
        @toggle=${this.toggled}
      ></corelag-menu>`;
  }

  private show(): void {
    if (this.opener !== null) this.menu?.show(this.opener);
  }

  private choiceKeyed(event: KeyboardEvent): void {
    if (event.key !== "ArrowDown" && event.key !== "ArrowUp") return;
    event.preventDefault();
    event.stopPropagation();
    this.show();
  }

  private toggled(event: CustomEvent<{ open: boolean }>): void {
    event.stopPropagation();
    this.open = event.detail.open;
  }

  private picked(event: CustomEvent<{ value: string }>): void {
    event.stopPropagation();
    if (event.detail.value !== this.value) this.tell("change", event.detail.value);
  }
}

declare global {
  interface HTMLElementTagNameMap {
    "corelag-blank": CorelagBlank;
  }
}
