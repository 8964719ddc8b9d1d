/** What the section says at the pointer, and the field as a sentence for listeners. */
import { html, nothing } from "lit";
import type { TemplateResult } from "lit";
import { shownUnit } from "../../case/units.ts";
import type { UnitSystem } from "../../case/units.ts";
import { duration, place as placeWords, temperature } from "../controls/figures.ts";
import { coordinate } from "./rulers.ts";
import { sceneValueAt } from "./scene.ts";
import type { Extreme, Scene } from "./scene.ts";
import type { CorelagSection } from "./section.ts";
import { insidePart } from "./sheet.ts";
import { fromScreen } from "./view.ts";

/** px from the pointer to the readout, and the room it takes */
const AWAY = 16;
const ROOM = { width: 210, height: 30 };

export function readoutOf(section: CorelagSection, scene: Scene | null): TemplateResult | typeof nothing {
  const { pointer, view, units, size } = section;
  if (!pointer || section.hand.busy) return nothing;
  const [x, y] = pointer;
  const [r, z] = fromScreen(view, x, y);
  if (!insidePart(section.sheet, [Math.abs(r), z])) return nothing;
  const value = scene && section.status !== "waiting" ? sceneValueAt(scene, r, z) : Number.NaN;
  const left = Math.min(x + AWAY, size.width - ROOM.width);
  const top = y + AWAY + ROOM.height > size.height - size.foot ? y - AWAY - ROOM.height : y + AWAY;
  return html`<div class="readout" style="left:${left}px;top:${top}px" aria-hidden="true">
    ${Number.isFinite(value) ? html`<b>${valueText(section, value)}</b>` : nothing}
    ${`r ${coordinate(Math.abs(r), units)} z ${coordinate(z, units)}`}
  </div>`;
}

function valueText(section: CorelagSection, value: number): string {
  return section.shown.by === "arrival" ? duration(value) : temperature(value, section.units).text;
}

/** "At 4 h 05 min from 690 °C at r 160, z 900 to 1024 °C on the axis, z 239 mm." */
export function sceneSentence(section: CorelagSection, scene: Scene): string {
  const { units } = section;
  const at = (extreme: Extreme): string => `${valueText(section, extreme.value)} ${where(extreme, units)}`;
  const begin =
    section.shown.by === "arrival" ? "Points get there from" : `At ${duration(section.cursor)} from`;
  return `${begin} ${at(scene.low)} to ${at(scene.high)}.`;
}

function where({ place }: Extreme, units: UnitSystem): string {
  const words = placeWords(place, units);
  return `${words.startsWith("on") ? "" : "at "}${words} ${shownUnit("length", units)}`;
}
