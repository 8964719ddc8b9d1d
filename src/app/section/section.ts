/**
 * The section: field, outline and everything that can be taken on it, between two graduated scales. It draws what it
 * is given and sends what the hand does; it works out nothing of the physics.
 */
import { LitElement, html, nothing } from "lit";
import type { PropertyValues, TemplateResult } from "lit";
import { customElement, property, query, state } from "lit/decorators.js";
import type { MaterialLibrary } from "../../case/library.ts";
import type { CaseDocument, CaseProblem } from "../../case/types.ts";
import type { UnitSystem } from "../../case/units.ts";
import { NOTHING, sameSelection } from "../../editor/selection.ts";
import type { Selection } from "../../editor/selection.ts";
import type { Profile } from "../../profile/types.ts";
import type { CaseResult } from "../../run/result.ts";
import { parseColour, readStops } from "../colours.ts";
import type { Rgb } from "../colours.ts";
import { send } from "../events.ts";
import type { Shown, Status } from "../state.ts";
import { drawing, shared } from "../styles/shared.ts";
import { captionSentence } from "./caption.ts";
import { BIG_BOARD, BoardDrawing } from "./boardDrawing.ts";
import { BoardHand } from "./boardHand.ts";
import type { Mode } from "./boardHand.ts";
import { BoardKeys } from "./boardKeys.ts";
import { MeshOverlay } from "./meshOverlay.ts";
import { Painter, PLAIN_WORDS } from "./painter.ts";
import { PICTURE_RATIO, sectionPicture } from "./picture.ts";
import { readoutOf, sceneSentence } from "./readout.ts";
import { SceneKeeper, sceneValueAt } from "./scene.ts";
import type { Scene } from "./scene.ts";
import { sectionStyle } from "./sectionStyle.ts";
import { readSheet, sheetPlaces } from "./sheet.ts";
import type { Sheet } from "./sheet.ts";
import { placeOfSelection } from "./thread.ts";
import { MODE_WORDS, sectionTools } from "./tools.ts";
import { boundsOf } from "./view.ts";
import type { Bounds, View } from "./view.ts";
import { BoardView } from "./boardView.ts";
import type { BoardRoom } from "./boardView.ts";
import "./facts.ts";
import "./mend.ts";
import "./tag.ts";
import type { CorelagTag } from "./tag.ts";

/** Up to this width of the window the tag stands under the section [px]. */
const NARROW = 760;

@customElement("corelag-section")
export class CorelagSection extends LitElement {
  static override styles = [shared, drawing, sectionStyle];

  @property({ attribute: false }) document: CaseDocument | null = null;
  /** the document before the running gesture */
  @property({ attribute: false }) earlier: CaseDocument | null = null;
  @property({ attribute: false }) result: CaseResult | null = null;
  @property({ attribute: false }) profile: Profile | null = null;
  @property({ attribute: false }) profileEarlier: Profile | null = null;
  @property({ attribute: false }) problems: readonly CaseProblem[] = [];
  @property() status: Status = "empty";
  @property({ type: Boolean }) dragging = false;
  @property({ type: Number }) cursor = 0;
  @property({ attribute: false }) selection: Selection = NOTHING;
  @property({ attribute: false }) focusedAnswer: number | null = null;
  @property({ attribute: false }) shown: Shown = { by: "temperature" };
  @property() units: UnitSystem = "si";
  @property() theme: "light" | "dark" = "light";
  @property({ attribute: false }) undoLabel: string | null = null;
  @property({ attribute: false }) library: MaterialLibrary = {};
  /** the mesh is laid over the field */
  @property({ type: Boolean }) meshShown = false;

  @state() private step: number | null = null;
  @state() mode: Mode = "take";
  /** pointer on the board [px] */
  @state() pointer: readonly [number, number] | null = null;
  @query(".board") board!: HTMLElement;
  @query("svg.lines") lines!: SVGSVGElement;
  @query("corelag-tag") tag!: CorelagTag | null;

  sheet: Sheet = { loops: [], probes: [] };
  bounds: Bounds = boundsOf([]);
  readonly hand = new BoardHand(this);
  readonly keys = new BoardKeys(this);
  readonly #keeper = new SceneKeeper();
  #painter: Painter | undefined;
  #overlay: MeshOverlay | undefined;
  #stops: readonly Rgb[] = [];
  #size = { width: 0, height: 0 };
  #observer = new ResizeObserver(() => this.#resized());
  readonly #drawing = new BoardDrawing(this);
  readonly #holder = new BoardView(() => this.requestUpdate());
  /** what the field was last painted from */
  #painted: readonly unknown[] = [];
  override disconnectedCallback(): void {
    super.disconnectedCallback();
    this.#observer.disconnect();
    this.#painter?.close();
    this.#painter = undefined;
    this.#holder.stop();
  }

  protected override firstUpdated(): void {
    this.#stops = readStops();
    this.#painter = new Painter(this.board, () => this.requestUpdate());
    void this.#painter.useThree();
    this.#observer.observe(this.board);
    this.#resized();
  }

  override connectedCallback(): void {
    super.connectedCallback();
    if (this.hasUpdated) this.firstUpdated();
  }

  protected override willUpdate(changed: PropertyValues<this>): void {
    if (changed.has("document")) {
      this.sheet = readSheet(this.document);
      const fresh = boundsOf(sheetPlaces(this.sheet));
      if (!this.dragging) this.bounds = fresh;
    }
    if (changed.has("shown")) this.step = null;
    if (changed.has("dragging") && !this.dragging) this.bounds = boundsOf(sheetPlaces(this.sheet));
  }

  protected override updated(changed: PropertyValues<this>): void {
    if (changed.has("document") && this.document && !changed.get("document")) this.fit(false);
    else if (
      (changed.has("selection") ||
        changed.has("dragging") ||
        changed.has("document") ||
        changed.has("problems")) &&
      !this.dragging
    )
      this.refit();
    this.#paint();
    this.#layMesh();
  }

  // --- view -----------------------------------------------------------------------------------------------------------

  get view(): View {
    return this.#holder.view;
  }

  #resized(): void {
    const box = this.board.getBoundingClientRect();
    if (box.width === this.#size.width && box.height === this.#size.height) return;
    this.#size = { width: box.width, height: box.height };
    this.board.style.setProperty(
      "--tag-room",
      `${Math.max(120, box.height - this.#length("--zrule") - 34)}px`,
    );
    this.fit(false);
    this.requestUpdate();
  }

  #length(token: string): number {
    return Number.parseFloat(getComputedStyle(this).getPropertyValue(token)) || 0;
  }

  get size(): { width: number; height: number; left: number; foot: number } {
    return { ...this.#size, left: this.#length("--scale"), foot: this.#length("--zrule") };
  }

  /** Room at the right that the tag or the mend card takes [px]; 0 without one. */
  get cardWidth(): number {
    const mends = this.problems.length > 0 ? 26 : 0;
    if (window.innerWidth <= NARROW || (!this.tagged && mends === 0)) return 0;
    return this.#length("--tag") + mends + 10;
  }

  get #room(): BoardRoom {
    return { ...this.size, card: this.cardWidth, big: this.#size.width > BIG_BOARD };
  }

  /** Fits the part into the free room, in a short move where the eye should follow. */
  fit(softly = true): void {
    if (this.#size.width > 0) this.#holder.fit(this.bounds, this.#room, softly ? settleTime(this) : 0);
  }

  /** Whether the tag may stand: not while the press that selected its thing is still held, so that nothing jumps. */
  get tagged(): boolean {
    return this.selection.kind !== "none" && !this.hand.bare;
  }

  /** After an edit or a selection: fits again when what has to be seen or the free room has changed. */
  refit(): void {
    if (this.document && !this.hand.pressed && this.#holder.isStale(this.bounds, this.#room)) this.fit();
  }

  turn(lying: boolean): void {
    this.#holder.turn(lying, this.bounds);
    this.fit(false);
  }

  /** Moves the view by hand: it stays until the next fit. */
  setView(view: View): void {
    this.#holder.view = view;
  }

  // --- drawing --------------------------------------------------------------------------------------------------------

  get scene(): Scene | null {
    const { result, cursor, shown, step } = this;
    return result
      ? this.#keeper.scene({ result, cursor, shown, step, units: this.units, scale: this.view.scale })
      : null;
  }

  get #faint(): boolean {
    return this.status === "waiting" || this.status === "failed";
  }

  /** Lays the mesh over the field, or takes it off. */
  #layMesh(): void {
    const { result } = this;
    const { width, height } = this.#size;
    if (!this.meshShown || !result || width === 0) {
      this.#overlay?.canvas.remove();
      this.#overlay = undefined;
      return;
    }
    this.#overlay ??= new MeshOverlay();
    if (!this.#overlay.canvas.isConnected) this.lines.before(this.#overlay.canvas);
    const colour = (name: string): string => getComputedStyle(this).getPropertyValue(name).trim();
    this.#overlay.draw(result, {
      view: this.view,
      width,
      height,
      line: colour("--iso-dark"),
      mark: colour("--bad"),
    });
  }

  #paint(): void {
    const { scene } = this;
    const { width, height } = this.#size;
    if (!this.#painter || width === 0) return;
    if (!scene) {
      this.#painted = [];
      return this.#painter.clear();
    }
    const faint = this.#faint;
    const key = [scene, this.view, width, height, this.theme, faint, this.#painter.kind];
    if (key.every((part, i) => part === this.#painted[i])) return;
    this.#painted = key;
    this.#painter.draw({
      mesh: scene.mesh,
      values: scene.values,
      range: scene.range,
      stops: this.#stops,
      view: this.view,
      sheet: parseColour(getComputedStyle(this).backgroundColor),
      veil: Number.parseFloat(getComputedStyle(this).getPropertyValue("--mirror-veil")) || 0.5,
      ghost: faint,
      width,
      height,
      pixelRatio: Math.min(2, window.devicePixelRatio || 1),
    });
  }

  /** The section as it stands, as a PNG. */
  picture(): Promise<Blob> {
    const ground = getComputedStyle(this).getPropertyValue("--sheet").trim();
    return sectionPicture(this.#painter?.copy(PICTURE_RATIO) ?? null, this.lines, ground);
  }

  protected override render(): TemplateResult {
    const { document, scene } = this;
    const narrow = window.innerWidth <= NARROW;
    return html`
      <div class="caption">${this.#captionLine(scene)}<span class="space"></span>${sectionTools(this)}</div>
      <div
        class="board ${this.mode === "take" ? "" : "mode"} ${this.dragging ? "dragging" : ""}"
        @pointerdown=${this.hand.down}
        @pointermove=${this.hand.move}
        @pointerup=${this.hand.up}
        @pointercancel=${this.hand.cancel}
        @pointerleave=${() => (this.pointer = null)}
        @wheel=${{ handleEvent: this.hand.wheel, passive: false }}
        @keydown=${this.keys.key}
        @focusin=${this.keys.focused}
      >
        <svg
          class="lines"
          role="group"
          aria-roledescription="section drawing"
          aria-label=${this.#spokenName()}
        >
          ${document && this.#size.width > 0 ? this.#drawing.draw(document, this.#faint ? null : scene, this.#stops) : nothing}
        </svg>
        <corelag-facts
          .document=${document}
          .profile=${this.profile}
          .units=${this.units}
          .library=${this.library}
        ></corelag-facts>
        ${narrow ? nothing : this.#cards(scene)}${readoutOf(this, scene)}
        ${scene && !this.#faint ? html`<p class="heard">${sceneSentence(this, scene)}</p>` : nothing}
      </div>
      ${narrow ? this.#cards(scene) : nothing}
    `;
  }

  /** Number of the stage at the time cursor. */
  get stageNow(): number {
    const found = this.result?.stages.findIndex((stage) => this.cursor < stage.ended) ?? 0;
    return found >= 0 ? found : Math.max(0, (this.document?.stages.length ?? 1) - 1);
  }

  #spokenName(): string {
    const { loops, probes } = this.sheet;
    const points = loops.reduce((sum, loop) => sum + loop.vertices.length, 0);
    const sides = loops.reduce((sum, loop) => sum + loop.sides.filter((side) => !side.onAxis).length, 0);
    const name = this.document?.part.regions.map((region) => region.name).join(" and ") ?? "part";
    const count = (number: number, thing: string): string => `${number} ${thing}${number === 1 ? "" : "s"}`;
    const half = this.view.lying ? "upper" : "right";
    return `Section of the ${name}, ${half} half editable. ${count(points, "point")}, ${count(sides, "side")}, ${count(probes.length, "probe")}.`;
  }

  /** The mend card while something is at fault, and the tag of what is selected. */
  #cards(scene: Scene | null): TemplateResult | typeof nothing {
    const mends = this.problems.length > 0 && !this.dragging;
    if (!mends && !this.tagged) return nothing;
    return html`<div class="cards ${mends ? "mends" : ""}">
      ${
        mends
          ? html`<corelag-mend
              .document=${this.document}
              .problems=${this.problems}
              .selection=${this.selection}
              .undoLabel=${this.undoLabel}
            ></corelag-mend>`
          : nothing
      }
      ${this.tagged ? this.#tag(scene) : nothing}
    </div>`;
  }

  #tag(scene: Scene | null): TemplateResult {
    const place = placeOfSelection(this.sheet, this.selection);
    const known = scene && place && this.shown.by === "temperature" && !this.#faint;
    return html`<corelag-tag
      .document=${this.document}
      .earlier=${this.earlier}
      .selection=${this.selection}
      .units=${this.units}
      .stageNow=${this.stageNow}
      .amounts=${amountsOf(this.profile)}
      .amountsBefore=${amountsOf(this.profileEarlier)}
      .temperature=${known ? sceneValueAt(scene, ...place) : Number.NaN}
      .library=${this.library}
    ></corelag-tag>`;
  }

  // --- caption --------------------------------------------------------------------------------------------------------

  #captionLine(scene: Scene | null): TemplateResult {
    if (this.mode !== "take")
      return html`<p class="says">${MODE_WORDS[this.mode]} <span class="aside">Esc leaves it.</span></p>`;
    return captionSentence({
      host: this,
      result: this.result,
      cursor: this.cursor,
      shown: this.shown,
      units: this.units,
      step: scene?.step ?? null,
      setStep: (step) => (this.step = step),
      remark: PLAIN_WORDS[this.#painter?.reason ?? ""],
    });
  }

  select(selection: Selection): void {
    if (!sameSelection(selection, this.selection)) send(this, "corelag-select", selection);
  }
}

const amountsOf = (profile: Profile | null) =>
  profile ? { mass: profile.mass, length: profile.characteristicLength } : null;

/** ms of a settling move, from the tokens; 0 with reduced motion. */
function settleTime(element: Element): number {
  const text = getComputedStyle(element).getPropertyValue("--m-settle").trim();
  const number = Number.parseFloat(text) || 0;
  return text.endsWith("ms") ? number : 1000 * number;
}

declare global {
  interface HTMLElementTagNameMap {
    "corelag-section": CorelagSection;
  }
}
