/** What the hand does on the strip, by pointer and by key: moves the cursor, stage ends, limits and surroundings. */
import type { UnitSystem } from "../../case/units.ts";
import type { Recipe } from "../../editor/history.ts";
import { valueAt } from "./curves.ts";
import type { Handle } from "./draw-hand.ts";
import type { Frame } from "./frame.ts";
import { dragStep, endStage, limitStage, moveKnot, snapped, timeSteps } from "./moves.ts";
import type { Knot, SurroundingsLine } from "./schedule.ts";

export interface HandHost {
  readonly frame: () => Frame | null;
  readonly cursor: () => number;
  readonly system: () => UnitSystem;
  readonly left: () => DOMRect;
  readonly moveCursor: (at: number) => void;
  readonly edit: (label: string, recipe: Recipe, gesture: string) => void;
  readonly hold: (handle: Handle | null) => void;
  readonly rest: () => void;
  readonly back: () => void;
}

/** K that a dragged knob or limit steps by, and an arrow key with and without Shift */
const DEGREE_STEP = 1;
const LONG_DEGREE_STEP = 10;

export class Hand {
  /** keys have moved something and the gesture is still open */
  #keyed = false;

  constructor(private readonly host: HandHost) {}

  // --- pointer ------------------------------------------------------------------------------------------------------

  press(event: PointerEvent, handle: Handle): void {
    if (event.button !== 0) return;
    const target = event.currentTarget as SVGElement;
    target.setPointerCapture(event.pointerId);
    const off = handle.kind === "knot" ? this.#offset(event, handle) : 0;
    this.host.hold(handle);
    const move = (next: PointerEvent): void => this.#drag(next, handle, off);
    const end = (next: Event): void => {
      target.removeEventListener("pointermove", move);
      target.removeEventListener("pointerup", end);
      target.removeEventListener("pointercancel", end);
      document.removeEventListener("keydown", escape, true);
      this.host.hold(null);
      if (handle.kind === "cursor") return;
      if (next.type === "pointercancel") this.host.back();
      else this.host.rest();
    };
    const escape = (next: KeyboardEvent): void => {
      if (next.key !== "Escape") return;
      next.stopPropagation();
      next.preventDefault();
      end(new Event("pointercancel"));
    };
    target.addEventListener("pointermove", move);
    target.addEventListener("pointerup", end);
    target.addEventListener("pointercancel", end);
    document.addEventListener("keydown", escape, true);
    if (handle.kind === "cursor") this.#drag(event, handle, 0);
  }

  /** px between the pointer and the middle of the knob, so that it does not jump when it is taken. */
  #offset(event: PointerEvent, handle: Handle): number {
    const found = this.#knot(handle);
    const frame = this.host.frame();
    if (found === null || frame === null) return 0;
    return event.clientY - this.host.left().top - frame.scales.y(found.knot.degC);
  }

  #drag(event: PointerEvent, handle: Handle, off: number): void {
    const frame = this.host.frame();
    if (frame === null) return;
    const box = this.host.left();
    const at = clamp(frame.scales.seconds(event.clientX - box.left), 0, frame.scales.end);
    if (handle.kind === "cursor") return this.host.moveCursor(Math.min(at, frame.end));
    if (handle.kind === "end") return this.#dragEnd(frame, handle.stage, at);
    const degC = frame.scales.degC(
      clamp(event.clientY - box.top - off, frame.scales.top, frame.scales.bottom),
    );
    this.#setKnot(handle, snapped(degC, DEGREE_STEP));
  }

  #dragEnd(frame: Frame, stage: number, at: number): void {
    const block = frame.schedule[stage];
    if (block === undefined) return;
    if (block.until !== null) return this.#limitAt(frame, stage, at);
    const pixels = frame.scales.x(1) - frame.scales.x(0);
    const step = dragStep(timeSteps(frame.scales.time.word), pixels);
    this.host.edit(`end of ${block.name}`, endStage(block, at, step), `end-${stage}`);
  }

  /** The end of an "until" stage follows from its limit: the limit becomes what the curve reads at the pointer. */
  #limitAt(frame: Frame, stage: number, at: number): void {
    const block = frame.schedule[stage]!;
    const curve =
      frame.curves.find(({ name }) => name.replace(/, probe$/, "") === block.until?.where) ?? frame.curves[0];
    if (curve === undefined) return;
    const degC = snapped(valueAt(curve.time, curve.values, Math.min(at, frame.end)), DEGREE_STEP);
    this.host.edit(`limit of ${block.name}`, limitStage(block, degC, this.host.system()), `limit-${stage}`);
  }

  // --- keys ---------------------------------------------------------------------------------------------------------

  key(event: KeyboardEvent, handle: Handle): void {
    const frame = this.host.frame();
    if (frame === null || event.ctrlKey || event.metaKey) return;
    const done =
      handle.kind === "cursor"
        ? this.#cursorKey(event, frame)
        : handle.kind === "end"
          ? this.#endKey(event, frame, handle.stage)
          : this.#knotKey(event, handle);
    if (event.key === "Escape" && this.#keyed) {
      this.#keyed = false;
      this.host.back();
    } else if (!done) return;
    event.preventDefault();
    event.stopPropagation();
  }

  /** The gesture of a burst of key strokes ends when the key comes up. */
  keyUp(): void {
    if (!this.#keyed) return;
    this.#keyed = false;
    this.host.rest();
  }

  #cursorKey(event: KeyboardEvent, { scales, end }: Frame): boolean {
    const step = scales.time.minor * (event.shiftKey ? 10 : 1);
    const now = this.host.cursor();
    const to = {
      ArrowLeft: () => (Math.ceil(now / step - 1e-6) - 1) * step,
      ArrowRight: () => (Math.floor(now / step + 1e-6) + 1) * step,
      PageDown: () => now - scales.time.major,
      PageUp: () => now + scales.time.major,
      Home: () => 0,
      End: () => end,
    }[event.key];
    if (to === undefined) return false;
    this.host.moveCursor(clamp(to(), 0, end));
    return true;
  }

  /** Puts the cursor onto the stage edge before or after it. */
  toEdge(direction: -1 | 1): void {
    const frame = this.host.frame();
    if (frame === null) return;
    const now = this.host.cursor();
    const edges = [0, ...frame.schedule.map((block) => block.ended)].filter(
      (at) => at <= frame.end * (1 + 1e-9),
    );
    const next =
      direction === 1 ? edges.find((at) => at > now + 1e-6) : edges.findLast((at) => at < now - 1e-6);
    if (next !== undefined) this.host.moveCursor(next);
  }

  #endKey(event: KeyboardEvent, frame: Frame, stage: number): boolean {
    const block = frame.schedule[stage];
    const sense = { ArrowLeft: -1, ArrowDown: -1, PageDown: -1, ArrowRight: 1, ArrowUp: 1, PageUp: 1 }[
      event.key
    ];
    if (block === undefined || sense === undefined) return false;
    this.#keyed = true;
    if (block.limit !== null) {
      const degC = block.limit + sense * (event.shiftKey ? LONG_DEGREE_STEP : DEGREE_STEP);
      this.host.edit(`limit of ${block.name}`, limitStage(block, degC, this.host.system()), `limit-${stage}`);
      return true;
    }
    const [fine, middle, long] = timeSteps(frame.scales.time.word);
    const step = event.shiftKey ? long : event.key.startsWith("Page") ? middle : fine;
    this.host.edit(`end of ${block.name}`, endStage(block, block.ended + sense * step, fine), `end-${stage}`);
    return true;
  }

  #knotKey(event: KeyboardEvent, handle: Handle): boolean {
    const found = this.#knot(handle);
    const sense = { ArrowUp: 1, ArrowRight: 1, ArrowDown: -1, ArrowLeft: -1 }[event.key];
    if (found === null || sense === undefined) return false;
    this.#keyed = true;
    this.#setKnot(handle, found.knot.degC + sense * (event.shiftKey ? LONG_DEGREE_STEP : DEGREE_STEP));
    return true;
  }

  #setKnot(handle: Handle, degC: number): void {
    const found = this.#knot(handle);
    if (found === null || handle.kind !== "knot") return;
    const gesture = `knot-${JSON.stringify(handle.place)}-${handle.index}`;
    this.host.edit(
      found.line.place.field === "held" ? "held temperature" : "surroundings",
      moveKnot(handle.place, found.knot, degC, this.host.system()),
      gesture,
    );
  }

  #knot(handle: Handle): { line: SurroundingsLine; knot: Knot } | null {
    if (handle.kind !== "knot") return null;
    const block = this.host.frame()?.schedule[handle.place.stage];
    const line = block?.lines.find(({ place }) => JSON.stringify(place) === JSON.stringify(handle.place));
    const knot = line?.knots[handle.index];
    return line === undefined || knot === undefined ? null : { line, knot };
  }
}

const clamp = (value: number, least: number, most: number): number => Math.min(most, Math.max(least, value));
