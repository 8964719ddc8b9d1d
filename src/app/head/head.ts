/** The head: name of the case, how far the sums are, undo, units, files. */
import { LitElement, html, nothing, svg } from "lit";
import type { TemplateResult } from "lit";
import { customElement, property, query, state } from "lit/decorators.js";
import type { UnitSystem } from "../../case/units.ts";
import { difference } from "../controls/figures.ts";
import "../controls/blank.ts";
import "../controls/menu.ts";
import type { CorelagMenu, MenuItem } from "../controls/menu.ts";
import { send, sendEdit } from "../events.ts";
import type { Deed } from "../events.ts";
import { icon } from "../icons.ts";
import type { Progress, Status, Theme } from "../state.ts";
import { shared } from "../styles/shared.ts";
import { headStyle } from "./headStyle.ts";

/** A case that comes with the page. */
export interface CaseChoice {
  readonly name: string;
  readonly title: string;
}

@customElement("corelag-head")
export class CorelagHead extends LitElement {
  static override styles = [shared, headStyle];

  /** title of the case; null while nothing lies on the sheet */
  @property({ attribute: false }) caseTitle: string | null = null;
  @property() status: Status = "empty";
  @property({ attribute: false }) progress: Progress | null = null;
  /** K; null when not known yet */
  @property({ attribute: false }) uncertainty: number | null = null;
  /** number of faults of the document, and whether one of them is in the outline */
  @property({ type: Number }) faults = 0;
  @property({ type: Boolean }) outlineFaulty = false;
  @property({ type: Boolean }) dragging = false;
  @property({ attribute: false }) undoLabel: string | null = null;
  @property({ attribute: false }) redoLabel: string | null = null;
  @property() units: UnitSystem = "si";
  @property() theme: Theme = "system";
  /** whether the case is kept on this machine; null while there is nothing to keep */
  @property({ attribute: false }) kept: boolean | null = null;
  @property({ attribute: false }) cases: readonly CaseChoice[] = [];

  @state() private menuOpen = false;
  @query("corelag-menu") private menu!: CorelagMenu;
  @query("input[type=file]") private file!: HTMLInputElement;

  /** Opens the file picker. */
  pickFile(): void {
    this.file.click();
  }

  protected override render(): TemplateResult {
    return html`
      <header>
        ${icon("mark")}<span class="name">Corelag</span>
        <h1 class="title">
          ${
            this.caseTitle === null
              ? "New part"
              : html`<corelag-blank
                  kind="words"
                  quiet
                  label="title of the case"
                  placeholder="no title"
                  .value=${this.caseTitle}
                  @change=${this.#rename}
                ></corelag-blank>`
          }
        </h1>
        ${
          this.kept === null
            ? nothing
            : html`<span class="kept"
                >${this.kept ? "kept on this machine" : "not kept: this browser keeps nothing"}</span
              >`
        }
        <span class="space"></span>
        ${this.#statusLine()}
        <span class="group" role="group" aria-label="Undo and redo">
          ${this.#tool("undo", this.undoLabel === null ? "Undo" : `Undo: ${this.undoLabel}`, { kind: "undo" }, this.undoLabel === null)}
          ${this.#tool("redo", this.redoLabel === null ? "Redo" : `Redo: ${this.redoLabel}`, { kind: "redo" }, this.redoLabel === null)}
        </span>
        <span class="pick" role="group" aria-label="Units"
          >${this.#unit("si", "mm °C")}${this.#unit("us", "in °F")}</span
        >
        <span class="group files">
          ${this.#tool("open", "Open a case", { kind: "open" })}
          ${this.#tool("save", "Save the case to a file", { kind: "save" }, this.caseTitle === null)}
          <button
            class="tool more"
            title="More"
            aria-label="More"
            aria-haspopup="menu"
            aria-expanded=${this.menuOpen}
            @click=${(event: Event) => this.menu.show(event.currentTarget as HTMLElement)}
          >
            ${icon("more")}
          </button>
        </span>
        <corelag-menu
          label="More"
          .items=${this.#items()}
          @pick=${this.#pick}
          @toggle=${this.#toggled}
        ></corelag-menu>
        <input
          type="file"
          accept=".json,application/json"
          hidden
          aria-label="Case file"
          @change=${this.#chosen}
        />
      </header>
    `;
  }

  #tool(
    name: "undo" | "redo" | "open" | "save",
    label: string,
    deed: Deed,
    disabled = false,
  ): TemplateResult {
    return html`<button
      class="tool"
      title=${label}
      aria-label=${label}
      ?disabled=${disabled}
      @click=${() => send(this, "corelag-do", deed)}
    >
      ${icon(name)}
    </button>`;
  }

  #unit(units: UnitSystem, words: string): TemplateResult {
    return html`<button
      aria-pressed=${this.units === units}
      @click=${() => send(this, "corelag-units", units)}
    >
      ${words}
    </button>`;
  }

  readonly #rename = (event: CustomEvent<{ raw: string }>): void => {
    const title = event.detail.raw.trim();
    sendEdit(this, "title", (draft) => {
      draft.title = title;
    });
  };

  // --- status ---------------------------------------------------------------------------------------------------------

  #statusLine(): TemplateResult {
    const [words, figure] = this.#statusWords();
    const stale = this.status === "preview" || this.status === "waiting" || this.status === "failed";
    return html`<p
      class="status ${this.status} ${stale && this.caseTitle !== null ? "stale" : ""}"
      role="status"
      aria-live=${this.dragging ? "off" : "polite"}
    >
      ${jaws()}<span>${words}${figure === "" ? nothing : html`, <b>${figure}</b>`}</span>
      ${
        this.progress && this.status !== "settled"
          ? html`<i
              class="done"
              style="transform:scaleX(${this.progress.fraction.toFixed(3)})"
              aria-hidden="true"
            ></i>`
          : nothing
      }
    </p>`;
  }

  #statusWords(): readonly [words: string, figure: string] {
    const doubt = this.uncertainty === null ? "" : difference(0, this.units, this.uncertainty).doubt;
    switch (this.status) {
      case "empty":
        return ["nothing to work out yet", ""];
      case "preview":
        return ["preview", doubt];
      case "settling":
        return ["settling", doubt];
      case "settled":
        return ["settled", doubt];
      case "waiting":
        return [
          this.outlineFaulty
            ? "waiting for a sound outline"
            : this.faults === 1
              ? "waiting: one fault"
              : `waiting: ${this.faults} faults`,
          "",
        ];
      case "failed":
        return ["stopped", ""];
    }
  }

  // --- more -----------------------------------------------------------------------------------------------------------

  #items(): MenuItem[] {
    const theme = (value: Theme, label: string): MenuItem => ({
      value: `theme:${value}`,
      label,
      ...(this.theme === value && { note: "now" }),
      ...(value === "light" && { parted: true }),
    });
    return [
      { value: "new", label: "New part" },
      ...(window.innerWidth <= 760 ? this.#narrowItems() : []),
      ...this.cases.map(({ name, title }, i): MenuItem => ({
        value: `case:${name}`,
        label: title,
        ...(i === 0 && { parted: true }),
      })),
      theme("light", "Light sheet"),
      theme("dark", "Dark sheet"),
      theme("system", "As the system"),
      { value: "keys", label: "Keys", note: "?", parted: true },
    ];
  }

  /** What a narrow head has no room for. */
  #narrowItems(): MenuItem[] {
    return [
      { value: "open", label: "Open a case" },
      { value: "save", label: "Save the case", disabled: this.caseTitle === null },
      { value: "units", label: this.units === "si" ? "Inches and °F" : "Millimetres and °C" },
    ];
  }

  readonly #pick = (event: CustomEvent<{ value: string }>): void => {
    event.stopPropagation();
    const { value } = event.detail;
    const [kind, rest = ""] = value.split(/:(.*)/su);
    if (kind === "theme") send(this, "corelag-theme", rest as Theme);
    else if (kind === "case") send(this, "corelag-do", { kind: "preset", name: rest });
    else if (kind === "units") send(this, "corelag-units", this.units === "si" ? "us" : "si");
    else if (kind === "keys" || kind === "open" || kind === "save" || kind === "new")
      send(this, "corelag-do", { kind });
  };

  readonly #toggled = (event: CustomEvent<{ open: boolean }>): void => {
    event.stopPropagation();
    this.menuOpen = event.detail.open;
  };

  readonly #chosen = async (): Promise<void> => {
    const [file] = this.file.files ?? [];
    if (!file) return;
    const text = await file.text();
    this.file.value = "";
    send(this, "corelag-do", { kind: "read", text, name: file.name });
  };
}

/** The jaws: they stand open while previewing, close while settling, are shut when settled. Moved by the style. */
function jaws(): TemplateResult {
  return html`<svg class="icon jaws" viewBox="0 0 20 20" aria-hidden="true">
    ${svg`<path d="M0 16h20" class="thin"></path><path class="left" d="M8.700 16V4H5v3"></path><path class="right" d="M11.300 16V4H15v3"></path><path class="work solid" d="M9 12h2v2H9z"></path>`}
  </svg>`;
}

declare global {
  interface HTMLElementTagNameMap {
    "corelag-head": CorelagHead;
  }
}
