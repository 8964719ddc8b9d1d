/** Pointer, wheel and keys on the board of the section. */
import { addProbe, removeProbe } from "../../editor/conditions.ts";
import {
  bendSide,
  FEWEST_VERTICES,
  insertVertex,
  moveSide,
  moveVertex,
  removeVertex,
  straightenSide,
} from "../../editor/outline.ts";
import type { LoopIndex } from "../../editor/outline.ts";
import { moveProbe, probeIsAsked } from "../../editor/conditions.ts";
import { NOTHING } from "../../editor/selection.ts";
import type { Selection } from "../../editor/selection.ts";
import type { Place } from "../../editor/arcs.ts";
import { send, sendEdit } from "../events.ts";
import { Drag, snapped, stepOf } from "./hand.ts";
import type { Grip } from "./hand.ts";
import type { CorelagSection } from "./section.ts";
import { alongSide, nearestOn } from "./sheet.ts";
import type { SheetLoop, SheetSide } from "./sheet.ts";
import { fromScreen } from "./view.ts";
import type { View } from "./view.ts";

/** take: points, sides and probes are taken hold of; the others wait for one click. */
export type Mode = "take" | "point" | "bend" | "probe";

/** px before a press becomes a drag */
const DEAD_ZONE = 3;
/** ms after the last arrow key until its gesture is over */
const KEY_REST = 500;
/** px within which a click finds the outline */
const REACH = 40;
const ZOOM_STEP = 1.0015;

interface Press {
  readonly id: number;
  readonly x: number;
  readonly y: number;
  readonly grip: Grip | null;
  readonly view: View;
  readonly bare: boolean;
  drag: Drag | null;
  panning: boolean;
}

export class BoardHand {
  #press: Press | null = null;
  #keyRest: ReturnType<typeof setTimeout> | undefined;

  constructor(private readonly section: CorelagSection) {}

  /** A press is held. */
  get pressed(): boolean {
    return this.#press !== null;
  }

  /** The press that is held began with nothing selected: the tag then waits for its end. */
  get bare(): boolean {
    return this.#press?.bare === true;
  }

  /** A thing or the view is being moved. */
  get busy(): boolean {
    return this.#press !== null && (this.#press.drag !== null || this.#press.panning);
  }

  // --- pointer --------------------------------------------------------------------------------------------------------

  readonly down = (event: PointerEvent): void => {
    if (event.button !== 0 || !this.#onDrawing(event)) return;
    const { section } = this;
    const [x, y] = this.#spot(event);
    if (section.mode !== "take") return this.#act(fromScreen(section.view, x, y));
    const grip = gripOf(event);
    this.#press = {
      id: event.pointerId,
      x,
      y,
      grip,
      view: section.view,
      bare: !section.tagged,
      drag: null,
      panning: false,
    };
    section.board.setPointerCapture(event.pointerId);
    if (grip) section.select(selectionOf(grip));
  };

  readonly move = (event: PointerEvent): void => {
    const { section } = this;
    const [x, y] = this.#spot(event);
    section.pointer = this.#onDrawing(event) ? [x, y] : null;
    const press = this.#press;
    if (!press) return;
    if (!this.busy && Math.hypot(x - press.x, y - press.y) < DEAD_ZONE) return;
    if (press.grip) this.#drag(press, fromScreen(press.view, x, y), event);
    else {
      press.panning = true;
      section.setView({ ...press.view, x: press.view.x + x - press.x, y: press.view.y + y - press.y });
    }
  };

  readonly up = (event: PointerEvent): void => {
    const press = this.#press;
    this.#press = null;
    if (!press) return;
    if (press.drag) send(this.section, "corelag-rest", null);
    else if (!press.grip && !press.panning && this.#onDrawing(event)) this.section.select(NOTHING);
    this.section.requestUpdate();
    void this.section.updateComplete.then(() => this.section.refit());
  };

  readonly cancel = (): void => {
    if (this.#press?.drag) send(this.section, "corelag-back", null);
    this.#press = null;
  };

  readonly wheel = (event: WheelEvent): void => {
    if (!this.#onDrawing(event)) return;
    event.preventDefault();
    const { view } = this.section;
    const [x, y] = this.#spot(event);
    const scale = Math.min(1e6, Math.max(1, view.scale * ZOOM_STEP ** -event.deltaY));
    const grown = scale / view.scale;
    this.section.setView({ ...view, scale, x: x - (x - view.x) * grown, y: y - (y - view.y) * grown });
  };

  /** Whether the event falls on the drawing, not on the tag, the card or the facts. */
  #onDrawing(event: Event): boolean {
    const target = event.composedPath()[0] as Node;
    return this.section.lines.contains(target) || target === this.section.board;
  }

  #spot(event: MouseEvent): readonly [number, number] {
    const box = this.section.board.getBoundingClientRect();
    return [event.clientX - box.left, event.clientY - box.top];
  }

  #drag(press: Press, place: Place, keys: { shiftKey: boolean; altKey: boolean }): void {
    const { section } = this;
    press.drag ??= this.#begin(press);
    if (!press.drag) return;
    const move = press.drag.to(place, stepOf(section.units, { ...keys, shiftKey: false }));
    if (move) sendEdit(section, move.label, move.recipe, press.drag.gesture);
  }

  #begin(press: Press): Drag | null {
    const grip = press.grip!;
    const grabbed = fromScreen(press.view, press.x, press.y);
    if (grip.kind === "probe") return new Drag(grip, this.section.sheet.probes[grip.index]!.at, grabbed);
    const loop = this.#loop(grip);
    if (!loop) return null;
    if (grip.kind === "vertex") return new Drag(grip, loop.vertices[grip.index]!.at, grabbed);
    if (grip.kind === "bulge") return new Drag(grip, loop.vertices[grip.index]!.through ?? grabbed, grabbed);
    return new Drag(grip, grabbed, grabbed, outwardOf(loop, loop.sides[grip.index]!));
  }

  #loop({ region, loop }: LoopIndex): SheetLoop | undefined {
    return this.section.sheet.loops.find((each) => each.region === region && each.loop === loop);
  }

  // --- tools ----------------------------------------------------------------------------------------------------------

  /** A drawing tool was pressed; by keyboard it acts at once, on what is selected or on a fair place. */
  tool(mode: Exclude<Mode, "take">, byKeyboard: boolean): void {
    const { section } = this;
    const side = this.#selectedSide();
    if (section.mode === mode) section.mode = "take";
    else if (mode === "bend" && side) this.bend(side);
    else if (mode === "point" && byKeyboard) this.insert();
    else if (mode === "probe" && byKeyboard)
      this.#setProbe(section.result?.history.core.place ?? middleOf(section));
    else section.mode = mode;
  }

  /** One click of a tool. */
  #act(place: Place): void {
    const { section } = this;
    const at: Place = [Math.abs(place[0]), place[1]];
    const { mode } = section;
    section.mode = "take";
    if (mode === "probe")
      return this.#setProbe(snapped(at, stepOf(section.units, { shiftKey: false, altKey: false })));
    const found = this.#nearestSide(at);
    if (!found) return;
    if (mode === "bend") this.bend(found.at);
    else this.#insertAt(found.at, found.place);
  }

  #nearestSide(place: Place): { readonly at: LoopIndex; readonly place: Place } | null {
    const { sheet, view } = this.section;
    let best: { at: LoopIndex; place: Place } | null = null;
    let least = REACH / view.scale;
    for (const loop of sheet.loops)
      for (const side of loop.sides) {
        if (side.onAxis) continue;
        const near = nearestOn(side, place);
        if (near.distance >= least) continue;
        least = near.distance;
        best = { at: { region: loop.region, loop: loop.loop, index: side.index }, place: near.at };
      }
    return best;
  }

  #setProbe(place: Place): void {
    const { section } = this;
    const index = section.sheet.probes.length;
    sendEdit(section, "new probe", (draft) => void addProbe(draft, place));
    section.select({ kind: "probe", index });
  }

  #insertAt(at: LoopIndex, place: Place): void {
    sendEdit(this.section, `new point on side ${at.index + 1}`, (draft) => insertVertex(draft, at, place));
    this.section.select({ kind: "vertex", ...at, index: at.index + 1 });
  }

  insert(): void {
    const at = this.#selectedSide() ?? this.#firstSide();
    const side = at && this.#loop(at)?.sides[at.index];
    if (at && side) this.#insertAt(at, alongSide(side, 0.5));
  }

  bend(at: LoopIndex): void {
    const side = this.#loop(at)?.sides[at.index];
    if (!side || side.onAxis) return;
    if (side.curved)
      sendEdit(this.section, `straightening ${side.name}`, (draft) => straightenSide(draft, at));
    else sendEdit(this.section, `bending ${side.name}`, (draft) => bendSide(draft, at));
    this.section.select({ kind: "side", ...at });
  }

  /** The selected side, or the side that starts at the selected point. */
  #selectedSide(): LoopIndex | null {
    const { selection } = this.section;
    return selection.kind === "side" || selection.kind === "vertex"
      ? { region: selection.region, loop: selection.loop, index: selection.index }
      : null;
  }

  #firstSide(): LoopIndex | null {
    const loop = this.section.sheet.loops[0];
    const side = loop?.sides.find((each) => !each.onAxis);
    return loop && side ? { region: loop.region, loop: loop.loop, index: side.index } : null;
  }

  // --- keys -----------------------------------------------------------------------------------------------------------

  /** A thing that gets the focus by keyboard is selected. */
  readonly focused = (event: FocusEvent): void => {
    const target = event.composedPath()[0] as HTMLElement;
    const grip = gripOf(event);
    if (grip && target.matches(":focus-visible")) this.section.select(selectionOf(grip));
  };

  readonly key = (event: KeyboardEvent): void => {
    if (event.ctrlKey || event.metaKey || !this.#onDrawing(event)) {
      if (event.key === "Escape" && !event.defaultPrevented) this.#escape();
      return;
    }
    const arrow = ARROWS[event.key];
    if (arrow) this.#nudge(arrow, event);
    else if (!this.#letter(event.key)) return;
    event.preventDefault();
    event.stopPropagation();
  };

  #letter(key: string): boolean {
    const { section } = this;
    const { selection } = section;
    const act: Record<string, (() => void) | undefined> = {
      Escape: () => this.#escape(),
      Enter: () => section.tag?.focus(),
      Delete: () => this.#remove(selection),
      n: () => this.#next(1),
      p: () => this.#next(-1),
      i: () => this.insert(),
      b: () => {
        const side = this.#selectedSide();
        if (side) this.bend(side);
      },
      f: () => section.fit(),
    };
    const found = act[key.length === 1 ? key.toLowerCase() : key];
    found?.();
    return found !== undefined;
  }

  #escape(): void {
    const { section } = this;
    if (section.dragging || this.#press) {
      this.#press = null;
      clearTimeout(this.#keyRest);
      send(section, "corelag-back", null);
    } else if (section.mode !== "take") section.mode = "take";
    else section.select(NOTHING);
  }

  #nudge([right, up]: readonly [number, number], keys: KeyboardEvent): void {
    const { section } = this;
    const { selection } = section;
    const step = stepOf(section.units, keys);
    const [dr, dz] = section.view.lying ? [up, right] : [right, up];
    const gesture = `keys ${JSON.stringify(selection)}`;
    if (selection.kind === "vertex") {
      const at = this.#loop(selection)?.vertices[selection.index]?.at;
      if (at) {
        const place = snapped(
          [at[0] + dr * step, at[1] + dz * step],
          Math.min(step, stepOf(section.units, { shiftKey: false, altKey: keys.altKey })),
        );
        sendEdit(
          section,
          `move of point ${selection.index + 1}`,
          (draft) => moveVertex(draft, selection, place),
          gesture,
        );
      }
    } else if (selection.kind === "probe") {
      const at = section.sheet.probes[selection.index]?.at;
      if (at) {
        const place: Place = [Math.max(0, at[0] + dr * step), at[1] + dz * step];
        sendEdit(section, "move of a probe", (draft) => moveProbe(draft, selection.index, place), gesture);
      }
    } else if (selection.kind === "side") {
      const loop = this.#loop(selection);
      const side = loop?.sides[selection.index];
      if (!loop || !side) return;
      const out = outwardOf(loop, side);
      const along = dr * out[0] + dz * out[1];
      if (Math.abs(along) > 0.3)
        sendEdit(
          section,
          `move of side ${selection.index + 1}`,
          (draft) => moveSide(draft, selection, Math.sign(along) * step),
          gesture,
        );
    } else return;
    clearTimeout(this.#keyRest);
    this.#keyRest = setTimeout(() => send(section, "corelag-rest", null), KEY_REST);
  }

  #remove(selection: Selection): void {
    const { section } = this;
    if (selection.kind === "vertex" && (this.#loop(selection)?.vertices.length ?? 0) > FEWEST_VERTICES) {
      section.select(NOTHING);
      sendEdit(section, `taking out point ${selection.index + 1}`, (draft) => removeVertex(draft, selection));
    } else if (
      selection.kind === "probe" &&
      section.document &&
      !probeIsAsked(section.document, selection.index)
    ) {
      section.select(NOTHING);
      sendEdit(section, "taking out a probe", (draft) => removeProbe(draft, selection.index));
    }
  }

  /** The next or previous point gets the focus, and with it the selection. */
  #next(step: 1 | -1): void {
    const points = [...this.section.lines.querySelectorAll<SVGGElement>(".point")];
    const active = this.section.shadowRoot?.activeElement;
    const now = points.findIndex((point) => point === active || point.classList.contains("on"));
    const next = points[(now + step + points.length) % points.length] ?? points[0];
    next?.focus();
    if (next) this.section.select(selectionOf(readGrip(next)!));
  }
}

const ARROWS: Readonly<Record<string, readonly [right: number, up: number] | undefined>> = {
  ArrowRight: [1, 0],
  ArrowLeft: [-1, 0],
  ArrowUp: [0, 1],
  ArrowDown: [0, -1],
};

function gripOf(event: Event): Grip | null {
  const target = event.composedPath()[0];
  const element = target instanceof Element ? target.closest<SVGElement>("[data-grip]") : null;
  return element && readGrip(element);
}

function readGrip({ dataset }: SVGElement): Grip | null {
  const index = Number(dataset["index"]);
  if (dataset["grip"] === "probe") return { kind: "probe", index };
  const place = { region: Number(dataset["region"]), loop: Number(dataset["loop"]), index };
  const kind = dataset["grip"];
  if (kind === "side" || kind === "bulge") return { kind, ...place };
  return kind === "vertex" || kind === "size" ? { kind: "vertex", ...place } : null;
}

function selectionOf(grip: Grip): Selection {
  return grip.kind === "bulge" ? { ...grip, kind: "side" } : grip;
}

/** Unit normal of a side's chord, away from the part. */
function outwardOf(loop: SheetLoop, side: SheetSide): Place {
  const [from, to] = [side.points[0]!, side.points.at(-1)!];
  const chord = Math.hypot(to[0] - from[0], to[1] - from[1]) || 1;
  let twiceArea = 0;
  loop.vertices.forEach(({ at }, i) => {
    const next = loop.vertices[(i + 1) % loop.vertices.length]!.at;
    twiceArea += at[0] * next[1] - next[0] * at[1];
  });
  // same rule for outlines and holes as `moveSide`: away from what the loop encloses
  const sign = twiceArea > 0 ? 1 : -1;
  return [(sign * (to[1] - from[1])) / chord, (-sign * (to[0] - from[0])) / chord];
}

function middleOf(section: CorelagSection): Place {
  return [0.5 * section.bounds.rMax, (section.bounds.zMin + section.bounds.zMax) / 2];
}
