/** Draws what the hand can move: stages and their ends, the surroundings with their knobs, the time cursor. */
import { nothing, svg } from "lit";
import type { SVGTemplateResult } from "lit";
import type { UnitSystem } from "../../case/units.ts";
import { duration, lasting, temperature } from "../controls/figures.ts";
import { cross, f } from "./draw-scales.ts";
import type { Frame } from "./frame.ts";
import { textWidth, touch, within } from "./place-labels.ts";
import type { Box } from "./place-labels.ts";
import { boundsOf } from "./reading.ts";
import type { Reading } from "./reading.ts";
import { valueOn } from "./schedule.ts";
import type { Knot, LinePlace, StageBlock, SurroundingsLine } from "./schedule.ts";
import type { Scales } from "./scales.ts";
import { endWords, plain } from "./spoken.ts";

/** What the hand has hold of, as the handles say it to the strip. */
export type Handle =
  | { readonly kind: "cursor" }
  | { readonly kind: "end"; readonly stage: number }
  | { readonly kind: "knot"; readonly place: LinePlace; readonly index: number };

export interface HandEvents {
  readonly press: (event: PointerEvent, handle: Handle) => void;
  readonly key: (event: KeyboardEvent, handle: Handle) => void;
  readonly keyUp: (event: KeyboardEvent) => void;
  readonly select: (stage: number) => void;
  readonly addStage: () => void;
  /** handle under the hand at this moment, for its figure */
  readonly held: Handle | null;
  /** selected stage, or null */
  readonly selected: number | null;
}

const same = (a: Handle | null, b: Handle): boolean => JSON.stringify(a) === JSON.stringify(b);

// --- the row of stages ----------------------------------------------------------------------------------------------

export function drawStages(frame: Frame, on: HandEvents): SVGTemplateResult {
  const { scales, schedule } = frame;
  const tools = scales.room.width - 40; // the table button stands there
  return svg`${schedule.map((block) => drawStage(block, scales, on, tools))}
    ${schedule.map((block) => drawEdge(block, scales))}
    ${drawAdd(schedule, scales, on, tools)}`;
}

const PAD = 10;

function drawStage(block: StageBlock, scales: Scales, on: HandEvents, limit: number): SVGTemplateResult {
  const { row, bodySize, noteSize } = scales.room;
  const [from, to] = [scales.x(block.began), scales.x(block.ended)];
  const room = Math.min(to, limit) - from - 2 * PAD;
  const nameWidth = textWidth(block.name, bodySize * 1.04);
  const does = block.does.find((words) => nameWidth + 14 + textWidth(words, noteSize * 1.04) <= room) ?? "";
  const label = plain(`Stage ${block.index + 1}: ${block.name}, ${block.does[0] ?? ""}`);
  const base = row / 2 + bodySize * 0.34;
  const chosen = on.selected === block.index;
  return svg`<g class="stage ${chosen ? "chosen" : ""}" role="button" tabindex="0" aria-pressed=${chosen ? "true" : "false"}
      aria-label=${label} @click=${() => on.select(block.index)}
      @keydown=${(event: KeyboardEvent) => pressedKey(event) && on.select(block.index)}>
    <title>${label}</title>
    <rect class="block" x=${f(from)} y="0" width=${f(Math.max(1, to - from))} height=${row - 1} />
    ${nameWidth <= room ? svg`<text class="stage-name" x=${f(from + PAD)} y=${base}>${block.name}</text>` : nothing}
    ${does === "" || nameWidth > room ? nothing : svg`<text class="stage-does" x=${f(from + PAD + nameWidth + 14)} y=${base}>${does}</text>`}
    ${nameWidth <= room ? nothing : drawHung(block, scales, from, to)}
  </g>`;
}

const pressedKey = (event: KeyboardEvent): boolean => event.key === "Enter";

/** A stage too short to hold its name has it hang below on a thread, low in the plot. */
function drawHung(block: StageBlock, scales: Scales, from: number, to: number): SVGTemplateResult {
  const middle = (from + to) / 2;
  const y = scales.bottom - 24 - (block.index % 2) * 18;
  const length = lasting(block.ended - block.began);
  const words = `${block.name} ${length}`;
  const left = middle - 10 - textWidth(words, scales.room.noteSize) > scales.room.left + 12;
  const [anchor, x, thread] = left ? ["end", middle - 10, -7] : ["start", middle + 10, 7];
  return svg`<path class="thread" d="M${f(middle)} ${scales.room.row}v-6M${f(middle)} ${y - 4}h${thread}" />
    <text class="hung" x=${f(x)} y=${y} text-anchor=${anchor}><tspan class="hung-name">${block.name}</tspan> ${length}</text>`;
}

function drawEdge(block: StageBlock, scales: Scales): SVGTemplateResult {
  const x = f(scales.x(block.ended));
  return svg`<path class="edge" d="M${x} 0V${scales.bottom}" />`;
}

function drawAdd(
  schedule: readonly StageBlock[],
  scales: Scales,
  on: HandEvents,
  limit: number,
): SVGTemplateResult | typeof nothing {
  const last = schedule.at(-1);
  if (last === undefined) return nothing;
  const x = scales.x(last.ended) + 12;
  const words = ["+ stage", "+"].find((text) => x + textWidth(text, scales.room.noteSize) <= limit);
  if (words === undefined) return nothing;
  const width = textWidth(words, scales.room.noteSize) + 8;
  return svg`<g class="add" role="button" tabindex="0" aria-label="Add a stage" @click=${on.addStage}
      @keydown=${(event: KeyboardEvent) => pressedKey(event) && on.addStage()}>
    <title>Add a stage</title>
    <rect class="block" x=${f(x - 6)} y="2" width=${f(width + 4)} height=${scales.room.row - 5} />
    <text class="stage-does" x=${f(x)} y=${scales.room.row / 2 + 5}>${words}</text></g>`;
}

// --- stage ends -----------------------------------------------------------------------------------------------------

export function drawGrips(frame: Frame, on: HandEvents): SVGTemplateResult {
  return svg`${frame.schedule.map((block) => drawGrip(frame, block, on))}`;
}

function drawGrip({ scales, system }: Frame, block: StageBlock, on: HandEvents): SVGTemplateResult {
  const handle: Handle = { kind: "end", stage: block.index };
  const { row } = scales.room;
  const x = scales.x(block.ended);
  const limit = block.limit !== null;
  const now = limit ? Math.round(block.limit ?? 0) : Math.round(block.ended);
  const words = limit ? temperature(block.limit ?? 0, system).text : duration(block.ended);
  return svg`<g class="grip" role="slider" tabindex="0" aria-label=${limit ? `Limit of ${block.name}` : `End of ${block.name}`}
      aria-orientation="horizontal" aria-valuemin=${limit ? -273 : 0} aria-valuemax=${limit ? 5000 : Math.round(scales.end)}
      aria-valuenow=${now} aria-valuetext=${endWords(block, system)}
      @pointerdown=${(event: PointerEvent) => on.press(event, handle)}
      @keydown=${(event: KeyboardEvent) => on.key(event, handle)} @keyup=${on.keyUp}>
    <rect class="reach" x=${f(x - 9)} y="0" width="18" height=${row} />
    <path class="bars" d="M${f(x - 1.5)} 8v${row - 16}M${f(x + 1.5)} 8v${row - 16}" />
    ${same(on.held, handle) ? drawFigure(scales, x, row + 16, words) : nothing}
  </g>`;
}

/** The figure beside what is being moved, inside the plot. */
function drawFigure(scales: Scales, x: number, y: number, words: string): SVGTemplateResult {
  const width = textWidth(words, scales.room.noteSize);
  const left = x + 10 + width > scales.room.width - 4;
  return svg`<text class="figure" x=${f(left ? x - 10 : x + 10)} y=${f(y)} text-anchor=${left ? "end" : "start"}>${words}</text>`;
}

// --- surroundings ---------------------------------------------------------------------------------------------------

export function drawSurroundings(frame: Frame): SVGTemplateResult {
  const { scales, schedule } = frame;
  const lines = schedule.flatMap((block) => block.lines);
  const path = lines.map((line) => poly(line, scales)).join("");
  return svg`<path class="ambient" d=${path} /><path class="jump" d=${jumps(schedule, scales)} />`;
}

function poly({ knots }: SurroundingsLine, scales: Scales): string {
  return knots
    .map(({ at, degC }, i) => `${i === 0 ? "M" : "L"}${f(scales.x(at))} ${f(scales.y(degC))}`)
    .join("");
}

/** Jumps of the surroundings from stage to stage, dotted: nobody draws them, they happen. */
function jumps(schedule: readonly StageBlock[], scales: Scales): string {
  let path = "";
  for (let i = 1; i < schedule.length; i++) {
    const before = schedule[i - 1]?.lines[0]?.knots.at(-1);
    const after = schedule[i]?.lines[0]?.knots[0];
    if (before === undefined || after === undefined || before.degC === after.degC) continue;
    path += `M${f(scales.x(after.at))} ${f(scales.y(before.degC))}V${f(scales.y(after.degC))}`;
  }
  return path;
}

/** Names of the lines, each where it touches nothing; a name that fits nowhere is left out. */
export function drawLineNames(frame: Frame, taken: readonly Box[]): SVGTemplateResult {
  const all = [...taken];
  return svg`${frame.schedule.flatMap((block) =>
    block.lines.map((line) => {
      const words = `${line.name} ${rangeOf(line, frame.system)}`;
      const box = placeName(words, line, frame, all);
      if (box === null) return nothing;
      all.push(box);
      return svg`<text class="amb" x=${f(box.x)} y=${f(box.y + box.height - 4)}>${words}</text>`;
    }),
  )}`;
}

function rangeOf(line: SurroundingsLine, system: UnitSystem): string {
  const values = line.knots.map((knot) => knot.degC);
  return values.every((value) => value === values[0]) ? temperature(values[0] ?? 0, system).text : "";
}

function placeName(
  words: string,
  { knots }: SurroundingsLine,
  frame: Frame,
  taken: readonly Box[],
): Box | null {
  const { scales } = frame;
  const size = scales.room.noteSize;
  const [width, height] = [textWidth(words, size * 1.05), size + 5];
  const [from, to] = [scales.x(knots[0]?.at ?? 0), scales.x(knots.at(-1)?.at ?? 0)];
  if (to - from < width + 24) return null;
  for (const x of [to - width - 10, from + 14, (from + to - width) / 2]) {
    const level = scales.y(valueOn(knots, scales.seconds(x + width / 2)));
    for (const y of [level - height - 2, level + 4]) {
      const box = { x, y, width, height };
      if (within(box, boundsOf(scales)) && !taken.some((other) => touch(box, other, 2)) && free(box, frame))
        return box;
    }
  }
  return null;
}

function free(box: Box, { crowd }: Frame): boolean {
  for (let i = 0; i + 1 < crowd.length; i += 2) {
    const inside =
      crowd[i]! > box.x &&
      crowd[i]! < box.x + box.width &&
      crowd[i + 1]! > box.y &&
      crowd[i + 1]! < box.y + box.height;
    if (inside) return false;
  }
  return true;
}

export function drawKnobs(frame: Frame, on: HandEvents): SVGTemplateResult {
  return svg`${frame.schedule.flatMap((block) =>
    block.lines.flatMap((line) =>
      line.knots.map((knot, i) => (knot.held ? drawKnob(frame, line, knot, i, on) : nothing)),
    ),
  )}`;
}

function drawKnob(
  frame: Frame,
  line: SurroundingsLine,
  knot: Knot,
  index: number,
  on: HandEvents,
): SVGTemplateResult {
  const { scales, system, schedule } = frame;
  const handle: Handle = { kind: "knot", place: line.place, index };
  const [x, y] = [scales.x(knot.at), scales.y(knot.degC)];
  const stage = schedule[line.place.stage]?.name ?? "";
  const when = knot.index === null ? "" : plain(` at ${duration(knot.at)}`);
  const words = temperature(knot.degC, system).text;
  return svg`<g class="knob" role="slider" tabindex="0" aria-orientation="vertical" aria-label="${stage}, ${line.name}${when}"
      aria-valuemin="-273" aria-valuemax="5000" aria-valuenow=${Math.round(knot.degC)} aria-valuetext=${plain(words)}
      @pointerdown=${(event: PointerEvent) => on.press(event, handle)}
      @keydown=${(event: KeyboardEvent) => on.key(event, handle)} @keyup=${on.keyUp}>
    <rect class="reach" x=${f(x - 11)} y=${f(y - 11)} width="22" height="22" />
    <rect class="square" x=${f(x - 3.5)} y=${f(y - 3.5)} width="7" height="7" />
    ${same(on.held, handle) ? drawFigure(scales, x, y < scales.top + 24 ? y + 20 : y - 9, words) : nothing}
  </g>`;
}

// --- the time cursor ------------------------------------------------------------------------------------------------

export interface CursorView {
  readonly at: number;
  readonly resolution: number;
  /** what the slider says */
  readonly words: string;
  readonly reading: Reading | null;
  /** y of the dots on the curves */
  readonly dots: readonly number[];
  /** coldest and hottest at the cursor [degC] */
  readonly span: readonly [number, number] | null;
}

export function drawCursor({ scales, end }: Frame, view: CursorView, on: HandEvents): SVGTemplateResult {
  const handle: Handle = { kind: "cursor" };
  const { room, bottom } = scales;
  const x = scales.x(view.at);
  const text = duration(view.at, view.resolution);
  const width = Math.max(56, textWidth(text, room.noteSize * 1.05) + 22);
  const left = Math.min(room.width - width - 1, Math.max(1, x - width / 2));
  const top = bottom + 5;
  const high = room.foot - 7;
  return svg`<g class="time" role="slider" tabindex="0" aria-label="Time" aria-orientation="horizontal" aria-valuemin="0"
      aria-valuemax=${Math.round(end)} aria-valuenow=${Math.round(view.at)} aria-valuetext=${view.words}
      @pointerdown=${(event: PointerEvent) => on.press(event, handle)}
      @keydown=${(event: KeyboardEvent) => on.key(event, handle)} @keyup=${on.keyUp}>
    <rect class="reach" x=${f(x - 7)} y=${room.row} width="14" height=${bottom - room.row} />
    <path class="cursor" d="M${f(x)} ${room.row}V${bottom + 6}" />
    <path class="flag" d="M${f(left)} ${top}h${f(width)}v${high}h${f(-width)}zM${f(x)} ${top - 6}l6 6.5h-12z" />
    <text class="flag-t" x=${f(left + width / 2)} y=${f(top + high / 2 + room.noteSize * 0.35)} text-anchor="middle">${text}</text>
  </g>`;
}

export function drawReading({ scales }: Frame, view: CursorView): SVGTemplateResult {
  const x = f(scales.x(view.at));
  const { left } = scales.room;
  const span = view.span;
  const bracket =
    span === null
      ? nothing
      : svg`<path class="span" d="M${left + 2} ${f(scales.y(span[1]))}h6V${f(scales.y(span[0]))}h-6" />`;
  return svg`${bracket}${view.dots.map((y) => svg`<circle class="dot" cx=${x} cy=${f(y)} r="3.2" />`)}${
    view.reading === null ? nothing : view.reading.cells.map((cell) => drawCell(cell, view.reading!))
  }`;
}

function drawCell(cell: Reading["cells"][number], reading: Reading): SVGTemplateResult {
  const { x, y, habit, value, name } = cell;
  return svg`<path class=${habit} d="M${f(x)} ${f(y - 4.5)}h26" />
    ${habit === "probe" ? svg`<path class="crosses" d=${cross(x + 13, y - 4.5)} />` : nothing}
    <text class="key v" x=${f(x + reading.valueEnd)} y=${f(y)} text-anchor="end">${value}</text>
    <text class="key" x=${f(x + reading.nameStart)} y=${f(y)}>${name}</text>`;
}
