/** Keys on the board: the selected thing moves, is typed, bent, taken out; N and P go from point to point. */
import type { Place } from "../../editor/arcs.ts";
import { moveProbe, probeIsAsked, removeProbe } from "../../editor/conditions.ts";
import { FEWEST_VERTICES, moveSide, moveVertex, removeVertex } from "../../editor/outline.ts";
import { NOTHING } from "../../editor/selection.ts";
import type { Selection } from "../../editor/selection.ts";
import { send, sendEdit } from "../events.ts";
import { gripOf, loopIn, outwardOf, readGrip, selectionOf } from "./grips.ts";
import { snapped, stepOf } from "./hand.ts";
import type { CorelagSection } from "./section.ts";

/** ms after the last arrow key until its gesture is over */
const KEY_REST = 500;
/** Least cosine between an arrow and the way out of a side for the arrow to move it. */
const ALONG = 0.3;

const ARROWS: Readonly<Record<string, readonly [right: number, up: number] | undefined>> = {
  ArrowRight: [1, 0],
  ArrowLeft: [-1, 0],
  ArrowUp: [0, 1],
  ArrowDown: [0, -1],
};

export class BoardKeys {
  #keyRest: ReturnType<typeof setTimeout> | undefined;

  constructor(private readonly section: CorelagSection) {}

  /** A thing that gets the focus by keyboard is selected. */
  readonly focused = (event: FocusEvent): void => {
    const target = event.composedPath()[0] as HTMLElement;
    const grip = gripOf(event);
    if (grip && target.matches(":focus-visible")) this.section.select(selectionOf(grip));
  };

  readonly key = (event: KeyboardEvent): void => {
    if (event.ctrlKey || event.metaKey || !this.section.hand.onDrawing(event)) {
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
      i: () => section.hand.insert(),
      b: () => {
        const side = section.hand.selectedSide;
        if (side) section.hand.bend(side);
      },
      f: () => section.fit(),
    };
    const found = act[key.length === 1 ? key.toLowerCase() : key];
    found?.();
    return found !== undefined;
  }

  #escape(): void {
    const { section } = this;
    if (section.dragging || section.hand.pressed) {
      section.hand.drop();
      clearTimeout(this.#keyRest);
      send(section, "corelag-back", null);
    } else if (section.mode !== "take") section.mode = "take";
    else {
      section.lines.querySelector<SVGElement>(".on")?.focus(); // the focus goes back from the tag to its thing
      section.select(NOTHING);
    }
  }

  #nudge([right, up]: readonly [number, number], keys: KeyboardEvent): void {
    const { section } = this;
    const { selection } = section;
    const step = stepOf(section.units, keys);
    const [dr, dz] = section.view.lying ? [up, right] : [right, up];
    const gesture = `keys ${JSON.stringify(selection)}`;
    if (selection.kind === "vertex") {
      const at = loopIn(section.sheet, selection)?.vertices[selection.index]?.at;
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
      const loop = loopIn(section.sheet, selection);
      const side = loop?.sides[selection.index];
      if (!loop || !side) return;
      const out = outwardOf(loop, side);
      const along = dr * out[0] + dz * out[1];
      if (Math.abs(along) > ALONG)
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
    if (
      selection.kind === "vertex" &&
      (loopIn(section.sheet, selection)?.vertices.length ?? 0) > FEWEST_VERTICES
    ) {
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
