/** Draws the lines of the board, layer over layer, and keeps what most updates leave alone. */
import { nothing, svg } from "lit";
import type { SVGTemplateResult } from "lit";
import type { CaseDocument } from "../../case/types.ts";
import type { Place } from "../../editor/arcs.ts";
import type { Rgb } from "../colours.ts";
import { faultsOf } from "./faults.ts";
import { IsothermKeeper } from "./isothermsLayer.ts";
import { outlineUnder, sidesLayer } from "./outlineLayer.ts";
import type { OutlineLayer } from "./outlineLayer.ts";
import { pointers, rulers } from "./rulers.ts";
import { inkFor, sceneValueAt } from "./scene.ts";
import type { Scene } from "./scene.ts";
import type { CorelagSection } from "./section.ts";
import { readSheet } from "./sheet.ts";
import type { Sheet } from "./sheet.ts";
import {
  balloonSize,
  balloonsLayer,
  faultsLayer,
  placeBalloons,
  pointsLayer,
  probesLayer,
  sizesLayer,
} from "./thingsLayer.ts";
import type { ThingsLayer } from "./thingsLayer.ts";
import { placeOfSelection, threadPath } from "./thread.ts";

/** From this width of the board on, type and marks go one step up [px]. */
export const BIG_BOARD = 1000;

export class BoardDrawing {
  readonly #isotherms = new IsothermKeeper();
  #scaled: { key: readonly unknown[]; drawn: SVGTemplateResult } = { key: [], drawn: svg`` };
  #sought: { scene: Scene | null; values: Map<string, number> } = { scene: null, values: new Map() };
  #ghost: { document: CaseDocument | null; sheet: Sheet | null } = { document: null, sheet: null };

  constructor(private readonly section: CorelagSection) {}

  /** @param field the scene, or null while the outline on the sheet has none of its own */
  draw(document: CaseDocument, field: Scene | null, stops: readonly Rgb[]): SVGTemplateResult {
    const { section } = this;
    const { faults, sides } = faultsOf(section.problems, section.sheet);
    const big = section.size.width > BIG_BOARD;
    const answers = field ? (section.result?.answers ?? []) : [];
    const balloons = placeBalloons(answers, section.view, big);
    const outline: OutlineLayer = {
      document,
      sheet: section.sheet,
      ghost: this.#ghostSheet(),
      view: section.view,
      bounds: section.bounds,
      units: section.units,
      selection: section.selection,
      stage: section.stageNow,
      faulty: sides,
      right: section.size.width - section.cardWidth,
      balloons: balloons.map((balloon) => balloon.at),
      balloonRadius: balloonSize(big).radius,
    };
    const things: ThingsLayer = {
      ...outline,
      focusedAnswer: section.focusedAnswer,
      untagged: !section.tagged,
      arrivalOf: section.shown.by === "arrival" ? section.shown.answer : null,
      valueAt: (place) => (field ? this.#valueAt(field, place) : Number.NaN),
      inkAt: (place) => (field ? inkFor(stops, field.range, this.#valueAt(field, place)) : "var(--ink)"),
      faults,
      big,
    };
    return svg`
      ${this.#scales()}${field ? this.#lines(field, outline, stops, big) : nothing}
      ${outlineUnder(outline)}${sizesLayer(things)}${sidesLayer(outline)}${probesLayer(things)}
      ${balloonsLayer(things, balloons)}${threadPath(section, faults)}${pointsLayer(things)}${faultsLayer(things)}
    `;
  }

  #lines(
    scene: Scene,
    { view, bounds, sheet, ghost, units }: OutlineLayer,
    stops: readonly Rgb[],
    big: boolean,
  ): SVGTemplateResult {
    // while the hand moves the labels stay where the field still is
    return this.#isotherms.layer({
      scene,
      view,
      bounds,
      sheet: ghost ?? sheet,
      stops,
      shown: this.section.shown,
      units,
      big,
    });
  }

  /** The outline before the running gesture. */
  #ghostSheet(): Sheet | null {
    const { earlier } = this.section;
    if (this.#ghost.document !== earlier)
      this.#ghost = { document: earlier, sheet: earlier && readSheet(earlier) };
    return this.#ghost.sheet;
  }

  /** The scales, and pointers on them at what is dragged. */
  #scales(): SVGTemplateResult {
    const { view, size, units, dragging, sheet, selection } = this.section;
    const key = [view, size.width, size.height, size.left, units];
    if (!key.every((part, i) => part === this.#scaled.key[i]))
      this.#scaled = { key, drawn: rulers(view, size, units) };
    const held = dragging ? placeOfSelection(sheet, selection) : null;
    return held ? svg`${this.#scaled.drawn}${pointers(view, size, held)}` : this.#scaled.drawn;
  }

  /** Value of the field at a place, sought once. */
  #valueAt(scene: Scene, [r, z]: Place): number {
    if (this.#sought.scene !== scene) this.#sought = { scene, values: new Map() };
    const key = `${r} ${z}`;
    const known = this.#sought.values.get(key);
    if (known !== undefined) return known;
    const value = sceneValueAt(scene, r, z);
    this.#sought.values.set(key, value);
    return value;
  }
}
