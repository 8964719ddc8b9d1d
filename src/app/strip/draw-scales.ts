/** Draws what the curves stand on: grounds, graduations, figures, and the scale that wears the colours of the map. */
import { nothing, svg } from "lit";
import type { SVGTemplateResult } from "lit";
import { shownUnit } from "../../case/units.ts";
import type { Rgb } from "../colours.ts";
import type { Frame } from "./frame.ts";
import { textWidth } from "./place-labels.ts";
import type { Scales } from "./scales.ts";

const LINE_LENGTHS = [4, 7, 10] as const;

export const barWidth = (scales: Scales): number => (scales.room.height > 300 ? 12 : 10);

export function drawGrounds({ scales }: Frame): SVGTemplateResult {
  const { width, height, left, row, foot } = scales.room;
  const { bottom } = scales;
  return svg`<rect class="scale-ground" x="0" y="0" width=${left} height=${height} />
    <rect class="scale-ground" x="0" y=${bottom} width=${width} height=${foot} />
    <rect class="scale-ground" x="0" y="0" width=${width} height=${row} />
    <path class="tick" d="M0 ${row - 0.5}H${width}" />`;
}

export function drawGrid({ scales }: Frame): SVGTemplateResult {
  const { width, left, row } = scales.room;
  const lines = scales.temperature.lines.filter((line) => line.rank === 2);
  const instants = scales.time.lines.filter((line) => line.rank === 2 && line.at > 0);
  const across = lines.map(({ at }) => `M${left} ${f(yShown(scales, at))}H${width}`).join("");
  const down = instants.map(({ at }) => `M${f(scales.x(at))} ${row}V${scales.bottom}`).join("");
  return svg`<path class="gridline" d="${across}${down}" />`;
}

/** The time scale: lines under the plot, figures at the long ones, the word once. */
export function drawTime({ scales }: Frame): SVGTemplateResult {
  const { time, bottom, room } = scales;
  const base = bottom + room.foot - 6;
  const path = time.lines
    .map(({ at, rank }) => `M${f(scales.x(at))} ${bottom}v${LINE_LENGTHS[rank]}`)
    .join("");
  const figures = time.lines.filter(({ label }) => label !== "");
  const [first, second] = figures;
  const gap = first !== undefined && second !== undefined ? scales.x(second.at) - scales.x(first.at) : 0;
  const inGap = gap > textWidth(time.word, room.scaleSize) + 34;
  const word = inGap ? time.word : { seconds: "s", minutes: "min", hours: "h", days: "d" }[time.word];
  const last = figures.at(-1);
  const wordX = inGap
    ? scales.x(first!.at) + gap / 2
    : scales.x(last?.at ?? 0) + textWidth(last?.label ?? "", 6) + 8;
  return svg`<path class="tick" d="${path}M${room.left} ${bottom + 0.5}H${room.width}" />
    ${figures.map(({ at, label }) => figure(scales, at, label, base))}
    <text x=${f(wordX)} y=${base} text-anchor=${inGap ? "middle" : "start"}>${word}</text>`;
}

/** A figure that the right edge would cut is left out. */
function figure(scales: Scales, at: number, label: string, base: number): SVGTemplateResult | typeof nothing {
  const x = scales.x(at);
  if (x > scales.room.width - textWidth(label, scales.room.scaleSize) / 2 - 2) return nothing;
  return svg`<text x=${f(x)} y=${base} text-anchor="middle">${label}</text>`;
}

export function drawTemperature(frame: Frame): SVGTemplateResult {
  const { scales, system } = frame;
  const { room, temperature } = scales;
  const bar = room.left - barWidth(scales);
  const lines = temperature.lines.filter(({ at }) => yShown(scales, at) >= scales.top - 1);
  const path = lines
    .map(({ at, rank }) => `M${bar} ${f(yShown(scales, at))}h${rank === 2 ? -8 : -4}`)
    .join("");
  const figures = lines.filter(({ at, label }) => label !== "" && clearOfUnit(scales, at));
  return svg`<path class="tick" d="${path}M${room.left + 0.5} ${room.row}V${scales.bottom}" />
    <text x="8" y=${room.row + room.scaleSize + 1}>${shownUnit("temperature", system)}</text>
    ${figures.map(
      ({ at, label }) =>
        svg`<text x=${bar - 11} y=${f(yShown(scales, at) + 4)} text-anchor="end">${label}</text>`,
    )}`;
}

/** Figures keep away from the unit at the top and from the button in the corner. */
function clearOfUnit(scales: Scales, at: number): boolean {
  const y = yShown(scales, at);
  return y > scales.room.row + 1.9 * scales.room.scaleSize && y < scales.bottom - 3;
}

/** The map, painted on the temperature scale, or for an arrival on the time scale from first to last. */
export function drawPaint(
  { scales, range }: Frame,
  stops: readonly Rgb[],
  arrival: readonly [number, number] | null,
): SVGTemplateResult {
  if (arrival !== null) {
    const [from, to] = [scales.x(arrival[0]), scales.x(arrival[1])];
    return svg`${ramp(stops, true)}<rect class="paint" x=${f(from)} y=${scales.bottom + 1} width=${f(Math.max(1, to - from))}
      height=${barWidth(scales) - 1} fill="url(#paint)" />`;
  }
  const [cold, hot] =
    range === null ? [scales.bottom, scales.top] : [scales.y(range.from), scales.y(range.to)];
  return svg`${ramp(stops, false)}<rect class=${range === null ? "paint pale" : "paint"} x=${scales.room.left - barWidth(scales)}
    y=${f(hot)} width=${barWidth(scales)} height=${f(Math.max(1, cold - hot))} fill="url(#paint)" />`;
}

function ramp(stops: readonly Rgb[], across: boolean): SVGTemplateResult {
  return svg`<linearGradient id="paint" x1="0" x2=${across ? 1 : 0} y1=${across ? 0 : 1} y2="0">${stops.map(
    (stop, i) => svg`<stop offset=${i / (stops.length - 1)} stop-color="rgb(${stop.join(" ")})" />`,
  )}</linearGradient>`;
}

/** y of a graduation, which counts in the shown unit. */
function yShown(scales: Scales, at: number): number {
  const { from, to } = scales.temperature;
  return scales.bottom - ((at - from) / (to - from)) * (scales.bottom - scales.top);
}

/** px to a tenth: finer is noise in the markup */
export const f = (value: number): string => String(Math.round(value * 10) / 10);

/** The mark of a probe, here and in the section. */
export const cross = (x: number, y: number): string => `M${f(x - 3.5)} ${f(y)}h7M${f(x)} ${f(y - 3.5)}v7`;
