/** The curves as rows of a table: at the long graduations, at the ends of the stages and where answers lie. */
import { shownUnit, toShown } from "../../case/units.ts";
import type { UnitSystem } from "../../case/units.ts";
import type { CaseResult } from "../../run/result.ts";
import { digits, duration } from "../controls/figures.ts";
import { curvesOf, valueAt } from "./curves.ts";
import type { Curve } from "./curves.ts";
import { marksOf } from "./marks.ts";

export interface CurveTable {
  readonly caption: string;
  readonly head: readonly string[];
  readonly rows: readonly {
    readonly head: string;
    readonly event: string;
    readonly values: readonly string[];
  }[];
}

export function tableOf(result: CaseResult, system: UnitSystem, apart: number): CurveTable {
  const end = result.stages.at(-1)?.ended ?? 0;
  const { time, coldest, hottest } = result.history;
  const curves: Curve[] = [
    ...curvesOf(result),
    { habit: "skin", name: "coldest point", time, values: coldest },
    { habit: "skin", name: "hottest point", time, values: hottest },
  ];
  const rows = instantsOf(result, end, apart).map(([at, event]) => ({
    head: duration(at, apart < 60 ? 0.1 : 1),
    event,
    values: curves.map((curve) =>
      digits(toShown(valueAt(curve.time, curve.values, at), "temperature", system), 1),
    ),
  }));
  return {
    caption: `Temperatures in ${shownUnit("temperature", system)}. Rows every ${duration(apart, 1)}, at the end of each stage and at each answer.`,
    head: ["time", ...curves.map((curve) => curve.name)],
    rows,
  };
}

/** Ascending instants with what happens there; an event replaces a plain row at the same time. */
function instantsOf(result: CaseResult, end: number, apart: number): [number, string][] {
  const instants = new Map<number, string>();
  const add = (at: number, event: string): void => {
    const key = Number(at.toFixed(1));
    const before = instants.get(key) ?? "";
    instants.set(key, [before, event].filter((text) => text !== "").join(", "));
  };
  for (let i = 0; i * apart <= end * (1 + 1e-9); i++) add(i * apart, "");
  for (const stage of result.stages) add(stage.ended, `end of ${stage.name}`);
  for (const mark of marksOf(result))
    if (mark.drops || mark.bracket !== null) add(mark.at, `answer ${mark.index + 1}`);
  return [...instants].sort(([a], [b]) => a - b);
}
