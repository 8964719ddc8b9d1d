/**
 * The reading at the time cursor, which is also the key of the lines: rows of line habit, value and name, in columns,
 * beside the cursor where the sheet is least crowded.
 */
import type { UnitSystem } from "../../case/units.ts";
import { toShown } from "../../case/units.ts";
import { digits } from "../controls/figures.ts";
import type { Curve, Habit } from "./curves.ts";
import { valueAt } from "./curves.ts";
import { bestPlace, textWidth } from "./place-labels.ts";
import type { Box } from "./place-labels.ts";
import type { Scales } from "./scales.ts";

export interface ReadingRow {
  readonly habit: Habit;
  readonly name: string;
  readonly value: string;
}
export interface ReadingCell extends ReadingRow {
  readonly x: number;
  readonly y: number;
}
export interface Reading {
  readonly box: Box;
  readonly cells: readonly ReadingCell[];
  /** from the left of a cell: end of the value, start of the name */
  readonly valueEnd: number;
  readonly nameStart: number;
}

const ROWS = 3;
const SAMPLE = 26;
const APART = 14;
/** px between cursor and reading: close, or out of the way of what begins at the cursor */
const OFF = [16, 74] as const;

export function readingRows(curves: readonly Curve[], at: number, system: UnitSystem): ReadingRow[] {
  return curves.map(({ habit, name, time, values }) => ({
    habit,
    name,
    value: digits(toShown(valueAt(time, values, at), "temperature", system), 0),
  }));
}

/** Where the reading goes; where the sheet is too narrow for all of it, core, mean and skin alone; null when not even those fit. */
export function placeReading(
  rows: readonly ReadingRow[],
  cursorX: number,
  scales: Scales,
  taken: readonly Box[],
  crowd: Float64Array,
): Reading | null {
  const whole = tryReading(rows, cursorX, scales, taken, crowd);
  return whole ?? tryReading(rows.slice(0, ROWS), cursorX, scales, [], crowd);
}

function tryReading(
  rows: readonly ReadingRow[],
  cursorX: number,
  scales: Scales,
  taken: readonly Box[],
  crowd: Float64Array,
): Reading | null {
  const size = scales.room.noteSize;
  const lineHeight = size + 3.5;
  const columns = Array.from({ length: Math.ceil(rows.length / ROWS) }, (_, i) =>
    rows.slice(i * ROWS, (i + 1) * ROWS),
  );
  const valueWidth = Math.max(...rows.map((row) => textWidth(row.value, size)));
  const valueEnd = SAMPLE + 7 + valueWidth;
  const nameStart = valueEnd + 7;
  const widths = columns.map(
    (column) => nameStart + Math.max(...column.map((row) => textWidth(row.name, size))) + APART,
  );
  const width = widths.reduce((sum, part) => sum + part, 0) - APART + 4;
  const height = Math.min(ROWS, rows.length) * lineHeight + 4;
  const box = bestPlace(candidates(cursorX, width, height, scales), boundsOf(scales), taken, crowd);
  if (box === null) return null;
  const cells = columns.flatMap((column, c) =>
    column.map((row, i) => ({
      ...row,
      x: box.x + 2 + widths.slice(0, c).reduce((sum, part) => sum + part, 0),
      y: box.y + (i + 1) * lineHeight - 3,
    })),
  );
  return { box, cells, valueEnd, nameStart };
}

/** Right of the cursor before left, top before bottom before the middle: the order breaks ties, so that it stays put. */
function candidates(cursorX: number, width: number, height: number, scales: Scales): Box[] {
  const tops = [
    scales.room.row + 5,
    scales.bottom - height - 6,
    (scales.room.row + scales.bottom - height) / 2,
  ];
  const lefts = [...OFF.map((off) => cursorX + off), ...OFF.map((off) => cursorX - off - width)];
  return tops.flatMap((y) => lefts.map((x) => ({ x, y, width, height })));
}

export function boundsOf(scales: Scales): Box {
  const { left, right, width, row } = scales.room;
  return { x: left + 12, y: row + 2, width: width - right - left - 12, height: scales.bottom - row - 4 };
}
