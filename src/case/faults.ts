/**
 * Turns what the schema found into problems: one each, at its place, in words. Of a choice between forms ("a
 * condition is one of ...") only the faults of the form that was meant are kept: the one with most of the fields given.
 */
import { z } from "zod";
import { missingField } from "./missing.ts";
import { pathText, spokenPlace, valueAt } from "./path.ts";
import type { PathStep } from "./path.ts";
import { listed, nearest } from "./similar.ts";
import { caseSchema } from "./schema.ts";
import type { CaseProblem } from "./types.ts";

type Issue = z.core.$ZodIssue;

export function schemaProblems(issues: readonly Issue[], document: unknown): CaseProblem[] {
  return issues.flatMap((issue) => problemsOf(issue, [], document));
}

function problemsOf(issue: Issue, prefix: readonly PathStep[], document: unknown): CaseProblem[] {
  const steps = [...prefix, ...(issue.path as PathStep[])];
  const found = valueAt(document, steps);
  if (found === undefined && issue.code !== "custom") return [missing(steps, document)];
  switch (issue.code) {
    case "custom":
      return [
        problem(
          String(issue.params?.["code"] ?? "value"),
          steps,
          issue.message,
          String(issue.params?.["mend"] ?? ""),
        ),
      ];
    case "unrecognized_keys":
      return issue.keys.map((key) => unknownField(key, steps, document));
    case "invalid_union":
      return unionProblems(issue, steps, document);
    default:
      return [wrongValue(issue, steps, found, document)];
  }
}

function problem(code: string, steps: readonly PathStep[], message: string, mend: string): CaseProblem {
  return { code, path: pathText(steps), message, mend };
}

function missing(steps: readonly PathStep[], document: unknown): CaseProblem {
  const last = steps[steps.length - 1];
  const holder = steps.slice(0, -1);
  if (typeof last !== "string") {
    return problem("missing", steps, "A value is missing.", "Give both values of the pair.");
  }
  const { message, mend } = missingField(spokenPlace(document, holder), last, String(steps[0]));
  return problem("missing", steps, message, mend);
}

// --- choices between forms ------------------------------------------------------------------------------------------

function unionProblems(
  issue: z.core.$ZodIssueInvalidUnion,
  steps: readonly PathStep[],
  document: unknown,
): CaseProblem[] {
  const found = valueAt(document, steps);
  const branch = branchMeant(issue.errors, found);
  if (branch) return branch.flatMap((inner) => problemsOf(inner, steps, document));
  return [problem("choice", steps, choiceMessage(found, issue.message), issue.message)];
}

function choiceMessage(found: unknown, says: string): string {
  if (says.startsWith("Found")) return says;
  if (typeof found === "object" && found !== null && !Array.isArray(found)) {
    const keys = Object.keys(found);
    return keys.length === 0
      ? "Nothing is given here."
      : `The fields ${listed(keys)} together are none of the forms.`.replace(
          / or (?="[^"]*" together)/,
          " and ",
        );
  }
  return `Found ${quoted(found)}.`;
}

/** The branch whose type is that of the value and which knows most of its fields; undefined when none stands out. */
function branchMeant(branches: readonly (readonly Issue[])[], found: unknown): readonly Issue[] | undefined {
  const ofThisType = branches.filter((issues) => !issues.some(isWrongType));
  if (ofThisType.length <= 1) return ofThisType[0];
  if (typeof found !== "object" || found === null) return undefined;
  const ranked = ofThisType
    .map((issues) => ({ issues, known: knownFields(issues, Object.keys(found).length) }))
    .sort((a, b) => b.known - a.known);
  const [best, second] = ranked;
  return best && best.known > 0 && best.known > (second?.known ?? 0) ? best.issues : undefined;
}

function isWrongType(issue: Issue): boolean {
  if (issue.path.length > 0) return false;
  return (
    issue.code === "invalid_type" ||
    issue.code === "invalid_value" ||
    (issue.code === "invalid_union" &&
      issue.errors.length > 0 &&
      issue.errors.every((branch) => branch.some(isWrongType)))
  );
}

function knownFields(issues: readonly Issue[], given: number): number {
  let unknown = 0;
  for (const issue of issues) {
    if (issue.code === "unrecognized_keys" && issue.path.length === 0) unknown += issue.keys.length;
  }
  return given - unknown;
}

// --- single faults --------------------------------------------------------------------------------------------------

function unknownField(key: string, steps: readonly PathStep[], document: unknown): CaseProblem {
  const place = spokenPlace(document, steps);
  const at = [...steps, key];
  const meant = nearest(key, allFieldNames());
  if (meant === key) {
    const message = `${place} has the field "${key}", which does not go with the others given there.`;
    return problem("unknown-field", at, message, `Take "${key}" out, or what stands beside it.`);
  }
  const mend =
    meant === undefined ? "Take it out, or put what it says into notes." : `Did you mean "${meant}"?`;
  const message = `${place} has the field "${key}", which the format does not know.`;
  return problem("unknown-field", at, message, mend);
}

function wrongValue(
  issue: Issue,
  steps: readonly PathStep[],
  found: unknown,
  document: unknown,
): CaseProblem {
  const place = spokenPlace(document, steps.slice(0, -1));
  const field = steps.filter((step) => typeof step === "string").at(-1);
  switch (issue.code) {
    case "invalid_type":
      return problem(
        "type",
        steps,
        `${place}: found ${quoted(found)}, expected ${spokenType(issue.expected)}.`,
        `Give ${spokenType(issue.expected)}.`,
      );
    case "invalid_value": {
      const choices = listed(issue.values.map(String));
      return problem(
        "choice",
        steps,
        `${place}: found ${quoted(found)}, expected ${choices}.`,
        `Write ${choices}.`,
      );
    }
    case "too_small":
    case "too_big":
      return wrongSize(issue, steps, found, place);
    default:
      return problem(
        "value",
        steps,
        `${place}: found ${quoted(found)} for "${field}". ${issue.message}`,
        "Correct the value.",
      );
  }
}

function wrongSize(
  issue: z.core.$ZodIssueTooSmall | z.core.$ZodIssueTooBig,
  steps: readonly PathStep[],
  found: unknown,
  place: string,
): CaseProblem {
  const field = steps.filter((step) => typeof step === "string").at(-1);
  if (issue.origin === "string")
    return problem("empty", steps, `${place} has an empty ${field}.`, "Give at least one letter.");
  const limit = issue.code === "too_small" ? issue.minimum : issue.maximum;
  if (issue.origin === "array") {
    const count = Array.isArray(found) ? found.length : 0;
    const wanted = issue.code === "too_small" ? `at least ${limit}` : `at most ${limit}`;
    return problem(
      "count",
      steps,
      `${place}: "${field}" has ${count} entries where ${wanted} ${limit === 1 ? "is" : "are"} expected.`,
      countMend(String(field)),
    );
  }
  const bound = issue.code === "too_small" ? "at least" : "at most";
  return problem(
    "range",
    steps,
    `"${field}" is ${quoted(found)}; it has to be ${bound} ${limit}.`,
    `Give a value of ${bound} ${limit}.`,
  );
}

function countMend(field: string): string {
  if (field === "at" || field === "through") return "Give two values: [r, z].";
  if (field === "outline" || field === "holes")
    return "Give three corners or more; two will do when a side is an arc.";
  if (field === "between") return "Give the names of two regions.";
  if (field === "regions" || field === "stages") return "Give at least one.";
  return "Give pairs [x, y].";
}

function spokenType(expected: string): string {
  const words: Readonly<Record<string, string>> = {
    object: "an object { ... }",
    record: "an object { ... }",
    array: "a list [ ... ]",
    tuple: "a pair [ , ]",
    string: "text",
    number: "a finite number",
  };
  return words[expected] ?? expected;
}

function quoted(found: unknown): string {
  if (typeof found === "number") return String(found);
  const text = JSON.stringify(found) ?? String(found);
  return text.length > 60 ? `${text.slice(0, 57)}...` : text;
}

let fieldNames: Set<string> | undefined;
/** Every field name of the format, read off the schema. */
function allFieldNames(): Set<string> {
  fieldNames ??= collectNames(caseSchema, new Set(), new Set());
  return fieldNames;
}

function collectNames(schema: unknown, names: Set<string>, seen: Set<unknown>): Set<string> {
  if (typeof schema !== "object" || schema === null || seen.has(schema)) return names;
  seen.add(schema);
  const def = (schema as z.core.$ZodType)._zod?.def as unknown as Record<string, unknown> | undefined;
  if (!def) return names;
  if (schema instanceof z.ZodObject) for (const key of Object.keys(schema.shape)) names.add(key);
  for (const part of Object.values(def)) {
    if (typeof part !== "object" || part === null) continue;
    for (const inner of [part, ...Object.values(part)]) collectNames(inner, names, seen);
  }
  return names;
}
