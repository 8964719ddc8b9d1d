/** Quantities of the document as the sheet needs them: SI numbers to draw with, and texts that keep a person's unit. */
import type { Quantity } from "../case/types.ts";
import { parseQuantity } from "../case/units.ts";
import type { Dimension } from "../case/units.ts";

/** SI value (degC) of a quantity; NaN where it cannot be read. */
export function siOf(quantity: Quantity | undefined, dimension: Dimension): number {
  if (quantity === undefined) return Number.NaN;
  const read = parseQuantity(quantity, dimension);
  return "value" in read ? read.value : Number.NaN;
}

/** Digits of a number that is written back: enough for any part, and 0.178 rather than 0.17800000000000002. */
const WRITTEN_DIGITS = 10;

/**
 * An SI value (degC) written the way the old quantity was: a number stays a number, a text keeps its unit.
 * A text of several parts ("4 ft 2 in") or one that cannot be read becomes a number.
 */
export function writtenLike(old: Quantity | undefined, value: number, dimension: Dimension): Quantity {
  const plain = tidy(value);
  if (typeof old !== "string") return plain;
  const unit = /^[\s\d.,+\-\u2212/eE]*?(?<unit>[^\s\d.,+\-\u2212/][^\d]*)$/.exec(old.trim())?.groups?.[
    "unit"
  ];
  if (unit === undefined) return plain;
  const [zero, one] = [siOf(`0 ${unit}`, dimension), siOf(`1 ${unit}`, dimension)];
  if (Number.isNaN(zero) || Number.isNaN(one)) return plain;
  return `${tidy((value - zero) / (one - zero))} ${unit}`;
}

/** The number without the dust of binary fractions. */
export function tidy(value: number): number {
  const rounded = Number(value.toPrecision(WRITTEN_DIGITS));
  return Math.abs(rounded) < 1e-12 ? 0 : rounded;
}
