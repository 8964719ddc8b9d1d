/** What is selected on the sheet: exactly one thing or nothing. Numbers count from 0; on the sheet they count from 1. */

export type Selection =
  | { readonly kind: "none" }
  | { readonly kind: "vertex"; readonly region: number; readonly loop: number; readonly index: number }
  | { readonly kind: "side"; readonly region: number; readonly loop: number; readonly index: number }
  | { readonly kind: "region"; readonly region: number }
  | { readonly kind: "probe"; readonly index: number }
  | { readonly kind: "stage"; readonly index: number };

export const NOTHING: Selection = { kind: "none" };

/** The loop of a region: 0 is its outline, 1 and up its holes. */
export interface LoopPlace {
  readonly region: number;
  readonly loop: number;
}

export function sameSelection(a: Selection, b: Selection): boolean {
  return JSON.stringify(a) === JSON.stringify(b);
}
