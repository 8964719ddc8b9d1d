/**
 * Figures as they stand on the page: value, thin space, unit; the doubt to one figure and the value to its last
 * digit; durations as "3 h 46 min". Pure text, no document object.
 */
import { formatDoubted } from "../../case/format.ts";
import { formatNumber, fromShown, shownUnit as unitText, toShown } from "../../case/units.ts";
import type { Dimension, UnitSystem } from "../../case/units.ts";

export { fromShown, toShown, unitText };
export type { Dimension, UnitSystem };

/** Between figure and unit: as wide as the thin space of this face, and never broken. */
export const THIN = "\u00a0";
/** Between groups of figures. */
const GROUP = "\u202f";
const MINUTE = 60;

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

export interface Figure {
  /** value with its unit */
  readonly text: string;
  /** "±2 K"; "" when the doubt is not known */
  readonly doubt: string;
}

/** Smallest doubt that is told of a temperature [K] and of a time [s]: below, the inputs drown it by far. */
const LEAST_KELVIN = 0.1;
const LEAST_SECONDS = 0.1;

/** Words of the core's formatting with a space that does not break. */
const unbroken = (text: string): string =>
  text.replace(/(\d)\u2009(?=\d{3}(?!\d))/g, `$1${GROUP}`).replaceAll("\u2009", THIN);

/** A temperature [degC], with its doubt [K] when known. */
export function temperature(degC: number, system: UnitSystem, doubt: number | null = null): Figure {
  const unit = unitText("temperature", system);
  const shown = toShown(degC, "temperature", system);
  if (doubt === null) return { text: joined(unbroken(formatNumber(shown)), unit), doubt: "" };
  const told = difference(0, system, Math.max(doubt, LEAST_KELVIN)).doubt;
  const places = decimalsFor(toShown(Math.max(doubt, LEAST_KELVIN), "temperatureDifference", system));
  return { text: joined(digits(shown, places), unit), doubt: told };
}

/** A difference of temperatures [K]. */
export function difference(kelvin: number, system: UnitSystem, doubt: number | null = null): Figure {
  return quantity(
    kelvin,
    "temperatureDifference",
    system,
    doubt === null ? null : Math.max(doubt, LEAST_KELVIN),
  );
}

/** Any other quantity in its shown unit. */
export function quantity(
  si: number,
  dimension: Dimension,
  system: UnitSystem,
  doubt: number | null = null,
): Figure {
  const { value, doubt: told } = formatDoubted(si, doubt, dimension, system);
  return { text: unbroken(value), doubt: unbroken(told) };
}

export const joined = (figure: string, unit: string): string =>
  unit === "" ? figure : `${figure}${THIN}${unit}`;

// --- durations ------------------------------------------------------------------------------------------------------

/** s: below, a time is written in seconds alone; from the second on, in hours and minutes */
const SHORT = 600;
const LONG = 3600;

/** Resolution [s] to which a time of this size is written: a minute from an hour on, else a second or finer. */
export function resolutionOf(seconds: number): number {
  const size = Math.abs(seconds);
  if (size >= LONG) return MINUTE;
  return size < SHORT ? 0.1 : 1;
}

/** How long something lasts, as people say it: "6 min" rather than "360 s". */
export function lasting(seconds: number): string {
  const whole = Math.abs(seconds - Math.round(seconds)) < 1e-6;
  const minutes = seconds >= 2 * MINUTE && seconds < LONG && Math.round(seconds) % MINUTE === 0;
  if (whole && minutes) return longDuration(Math.round(seconds / MINUTE));
  return whole && seconds < SHORT ? joined(digits(seconds, 0), "s") : duration(seconds);
}

/** "115.2 s", "49 min", "3 h 46 min", "2 d 4 h": to the resolution given [s]. */
export function duration(seconds: number, resolution = resolutionOf(seconds)): string {
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

/** A time [s] with its doubt; the doubt is never told finer than the digits that are shown. */
export function time(seconds: number, doubt: number | null = null): Figure {
  if (doubt === null) return { text: duration(seconds), doubt: "" };
  return quantity(seconds, "time", "si", Math.max(doubt, LEAST_SECONDS));
}

// --- places ---------------------------------------------------------------------------------------------------------

/** r below which a place counts as on the axis [m] */
const ON_AXIS = 1e-6;

/** "on the axis, z 307" or "r 180.4, z 440" in the shown unit of length. */
export function place(at: readonly [r: number, z: number], system: UnitSystem): string {
  const figure = (metres: number): string => {
    const value = toShown(metres, "length", system);
    const places = system === "us" ? 2 : Math.abs(value) < 100 ? 1 : 0;
    return digits(
      Number(value.toFixed(places)),
      Number.isInteger(Number(value.toFixed(places))) ? 0 : places,
    );
  };
  const height = `z${THIN}${figure(at[1])}`;
  return at[0] < ON_AXIS ? `on the axis, ${height}` : `r${THIN}${figure(at[0])}, ${height}`;
}

/** A place with its unit behind it, where it stands alone. */
export function placeAlone(at: readonly [r: number, z: number], system: UnitSystem): string {
  return `${place(at, system)}${THIN}${unitText("length", system)}`;
}
