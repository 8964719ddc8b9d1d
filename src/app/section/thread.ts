/** The thread that ties the tag, or the mend card, to its thing on the drawing. */
import { nothing, svg } from "lit";
import type { SVGTemplateResult } from "lit";
import type { Place } from "../../editor/arcs.ts";
import type { Selection } from "../../editor/selection.ts";
import type { CorelagSection } from "./section.ts";
import { alongSide } from "./sheet.ts";
import type { Sheet } from "./sheet.ts";
import { toScreen } from "./view.ts";
import type { Spot, View } from "./view.ts";

/** Where the selected thing stands; null for a region or a stage, or where it is gone. */
export function placeOfSelection(sheet: Sheet, selection: Selection): Place | null {
  if (selection.kind === "probe") return sheet.probes[selection.index]?.at ?? null;
  if (selection.kind !== "vertex" && selection.kind !== "side") return null;
  const loop = sheet.loops.find((each) => each.region === selection.region && each.loop === selection.loop);
  if (selection.kind === "vertex") return loop?.vertices[selection.index]?.at ?? null;
  const side = loop?.sides[selection.index];
  return side ? alongSide(side, 0.5) : null;
}

/** The spot of a side nearest to the card at the upper right, not too near its ends. */
function sideSpot(sheet: Sheet, view: View, selection: Extract<Selection, { kind: "side" }>): Spot | null {
  const side = sheet.loops.find((each) => each.region === selection.region && each.loop === selection.loop)
    ?.sides[selection.index];
  if (!side) return null;
  const spots = [0.17, 0.34, 0.5, 0.66, 0.83].map((share) => toScreen(view, ...alongSide(side, share)));
  return spots.reduce((best, spot) => (spot[0] - spot[1] > best[0] - best[1] ? spot : best));
}

/** px from the top of the board to the thread's level, and from the right to the card */
const LEVEL = 21;
const BEND = 9;

export function threadPath(
  section: CorelagSection,
  faults: readonly Place[],
): SVGTemplateResult | typeof nothing {
  const { view, sheet, selection } = section;
  if (window.innerWidth <= 760) return nothing;
  const faulty = section.problems.length > 0 && !section.dragging;
  const cards = Number.parseFloat(getComputedStyle(section).getPropertyValue("--tag")) + (faulty ? 26 : 0);
  const end = section.size.width - 12 - cards + (faulty ? 0 : 14);
  if (!faulty && !section.tagged) return nothing;
  const place = faulty ? faults[0] : placeOfSelection(sheet, selection);
  if (!place || !Number.isFinite(place[0] + place[1])) return nothing;
  const spot =
    !faulty && selection.kind === "side" ? sideSpot(sheet, view, selection) : toScreen(view, ...place);
  if (!spot || spot[0] > end - 2 * BEND) return nothing;
  const [x, y] = spot;
  const from = faulty ? y - 13 : selection.kind === "side" ? y : y - 5;
  return svg`
    <path class="thread ${faulty ? "bad" : ""}" d="M${x} ${from}V${LEVEL + BEND}L${x + BEND} ${LEVEL}H${end}"></path>
    ${!faulty && selection.kind === "side" ? svg`<circle class="thread-end" cx=${x} cy=${y} r="3.5"></circle>` : nothing}
  `;
}
