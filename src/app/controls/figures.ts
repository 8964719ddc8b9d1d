/**
 * Figures as they stand on the page: value, thin space, unit; the doubt to one figure and the value to its last
 * digit; durations as "3 h 46 min". Pure text, no document object.
 */
import { fromShown, shownUnit as unitText, toShown } from "../../case/units.ts";
import type { Dimension, UnitSystem } from "../../case/units.ts";

export { fromShown, toShown, unitText };
export type { Dimension, UnitSystem };

/** Between figure and unit: as wide as the thin space of this face, and never broken. */
export const THIN = "\u00a0";
/** Between groups of figures. */
const GROUP = "\u202f";
const MINUTE = 60;
const HOUR = 3600;
const DAY = 86_400;

/** Decimals of a figure whose doubt is known: none above 1, else as far as the first figure of the doubt. */
export function decimalsFor(doubt: number, most = 6): number {
  if (!(doubt > 0)) return most;
  return Math.min(most, Math.max(0, -Math.floor(Math.log10(roundUp(doubt)))));
}

/** A doubt to one figure, rounded up, so that it is never stated smaller than it is. */
export function roundUp(doubt: number): number {
  if (!(doubt > 0)) return 0;
  const scale = 10 ** Math.floor(Math.log10(doubt) + 1e-9);
  return Number((Math.ceil(doubt / scale - 1e-6) * scale).toPrecision(1));
}

/** Plain digits with a true minus, grouped by thin spaces from 10 000. */
export function digits(value: number, decimals: number): string {
  const text = Math.abs(value).toFixed(decimals);
  const [whole = "", part] = text.split(".");
  const grouped = whole.length >= 5 ? whole.replace(/\B(?=(\d{3})+$)/g, GROUP) : whole;
  const sign = value < 0 && Number(text) !== 0 ? "\u2212" : "";
  return sign + grouped + (part === undefined ? "" : `.${part}`);
}

/** A figure with about `significant` figures, for values whose doubt is not known. */
export function roughly(value: number, significant = 4): string {
  if (value === 0) return "0";
  const size = Math.floor(Math.log10(Math.abs(value)));
  return digits(value, Math.max(0, Math.min(6, significant - 1 - size)));
}

export interface Figure {
  /** value with its unit */
  readonly text: string;
  /** "±2 K"; "" when the doubt is not known */
  readonly doubt: string;
}

/** A temperature [degC], with its doubt [K] when known. */
export function temperature(degC: number, system: UnitSystem, doubt: number | null = null): Figure {
  const unit = unitText("temperature", system);
  const shown = doubt === null ? null : toShown(doubt, "temperatureDifference", system);
  const places = shown === null ? 0 : Math.min(1, decimalsFor(Math.max(shown, 0.05)));
  return {
    text: `${digits(toShown(degC, "temperature", system), places)}${THIN}${unit}`,
    doubt: shown === null ? "" : doubtText(Math.max(shown, 0.1), unitText("temperatureDifference", system)),
  };
}

/** A difference of temperatures [K]. */
export function difference(kelvin: number, system: UnitSystem, doubt: number | null = null): Figure {
  const unit = unitText("temperatureDifference", system);
  const value = toShown(kelvin, "temperatureDifference", system);
  const shown = doubt === null ? null : toShown(doubt, "temperatureDifference", system);
  const places =
    shown === null ? (Math.abs(value) < 10 ? 1 : 0) : Math.min(2, decimalsFor(Math.max(shown, 0.05)));
  return {
    text: `${digits(value, places)}${THIN}${unit}`,
    doubt: shown === null ? "" : doubtText(Math.max(shown, 0.1), unit),
  };
}

/** Any other quantity in its shown unit. */
export function quantity(
  si: number,
  dimension: Dimension,
  system: UnitSystem,
  doubt: number | null = null,
): Figure {
  const unit = unitText(dimension, system);
  const value = toShown(si, dimension, system);
  if (doubt === null) return { text: joined(roughly(value), unit), doubt: "" };
  const shown = toShown(doubt, dimension, system);
  return { text: joined(digits(value, decimalsFor(shown)), unit), doubt: doubtText(shown, unit) };
}

export const joined = (figure: string, unit: string): string =>
  unit === "" ? figure : `${figure}${THIN}${unit}`;

function doubtText(shown: number, unit: string): string {
  const rounded = roundUp(shown);
  return joined(`\u00b1${digits(rounded, decimalsFor(rounded))}`, unit);
}

// --- durations ------------------------------------------------------------------------------------------------------

/** s: below, a time is written in seconds alone; from the second on, in hours and minutes */
const SHORT = 600;
const LONG = 3600;

/** Resolution [s] to which a time of this size is written: a minute from an hour on, else a second or finer. */
export function resolutionOf(seconds: number, doubt: number | null): number {
  const size = Math.abs(seconds);
  if (size >= LONG) return MINUTE;
  if (size >= SHORT || doubt === null || !(doubt > 0)) return size < 100 ? 0.1 : 1;
  return 10 ** Math.floor(Math.log10(Math.max(doubt, 0.1)) + 1e-9);
}

/** How long something lasts, as people say it: "6 min" rather than "360 s". */
export function lasting(seconds: number): string {
  return seconds >= 120 && Math.abs(seconds - Math.round(seconds / MINUTE) * MINUTE) < 0.5 && seconds < LONG
    ? longDuration(Math.round(seconds / MINUTE))
    : duration(seconds);
}

/** "115.2 s", "49 min", "3 h 46 min", "2 d 4 h": to the resolution given [s]. */
export function duration(seconds: number, resolution = resolutionOf(seconds, null)): string {
  const sign = seconds < 0 ? "\u2212" : "";
  const size = Math.abs(seconds);
  if (size < LONG && resolution < MINUTE) return `${sign}${shortDuration(size, resolution)}`;
  return sign + longDuration(Math.round(size / MINUTE));
}

function shortDuration(size: number, resolution: number): string {
  const rounded = Math.round(size / resolution) * resolution;
  if (rounded < SHORT) return `${digits(rounded, decimalsFor(Math.min(1, resolution), 1))}${THIN}s`;
  const minutes = Math.floor(Math.round(rounded) / MINUTE);
  const rest = Math.round(rounded) - minutes * MINUTE;
  return rest === 0 ? `${minutes}${THIN}min` : `${minutes}${THIN}min ${pad(rest)}${THIN}s`;
}

function longDuration(minutes: number): string {
  const days = Math.floor(minutes / 1440);
  if (days >= 2) {
    const hours = Math.round((minutes - days * 1440) / 60);
    return hours === 24 ? `${days + 1}${THIN}d` : `${days}${THIN}d ${hours}${THIN}h`;
  }
  const hours = Math.floor(minutes / 60);
  const rest = minutes - hours * 60;
  if (hours === 0) return `${rest}${THIN}min`;
  return rest === 0 ? `${hours}${THIN}h` : `${hours}${THIN}h ${pad(rest)}${THIN}min`;
}

const pad = (value: number): string => String(value).padStart(2, "0");

/** A time [s] with its doubt; the doubt is never stated below the digits that are shown. */
export function time(seconds: number, doubt: number | null = null): Figure {
  const resolution = resolutionOf(seconds, doubt);
  if (doubt === null) return { text: duration(seconds, resolution), doubt: "" };
  return {
    text: duration(seconds, resolution),
    doubt: `\u00b1${doubtDuration(Math.max(doubt, resolution))}`,
  };
}

function doubtDuration(doubt: number): string {
  if (doubt < MINUTE) return `${digits(roundUp(doubt), decimalsFor(roundUp(doubt), 1))}${THIN}s`;
  if (doubt < HOUR) return `${roundUp(doubt / MINUTE - 1e-9)}${THIN}min`;
  return doubt < DAY ? `${roundUp(doubt / HOUR)}${THIN}h` : `${roundUp(doubt / DAY)}${THIN}d`;
}

// --- places ---------------------------------------------------------------------------------------------------------

/** r below which a place counts as on the axis [m] */
const ON_AXIS = 1e-6;

/** "on the axis, z 307" or "r 180.4, z 440" in the shown unit of length. */
export function place(at: readonly [r: number, z: number], system: UnitSystem): string {
  const figure = (metres: number): string => {
    const value = toShown(metres, "length", system);
    return system === "us" ? digits(value, 2) : digits(value, Math.abs(value) < 100 ? 1 : 0);
  };
  const height = `z${THIN}${figure(at[1])}`;
  return at[0] < ON_AXIS ? `on the axis, ${height}` : `r${THIN}${figure(at[0])}, ${height}`;
}

/** A place with its unit behind it, where it stands alone. */
export function placeAlone(at: readonly [r: number, z: number], system: UnitSystem): string {
  return `${place(at, system)}${THIN}${unitText("length", system)}`;
}
