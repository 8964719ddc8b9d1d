/** The graduated scales of the section: r and z, at the left and at the bottom. */
import { svg } from "lit";
import type { SVGTemplateResult } from "lit";
import { fromShown, shownUnit, toShown } from "../../case/units.ts";
import type { UnitSystem } from "../../case/units.ts";
import type { Place } from "../../editor/arcs.ts";
import { digits } from "../controls/figures.ts";
import { toScreen } from "./view.ts";
import type { View } from "./view.ts";

export interface RulerRoom {
  readonly width: number;
  readonly height: number;
  /** width of the left scale, height of the bottom scale [px] */
  readonly left: number;
  readonly foot: number;
}

export interface Tick {
  /** in the shown unit */
  readonly value: number;
  readonly at: number;
  readonly rank: 0 | 1 | 2;
}

/** px that two figures keep between them, and two fine lines */
const FIGURE_ROOM = 40;
const LINE_ROOM = 4.5;

/** Steps of a scale: figures every 1, 2 or 5 times a power of ten, divided so that the eye can count. */
export function rulerStep(pixelsPerUnit: number): {
  readonly major: number;
  readonly middle: number;
  readonly minor: number;
} {
  const rough = FIGURE_ROOM / pixelsPerUnit;
  const power = 10 ** Math.floor(Math.log10(rough));
  const lead = [1, 2, 5, 10].find((step) => step * power >= rough * (1 - 1e-9)) ?? 10;
  const major = lead * power;
  const parts = lead === 2 ? [20, 10, 4, 2] : [20, 10, 5, 2];
  const minor = parts.map((part) => major / part).find((step) => step * pixelsPerUnit >= LINE_ROOM) ?? major;
  return { major, middle: major / 2, minor };
}

/** Graduations between two px, for a scale whose zero lies at `zero` and that grows with `direction`. */
export function ticksBetween(
  from: number,
  to: number,
  zero: number,
  pixelsPerUnit: number,
  direction: 1 | -1,
): Tick[] {
  const { major, middle, minor } = rulerStep(pixelsPerUnit);
  const ends = [from, to].map((px) => (direction * (px - zero)) / pixelsPerUnit);
  const ticks: Tick[] = [];
  const multiple = (value: number, step: number): boolean =>
    Math.abs(value / step - Math.round(value / step)) < 1e-6;
  for (let k = Math.ceil(Math.min(...ends) / minor - 1e-9); k * minor <= Math.max(...ends); k++) {
    const value = k * minor;
    const rank = multiple(value, major) ? 2 : multiple(value, middle) ? 1 : 0;
    ticks.push({ value, at: zero + direction * value * pixelsPerUnit, rank });
  }
  return ticks;
}

const LENGTHS = [4, 7, 10] as const;

/** Both scales. */
export function rulers(view: View, room: RulerRoom, system: UnitSystem): SVGTemplateResult {
  const { width, height, left, foot } = room;
  const bottom = height - foot;
  const unit = shownUnit("length", system);
  const perUnit = view.scale * fromShown(1, "length", system);
  const [across, up] = view.lying ? ["z", "r"] : ["r", "z"];
  const acrossTicks = ticksBetween(left, width, view.x, perUnit, 1);
  const upTicks = ticksBetween(bottom, 0, view.y, perUnit, -1);
  const figure = (value: number, mirrored: boolean): string => {
    const shown = Number((mirrored ? Math.abs(value) : value).toPrecision(6));
    return String(shown).replace("-", "\u2212");
  };
  return svg`
    <rect class="scale-ground" x="0" y=${bottom} width=${width} height=${foot}></rect>
    <rect class="scale-ground" x="0" y="0" width=${left} height=${bottom}></rect>
    <path class="tick" d=${tickPaths(acrossTicks, upTicks, left, bottom)}></path>
    ${acrossTicks
      .filter((tick) => tick.rank === 2 && tick.at > left + 14 && tick.at < width - 16)
      .map(
        (tick) =>
          svg`<text x=${tick.at} y=${height - 4} text-anchor="middle">${figure(tick.value, !view.lying)}</text>`,
      )}
    ${upTicks
      .filter((tick) => tick.rank === 2 && tick.at > 26 && tick.at < bottom - 8)
      .map(
        (tick) =>
          svg`<text x=${left - 14} y=${tick.at + 4} text-anchor="end">${figure(tick.value, view.lying)}</text>`,
      )}
    <text x="8" y="16">${up} ${unit}</text>
    <text x=${left - 14} y=${height - 4} text-anchor="end">${across} ${unit}</text>
  `;
}

function tickPaths(across: readonly Tick[], up: readonly Tick[], left: number, bottom: number): string {
  const below = across.map((tick) => `M${tick.at.toFixed(1)} ${bottom}v${LENGTHS[tick.rank]}`).join("");
  const beside = up
    .filter((tick) => tick.at > 4 && tick.at < bottom - 2)
    .map((tick) => `M${left} ${tick.at.toFixed(1)}h${-LENGTHS[tick.rank]}`)
    .join("");
  return `M${left + 0.5} 0V${bottom + 0.5}H${10_000}${below}${beside}`;
}

/** Pointers on both scales at a place, and its plumb lines, while something is dragged there. */
export function pointers(view: View, { height, left, foot }: RulerRoom, [r, z]: Place): SVGTemplateResult {
  const [x, y] = toScreen(view, r, z);
  const bottom = height - foot;
  return svg`
    <path class="pointer" d="M${left} ${y}l-9 -5v10zM${x} ${bottom}l-5 9h10z"></path>
    <path class="plumb" d="M${left} ${y}H${x}M${x} ${y}V${bottom}"></path>
  `;
}

/** Coordinates of a place as they stand beside a point: "160.0" in mm, "6.299" in inches. */
export function coordinate(metres: number, system: UnitSystem): string {
  return digits(toShown(metres, "length", system), system === "si" ? 1 : 3);
}
