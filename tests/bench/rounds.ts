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

/** Runs the work once cold, then for about `seconds` (3 to 25 rounds) warm. */
export async function timeRounds(work: () => unknown, seconds = 3): Promise<Timed> {
  const once = async (): Promise<number> => {
    const from = performance.now();
    await work();
    return performance.now() - from;
  };
  const cold = await once();
  const rounds = Math.min(25, Math.max(3, Math.round((1000 * seconds) / Math.max(cold, 1))));
  const warm: number[] = [];
  for (let i = 0; i < rounds; i++) warm.push(await once());
  return { cold, warm: median(warm) };
}
