/** The instants of a stage at which curves and fields are kept. */
import { EARLIEST_SHARE, EARLY_INSTANTS, EVEN_INSTANTS } from "./defaults.ts";
import type { Signal } from "../march/types.ts";

/**
 * Evenly spaced instants, geometrically spaced early ones, the knots of the signals and those asked for, ascending,
 * each once, from 0 to the duration.
 *
 * @param duration of the stage [s]
 * @param signals  whose knots are kept
 * @param asked    more instants of the stage [s]; those outside are left out
 */
export function keptInstants(
  duration: number,
  signals: readonly Signal[],
  asked: readonly number[],
): Float64Array {
  const instants = [0, duration];
  for (let i = 1; i < EVEN_INSTANTS; i++) instants.push((duration * i) / EVEN_INSTANTS);
  for (let i = 0; i < EARLY_INSTANTS; i++)
    instants.push(
      duration * EARLIEST_SHARE ** (1 - i / EARLY_INSTANTS) * EVEN_INSTANTS ** (-i / EARLY_INSTANTS),
    );
  for (const signal of signals) instants.push(...signal.times);
  instants.push(...asked);
  const inside = instants.filter((time) => time >= 0 && time <= duration).sort((a, b) => a - b);
  return Float64Array.from(inside.filter((time, i) => i === 0 || time > inside[i - 1]!));
}
