/** Schema parts for quantities and curves: text or number in, SI out. */
import { z } from "zod";
import { ABSOLUTE_ZERO, DIMENSIONS } from "./dimensions.ts";
import type { Dimension } from "./dimensions.ts";
import type { Curve } from "./types.ts";
import { parseQuantity } from "./units.ts";

/** Bounds in SI (degC) for a quantity. */
export interface Rule {
  readonly above?: number;
  readonly atLeast?: number;
  readonly atMost?: number;
}
type Over = "time" | "temperature";

/** A number in SI, or a text with its unit; the output is the SI value. */
export function quantity(dimension: Dimension, what: string, rule: Rule = {}) {
  const { bare, example } = DIMENSIONS[dimension];
  return z
    .union([z.number(), z.string()], { error: (issue) => notAQuantity(issue.input, dimension) })
    .transform((given, context) => {
      const read = parseQuantity(given, dimension);
      const fault =
        "fault" in read ? { code: "quantity", ...read.fault } : outside(given, read.value, rule, bare);
      if (!fault) return (read as { value: number }).value;
      context.issues.push({
        code: "custom",
        input: given,
        message: fault.message,
        params: { code: fault.code, mend: fault.mend },
      });
      return z.NEVER;
    })
    .describe(
      `${what}: ${dimension === "share" ? bare : `a number in ${bare}, or text such as "${example}"`}.`,
    );
}

function notAQuantity(input: unknown, dimension: Dimension): string {
  const { spoken, bare, example } = DIMENSIONS[dimension];
  const found =
    typeof input === "number"
      ? String(input)
      : input === null
        ? "null"
        : Array.isArray(input)
          ? "a list"
          : typeof input;
  const unit = dimension === "share" ? "" : ` in ${bare}, or text such as "${example}"`;
  return `Found ${found}; ${spoken} is expected: a finite number${unit}.`;
}

function outside(given: number | string, value: number, rule: Rule, bare: string) {
  const { above, atLeast, atMost } = rule;
  const limits: string[] = [];
  if (above !== undefined && !(value > above)) limits.push(`above ${above}`);
  if (atLeast !== undefined && !(value >= atLeast)) limits.push(`at least ${atLeast}`);
  if (atMost !== undefined && !(value <= atMost)) limits.push(`at most ${atMost}`);
  if (limits.length === 0) return undefined;
  const unit = bare.startsWith("a ") ? "" : ` ${bare}`;
  const meant = typeof given === "string" ? ` (${Number(value.toPrecision(6))}${unit})` : unit;
  return {
    code: "range",
    message: `${given}${meant} is out of range; it has to be ${limits.join(" and ")}${unit}.`,
    mend: `Give a value ${limits.join(" and ")}${unit}.`,
  };
}

/**
 * A constant, a table [[x, y], ...], or { over, points }.
 *
 * @param choice.over what the x of a table may be; the first is what a plain table means
 */
export function curve(
  dimension: Dimension,
  what: string,
  choice: { readonly over: readonly [Over, Over?]; readonly rule?: Rule },
) {
  const y = quantity(dimension, "y", choice.rule);
  const [usual, other] = choice.over;
  const spelledOver = <X extends Over>(over: X) =>
    z.strictObject({ over: z.literal(over).describe("What x is."), points: table(over, y) });
  const spelled = other
    ? z.discriminatedUnion("over", [spelledOver(usual), spelledOver(other)], {
        error: `"over" is ${usual} or ${other}.`,
      })
    : spelledOver(usual);
  return z
    .union([y, table(usual, y), spelled], {
      error: (issue) => notAQuantity(issue.input, dimension).replace(/\.$/, ", or a table [[x, y], ...]."),
    })
    .transform((given): Curve => {
      if (typeof given === "number") return given;
      return Array.isArray(given) ? { over: usual, points: given } : given;
    })
    .describe(what);
}

/** Points with x strictly increasing. */
function table(over: Over, y: ReturnType<typeof quantity>) {
  const x =
    over === "time"
      ? quantity("time", "Time since the stage began")
      : quantity("temperature", "Temperature", { atLeast: ABSOLUTE_ZERO });
  return z
    .array(z.tuple([x, y]))
    .min(1)
    .superRefine((points, context) => {
      for (let i = 1; i < points.length; i++) {
        const [before, here] = [points[i - 1]![0], points[i]![0]];
        if (here > before) continue;
        context.addIssue({
          code: "custom",
          path: [i, 0],
          message: `${here} does not lie above the ${before} before it; a table goes up in x.`,
          params: { code: "table-order", mend: "Sort the points by x and give each x once." },
        });
      }
    })
    .describe("Points [x, y]: piecewise linear, held constant beyond the ends, x strictly increasing.");
}
