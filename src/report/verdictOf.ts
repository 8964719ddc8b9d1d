/** The verdict on the quick estimate, from a result alone: what terminal, report and page all say. */
import type { Verdict } from "../compare/types.ts";
import { verdict } from "../compare/verdict.ts";
import type { CaseResult } from "../run/result.ts";

export function verdictOf(result: CaseResult): Verdict {
  return verdict(result.answers);
}
