/** answers.json: what the command line writes and other programs read. A contract: extend it, never rename. */
import type { CaseResult } from "../run/result.ts";

/** The result as plain JSON data; arrays are plain arrays, numbers keep all their digits. */
export function answersJson(result: CaseResult): Record<string, unknown> {
  const { mesh, run, history, estimates } = result;
  return {
    corelag: 1,
    title: result.title,
    mesh,
    run,
    stages: result.stages,
    history: {
      time: list(history.time),
      coldest: list(history.coldest),
      hottest: list(history.hottest),
      mean: list(history.mean),
      surfaceMean: list(history.surfaceMean),
      heat: list(history.heat),
      probes: Object.fromEntries(
        Object.entries(history.probes).map(([name, values]) => [name, list(values)]),
      ),
      core: { place: history.core.place, temperature: list(history.core.temperature) },
    },
    estimates: plain(estimates),
    answers: result.answers,
    warnings: result.warnings,
  };
}

const list = (values: Float64Array): number[] => Array.from(values);

/** Typed arrays anywhere inside become plain ones. */
function plain(value: unknown): unknown {
  if (value instanceof Float64Array) return list(value);
  if (Array.isArray(value)) return value.map(plain);
  if (typeof value !== "object" || value === null) return value;
  return Object.fromEntries(Object.entries(value).map(([key, inner]) => [key, plain(inner)]));
}
