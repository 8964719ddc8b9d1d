/** Words that strip and pane share: what the places, the shapes and the estimates are called. */
import type { SeriesShape } from "../../compare/types.ts";

export const ONE_TEMPERATURE = "one temperature";

const SHAPE_WORDS: Readonly<Record<SeriesShape, string>> = {
  slab: "plate",
  cylinder: "long round",
  sphere: "ball",
  "finite-cylinder": "short round",
};

/** "series, long round": what the series estimate is called, with the shape it stands for. */
export function seriesName(shape: SeriesShape): string {
  return `series, ${SHAPE_WORDS[shape]}`;
}

/** What a `where` of a question is called in a sentence; a probe goes by its own name. */
export function whereWords(where: string): string {
  return WHERE_WORDS[where] ?? where;
}

const WHERE_WORDS: Readonly<Record<string, string>> = {
  "every-point": "every point",
  "any-point": "the first point",
  mean: "the mean",
  "surface-mean": "the skin, on average,",
  coldest: "the coldest point",
  hottest: "the hottest point",
};

/** The same without the comma, for lists and short sentences. */
export function whereName(where: string): string {
  return whereWords(where).replace(/,$/, "");
}

export const PLACES = ["every-point", "any-point", "mean", "surface-mean", "coldest", "hottest"] as const;
