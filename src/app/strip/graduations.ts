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

/** Long lines that people count by [s], and how each may be cut: short and middle lines, the finest cut first. */
type Cuts = readonly (readonly [minor: number, middle: number])[];
const LADDER: readonly (readonly [major: number, cuts: Cuts])[] = [
  [1, [[0.1, 0.5]]],
  [
    2,
    [
      [0.2, 1],
      [0.5, 1],
    ],
  ],
  [
    5,
    [
      [0.5, 1],
      [1, 5],
    ],
  ],
  [
    10,
    [
      [1, 5],
      [2, 10],
    ],
  ],
  [
    20,
    [
      [2, 10],
      [5, 10],
    ],
  ],
  [
    30,
    [
      [5, 10],
      [10, 30],
    ],
  ],
  [
    60,
    [
      [5, 30],
      [10, 30],
      [20, 60],
    ],
  ],
  [
    120,
    [
      [10, 60],
      [20, 60],
      [60, 120],
    ],
  ],
  [
    300,
    [
      [30, 60],
      [60, 300],
    ],
  ],
  [
    600,
    [
      [60, 300],
      [120, 600],
    ],
  ],
  [
    1200,
    [
      [120, 600],
      [300, 600],
    ],
  ],
  [
    1800,
    [
      [300, 600],
      [600, 1800],
    ],
  ],
  [
    3600,
    [
      [300, 1800],
      [600, 1800],
      [1200, 3600],
    ],
  ],
  [
    7200,
    [
      [600, 3600],
      [1200, 3600],
      [3600, 7200],
    ],
  ],
  [
    10_800,
    [
      [1800, 3600],
      [3600, 10_800],
    ],
  ],
  [
    21_600,
    [
      [3600, 10_800],
      [7200, 21_600],
    ],
  ],
  [
    43_200,
    [
      [3600, 21_600],
      [7200, 21_600],
      [21_600, 43_200],
    ],
  ],
  [
    86_400,
    [
      [7200, 43_200],
      [21_600, 43_200],
      [43_200, 86_400],
    ],
  ],
  [
    172_800,
    [
      [21_600, 86_400],
      [43_200, 86_400],
    ],
  ],
  [432_000, [[86_400, 432_000]]],
  [
    864_000,
    [
      [86_400, 432_000],
      [172_800, 864_000],
    ],
  ],
];
const UNITS = [
  { word: "days", seconds: 86_400, from: 4 * 86_400 },
  { word: "hours", seconds: 3600, from: 2.5 * 3600 },
  { word: "minutes", seconds: 60, from: 4 * 60 },
  { word: "seconds", seconds: 1, from: 0 },
] as const;

/** px below which two figures would touch, and two short lines would run together */
const FIGURE_ROOM = 44;
const LINE_ROOM = 7;

/**
 * Time graduations from 0 to `end` [s] on a scale of `width` px. The word goes by the length of the whole treatment
 * (hours from two and a half on), and the long lines carry whole numbers of it.
 */
export function timeGraduations(end: number, width: number): TimeGraduations {
  const pixels = width / Math.max(end, 1e-9);
  const unit = UNITS.find(({ from }) => end >= from) ?? UNITS[3];
  const fits = LADDER.find(
    ([major]) => major * pixels >= FIGURE_ROOM && major <= end && isMultiple(major, unit.seconds),
  );
  const [major, cuts] = fits ?? coarse(end, width);
  const [minor, middle] = cuts.find(([line]) => line * pixels >= LINE_ROOM) ?? [major, major];
  const lines: Graduation[] = [];
  for (let i = 0; i * minor <= end * (1 + 1e-9); i++) {
    const at = i * minor;
    const rank = isMultiple(at, major) ? 2 : isMultiple(at, middle) ? 1 : 0;
    lines.push({ at, rank, label: rank === 2 ? String(Number((at / unit.seconds).toPrecision(6))) : "" });
  }
  return { word: unit.word, minor, middle, major, lines };
}

/** The rung whose long lines stand at least `room` px apart, for scales that count in mixed units. */
export function timeRung(pixelsPerSecond: number, room: number): { major: number; minor: number } {
  const [major, cuts] =
    LADDER.find(([line]) => line * pixelsPerSecond >= room) ?? coarse(room / pixelsPerSecond, room);
  const [minor] = cuts.find(([line]) => line * pixelsPerSecond >= LINE_ROOM) ?? [major];
  return { major, minor };
}

/** Beyond the ladder at both ends: by 1, 2, 5 of a day or of a second. */
function coarse(end: number, width: number): [number, Cuts] {
  const least = (end * FIGURE_ROOM) / width;
  const unit = least > 1 ? 86_400 : 1;
  const major = niceStep(least / unit) * unit;
  return [
    major,
    [
      [major / 10, major / 2],
      [major / 2, major],
    ],
  ];
}

function isMultiple(value: number, step: number): boolean {
  const share = value / step;
  return Math.abs(share - Math.round(share)) < 1e-6 && Math.round(share) >= (value === 0 ? 0 : 1);
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
