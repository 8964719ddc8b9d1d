/** Timing of repeated work: the first round is cold, the median of the others is warm. Machines are shared: compare ratios. */
import { performance } from "node:perf_hooks";

export interface Timed {
  /** ms */
  readonly cold: number;
  readonly warm: number;
}

export const median = (values: readonly number[]): number => {
  const sorted = [...values].sort((a, b) => a - b);
  const middle = sorted.length >> 1;
  return sorted.length % 2 === 1 ? sorted[middle]! : (sorted[middle - 1]! + sorted[middle]!) / 2;
};

/** Runs the work once cold, then for some seconds; the median of the second half counts as warm: compilers have settled. */
export async function timeRounds(work: () => unknown, seconds = 6): Promise<Timed> {
  const once = async (): Promise<number> => {
    const from = performance.now();
    await work();
    return performance.now() - from;
  };
  const cold = await once();
  const until = performance.now() + 1000 * seconds;
  const rounds: number[] = [];
  while (rounds.length < 4 || (performance.now() < until && rounds.length < 60)) rounds.push(await once());
  return { cold, warm: median(rounds.slice(rounds.length >> 1)) };
}
