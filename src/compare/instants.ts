/** The instants at which estimates are worked out. */
import { INSTANTS_PER_STAGE } from "./defaults.ts";
import type { StageFacts } from "./facts.ts";

/**
 * Instants of the field's history and of every stage's own, dense at its start, in one ascending array without
 * repeats: an estimate is read between them to a far finer share than it is right to.
 *
 * @param times  [s] from the start of the case, ascending
 */
export function estimateInstants(stages: readonly StageFacts[], times: Float64Array): Float64Array {
  const all = new Set<number>(times);
  let began = 0;
  for (const { duration } of stages) {
    for (let i = 0; i < INSTANTS_PER_STAGE; i++) all.add(began + duration * (i / INSTANTS_PER_STAGE) ** 2);
    began += duration;
  }
  all.add(began);
  return Float64Array.from([...all].sort((a, b) => a - b));
}
