/** A question as a plain sentence, for terminals, files and reports. */
import { formatDuration, formatTemperature } from "../case/format.ts";
import type { Question } from "../case/types.ts";

const WHERE: Readonly<Record<string, string>> = {
  "every-point": "every point",
  "any-point": "the first point",
  mean: "the mean",
  "surface-mean": "the skin on average",
  coldest: "the coldest point",
  hottest: "the hottest point",
};

const place = (where: string): string => WHERE[where] ?? where;

/** @param going which way the level was reached, where that is known */
export function questionText(question: Question, going?: "up" | "down"): string {
  switch (question.ask) {
    case "when": {
      const way = question.going ?? going;
      const verb = way === "down" ? "fallen to" : way === "up" ? "risen to" : "reached";
      return `When has ${place(question.where)} ${verb} ${formatTemperature(question.reaches)}?`;
    }
    case "reading":
      return `What does ${place(question.where)} read at ${formatDuration(question.at)}?`;
    case "spread":
      return `How far apart do hottest and coldest get${question.stage === undefined ? "" : ` in ${question.stage}`}?`;
    case "passage":
      return `How long does ${place(question.where)} take from ${formatTemperature(question.from)} to ${formatTemperature(question.to)}?`;
    case "rate":
      return `How fast does ${place(question.where)} pass ${formatTemperature(question.at)}?`;
    case "held-above":
    case "held-below":
      return `How long is ${place(question.where)} ${question.ask === "held-above" ? "above" : "below"} ${formatTemperature(question.level)}?`;
    case "dose":
      return `How many minutes at ${formatTemperature(question.reference)} is it worth to ${place(question.where)} (z ${question.z} K)?`;
    case "heat":
      return question.until === undefined
        ? "How much heat does the part take up?"
        : `How much heat has the part taken up by ${formatDuration(question.until)}?`;
  }
}
