/**
 * The only converter of units: text to SI when a case is read, SI to text when the page and the report write.
 * Temperatures are degC inside. A temperature and a difference of temperatures are two dimensions: "18 degF" is
 * -7.8 degC where a temperature is wanted and 10 K where a difference is.
 */
import { DIMENSIONS, sameVector, spokenDimension } from "./dimensions.ts";
import type { Dimension, UnitSystem } from "./dimensions.ts";
import { normaliseText, readTerms } from "./unitText.ts";
import type { ReadTerm } from "./unitText.ts";

export type { Dimension, UnitSystem } from "./dimensions.ts";

export interface QuantityFault {
  /** what was given and what is expected */
  readonly message: string;
  readonly mend: string;
}
export type ReadQuantity = { readonly value: number } | { readonly fault: QuantityFault };

/**
 * Reads a quantity of a known dimension.
 *
 * @param given     a number (SI, temperatures in degC) or a text with its unit
 * @param dimension what is wanted
 * @param bareUnit  unit of a text that carries none, for a field with the unit written beside it; without it such a
 *                  text is a fault
 * @returns the value in SI (degC), or what is wrong with it
 */
export function parseQuantity(given: string | number, dimension: Dimension, bareUnit?: string): ReadQuantity {
  if (typeof given === "number") {
    if (Number.isFinite(given)) return { value: given };
    return faultOf(String(given), "is not a finite number", dimension);
  }
  const text = normaliseText(given);
  if (text === "") return faultOf(given, "is empty", dimension);
  const terms = readTerms(text);
  if ("fault" in terms) return faultOf(given, terms.fault, dimension, terms.mend);
  const bare = terms.length === 1 && terms[0]?.unit.none === true;
  if (bare && bareUnit !== undefined) return parseQuantity(`${text} ${bareUnit}`, dimension);
  const value = terms.length === 1 ? single(terms[0] as ReadTerm, dimension) : sum(terms, dimension);
  if (typeof value === "string") return faultOf(given, value, dimension);
  if (!Number.isFinite(value)) return faultOf(given, "is too large for a number", dimension);
  return { value };
}

/** The SI value of one number with its unit, or what is wrong. */
function single({ number, unit }: ReadTerm, dimension: Dimension): number | string {
  const wanted = DIMENSIONS[dimension];
  if (unit.none && dimension !== "share") return "carries no unit";
  if (!sameVector(unit.vector, wanted.vector)) return `is ${spokenDimension(unit.vector)}`;
  if (dimension !== "temperature") return number * unit.factor;
  if (unit.zero === undefined) return "is not on a temperature scale";
  return number * unit.factor + unit.zero;
}

/** Feet and inches, hours and minutes: parts of a length or a time that add up. */
function sum(terms: readonly ReadTerm[], dimension: Dimension): number | string {
  let total = 0;
  for (const [i, term] of terms.entries()) {
    const part = single(term, dimension);
    if (typeof part === "string") return i === 0 ? part : `goes on with a part that ${part}`;
    if (i > 0 && term.number < 0) return "goes on with a negative part";
    total += terms[0]!.number < 0 && i > 0 ? -part : part;
  }
  const addsUp = dimension === "length" || dimension === "time";
  return addsUp ? total : "holds more than one number";
}

function faultOf(given: string, what: string, dimension: Dimension, mend?: string): { fault: QuantityFault } {
  const wanted = DIMENSIONS[dimension];
  const shown = given.length > 60 ? `${given.slice(0, 57)}...` : given;
  const example = dimension === "share" ? "0.8" : `"${wanted.example}", or a bare number in ${wanted.bare}`;
  return {
    fault: {
      message: `"${shown}" ${what}; ${wanted.spoken} is expected.`,
      mend: mend === undefined ? `Write for example ${example}.` : `${sentence(mend)}`,
    },
  };
}

function sentence(words: string): string {
  return `${words[0]?.toUpperCase() ?? ""}${words.slice(1)}${words.endsWith(".") ? "" : "."}`;
}

/** The text of the unit in which a dimension is shown, for example "W/(m² K)"; "" for plain numbers. */
export function shownUnit(dimension: Dimension, system: UnitSystem): string {
  return DIMENSIONS[dimension].shown[system].text;
}

/** An SI value (degC) as a number of the shown unit. */
export function toShown(value: number, dimension: Dimension, system: UnitSystem): number {
  const { factor, offset = 0 } = DIMENSIONS[dimension].shown[system];
  return (value - offset) / factor;
}

/** A number of the shown unit as an SI value (degC). */
export function fromShown(shown: number, dimension: Dimension, system: UnitSystem): number {
  const { factor, offset = 0 } = DIMENSIONS[dimension].shown[system];
  return shown * factor + offset;
}

/** Significant digits of a shown value when nothing else is asked: what a reading in a shop carries. */
const SHOWN_DIGITS = 4;
const THIN_SPACE = "\u2009";
const MINUS = "\u2212";

/**
 * Writes a value for reading: number, thin space, unit. Times above ten minutes are written in hours and minutes.
 *
 * @param digits significant digits; zeros at the end of the decimals are left out
 */
export function formatQuantity(
  value: number,
  dimension: Dimension,
  system: UnitSystem,
  digits = SHOWN_DIGITS,
): string {
  if (dimension === "time" && Number.isFinite(value)) return formatTime(value, digits);
  const { text } = DIMENSIONS[dimension].shown[system];
  const number = formatNumber(toShown(value, dimension, system), digits);
  return text === "" ? number : `${number}${THIN_SPACE}${text}`;
}

/** A number with so many significant digits, figures grouped from 10 000, powers of ten only beyond 1e9 and 1e-4. */
export function formatNumber(value: number, digits = SHOWN_DIGITS): string {
  if (!Number.isFinite(value)) return "none";
  if (value === 0) return "0";
  const size = Math.abs(Number(value.toPrecision(digits)));
  const sign = value < 0 ? MINUS : "";
  if (size >= 1e9 || size < 1e-4) return sign + powerOfTen(size, digits);
  const [whole = "", decimals] = size.toString().split(".");
  const grouped = size < 10_000 ? whole : whole.replace(/\B(?=(\d{3})+$)/g, THIN_SPACE);
  return sign + grouped + (decimals === undefined ? "" : `.${decimals}`);
}

function powerOfTen(size: number, digits: number): string {
  const [mantissa = "", power = ""] = size.toExponential(digits - 1).split("e");
  return `${Number(mantissa)}e${Number(power)}`;
}

/** Up to ten minutes in seconds, up to an hour in minutes and seconds, above in hours and minutes. */
function formatTime(seconds: number, digits: number): string {
  const size = Math.abs(seconds);
  const sign = seconds < 0 ? MINUS : "";
  if (size < 600) return `${formatNumber(seconds, digits)}${THIN_SPACE}s`;
  if (Math.round(size) < 3600) return sign + twoParts(Math.round(size), 60, "min", "s");
  return sign + twoParts(Math.round(size / 60), 60, "h", "min");
}

function twoParts(count: number, base: number, large: string, small: string): string {
  const rest = String(count % base).padStart(2, "0");
  return `${formatNumber(Math.floor(count / base), 15)}${THIN_SPACE}${large} ${rest}${THIN_SPACE}${small}`;
}
