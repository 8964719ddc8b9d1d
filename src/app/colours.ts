/**
 * The temperature map: 17 stops of tokens.css, linear in sRGB between them. The section's field and the scales that
 * wear its colours read the same stops and the same range.
 */
import type { CaseResult } from "../run/result.ts";

export type Rgb = readonly [red: number, green: number, blue: number];
export const STOPS = 17;

/** The stops as they stand in the tokens of the page. */
export function readStops(element: Element = document.documentElement): Rgb[] {
  const style = getComputedStyle(element);
  return Array.from({ length: STOPS }, (_, i) => parseHex(style.getPropertyValue(`--map-${pad(i)}`).trim()));
}

const pad = (i: number): string => String(i).padStart(2, "0");

/** "#1a2b3c" as three numbers 0 to 255. */
export function parseHex(hex: string): Rgb {
  const value = Number.parseInt(hex.slice(1), 16);
  return [(value >> 16) & 255, (value >> 8) & 255, value & 255];
}

/** A colour as the browser states it when computed: "rgb(247, 250, 248)". */
export function parseColour(text: string): Rgb {
  const [red = 255, green = 255, blue = 255] = (text.match(/[\d.]+/g) ?? []).map(Number);
  return [red, green, blue];
}

/** The colour at a share of the map, 0 cold to 1 hot; held at the ends. */
export function colourAt(stops: readonly Rgb[], share: number): Rgb {
  const at = Math.min(1, Math.max(0, share)) * (stops.length - 1);
  const below = Math.min(stops.length - 2, Math.floor(at));
  const part = at - below;
  const [from, to] = [stops[below]!, stops[below + 1]!];
  const mix = (k: 0 | 1 | 2): number => Math.round(from[k] + part * (to[k] - from[k]));
  return [mix(0), mix(1), mix(2)];
}

/** The map as a table of RGBA bytes, `length` entries from cold to hot. */
export function mapTable(stops: readonly Rgb[], length = 256): Uint8Array<ArrayBuffer> {
  const table = new Uint8Array(4 * length);
  for (let i = 0; i < length; i++) table.set([...colourAt(stops, i / (length - 1)), 255], 4 * i);
  return table;
}

/** Whether dark lines read better than light ones on this colour of the map. */
export function wantsDarkInk([red, green, blue]: Rgb): boolean {
  return (0.3 * red + 0.59 * green + 0.11 * blue) / 255 > 0.42;
}

export interface Range {
  readonly from: number;
  readonly to: number;
}

/** Temperatures [degC] of the whole run, so that a colour means one temperature all along. */
export function temperatureRange(result: CaseResult): Range {
  let from = Infinity;
  let to = -Infinity;
  for (const value of result.history.coldest) from = Math.min(from, value);
  for (const value of result.history.hottest) to = Math.max(to, value);
  return to > from ? { from, to } : { from: from - 1, to: from + 1 };
}

export const shareOf = (range: Range, value: number): number =>
  (value - range.from) / (range.to - range.from);
