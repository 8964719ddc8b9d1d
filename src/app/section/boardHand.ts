/** Pointer, wheel and tools on the board of the section. */
import type { Place } from "../../editor/arcs.ts";
import { addProbe } from "../../editor/conditions.ts";
import { bendSide, insertVertex, straightenSide } from "../../editor/outline.ts";
import type { LoopIndex } from "../../editor/outline.ts";
import { NOTHING } from "../../editor/selection.ts";
import type { Selection } from "../../editor/selection.ts";
import { send, sendEdit } from "../events.ts";
import { gripOf, loopIn, outwardOf, selectionOf } from "./grips.ts";
import { Drag, snapped, stepOf } from "./hand.ts";
import type { Grip } from "./hand.ts";
import type { CorelagSection } from "./section.ts";
import { alongSide, insideRegion, nearestOn } from "./sheet.ts";
import { fromScreen } from "./view.ts";
import type { View } from "./view.ts";

/** take: points, sides and probes are taken hold of; the others wait for one click. */
export type Mode = "take" | "point" | "bend" | "probe";

/** px before a press becomes a drag */
const DEAD_ZONE = 3;
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
    if (event.button !== 0 || !this.onDrawing(event)) return;
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
    section.pointer = this.onDrawing(event) ? [x, y] : null;
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
    else if (!press.grip && !press.panning && this.onDrawing(event))
      this.section.select(this.#regionAt(press));
    this.section.requestUpdate();
    void this.section.updateComplete.then(() => this.section.refit());
  };

  /** A click inside the part selects its region, any other lets go. */
  #regionAt({ x, y, view }: Press): Selection {
    const [r, z] = fromScreen(view, x, y);
    const { sheet } = this.section;
    const region = sheet.loops.find((loop) => insideRegion(sheet, loop.region, [Math.abs(r), z]))?.region;
    return region === undefined ? NOTHING : { kind: "region", region };
  }

  readonly cancel = (): void => {
    if (this.#press?.drag) send(this.section, "corelag-back", null);
    this.#press = null;
  };

  /** Lets go of what is held, without a word. */
  drop(): void {
    this.#press = null;
  }

  readonly wheel = (event: WheelEvent): void => {
    const scrolls = document.documentElement.scrollHeight > window.innerHeight + 1;
    if (!this.onDrawing(event) || (scrolls && !event.ctrlKey)) return;
    event.preventDefault();
    const { view } = this.section;
    const [x, y] = this.#spot(event);
    const scale = Math.min(1e6, Math.max(1, view.scale * ZOOM_STEP ** -event.deltaY));
    const grown = scale / view.scale;
    this.section.setView({ ...view, scale, x: x - (x - view.x) * grown, y: y - (y - view.y) * grown });
  };

  /** Whether the event falls on the drawing, not on the tag, the card or the facts. */
  onDrawing(event: Event): boolean {
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
    const loop = loopIn(this.section.sheet, grip);
    if (!loop) return null;
    if (grip.kind === "vertex") return new Drag(grip, loop.vertices[grip.index]!.at, grabbed);
    if (grip.kind === "bulge") return new Drag(grip, loop.vertices[grip.index]!.through ?? grabbed, grabbed);
    return new Drag(grip, grabbed, grabbed, outwardOf(loop, loop.sides[grip.index]!));
  }

  // --- tools ----------------------------------------------------------------------------------------------------------

  /** A drawing tool was pressed; by keyboard it acts at once, on what is selected or on a fair place. */
  tool(mode: Exclude<Mode, "take">, byKeyboard: boolean): void {
    const { section } = this;
    const side = this.selectedSide;
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
    const at = this.selectedSide ?? this.#firstSide();
    const side = at && loopIn(this.section.sheet, at)?.sides[at.index];
    if (at && side) this.#insertAt(at, alongSide(side, 0.5));
  }

  bend(at: LoopIndex): void {
    const side = loopIn(this.section.sheet, at)?.sides[at.index];
    if (!side || side.onAxis) return;
    if (side.curved)
      sendEdit(this.section, `straightening ${side.name}`, (draft) => straightenSide(draft, at));
    else sendEdit(this.section, `bending ${side.name}`, (draft) => bendSide(draft, at));
    this.section.select({ kind: "side", ...at });
  }

  /** The selected side, or the side that starts at the selected point. */
  get selectedSide(): LoopIndex | null {
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
}

function middleOf(section: CorelagSection): Place {
  return [0.5 * section.bounds.rMax, (section.bounds.zMin + section.bounds.zMax) / 2];
}
