/**
 * Reads the text of a quantity: a number, a mixed fraction or several of them with units ("4 1/2 in", "1 h 30 min").
 *
 *   quantity = (number unit)+
 *   unit     = { "*" | "/" | name power? | "(" unit ")" }
 *
 * A slash divides by everything behind it up to the end of the bracket: "W/m2 K", "W/m2/K" and "W/(m2 K)" are one.
 * Units written without a space are told apart ("W/mK" is watt per metre and kelvin).
 */
import { AMBIGUOUS, unitsNamed } from "./unitTable.ts";
import type { Unit } from "./unitTable.ts";
import type { DimensionVector } from "./dimensions.ts";

export interface ReadUnit {
  readonly factor: number;
  readonly vector: DimensionVector;
  /** degC at the zero of the scale, when the unit is one temperature scale alone */
  readonly zero: number | undefined;
  /** no unit at all was written */
  readonly none: boolean;
}
export interface ReadTerm {
  readonly number: number;
  readonly unit: ReadUnit;
}
/** What is wrong with the text, without the text itself. */
export interface TextFault {
  readonly fault: string;
  readonly mend?: string;
}

const VULGAR: Readonly<Record<string, string>> = {
  "½": "1/2",
  "¼": "1/4",
  "¾": "3/4",
  "⅛": "1/8",
  "⅜": "3/8",
  "⅝": "5/8",
  "⅞": "7/8",
  "⅓": "1/3",
  "⅔": "2/3",
};
const SUPERSCRIPTS = "⁰¹²³⁴⁵⁶⁷⁸⁹";

const PLAIN = String.raw`(?:\d{1,3}(?: \d{3})+(?!\d)(?:\.\d+)?|\d+\.?\d*|\.\d+)(?:[eE][+-]?\d+)?`;
const FRACTION = String.raw`(?:(\d+)(?: +|-))?(\d+)/(\d+)`;
const NUMBER = new RegExp(String.raw`^\s*([+-]?)\s*(?:${FRACTION}|(${PLAIN}))`);
const CLOCK = /^\s*(\d+):(\d{1,2})(?::(\d{1,2}(?:\.\d+)?))?\s*$/;
const POWER = /^(?:\^\s*(-?\d)|(-?\d))(?![\d.])/;

/** One spelling for signs that look alike: minus, micro, degree, powers, quotes, spaces. */
export function normaliseText(text: string): string {
  return text
    .replace(/[½¼¾⅛⅜⅝⅞⅓⅔]/g, (sign) => ` ${VULGAR[sign]}`)
    .replace(/[\u2212\u2013]/g, "-")
    .replace(/\u2044/g, "/")
    .replace(/[\u00a0\u2009\u202f\u2007]/g, " ")
    .replace(/\u03bc/g, "µ")
    .replace(/\u207b/g, "^-")
    .replace(/[⁰¹²³⁴⁵⁶⁷⁸⁹]/g, (sign) => `^${SUPERSCRIPTS.indexOf(sign)}`)
    .replace(/\^-\^/g, "^-")
    .replace(/[·⋅×∙•]/g, "*")
    .replace(/[″”“]/g, '"')
    .replace(/[′’‘]/g, "'")
    .replace(/(?:[°º]|\bdeg(?:rees?|\.)?(?=[ CFKR]))\s*([CFKR])(?![A-Za-z])/g, "deg$1")
    .replace(/(?:[°º]|\bdeg(?:rees?|\.)?)\s*(?=celsius|fahrenheit|kelvin|rankine)/gi, "")
    .replace(/\bsq\.?\s*(ft|in)\b/gi, "sq$1")
    .replace(/\bcu\.?\s*(ft|in)\b/gi, "cu$1")
    .replace(/\s+per\s+/g, "/")
    .trim();
}

/** Takes a normalised text apart into numbers with their units, or says what stands in the way. */
export function readTerms(text: string): readonly ReadTerm[] | TextFault {
  if (/\d,\d/.test(text)) return commaFault(text);
  const clock = CLOCK.exec(text);
  if (clock) return clockTime(clock);
  const terms: ReadTerm[] = [];
  let rest = text;
  while (rest.length > 0) {
    const number = NUMBER.exec(rest);
    if (!number) return numberFault(rest, terms.length);
    const cursor = new UnitCursor(rest.slice(number[0].length));
    const unit = cursor.product(false);
    if ("fault" in unit) return unit;
    terms.push({ number: numberOf(number), unit });
    rest = cursor.rest;
  }
  return terms;
}

function numberOf(match: RegExpExecArray): number {
  const [, sign, whole, over, under, plain] = match;
  const size =
    plain === undefined
      ? Number(whole ?? 0) + Number(over) / Number(under)
      : Number(plain.replaceAll(" ", ""));
  return sign === "-" ? -size : size;
}

function commaFault(text: string): TextFault {
  const point = text.replace(/(\d),(?=\d)/g, "$1.");
  return {
    fault: "has a comma in the number",
    mend: `write the decimal point and no commas between thousands, for example "${point}"`,
  };
}

function numberFault(rest: string, found: number): TextFault {
  if (found > 0) return { fault: `goes on with "${rest}", which is not read` };
  return { fault: "does not begin with a number" };
}

/** h:mm:ss; two fields alone may be hours or minutes and are refused. */
function clockTime(match: RegExpExecArray): readonly ReadTerm[] | TextFault {
  const [, first, second, third] = match;
  if (third === undefined) {
    return {
      fault: "may be hours and minutes or minutes and seconds",
      mend: `write "${first} h ${second} min" or "${first}:${second}:00"`,
    };
  }
  const seconds = Number(first) * 3600 + Number(second) * 60 + Number(third);
  return [{ number: seconds, unit: { factor: 1, vector: [0, 0, 1, 0], zero: undefined, none: false } }];
}

/** Walks over one unit; stops where the next number begins. Holds its place in the text. */
class UnitCursor {
  rest: string;
  private factor = 1;
  private readonly vector: [number, number, number, number] = [0, 0, 0, 0];
  private parts: { unit: Unit; power: number }[] = [];

  constructor(text: string) {
    this.rest = text;
  }

  /** Reads to the end of the unit, or of the bracket when inside one. `sign` -1: this part divides. */
  product(bracketed: boolean, sign = 1): ReadUnit | TextFault {
    let power = sign;
    let operator = "";
    for (;;) {
      this.rest = this.rest.trimStart();
      const next = this.rest[0];
      if (next === undefined || /^-?\s*[\d.+]/.test(this.rest)) break;
      if (next === ")" && bracketed) break;
      operator = "*/-".includes(next) ? next : "";
      if (operator) this.rest = this.rest.slice(1);
      if (operator === "/") power = -sign;
      const fault = operator ? undefined : next === "(" ? this.bracket(power) : this.name(power);
      if (fault) return fault;
    }
    return operator ? { fault: `has nothing behind "${operator}"` } : this.result();
  }

  private bracket(power: number): TextFault | undefined {
    this.rest = this.rest.slice(1);
    const inside = this.product(true, power);
    if ("fault" in inside) return inside;
    if (this.rest[0] !== ")") return { fault: "has a bracket that is not closed" };
    this.rest = this.rest.slice(1);
    return undefined;
  }

  private name(power: number): TextFault | undefined {
    const letters = /^(?:["'%]|[A-Za-zµ]+)/.exec(this.rest)?.[0];
    if (letters === undefined) return { fault: `has "${this.rest[0]}" where a unit is expected` };
    if (AMBIGUOUS[letters]) return { fault: `has the unit "${letters}"`, mend: AMBIGUOUS[letters] };
    const units = unitsNamed(letters);
    if (!units) return { fault: `has the unit "${letters}", which is not known here` };
    this.rest = this.rest.slice(letters.length);
    units.forEach((unit, i) => {
      const exponent = i === units.length - 1 ? this.exponent(unit, letters) : 1;
      this.multiply(unit, power * exponent);
    });
    return undefined;
  }

  /** The power right behind a unit. 5'6" and 1h5min are sums: no bare positive power behind a quote or a time. */
  private exponent(unit: Unit, letters: string): number {
    const match = POWER.exec(this.rest);
    const written = match?.[1] ?? match?.[2];
    if (match === null || written === undefined) return 1;
    const isTime = unit.vector[2] === 1 && unit.vector[1] === 0;
    const beginsNumber = match[1] === undefined && Number(written) > 0;
    if (beginsNumber && (isTime || letters === "'" || letters === '"')) return 1;
    this.rest = this.rest.slice(match[0].length);
    return Number(written);
  }

  private multiply(unit: Unit, power: number): void {
    this.factor *= unit.factor ** power;
    for (let i = 0; i < 4; i++) this.vector[i] = this.vector[i]! + power * unit.vector[i]!;
    this.parts.push({ unit, power });
  }

  private result(): ReadUnit {
    const alone = this.parts.length === 1 && this.parts[0]?.power === 1 ? this.parts[0].unit : undefined;
    return { factor: this.factor, vector: this.vector, zero: alone?.zero, none: this.parts.length === 0 };
  }
}
