/** Labels that would touch are left out or stand elsewhere; lines stay. Plain rectangles, px. */

export interface Box {
  readonly x: number;
  readonly y: number;
  readonly width: number;
  readonly height: number;
}

export function touch(a: Box, b: Box, air = 0): boolean {
  return (
    a.x < b.x + b.width + air &&
    b.x < a.x + a.width + air &&
    a.y < b.y + b.height + air &&
    b.y < a.y + a.height + air
  );
}

export function within(inner: Box, outer: Box): boolean {
  return (
    inner.x >= outer.x &&
    inner.y >= outer.y &&
    inner.x + inner.width <= outer.x + outer.width &&
    inner.y + inner.height <= outer.y + outer.height
  );
}

/** Advance of a letter as a share of the size, for the kinds of letters that differ most; measured in the page's face. */
const ADVANCES: readonly (readonly [letters: RegExp, share: number])[] = [
  [/[0-9+\u2212±×=]/, 0.56],
  [/[\s.,:;'|]/, 0.2],
  [/[fijlrtI()]/, 0.31],
  [/[mwMW]/, 0.77],
];
const OTHERWISE = 0.5;

/** Width of a text [px] in the face of the page, near enough to keep labels apart without asking the browser. */
export function textWidth(text: string, size: number): number {
  let width = 0;
  for (const letter of text) width += ADVANCES.find(([letters]) => letters.test(letter))?.[1] ?? OTHERWISE;
  return width * size;
}

/**
 * How many of the points (x, y pairs, px) lie in the box: the price of putting a label there. Curves are given as the
 * points they are drawn through.
 */
export function crowding(box: Box, points: Float64Array): number {
  let count = 0;
  for (let i = 0; i + 1 < points.length; i += 2) {
    const [x, y] = [points[i]!, points[i + 1]!];
    if (x > box.x && x < box.x + box.width && y > box.y && y < box.y + box.height) count++;
  }
  return count;
}

/** The box that fits the bounds, touches nothing that is taken and crowds least; null when none fits. Earlier ones win ties. */
export function bestPlace(
  candidates: readonly Box[],
  bounds: Box,
  taken: readonly Box[],
  points: Float64Array,
): Box | null {
  let best: Box | null = null;
  let least = Infinity;
  for (const box of candidates) {
    if (!within(box, bounds) || taken.some((other) => touch(box, other, 2))) continue;
    const price = crowding(box, points);
    if (price < least) [best, least] = [box, price];
  }
  return best;
}

/** Leaves out every label that would touch an earlier one. */
export function sparse<Label extends { readonly box: Box }>(labels: readonly Label[], air = 3): Label[] {
  const kept: Label[] = [];
  for (const label of labels) if (!kept.some((other) => touch(label.box, other.box, air))) kept.push(label);
  return kept;
}
