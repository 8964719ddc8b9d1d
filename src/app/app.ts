/** The page: the grid of head, section, treatment and pane; the only element that holds and changes the state. */
import { computed, effect } from "@preact/signals-core";
import { LitElement, html, nothing } from "lit";
import type { TemplateResult } from "lit";
import { customElement, query, state } from "lit/decorators.js";
import { BUNDLED_CASE, CASES } from "../../presets/cases/index.ts";
import { LIBRARY } from "../../presets/materials/index.ts";
import { readCase } from "../case/readCase.ts";
import type { CaseDocument } from "../case/types.ts";
import { buildProfile } from "../profile/buildProfile.ts";
import type { Profile } from "../profile/types.ts";
import { appStyle } from "./appStyle.ts";
import type { Deed, EventDetails } from "./events.ts";
import { download } from "./download.ts";
import { Follow } from "./follow.ts";
import type { CorelagHead } from "./head/head.ts";
import { icon } from "./icons.ts";
import { keep, readKept } from "./keeping.ts";
import { pageKeys } from "./keys.ts";
import type { CorelagKeys } from "./keysSheet.ts";
import { openText, isStandable, saveDocument } from "./opening.ts";
import { stem } from "./pane/files.ts";
import type { CorelagSection } from "./section/section.ts";
import { Solving } from "./solving.ts";
import { AppState } from "./state.ts";
import { shared } from "./styles/shared.ts";
import "./head/head.ts";
import "./keysSheet.ts";
import "./pane/pane.ts";
import "./section/section.ts";
import "./start/start.ts";
import "./strip/strip.ts";

const DARK = "(prefers-color-scheme: dark)";

@customElement("corelag-app")
export class CorelagApp extends LitElement {
  static override styles = [shared, appStyle];

  readonly state = new AppState();
  @state() private kept: boolean | null = null;
  @state() private darkSystem = matchMedia(DARK).matches;
  @state() private dropping = false;
  @query("corelag-head") private head!: CorelagHead;
  @query("corelag-section") private section!: CorelagSection;
  @query("corelag-keys") private keys!: CorelagKeys;

  readonly #profile = computed(() => profileOf(this.state.document.value));
  readonly #profileEarlier = computed(() => profileOf(this.state.before.value));
  #solving: Solving | null = null;
  #stop: (() => void)[] = [];
  #saving: ReturnType<typeof setTimeout> | undefined;

  readonly follow = new Follow(this, () => {
    const s = this.state;
    for (const value of [
      s.document,
      s.before,
      s.problems,
      s.result,
      s.status,
      s.progress,
      s.failure,
      s.dragging,
      s.cursor,
      s.selection,
      s.focusedAnswer,
      s.shown,
      s.units,
      s.theme,
      s.pane,
      s.meshShown,
      s.message,
      s.undoLabel,
      s.redoLabel,
      s.stale,
    ])
      void value.value;
  });

  override connectedCallback(): void {
    super.connectedCallback();
    this.#restore();
    this.#solving = new Solving(this.state, LIBRARY);
    const system = matchMedia(DARK);
    const themed = (): void => void (this.darkSystem = system.matches);
    system.addEventListener("change", themed);
    this.#stop = [
      effect(() => this.#autosave()),
      effect(() => {
        globalThis.document.title = this.state.document.value?.title
          ? `Corelag: ${this.state.document.value.title}`
          : "Corelag";
      }),
      () => system.removeEventListener("change", themed),
      pageKeys(this),
    ];
    this.#listen();
  }

  override disconnectedCallback(): void {
    super.disconnectedCallback();
    this.#solving?.close();
    for (const stop of this.#stop) stop();
  }

  protected override willUpdate(): void {
    globalThis.document.documentElement.dataset["theme"] = this.theme;
  }

  get theme(): "light" | "dark" {
    const chosen = this.state.theme.value;
    return chosen === "system" ? (this.darkSystem ? "dark" : "light") : chosen;
  }

  // --- what is on the sheet ---------------------------------------------------------------------------------------------

  #restore(): void {
    const kept = readKept();
    const { state: s } = this;
    if (kept?.units === "us") s.units.value = "us";
    if (kept?.theme === "light" || kept?.theme === "dark") s.theme.value = kept.theme;
    if (kept && kept.document === null) return;
    if (kept && isStandable(kept.document)) {
      s.open(kept.document);
      if (typeof kept.cursor === "number") s.cursor.value = kept.cursor;
    } else this.#preset("");
  }

  #autosave(): void {
    const { state: s } = this;
    const kept = {
      document: s.document.value,
      cursor: s.cursor.value,
      units: s.units.value,
      theme: s.theme.value,
    };
    clearTimeout(this.#saving);
    this.#saving = setTimeout(() => {
      const stored = keep(kept);
      this.kept = kept.document === null ? null : stored;
    }, 300);
  }

  #preset(name: string): void {
    const found = CASES.find((each) => each.id === name) ?? BUNDLED_CASE;
    this.state.open(structuredClone(found.document));
  }

  #read(text: string, name: string): void {
    const opened = openText(text, name, LIBRARY);
    if ("document" in opened) {
      this.state.open(opened.document);
      this.state.message.value = "";
    } else this.state.message.value = opened.refused;
  }

  // --- events -----------------------------------------------------------------------------------------------------------

  #listen(): void {
    const { state: s } = this;
    const on = <Name extends keyof EventDetails>(
      name: Name,
      act: (detail: EventDetails[Name]) => void,
    ): void =>
      this.addEventListener(name as keyof HTMLElementEventMap, (event) =>
        act((event as CustomEvent<EventDetails[Name]>).detail),
      );
    on("corelag-edit", ({ label, recipe, gesture }) =>
      s.edit(label, recipe, gesture === undefined ? {} : { gesture }),
    );
    on("corelag-rest", () => s.rest());
    on("corelag-back", () => s.back());
    on("corelag-cursor", (time) => void (s.cursor.value = time));
    on("corelag-select", (selection) => void (s.selection.value = selection));
    on("corelag-ask", (answer) => void (s.focusedAnswer.value = answer));
    on("corelag-show", (shown) => void (s.shown.value = shown));
    on("corelag-pane", (pane) => void (s.pane.value = pane));
    on("corelag-units", (units) => void (s.units.value = units));
    on("corelag-theme", (theme) => void (s.theme.value = theme));
    on("corelag-do", (deed) => this.perform(deed));
    on("corelag-mesh", (shown) => void (s.meshShown.value = shown));
  }

  /** The section as it stands, as a PNG. */
  async #savePicture(): Promise<void> {
    try {
      download(await this.section.picture(), `${stem(this.state.document.value?.title ?? "")}.png`);
    } catch (error) {
      this.state.message.value = `The picture could not be made: ${error instanceof Error ? error.message : String(error)}.`;
    }
  }

  perform(deed: Deed): void {
    const { state: s } = this;
    switch (deed.kind) {
      case "undo":
        return s.undo();
      case "redo":
        return s.redo();
      case "open":
        return this.head.pickFile();
      case "save":
        if (s.document.value) saveDocument(s.document.value);
        return;
      case "picture":
        return void this.#savePicture();
      case "new":
        return s.clear();
      case "retry":
        return this.#solving?.retry();
      case "keys":
        return this.keys.show();
      case "read":
        return this.#read(deed.text, deed.name);
      case "begin":
        return s.open(deed.document);
      case "preset":
        return this.#preset(deed.name);
    }
  }

  readonly #over = (event: DragEvent): void => {
    if (!event.dataTransfer?.types.includes("Files")) return;
    event.preventDefault();
    this.dropping = true;
  };

  readonly #drop = async (event: DragEvent): Promise<void> => {
    event.preventDefault();
    this.dropping = false;
    const [file] = event.dataTransfer?.files ?? [];
    if (file) this.#read(await file.text(), file.name);
  };

  // --- drawing ----------------------------------------------------------------------------------------------------------

  protected override render(): TemplateResult {
    const empty = this.state.document.value === null;
    return html`
      <div
        class="app ${empty ? "empty" : ""} ${this.dropping ? "dropping" : ""}"
        @dragover=${this.#over}
        @dragleave=${() => (this.dropping = false)}
        @drop=${this.#drop}
      >
        ${this.#head()}
        <main aria-label="Section">
          ${empty ? html`<corelag-start .units=${this.state.units.value} .library=${LIBRARY}></corelag-start>` : this.#section()}
        </main>
        ${this.#strip()}${this.#pane()}${this.#notice()}
        <corelag-keys></corelag-keys>
      </div>
    `;
  }

  #head(): TemplateResult {
    const { state: s } = this;
    const document = s.document.value;
    return html`<corelag-head
      .caseTitle=${document === null ? null : (document.title ?? "")}
      .status=${s.status.value}
      .progress=${s.progress.value}
      .uncertainty=${s.result.value?.run.temperatureUncertainty ?? null}
      .faults=${s.problems.value.length}
      .outlineFaulty=${s.problems.value.some((problem) => problem.path.startsWith("part.regions"))}
      .dragging=${s.dragging.value}
      .undoLabel=${s.undoLabel.value}
      .redoLabel=${s.redoLabel.value}
      .units=${s.units.value}
      .theme=${s.theme.value}
      .kept=${this.kept}
      .cases=${CASES.map(({ id, document: { title } }) => ({ name: id, title: title ?? id }))}
    ></corelag-head>`;
  }

  #section(): TemplateResult {
    const { state: s } = this;
    return html`<corelag-section
      .document=${s.document.value}
      .earlier=${s.before.value}
      .result=${s.result.value}
      .profile=${this.#profile.value}
      .profileEarlier=${this.#profileEarlier.value}
      .problems=${s.problems.value}
      .status=${s.status.value}
      .dragging=${s.dragging.value}
      .cursor=${s.cursor.value}
      .meshShown=${s.meshShown.value}
      .selection=${s.selection.value}
      .focusedAnswer=${s.focusedAnswer.value}
      .shown=${s.shown.value}
      .units=${s.units.value}
      .theme=${this.theme}
      .undoLabel=${s.undoLabel.value}
      .library=${LIBRARY}
    ></corelag-section>`;
  }

  #strip(): TemplateResult {
    const { state: s } = this;
    return html`<corelag-strip
      .document=${s.document.value}
      .result=${s.result.value}
      .status=${s.status.value}
      .stale=${s.stale.value}
      .dragging=${s.dragging.value}
      .cursor=${s.cursor.value}
      .selection=${s.selection.value}
      .focusedAnswer=${s.focusedAnswer.value}
      .shown=${s.shown.value}
      .units=${s.units.value}
    ></corelag-strip>`;
  }

  #pane(): TemplateResult {
    const { state: s } = this;
    return html`<corelag-pane
      .document=${s.document.value}
      .result=${s.result.value}
      .problems=${s.problems.value}
      .failure=${s.failure.value}
      .status=${s.status.value}
      .stale=${s.stale.value}
      .dragging=${s.dragging.value}
      .cursor=${s.cursor.value}
      .selection=${s.selection.value}
      .focusedAnswer=${s.focusedAnswer.value}
      .shown=${s.shown.value}
      .units=${s.units.value}
      .pane=${s.pane.value}
      .meshShown=${s.meshShown.value}
    ></corelag-pane>`;
  }

  #notice(): TemplateResult {
    const message = this.state.message.value;
    return html`<div class="notice" role="status">
      ${
        message === ""
          ? nothing
          : html`${icon("care")}<span>${message}</span>
              <button class="act" @click=${() => (this.state.message.value = "")}>Close</button>`
      }
    </div>`;
  }
}

/** The profile of a document that can be read; null for one that cannot. */
function profileOf(document: CaseDocument | null): Profile | null {
  const read = document && readCase(document, LIBRARY);
  return read && "case" in read ? buildProfile(read.case) : null;
}

declare global {
  interface HTMLElementTagNameMap {
    "corelag-app": CorelagApp;
  }
}
