/**
 * Cautions in our own words where they bite. They say what, where, how much, and who decides; they are no substitute
 * for local codes and licensed practice.
 */
import { formatTemperature } from "../case/format.ts";
import type { CaseResult } from "../run/result.ts";

/** degC above which bare metal can burn at a short touch; common practice of the trade, from memory of ISO 13732-1. */
const HOT_TO_TOUCH = 50;
/** degC above which hot parts ignite oil vapour or flash water to steam: common practice of the trade. */
const QUENCH_HOT = 200;

/** Sentences for the end of a summary, a report or the pane; empty when nothing bites. */
export function cautionsFor({ history, answers }: CaseResult): string[] {
  const cautions: string[] = [];
  const end = history.hottest.length - 1;
  const hottest = history.hottest[end]!;
  if (hottest > HOT_TO_TOUCH)
    cautions.push(
      `The hottest point is still at ${formatTemperature(hottest)} at the end; a part looks cold long before it is. Keep hands off, mark it, and follow the local rules for hot surfaces.`,
    );
  if (fallsQuickly(history.hottest, history.surfaceMean, history.time))
    cautions.push(
      "A hot part put into a bath makes steam or burning oil vapour. Bath size, extraction and fire cover are for local codes and licensed practice to decide, not for this sum.",
    );
  if (answers.some((answer) => answer.question.ask === "dose"))
    cautions.push(
      "This reckons conduction in a set food or part only. It does not release a process; a process authority does.",
    );
  return cautions;
}

/** Does the skin fall from quench heat by half within the first twentieth of the run? */
function fallsQuickly(hottest: Float64Array, skin: Float64Array, time: Float64Array): boolean {
  if (hottest[0]! < QUENCH_HOT) return false;
  const early = time.findIndex((instant) => instant >= time[time.length - 1]! / 20);
  return skin[early]! < hottest[0]! / 2;
}
