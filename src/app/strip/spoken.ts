/** What the strip says to those who listen. */
import type { UnitSystem } from "../../case/units.ts";
import { shownUnit, toShown } from "../../case/units.ts";
import { digits, duration, temperature } from "../controls/figures.ts";
import type { Curve } from "./curves.ts";
import { valueAt } from "./curves.ts";
import type { StageBlock } from "./schedule.ts";

/** Thin spaces read badly aloud. */
export const plain = (text: string): string => text.replace(/[\u00a0\u2009\u202f]/g, " ");

/** "Treatment: Furnace, 25 °C for 4 h; Still air, until ...." */
export function treatmentWords(schedule: readonly StageBlock[]): string {
  const stages = schedule.map((block) => `${block.name}, ${block.does[0] ?? ""}`.replace(/, $/, ""));
  return plain(stages.length === 0 ? "Treatment: no stage yet" : `Treatment: ${stages.join("; ")}`);
}

/** "4 h 05 min. Core 1014, mean 880, skin 791 °C." */
export function cursorWords(
  at: number,
  curves: readonly Curve[],
  system: UnitSystem,
  resolution: number,
): string {
  const values = curves
    .filter(({ habit }) => habit === "core" || habit === "mean" || habit === "skin")
    .map(
      ({ name, time, values: v }) =>
        `${name} ${digits(toShown(valueAt(time, v, at), "temperature", system), 0)}`,
    );
  const reading = values.join(", ");
  const unit = shownUnit("temperature", system);
  const sentence = reading === "" ? "" : ` ${reading[0]?.toUpperCase() ?? ""}${reading.slice(1)} ${unit}.`;
  return plain(`${duration(at, resolution)}.${sentence}`);
}

export function endWords(block: StageBlock, system: UnitSystem): string {
  if (block.limit === null) return plain(duration(block.ended));
  return plain(`${temperature(block.limit, system).text}, at ${duration(block.ended)}`);
}
