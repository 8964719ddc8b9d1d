/** What a hand types or drags into a blank, as text: pure helpers without a document object. */

const BARE_NUMBER = /^[+\-\u2212]?\s*[\d.,][\d\s.,/\u202f\u2009]*(e[+-]?\d+)?$/i;

/** Whether the text is a number alone ("120", "-4.5", "4 1/2", "1e-3"), without a unit. */
export function isBareNumber(text: string): boolean {
  return BARE_NUMBER.test(text.trim());
}

/** The text with the blank's own unit behind a bare number; any other text as it stands. */
export function withUnit(text: string, unit: string): string {
  const trimmed = text.trim().replace(/\u2212/g, "-");
  return unit !== "" && isBareNumber(trimmed) ? `${trimmed} ${unit}` : trimmed;
}

/** Decimals that show every multiple of the step exactly (at most 6). */
export function decimalsOf(step: number): number {
  for (let decimals = 0; decimals < 6; decimals++) {
    const scaled = step * 10 ** decimals;
    if (Math.abs(scaled - Math.round(scaled)) < 1e-9 * Math.max(1, scaled)) return decimals;
  }
  return 6;
}

/** How far one movement goes, from the keys held: Shift ten steps, Alt a tenth. */
export function strideOf(step: number, keys: { shiftKey: boolean; altKey: boolean }): number {
  if (keys.shiftKey) return step * 10;
  return keys.altKey ? step / 10 : step;
}

/**
 * The value moved by `count` strides, kept inside the limits and put onto multiples of the stride, so that a value
 * of 118.37 moved by steps of 5 becomes 120 rather than 123.37.
 */
export function moved(value: number, count: number, stride: number, least: number, most: number): number {
  if (count === 0) return value;
  const tolerance = 1e-9 * Math.max(1, Math.abs(value / stride));
  const from = count > 0 ? Math.floor(value / stride + tolerance) : Math.ceil(value / stride - tolerance);
  const next = Number(((from + count) * stride).toFixed(decimalsOf(stride)));
  return Math.min(most, Math.max(least, next));
}

/** A number as it is put into a field: plain digits, a full stop, a hyphen for minus, so that it can be read back. */
export function plainNumber(value: number, stride: number): string {
  return String(Number(value.toFixed(decimalsOf(stride))));
}
