/**
 * Values in sentences: durations, temperatures and differences with the unit, ranges, and the doubt to one figure
 * with the value to its last digit.
 */
import type { Dimension, UnitSystem } from "./dimensions.ts";
import { formatNumber, formatQuantity, shownUnit, toShown } from "./units.ts";

export const THIN_SPACE = "\u2009";
export const PLUS_MINUS = "\u00b1";
const MINUS = "\u2212";

/** Significant digits of a value in a sentence when nothing is said about its doubt. */
const SENTENCE_DIGITS = 3;
const MINUTE = 60;
const HOUR = 3600;
/** Up to here a duration is told in seconds, and in minutes a range of durations. */
const SECONDS_UP_TO = 10 * MINUTE;
const MINUTES_UP_TO = 3 * HOUR;

/** A value and its doubt as texts; `doubt` begins with a plus-minus sign, and is empty when none is known. */
export interface DoubtedText {
  readonly value: string;
  readonly doubt: string;
}

/** "115.2 s", "12 min 05 s", "3 h 46 min"; negative durations carry a minus sign. */
export function formatDuration(seconds: number): string {
  return formatQuantity(seconds, "time", "si");
}

/** A temperature [degC] as "503.7 degC" or "938.7 degF", with the proper signs. */
export function formatTemperature(temperature: number, system: UnitSystem = "si"): string {
  return formatQuantity(temperature, "temperature", system);
}

/** A difference of temperatures [K]. */
export function formatDifference(
  kelvin: number,
  system: UnitSystem = "si",
  digits = SENTENCE_DIGITS,
): string {
  return formatQuantity(kelvin, "temperatureDifference", system, digits);
}

/** A share as a percentage, "0.7 %", "26 %": two figures, whole from 10 on. */
export function formatPercent(share: number): string {
  const percent = 100 * share;
  return `${formatNumber(Math.abs(percent) < 10 ? Number(percent.toPrecision(2)) : Math.round(percent))}${THIN_SPACE}%`;
}

/** Both ends in one unit, "53 to 64 min", "7 to 19 K"; one value when both read the same. */
export function formatRange(
  low: number,
  high: number,
  dimension: Dimension,
  system: UnitSystem = "si",
): string {
  if (dimension === "time") return durationRange(low, high);
  const [from, to] = [low, high].map((value) =>
    formatNumber(toShown(value, dimension, system), SENTENCE_DIGITS),
  );
  const unit = shownUnit(dimension, system);
  return (from === to ? from! : `${from} to ${to}`) + (unit === "" ? "" : THIN_SPACE + unit);
}

function durationRange(low: number, high: number): string {
  const largest = Math.max(Math.abs(low), Math.abs(high));
  if (largest >= MINUTES_UP_TO) {
    const [from, to] = [formatDuration(low), formatDuration(high)];
    return from === to ? from : `${from} to ${to}`;
  }
  const [size, unit] = largest < SECONDS_UP_TO ? [1, "s"] : [MINUTE, "min"];
  const digits = largest / size < 10 ? 2 : 3;
  const [from, to] = [low, high].map((value) => formatNumber(value / size, digits));
  return `${from === to ? from! : `${from} to ${to}`}${THIN_SPACE}${unit}`;
}

/**
 * A value with its doubt: the doubt to one figure, the value to the digit of that figure. Durations above ten minutes
 * are whole seconds, above an hour whole minutes, and their doubt is never told finer than that.
 *
 * @param doubt  in SI, 0 or more; null: not known
 */
export function formatDoubted(
  value: number,
  doubt: number | null,
  dimension: Dimension,
  system: UnitSystem = "si",
): DoubtedText {
  if (doubt === null || !(doubt > 0) || !Number.isFinite(doubt))
    return { value: formatQuantity(value, dimension, system), doubt: "" };
  if (dimension === "time" && Math.abs(value) >= SECONDS_UP_TO) {
    const [size, unit] = Math.abs(value) >= HOUR ? [MINUTE, "min"] : [1, "s"];
    const told = Math.max(1, oneFigure(doubt / size));
    return { value: formatDuration(value), doubt: PLUS_MINUS + withUnit(formatFixed(told, 0), unit) };
  }
  const unit = shownUnit(dimension, system);
  const scale = Math.abs(toShown(1, dimension, system) - toShown(0, dimension, system));
  const told = oneFigure(doubt * scale);
  const place = Math.floor(Math.log10(told) + ROUNDING);
  return {
    value: withUnit(formatFixed(toShown(value, dimension, system), place), unit),
    doubt: PLUS_MINUS + withUnit(formatFixed(told, place), unit),
  };
}

/** Keeps the logarithm of a power of ten from falling just short of it. */
const ROUNDING = 1e-12;

/** Rounded at a power of ten, zeros kept: 5.00 at place -2, 120 at place 1; figures grouped from 10 000. */
export function formatFixed(value: number, place: number): string {
  const step = 10 ** place;
  const [whole, decimals] = Math.abs(place < 0 ? value : Math.round(value / step) * step)
    .toFixed(Math.max(0, -place))
    .split(".");
  const sign = value < 0 && Number(`${whole}.${decimals ?? 0}`) !== 0 ? MINUS : "";
  const grouped = whole!.length < 5 ? whole! : whole!.replace(/\B(?=(\d{3})+$)/g, THIN_SPACE);
  return sign + grouped + (decimals === undefined ? "" : `.${decimals}`);
}

function withUnit(number: string, unit: string): string {
  return unit === "" ? number : number + THIN_SPACE + unit;
}

/** Rounded to one figure. */
function oneFigure(x: number): number {
  return Number(x.toPrecision(1));
}
