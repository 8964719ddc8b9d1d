/** What stands on the drawing: sizes, probes, balloons of the answers, points, rings of faults. */
import { nothing, svg } from "lit";
import type { SVGTemplateResult } from "lit";
import type { UnitSystem } from "../../case/units.ts";
import { shownUnit, toShown } from "../../case/units.ts";
import type { Place } from "../../editor/arcs.ts";
import { sameSelection } from "../../editor/selection.ts";
import type { Selection } from "../../editor/selection.ts";
import type { Answer } from "../../run/result.ts";
import { temperature } from "../controls/figures.ts";
import { dimensionRoom, dimensionsOf, drawDimension } from "./dimensions.ts";
import type { Dimension } from "./dimensions.ts";
import { coordinate } from "./rulers.ts";
import { insidePart, nearestOn } from "./sheet.ts";
import type { Sheet, SheetLoop } from "./sheet.ts";
import { vertexWords } from "./spoken.ts";
import { fromScreen, toScreen } from "./view.ts";
import type { Bounds, Spot, View } from "./view.ts";

export interface ThingsLayer {
  readonly sheet: Sheet;
  readonly view: View;
  readonly bounds: Bounds;
  readonly units: UnitSystem;
  readonly selection: Selection;
  readonly focusedAnswer: number | null;
  /** answer whose arrival colours the section; null for none */
  readonly arrivalOf: number | null;
  /** degC at a place of the part, NaN where unknown */
  readonly valueAt: (place: Place) => number;
  /** colour of lines on the field there */
  readonly inkAt: (place: Place) => string;
  /** the tag does not stand: a selected point says its coordinates itself */
  readonly untagged: boolean;
  /** places of faults */
  readonly faults: readonly Place[];
  readonly big: boolean;
}

/** px below which a size does not find room between its heads */
const SIZE_ROOM = 34;

export function sizesLayer(layer: ThingsLayer): SVGTemplateResult[] {
  const room = dimensionRoom(layer.view, layer.bounds, layer.big ? 26 : 19);
  return dimensionsOf(layer.sheet).map((dimension) => {
    const drawn = drawDimension(dimension, layer.view, room);
    const [x, y] = drawn.middle;
    const text = `${dimension.kind === "diameter" ? "Ø " : ""}${sizeText(dimension.value, layer.units)}`;
    const { region, loop, index, arc } = dimension.point;
    const fits = drawn.room > SIZE_ROOM || drawn.upright;
    return svg`
      <path class="dim" d=${drawn.path}></path><path class="dim-head" d=${drawn.heads}></path>
      ${
        fits
          ? svg`<text class="size" x=${x} y=${y} dy="4" text-anchor="middle" transform=${drawn.upright ? `rotate(-90 ${x} ${y})` : ""}
              data-grip=${arc ? "side" : "size"} data-region=${region} data-loop=${loop} data-index=${index}>${text}<title>${sizeTitle(dimension)}</title></text>`
          : nothing
      }
    `;
  });
}

const sizeTitle = ({ point }: Dimension): string =>
  `Set by ${point.arc ? "side" : "point"} ${point.index + 1}`;

function sizeText(metres: number, units: UnitSystem): string {
  return String(Number(toShown(metres, "length", units).toFixed(units === "si" ? 1 : 3)));
}

/** m: nearer to a side than this a probe counts as on it */
const ON_SIDE = 1e-6;

function onOrInside(sheet: Sheet, place: Place): boolean {
  if (insidePart(sheet, place)) return true;
  return sheet.loops.some((loop) => loop.sides.some((side) => nearestOn(side, place).distance < ON_SIDE));
}

export function probesLayer(layer: ThingsLayer): SVGTemplateResult[] {
  return layer.sheet.probes.map((probe, index) => {
    if (!Number.isFinite(probe.at[0] + probe.at[1])) return svg``;
    const [x, y] = toScreen(layer.view, ...probe.at);
    const value = layer.valueAt(probe.at);
    const outside = !onOrInside(layer.sheet, probe.at);
    const ink = outside ? "var(--ink-2)" : layer.inkAt(probe.at);
    const selected = sameSelection(layer.selection, { kind: "probe", index });
    const says = outside ? "outside" : Number.isFinite(value) ? temperature(value, layer.units).text : "";
    const [dx, dy] = probe.at[0] < 1e-6 ? [10, -7] : [11, 15];
    const onPart = [0, 6.4 * probe.name.length].every((along) =>
      [-9, 3].every((up) => {
        const [r, z] = fromScreen(layer.view, x + dx + along, y + dy + up);
        return r > 0 && insidePart(layer.sheet, [r, z]);
      }),
    );
    return svg`<g class="probe ${selected ? "on" : ""} ${outside ? "outside" : ""}" role="button" tabindex="0" data-grip="probe" data-index=${index}
      aria-label="Probe ${probe.name}, r ${coordinate(probe.at[0], layer.units)}, z ${coordinate(probe.at[1], layer.units)} ${shownUnit("length", layer.units)}, ${says}"
      aria-pressed=${selected} style="--on-field: ${ink}">
      <circle class="hit" cx=${x} cy=${y} r="12"></circle>
      <circle class="ring" cx=${x} cy=${y} r="3.5"></circle>
      <path class="cross" d="M${x - 8} ${y}h16M${x} ${y - 8}v16"></path>
      <text class="probe-name ${onPart ? "" : "beside"}" x=${x + dx} y=${y + dy}>${probe.name}<tspan class="reads"> ${says}</tspan></text>
    </g>`;
  });
}

/** px: radius of a balloon, and how far it stands above its place */
export const balloonSize = (big: boolean): { radius: number; rise: number } =>
  big ? { radius: 10, rise: 30 } : { radius: 8.5, rise: 22 };

/** A balloon of an answer: its foot at the place that decides, its middle above it. */
export interface Balloon {
  /** number of the answer, from 0 */
  readonly index: number;
  readonly place: Place;
  readonly foot: Spot;
  readonly at: Spot;
}

/** Balloons at the places that decide the answers; several near one place stand side by side. */
export function placeBalloons(answers: readonly Answer[], view: View, big: boolean): Balloon[] {
  const { radius, rise } = balloonSize(big);
  const placed: Balloon[] = [];
  answers.forEach(({ place }, index) => {
    if (place === null) return;
    const foot = toScreen(view, ...place);
    let at: Spot = [foot[0], foot[1] - rise];
    while (placed.some((other) => Math.hypot(other.at[0] - at[0], other.at[1] - at[1]) < 2 * radius + 3))
      at = [at[0] + 2 * radius + 4, at[1]];
    placed.push({ index, place, foot, at });
  });
  return placed;
}

export function balloonsLayer(layer: ThingsLayer, balloons: readonly Balloon[]): SVGTemplateResult {
  const { radius } = balloonSize(layer.big);
  const lit = (index: number): string =>
    layer.focusedAnswer === index || layer.arrivalOf === index ? "lit" : "";
  return svg`<g class="balloons" aria-hidden="true">
    ${balloons.map(({ place, foot: [x, y], at }) => {
      const ink = layer.inkAt(place);
      return svg`<path d="M${x} ${y}L${at[0]} ${at[1]}" stroke=${ink} stroke-width="1.25"></path>
        <circle cx=${x} cy=${y} r="2.75" fill=${ink}></circle>`;
    })}
    ${balloons.map(
      ({ index, at }) => svg`<circle class="ball ${lit(index)}" cx=${at[0]} cy=${at[1]} r=${radius}></circle>
        <text class="ball-n ${lit(index)}" x=${at[0]} y=${at[1] + 4.3}>${index + 1}</text>`,
    )}
  </g>`;
}

export function pointsLayer(layer: ThingsLayer): SVGTemplateResult[] {
  return layer.sheet.loops.flatMap((loop) => [
    ...loop.vertices.map((_, index) => pointOf(layer, loop, index)),
    ...loop.sides.filter((side) => side.curved).map((side) => bulgeOf(layer, loop, side.index)),
  ]);
}

function pointOf(layer: ThingsLayer, loop: SheetLoop, index: number): SVGTemplateResult {
  const { at } = loop.vertices[index]!;
  if (!Number.isFinite(at[0] + at[1])) return svg``;
  const [x, y] = toScreen(layer.view, ...at);
  const selected = sameSelection(layer.selection, {
    kind: "vertex",
    region: loop.region,
    loop: loop.loop,
    index,
  });
  return svg`<g class="point ${selected ? "on" : ""}" role="button" tabindex="0" data-grip="vertex"
    data-region=${loop.region} data-loop=${loop.loop} data-index=${index}
    aria-label=${vertexWords(loop, index, layer.units)} aria-pressed=${selected}>
    <circle class="hit" cx=${x} cy=${y} r="13"></circle>
    ${selected ? svg`<circle class="halo" cx=${x} cy=${y} r="13"></circle>` : nothing}
    ${selected && layer.untagged ? coordinatesAt(layer, at, x, y) : nothing}
    <rect class="box" x=${x - 4} y=${y - 4} width="8" height="8"></rect>
  </g>`;
}

function coordinatesAt({ units }: ThingsLayer, [r, z]: Place, x: number, y: number): SVGTemplateResult {
  return svg`<text class="coordinates" x=${x + 16} y=${y - 12}>r ${coordinate(r, units)}  z ${coordinate(z, units)}</text>`;
}

/** The round grip in the middle of an arc: shown while the side or one of its ends is selected. */
function bulgeOf(layer: ThingsLayer, loop: SheetLoop, index: number): SVGTemplateResult {
  const { selection } = layer;
  const shown =
    selection.kind === "side" &&
    selection.region === loop.region &&
    selection.loop === loop.loop &&
    selection.index === index;
  const through = loop.vertices[index]!.through;
  if (!shown || !through) return svg``;
  const [x, y] = toScreen(layer.view, ...through);
  return svg`<g class="bulge" data-grip="bulge" data-region=${loop.region} data-loop=${loop.loop} data-index=${index}>
    <circle class="hit" cx=${x} cy=${y} r="13"></circle><circle class="box" cx=${x} cy=${y} r="4.5"></circle>
  </g>`;
}

export function faultsLayer(layer: ThingsLayer): SVGTemplateResult[] {
  return layer.faults.map(([r, z]) => {
    const [x, y] = toScreen(layer.view, r, z);
    return svg`<circle class="fault-ring" cx=${x} cy=${y} r="13"></circle>`;
  });
}
