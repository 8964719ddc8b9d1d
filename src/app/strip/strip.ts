import { LitElement, html, nothing, svg } from "lit";
import type { PropertyValues, TemplateResult } from "lit";
import { customElement, property, state } from "lit/decorators.js";
import type { CaseDocument } from "../../case/types.ts";
import type { UnitSystem } from "../../case/units.ts";
import { NOTHING } from "../../editor/selection.ts";
import type { Selection } from "../../editor/selection.ts";
import type { CaseResult } from "../../run/result.ts";
import { readStops } from "../colours.ts";
import type { Rgb } from "../colours.ts";
import { send, sendEdit } from "../events.ts";
import { icon } from "../icons.ts";
import type { Shown, Status } from "../state.ts";
import { drawing, shared } from "../styles/shared.ts";
import { valueAt } from "./curves.ts";
import "./curve-table.ts";
import { drawCurves, drawLevels, drawMarks, placeBalloons } from "./draw-curves.ts";
import type { PlacedBalloon } from "./draw-curves.ts";
import {
  drawCursor,
  drawGrips,
  drawKnobs,
  drawLineNames,
  drawReading,
  drawStages,
  drawSurroundings,
} from "./draw-hand.ts";
import type { CursorView, Handle, HandEvents } from "./draw-hand.ts";
import { drawGrid, drawGrounds, drawPaint, drawTemperature, drawTime } from "./draw-scales.ts";
import { makeFrame } from "./frame.ts";
import type { Frame } from "./frame.ts";
import { Hand } from "./hand.ts";
import { arrivalSpan } from "./marks.ts";
import { addStage } from "./moves.ts";
import { Play } from "./play.ts";
import { placeReading, readingRows } from "./reading.ts";
import { makeScales } from "./scales.ts";
import type { Room, Scales } from "./scales.ts";
import { cursorWords, treatmentWords } from "./spoken.ts";
import { stripStyle } from "./strip-style.ts";

const ROW = 30;
const FOOT = 30;
const RIGHT = 10;

/**
 * The treatment: time against temperature, at once the schedule to be edited, the chart of the result and the time
 * cursor of the section.
 *
 * Sends corelag-cursor, corelag-edit (stage ends, limits, surroundings, a further stage), corelag-rest, corelag-back
 * and corelag-select (a stage).
 */
@customElement("corelag-strip")
export class CorelagStrip extends LitElement {
  static override styles = [shared, drawing, stripStyle];

  @property({ attribute: false }) document: CaseDocument | null = null;
  @property({ attribute: false }) result: CaseResult | null = null;
  @property() status: Status = "empty";
  @property({ type: Boolean }) stale = false;
  @property({ type: Boolean }) dragging = false;
  /** s from the start of the case */
  @property({ type: Number }) cursor = 0;
  @property({ attribute: false }) selection: Selection = NOTHING;
  @property({ attribute: false }) focusedAnswer: number | null = null;
  @property({ attribute: false }) shown: Shown = { by: "temperature" };
  @property() units: UnitSystem = "si";

  @state() private room: Room | null = null;
  @state() private table = false;
  @state() private playing = false;
  @state() private kept: Scales | null = null;
  @state() private held: Handle | null = null;

  private frame: Frame | null = null;
  private balloons: readonly PlacedBalloon[] = [];
  private was: CaseResult | null = null;
  private stops: readonly Rgb[] = [];
  private readonly observer = new ResizeObserver(() => this.measure());
  private readonly play = new Play(
    (at) => send(this, "corelag-cursor", at),
    () => (this.playing = false),
  );
  private readonly hand = new Hand({
    frame: () => this.frame,
    cursor: () => this.cursor,
    system: () => this.units,
    left: () => this.getBoundingClientRect(),
    moveCursor: (at) => send(this, "corelag-cursor", at),
    edit: (label, recipe, gesture) => sendEdit(this, label, recipe, gesture),
    hold: (handle) => this.hold(handle),
    rest: () => send(this, "corelag-rest", null),
    back: () => send(this, "corelag-back", null),
  });

  override connectedCallback(): void {
    super.connectedCallback();
    this.observer.observe(this);
    this.addEventListener("keydown", this.keyed);
  }

  override disconnectedCallback(): void {
    super.disconnectedCallback();
    this.observer.disconnect();
    this.play.stop();
    this.removeEventListener("keydown", this.keyed);
  }

  /** Size and tokens: the drawing is laid out again when either changes. */
  private measure(): void {
    const { clientWidth: width, clientHeight: height } = this;
    if (width < 60 || height < 90) return;
    const style = getComputedStyle(this);
    const token = (name: string, otherwise: number): number =>
      Number.parseFloat(style.getPropertyValue(name)) || otherwise;
    this.stops = readStops(this);
    this.room = {
      width,
      height,
      left: token("--scale", 58),
      right: RIGHT,
      row: ROW,
      foot: FOOT,
      noteSize: token("--t-note", 13.5),
      bodySize: token("--t-body", 15),
      scaleSize: token("--t-scale", 12),
    };
  }

  protected override willUpdate(changed: PropertyValues<this>): void {
    if (changed.has("dragging") && this.dragging) this.was = changed.get("result") ?? this.result;
    if (!this.dragging && this.was !== null && !this.stale) this.was = null;
    if (changed.has("document") && this.document === null) this.play.stop();
    if (this.room === null || this.document === null) {
      this.frame = null;
      return;
    }
    const { document, result, was, units: system, room, kept } = this;
    const inputs = ["document", "result", "units", "room", "kept", "dragging"] as const;
    if (this.frame !== null && !inputs.some((name) => changed.has(name as keyof CorelagStrip))) return;
    this.frame = makeFrame({ document, result, was, system, room, kept });
    this.balloons = placeBalloons(this.frame);
  }

  protected override render(): TemplateResult {
    if (this.room === null) return html``;
    const frame = this.frame;
    if (frame === null) return this.renderEmpty(this.room);
    const playing = this.playing;
    return html`<svg
        class="chart"
        role="group"
        aria-roledescription="treatment chart"
        aria-label=${treatmentWords(frame.schedule)}
      >
        ${this.chart(frame)}
      </svg>
      ${
        this.table
          ? html`<corelag-curve-table
              .result=${this.result}
              .units=${this.units}
              .apart=${frame.scales.time.middle}
            ></corelag-curve-table>`
          : nothing
      }
      <div class="corner" ?hidden=${this.table}>
        <button
          class="tool"
          type="button"
          aria-label=${playing ? "Stop playing" : "Play through the treatment"}
          title=${playing ? "Stop (Space)" : "Play through the treatment (Space)"}
          ?disabled=${this.result === null}
          @click=${this.playOrStop}
        >
          ${playing ? STOP : icon("play")}
        </button>
      </div>
      <div class="tools">
        <button
          class="tool"
          type="button"
          aria-label="Show the curves as a table"
          title="Show the curves as a table"
          aria-pressed=${this.table ? "true" : "false"}
          ?disabled=${this.result === null}
          @click=${() => (this.table = !this.table)}
        >
          ${icon("table")}
        </button>
      </div>`;
  }

  private chart(frame: Frame) {
    const { scales } = frame;
    const on = this.events();
    const arrival =
      this.shown.by === "arrival" && this.result !== null
        ? arrivalSpan(this.result, this.shown.answer)
        : null;
    const lit = this.shown.by === "arrival" ? this.shown.answer : this.focusedAnswer;
    const taken = this.balloons.map(({ x, y }) => ({ x: x - 11, y: y - 11, width: 22, height: 22 }));
    const view = this.view(frame, taken);
    const names = view.reading === null ? taken : [...taken, view.reading.box];
    const old = this.status === "waiting" || this.status === "failed" || (this.stale && !this.dragging);
    const pale = this.stale || this.result?.quality === "preview";
    return svg`${drawGrounds(frame)}${drawGrid(frame)}${drawStages(frame, on)}
      <rect class="plot" x=${scales.room.left} y=${scales.room.row} width=${scales.room.width - scales.room.left}
        height=${scales.bottom - scales.room.row} @pointerdown=${(event: PointerEvent) => on.press(event, { kind: "cursor" })} />
      ${drawTime(frame)}${drawTemperature(frame)}${drawPaint(frame, this.stops, arrival)}
      <g class=${old ? "old" : ""} aria-hidden="true">${drawLevels(frame)}${drawSurroundings(frame)}${drawCurves(frame)}
        ${drawMarks(frame, this.balloons, lit)}${drawLineNames(frame, names)}</g>
      ${this.result === null ? nothing : drawCursor(frame, view, on)}
      <g class="read ${old ? "old" : ""} ${pale ? "pale" : ""}" aria-hidden="true">${
        this.result === null ? nothing : drawReading(frame, view)
      }</g>
      ${drawGrips(frame, on)}${drawKnobs(frame, on)}`;
  }

  private view(
    frame: Frame,
    taken: readonly { x: number; y: number; width: number; height: number }[],
  ): CursorView {
    const at = Math.min(this.cursor, frame.end);
    const { scales, curves, system } = frame;
    const resolution = Math.min(60, scales.time.minor < 60 ? (scales.time.minor < 1 ? 0.1 : 1) : 60);
    const rows = readingRows(curves, at, system);
    const main = curves.filter(({ habit }) => habit === "core" || habit === "mean" || habit === "skin");
    const history = this.result?.history;
    return {
      at,
      resolution,
      words: cursorWords(at, curves, system, resolution),
      reading: rows.length === 0 ? null : placeReading(rows, scales.x(at), scales, taken, frame.crowd),
      dots: main.map(({ time, values }) => scales.y(valueAt(time, values, at))),
      span:
        history === undefined || this.shown.by === "arrival"
          ? null
          : [valueAt(history.time, history.coldest, at), valueAt(history.time, history.hottest, at)],
    };
  }

  private events(): HandEvents {
    return {
      press: (event, handle) => {
        this.stopPlaying();
        this.hand.press(event, handle);
      },
      key: (event, handle) => this.hand.key(event, handle),
      keyUp: () => this.hand.keyUp(),
      select: (index) => send(this, "corelag-select", { kind: "stage", index }),
      addStage: () => sendEdit(this, "a further stage", addStage()),
      held: this.held,
      selected: this.selection.kind === "stage" ? this.selection.index : null,
    };
  }

  /** While a stage end or a knob is held, the scales stand still under the hand. */
  private hold(handle: Handle | null): void {
    this.held = handle;
    this.kept = handle === null || handle.kind === "cursor" ? null : (this.frame?.scales ?? null);
  }

  private readonly keyed = (event: KeyboardEvent): void => {
    const target = event.composedPath()[0];
    if (target instanceof HTMLInputElement || event.ctrlKey || event.metaKey || event.altKey) return;
    if (event.key === " " && !(target instanceof HTMLButtonElement)) this.playOrStop();
    else if (event.key === "[" || event.key === "]") this.hand.toEdge(event.key === "[" ? -1 : 1);
    else return;
    event.preventDefault();
    event.stopPropagation();
  };

  private playOrStop(): void {
    if (this.playing) return this.stopPlaying();
    if (this.result === null || this.frame === null) return;
    this.playing = true;
    this.play.start(this.cursor, this.frame.end);
  }

  private stopPlaying(): void {
    this.play.stop();
    this.playing = false;
  }

  /** Before there is a part: scales stand at once, and say what will lie here. */
  private renderEmpty(room: Room): TemplateResult {
    const scales = makeScales(room, 4 * 3600, [0, 1000], this.units);
    const frame: Frame = {
      schedule: [],
      scales,
      curves: [],
      ghosts: [],
      marks: [],
      range: null,
      crowd: new Float64Array(),
      end: 0,
      system: this.units,
    };
    return html`<svg class="chart" aria-hidden="true">
        ${drawGrounds(frame)}${drawGrid(frame)}${drawTime(frame)}${drawTemperature(frame)}${drawPaint(frame, this.stops, null)}
      </svg>
      <p class="empty">
        Then say what is done to it: furnace, carry, quench, air. The stages come to lie here, along the time.
      </p>`;
  }
}

const STOP = html`<svg class="icon" viewBox="0 0 20 20" aria-hidden="true">
  <path d="M5.5 4h3.2v12H5.5zM11.3 4h3.2v12h-3.2z" class="solid" />
</svg>`;

declare global {
  interface HTMLElementTagNameMap {
    "corelag-strip": CorelagStrip;
  }
}
