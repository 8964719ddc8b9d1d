/** The scale of a calliper: wide enough for the answer, its doubt and the estimates, with figures people read. */
import { niceStep, timeRung } from "../strip/graduations.ts";
import type { Graduation } from "../strip/graduations.ts";
import { digits } from "./figures.ts";

/** "time" counts in seconds and is written in hours and minutes; "number" is a plain scale */
export type CalliperKind = "time" | "number";

export interface CalliperScale {
  readonly from: number;
  readonly to: number;
  readonly x: (at: number) => number;
  readonly lines: readonly Graduation[];
}

/** Share of the span left free at each end, and the least span as a share of the answer. */
const AIR = 0.09;
const LEAST_SPAN = 0.08;
/** px between figures, and between short lines of a plain scale */
const FIGURE_ROOM = 62;
const LINE_ROOM = 7;

export function calliperScale(
  kind: CalliperKind,
  value: number,
  doubt: number | null,
  others: readonly (number | null)[],
  width: number,
): CalliperScale {
  const all = [value, ...others.filter((other) => other !== null)];
  if (doubt !== null) all.push(value - doubt, value + doubt);
  let [low, high] = [Math.min(...all), Math.max(...all)];
  const least = LEAST_SPAN * Math.max(Math.abs(value), 1e-9);
  if (high - low < least) {
    const middle = (low + high) / 2;
    [low, high] = [middle - least / 2, middle + least / 2];
  }
  const air = AIR * (high - low);
  const [from, to] = [low - air, high + air];
  const pixels = width / (to - from);
  const { major, minor } =
    kind === "time" ? timeRung(pixels, FIGURE_ROOM) : plainRung(FIGURE_ROOM / pixels, LINE_ROOM / pixels);
  return { from, to, x: (at) => (at - from) * pixels, lines: linesOf(kind, from, to, major, minor) };
}

function plainRung(room: number, lineRoom: number): { major: number; minor: number } {
  const major = niceStep(room);
  const parts = [10, 5, 2].find((count) => major / count >= lineRoom) ?? 1;
  return { major, minor: major / parts };
}

function linesOf(kind: CalliperKind, from: number, to: number, major: number, minor: number): Graduation[] {
  const lines: Graduation[] = [];
  for (let i = Math.ceil(from / minor - 1e-9); i * minor <= to; i++) {
    const at = i * minor;
    const long = Math.abs(at / major - Math.round(at / major)) < 1e-6;
    if (kind === "time" && at < -1e-9) continue; // nothing happens before the start
    lines.push({
      at,
      rank: long ? 2 : 0,
      label: long ? (kind === "time" ? clock(at, major) : figure(at, major)) : "",
    });
  }
  return lines;
}

function figure(at: number, major: number): string {
  const places = Math.max(0, -Math.floor(Math.log10(major) + 1e-9));
  return digits(at, Math.min(6, places));
}

/** "3 h", "3 h 30", "45 min", "90 s": as short as the step allows. */
function clock(at: number, major: number): string {
  if (at === 0) return "0";
  if (major < 60) return secondsClock(at);
  const minutes = Math.round(at / 60);
  if (minutes < 60) return `${minutes}\u00a0min`;
  const [hours, rest] = [Math.floor(minutes / 60), minutes % 60];
  if (hours >= 48 && rest === 0 && hours % 24 === 0) return `${hours / 24}\u00a0d`;
  return rest === 0 ? `${hours}\u00a0h` : `${hours}\u00a0h\u00a0${String(rest).padStart(2, "0")}`;
}

/** Seconds alone up to ten minutes, then "47 min 30". */
function secondsClock(at: number): string {
  const seconds = Number(at.toFixed(1));
  if (seconds < 600) return `${seconds}\u00a0s`;
  const [minutes, rest] = [Math.floor(seconds / 60), Math.round(seconds % 60)];
  return rest === 0 ? `${minutes}\u00a0min` : `${minutes}\u00a0min\u00a0${String(rest).padStart(2, "0")}`;
}
