/** Graduations of the time scale and of the temperature scale: which lines, how long, which of them carry a figure. */

export interface Graduation {
  /** in the unit of the scale: s, or the shown temperature */
  readonly at: number;
  /** 0 short, 1 middle, 2 long */
  readonly rank: 0 | 1 | 2;
  /** "" when the line carries no figure */
  readonly label: string;
}

export interface TimeGraduations {
  /** word that stands once behind the scale */
  readonly word: "seconds" | "minutes" | "hours" | "days";
  /** s between short, middle and long lines */
  readonly minor: number;
  readonly middle: number;
  readonly major: number;
  readonly lines: readonly Graduation[];
}

type Ladder = readonly (readonly [minor: number, middle: number, major: number])[];

/** Steps that people count in, in seconds: a long line every so often, cut in ways that the eye can count. */
const LADDER: Ladder = [
  [0.1, 0.5, 1],
  [0.2, 1, 2],
  [0.5, 1, 5],
  [1, 5, 10],
  [2, 10, 20],
  [5, 10, 30],
  [10, 30, 60],
  [20, 60, 120],
  [30, 60, 300],
  [60, 300, 600],
  [120, 600, 1200],
  [300, 600, 1800],
  [600, 1800, 3600],
  [1200, 3600, 7200],
  [1800, 3600, 10_800],
  [3600, 10_800, 21_600],
  [3600, 21_600, 43_200],
  [7200, 43_200, 86_400],
  [21_600, 86_400, 172_800],
  [43_200, 86_400, 432_000],
  [86_400, 432_000, 864_000],
  [172_800, 864_000, 1_728_000],
];
const UNITS = [
  { word: "days", seconds: 86_400 },
  { word: "hours", seconds: 3600 },
  { word: "minutes", seconds: 60 },
  { word: "seconds", seconds: 1 },
] as const;

/** px below which two figures would touch, and two short lines would run together */
const FIGURE_ROOM = 44;
const LINE_ROOM = 5;

/**
 * Time graduations from 0 to `end` [s] on a scale of `width` px. The word is the largest unit in which the long
 * lines carry whole numbers, so that a scale reads 0, 1, 2 hours rather than 0, 60, 120 minutes.
 */
export function timeGraduations(end: number, width: number): TimeGraduations {
  const pixels = width / Math.max(end, 1e-9);
  const rung = LADDER.find(([, , major]) => major * pixels >= FIGURE_ROOM) ?? coarse(end);
  const [fine, middle, major] = rung;
  const minor = fine * pixels >= LINE_ROOM ? fine : middle;
  const unit = UNITS.find(({ seconds }) => isMultiple(major, seconds)) ?? UNITS[3];
  const lines: Graduation[] = [];
  for (let i = 0; i * minor <= end * (1 + 1e-9); i++) {
    const at = i * minor;
    const rank = isMultiple(at, major) ? 2 : isMultiple(at, middle) ? 1 : 0;
    lines.push({ at, rank, label: rank === 2 ? String(Number((at / unit.seconds).toPrecision(6))) : "" });
  }
  return { word: unit.word, minor, middle, major, lines };
}

/** Beyond the ladder: days by 1, 2, 5. */
function coarse(end: number): [number, number, number] {
  const major = niceStep(end / 86_400 / 10) * 86_400;
  return [major / 10, major / 2, major];
}

function isMultiple(value: number, step: number): boolean {
  const share = value / step;
  return Math.abs(share - Math.round(share)) < 1e-6;
}

/** The smallest of 1, 2, 5 times a power of ten that is not below `least`. */
export function niceStep(least: number): number {
  const scale = 10 ** Math.floor(Math.log10(Math.max(least, 1e-12)));
  for (const step of [1, 2, 5, 10]) if (step * scale >= least * (1 - 1e-9)) return step * scale;
  return 10 * scale;
}

export interface TemperatureGraduations {
  readonly from: number;
  readonly to: number;
  readonly major: number;
  readonly lines: readonly Graduation[];
}

const TEMPERATURE_ROOM = 26;
const TEMPERATURE_LINE_ROOM = 7;

/**
 * Temperature graduations on a scale of `height` px that holds everything from `low` to `high` (shown unit). The
 * ends of the scale are short lines just beyond, with a little air.
 */
export function temperatureGraduations(low: number, high: number, height: number): TemperatureGraduations {
  const span = Math.max(high - low, 1);
  const major = niceStep((span * TEMPERATURE_ROOM) / Math.max(height, 40));
  const parts = major * (height / span) >= 4 * TEMPERATURE_LINE_ROOM ? 4 : 2;
  const minor = isMultiple(major / 4, 10 ** Math.floor(Math.log10(major)) / 4) ? major / parts : major / 2;
  const from = Math.floor((low - 0.02 * span) / minor) * minor;
  const to = Math.ceil((high + 0.04 * span) / minor) * minor;
  const lines: Graduation[] = [];
  for (let i = 0; from + i * minor <= to + 1e-9 * span; i++) {
    const at = from + i * minor;
    const long = isMultiple(at, major);
    const label = long ? String(Number(at.toPrecision(9))).replace("-", "\u2212") : "";
    lines.push({ at, rank: long ? 2 : 0, label });
  }
  return { from, to, major, lines };
}
