/** The outline on the board: axis, mirrored half, marks of the conditions, sides that can be taken. */
import { nothing, svg } from "lit";
import type { SVGTemplateResult, TemplateResult } from "lit";
import type { CaseDocument } from "../../case/types.ts";
import type { UnitSystem } from "../../case/units.ts";
import type { Place } from "../../editor/arcs.ts";
import { conditionOf } from "../../editor/conditions.ts";
import { sameSelection } from "../../editor/selection.ts";
import type { Selection } from "../../editor/selection.ts";
import { conditionWords, sideName } from "./spoken.ts";
import { markOf, markPath, outsideIsLeft } from "./marks.ts";
import { alongSide } from "./sheet.ts";
import type { Sheet, SheetLoop, SheetSide } from "./sheet.ts";
import { toMirror, toScreen } from "./view.ts";
import type { Bounds, Spot, View } from "./view.ts";

export interface OutlineLayer {
  readonly document: CaseDocument;
  readonly sheet: Sheet;
  /** the outline before the running gesture */
  readonly ghost: Sheet | null;
  readonly view: View;
  readonly bounds: Bounds;
  readonly units: UnitSystem;
  readonly selection: Selection;
  /** stage whose conditions are marked */
  readonly stage: number;
  /** sides at fault, as "region loop index" */
  readonly faulty: ReadonlySet<string>;
  /** right end of the free room [px] */
  readonly right: number;
  /** where the balloons of the answers stand */
  readonly balloons: readonly Spot[];
  readonly balloonRadius: number;
}

export const sideKey = (loop: SheetLoop, side: SheetSide): string =>
  `${loop.region} ${loop.loop} ${side.index}`;

type Project = (view: View, r: number, z: number) => Spot;

export function pathOf(points: readonly Place[], view: View, project: Project): string {
  const sound = points.filter(([r, z]) => Number.isFinite(r + z));
  return sound.map(([r, z], i) => `${i === 0 ? "M" : "L"}${spotText(project(view, r, z))}`).join("");
}

export const spotText = ([x, y]: Spot): string => `${x.toFixed(1)} ${y.toFixed(1)}`;

const drawnSides = (sheet: Sheet): SheetSide[] =>
  sheet.loops.flatMap((loop) => loop.sides.filter((side) => !side.onAxis));

/** Everything under the hands: drawn before the sides and points that can be taken. */
export function outlineUnder(layer: OutlineLayer): SVGTemplateResult {
  const { view, sheet } = layer;
  const mirror = drawnSides(sheet)
    .map((side) => pathOf(side.points, view, toMirror))
    .join("");
  const ghost =
    layer.ghost &&
    drawnSides(layer.ghost)
      .map((side) => pathOf(side.points, view, toScreen))
      .join("");
  return svg`
    ${sheet.loops.map((loop) => loop.sides.map((side) => marksOf(layer, loop, side)))}
    <path class="axis" d=${axisPath(layer)}></path>
    <path class="mirror" d=${mirror}></path>
    ${ghost ? svg`<path class="ghost" d=${ghost}></path>` : nothing}
  `;
}

function axisPath({ view, bounds }: OutlineLayer): string {
  const [a, b] = [toScreen(view, 0, bounds.zMin), toScreen(view, 0, bounds.zMax)];
  return view.lying ? `M${a[0] - 26} ${a[1]}H${b[0] + 30}` : `M${a[0]} ${a[1] + 26}V${b[1] - 30}`;
}

function marksOf(layer: OutlineLayer, loop: SheetLoop, side: SheetSide): TemplateResult | typeof nothing {
  if (side.onAxis || side.joint) return nothing;
  const stage = layer.document.stages[layer.stage];
  const mark = markOf(conditionOf(stage, side.name)?.condition);
  const halves = [toScreen, toMirror].map((project) => {
    const spots = side.points.map(([r, z]) => project(layer.view, r, z));
    const around = loop.vertices.map((vertex) => project(layer.view, ...vertex.at));
    return markPath(mark, spots, outsideIsLeft(around, loop.loop > 0));
  });
  return halves[0] === ""
    ? nothing
    : (svg`<path class="mark ${mark}" d=${halves.join("")}></path>` as TemplateResult);
}

/** The sides themselves, each a thing to take. */
export function sidesLayer(layer: OutlineLayer): SVGTemplateResult[] {
  return layer.sheet.loops.flatMap((loop) =>
    loop.sides.filter((side) => !side.onAxis).map((side) => sideOf(layer, loop, side)),
  );
}

/** px: a level or upright side has no width of its own; this gives it one for touch and for listeners */
const EXTENT = 16;

function sideOf(layer: OutlineLayer, loop: SheetLoop, side: SheetSide): SVGTemplateResult {
  const d = pathOf(side.points, layer.view, toScreen);
  const middle = toScreen(layer.view, ...alongSide(side, 0.5));
  const { region, loop: number } = loop;
  const selected = sameSelection(layer.selection, { kind: "side", region, loop: number, index: side.index });
  const found = conditionOf(layer.document.stages[layer.stage], side.name);
  const lacks = !side.joint && found === undefined && layer.document.stages.length > 0;
  const words = lacks
    ? "needs a condition"
    : side.joint
      ? "joint"
      : conditionWords(found, layer.document.stages[layer.stage], layer.units);
  const within = layer.selection.kind === "region" && layer.selection.region === region;
  const state = [
    selected ? "on" : "",
    within ? "within" : "",
    layer.faulty.has(sideKey(loop, side)) ? "faulty" : "",
    lacks ? "lacks" : "",
  ].join(" ");
  return svg`<g
    class="side ${state}" role="button" tabindex="0" data-grip="side" data-region=${region} data-loop=${number} data-index=${side.index}
    aria-label="${sideName(side)}, ${words}" aria-pressed=${selected}
  >
    <rect class="extent" x=${middle[0] - EXTENT / 2} y=${middle[1] - EXTENT / 2} width=${EXTENT} height=${EXTENT}></rect>
    <path class="hit" d=${d}></path><path class="line" d=${d}></path>
    ${noteAt(layer, loop, side, `${side.name}: ${words}`, lacks)}
  </g>`;
}

/** px between a side and the words beside it; width of a letter; height of the words */
const NOTE_GAP = 12;
const LETTER = 6.2;
const NOTE_HEIGHT = 14;
/** Shares of a side where its words may stand, the best first. */
const NOTE_SHARES = [0.3, 0.16, 0.6, 0.8] as const;

interface Note {
  readonly x: number;
  readonly y: number;
  readonly anchor: "start" | "middle" | "end";
}

/** The words beside a side: shown while it is pointed at, focused or selected, or when it lacks a condition. */
function noteAt(
  layer: OutlineLayer,
  loop: SheetLoop,
  side: SheetSide,
  words: string,
  lacks: boolean,
): SVGTemplateResult | typeof nothing {
  const left = outsideIsLeft(
    loop.vertices.map((vertex) => toScreen(layer.view, ...vertex.at)),
    loop.loop > 0,
  );
  const note = NOTE_SHARES.map((share) => besideSide(layer.view, side, share, left)).find((spot) =>
    fits(layer, spot, words),
  );
  if (!note) return nothing;
  return svg`<text class="note ${lacks ? "lack" : ""}" x=${note.x} y=${note.y} text-anchor=${note.anchor}>${words}</text>`;
}

function besideSide(view: View, side: SheetSide, share: number, left: boolean): Note {
  const [a, b] = [alongSide(side, share), alongSide(side, share + 0.04)].map((at) =>
    toScreen(view, ...at),
  ) as [Spot, Spot];
  const length = Math.hypot(b[0] - a[0], b[1] - a[1]) || 1;
  const [along, down] = [(b[0] - a[0]) / length, (b[1] - a[1]) / length];
  const out: Spot = left ? [down, -along] : [-down, along];
  const flat = Math.abs(out[1]) > 0.6;
  const drop = out[1] > 0.6 ? 10 : flat ? 0 : 4;
  return {
    x: a[0] + out[0] * NOTE_GAP,
    y: a[1] + out[1] * NOTE_GAP + drop,
    anchor: flat ? "middle" : out[0] > 0 ? "start" : "end",
  };
}

/** Whether the words stay in the free room and clear of the balloons. */
function fits(layer: OutlineLayer, { x, y, anchor }: Note, words: string): boolean {
  const width = words.length * LETTER;
  const from = x - (anchor === "middle" ? width / 2 : anchor === "end" ? width : 0);
  const clear = layer.balloons.every(
    ([bx, by]) =>
      bx + layer.balloonRadius < from ||
      bx - layer.balloonRadius > from + width ||
      Math.abs(by - y + NOTE_HEIGHT / 2) > layer.balloonRadius + NOTE_HEIGHT / 2,
  );
  return from + width < layer.right && clear;
}
