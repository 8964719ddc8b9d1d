/** The answers of a run as a page of plain text, for a terminal. */
import { formatDoubted, formatDuration, formatTemperature } from "../case/format.ts";
import { formatQuantity } from "../case/units.ts";
import type { Dimension } from "../case/dimensions.ts";
import type { Comparison } from "../compare/types.ts";
import { verdict } from "../compare/verdict.ts";
import type { Answer, CaseResult } from "../run/result.ts";
import { questionText } from "./questionText.ts";
import { cautionsFor } from "./cautions.ts";
import { oneLine } from "./plainText.ts";

/** Readable summary, lines ended. Times from the start of the case. */
export function summaryText(result: CaseResult): string {
  const lines = [
    oneLine(result.title),
    "",
    ...result.answers.flatMap((answer, i) => answerLines(answer, i + 1)),
    ...verdictLines(result),
    ...stageLines(result),
    ...proofLines(result),
    ...result.warnings.map((warning) => `Note: ${oneLine(warning)}`),
    ...cautionsFor(result).map((caution) => `Caution: ${caution}`),
  ];
  return `${lines.join("\n")}\n`;
}

function answerLines(answer: Answer, number: number): string[] {
  const lines = [`${number}. ${oneLine(questionText(answer.question))}`];
  if (answer.value === null) return [...lines, `   ${answer.remark}`, ""];
  const value = valueText(answer, answer.value, answer.numericalUncertainty);
  lines.push(`   ${value}${placeText(answer)}${answer.remark === "" ? "" : `  ${answer.remark}`}`);
  for (const [name, estimate, comparison] of [
    ["one temperature", answer.lumped, answer.comparison.lumped],
    ["series", answer.series, answer.comparison.series],
  ] as const)
    if (estimate !== null)
      lines.push(`   ${name}: ${valueText(answer, estimate, null)}${comparisonText(comparison)}`);
  return [...lines, ""];
}

const DIMENSION_OF: Readonly<Record<Answer["unit"], Dimension>> = {
  s: "time",
  min: "share",
  degC: "temperature",
  K: "temperatureDifference",
  "K/s": "rate",
  J: "energy",
};

/** A value in the words of its unit, with its numerical uncertainty where it is stated. */
export function valueText(answer: Pick<Answer, "unit">, value: number, doubt: number | null): string {
  const dimension = DIMENSION_OF[answer.unit];
  const text = formatDoubted(value, doubt, dimension);
  const minutes = answer.unit === "min" ? " min" : "";
  return [text.value + minutes, text.doubt === "" ? "" : text.doubt + minutes]
    .filter((part) => part !== "")
    .join(" ");
}

function placeText({ place, at, unit }: Answer): string {
  const where =
    place === null
      ? ""
      : `  at r ${formatQuantity(place[0], "length", "si")}, z ${formatQuantity(place[1], "length", "si")}`;
  return unit === "s" || at === null ? where : `${where}  after ${formatDuration(at)}`;
}

function comparisonText(comparison: Comparison | null): string {
  if (!comparison) return "";
  if (comparison.side === "agrees") return ", agrees";
  const { seconds, kelvin, side } = comparison;
  const parts = [
    seconds === null ? "" : `${formatDuration(Math.abs(seconds))} ${seconds < 0 ? "early" : "late"}`,
    kelvin === null
      ? ""
      : `${formatQuantity(Math.abs(kelvin), "temperatureDifference", "si", 3)} ${kelvin < 0 ? "low" : "high"}`,
  ].filter((part) => part !== "");
  return ["", parts.join(" or "), `on the ${side} side`]
    .filter((part, i) => i === 0 || part !== "")
    .join(", ");
}

function verdictLines(result: CaseResult): string[] {
  const found = verdict(result.answers);
  return found ? [found.headline, found.detail, ""] : [];
}

function stageLines({ stages, history }: CaseResult): string[] {
  if (stages.length < 2) return [];
  return [
    ...stages.map(
      ({ name, began, ended }) => `${oneLine(name)}: ${formatDuration(began)} to ${formatDuration(ended)}`,
    ),
    `At the end the mean is ${formatTemperature(history.mean[history.mean.length - 1]!)}.`,
    "",
  ];
}

function proofLines({ mesh, run }: CaseResult): string[] {
  const doubt =
    run.temperatureUncertainty === null
      ? "uncertainty not stated, one mesh only"
      : `temperatures to ±${formatQuantity(run.temperatureUncertainty, "temperatureDifference", "si", 1)}`;
  return [
    `Sums: ${mesh.nodes} unknowns, smallest angle ${mesh.minAngleDeg.toFixed(0)} degrees, ${run.scheme}, ${doubt}; heat balances to ${run.energyImbalance.toExponential(0)}.`,
  ];
}
