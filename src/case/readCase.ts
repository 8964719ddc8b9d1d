/** Reads a case: text or value in; a case in SI and hints, or every fault at once. */
import { checkDocument } from "./checkDocument.ts";
import { MOST_CHARACTERS, MOST_PROBLEMS } from "./defaults.ts";
import { schemaProblems } from "./faults.ts";
import { commonEmissivity, fillCase } from "./fillCase.ts";
import { hintsOf } from "./hints.ts";
import { readJson } from "./jsonText.ts";
import type { MaterialLibrary } from "./library.ts";
import { pathText, spokenPlace } from "./path.ts";
import { caseSchema, FORMAT_VERSION } from "./schema.ts";
import type { ParsedCase } from "./schema.ts";
import type { Case, CaseDocument, CaseProblem } from "./types.ts";

export type { MaterialLibrary } from "./library.ts";

export type ReadCase =
  | {
      readonly case: Case;
      /** what was read, for saving it again as the person wrote it */
      readonly document: CaseDocument;
      /** things that are allowed but look like a slip, each with its place */
      readonly hints: readonly CaseProblem[];
      /** the same as sentences, for the result and the report */
      readonly warnings: readonly string[];
    }
  | { readonly problems: readonly CaseProblem[] };

/**
 * @param input   the text of a case file, or the document as a value
 * @param library materials that the case may name
 * @returns never throws on a faulty document: all its faults are listed, each with its place
 */
export function readCase(input: unknown, library: MaterialLibrary): ReadCase {
  if (typeof input !== "string") return readDocument(input, library);
  if (input.length > MOST_CHARACTERS) return { problems: [tooLarge(input.length)] };
  const json = readJson(input);
  if ("value" in json) return readDocument(json.value, library);
  const { message, mend, line, column } = json.fault;
  return {
    problems: [{ code: "json", path: "", message: `Line ${line}, column ${column}: ${message}`, mend }],
  };
}

function tooLarge(characters: number): CaseProblem {
  return {
    code: "too-large",
    path: "",
    message: `The file has ${(characters / 1e6).toFixed(1)} million characters; a case has at most ${MOST_CHARACTERS / 1e6} million.`,
    mend: "Check that this is a case file.",
  };
}

function readDocument(document: unknown, library: MaterialLibrary): ReadCase {
  const version = versionProblem(document);
  if (version) return { problems: [version] };
  const parsed = caseSchema.safeParse(document);
  const problems = [
    ...(parsed.success ? [] : schemaProblems(parsed.error.issues, document)),
    ...checkDocument(document, library),
  ];
  if (problems.length > 0 || !parsed.success) return { problems: tidy(problems) };
  const filled = fillCase(parsed.data, library);
  const dark = radiationProblems(parsed.data, filled);
  if (dark.length > 0) return { problems: dark };
  const hints = hintsOf(filled, library);
  const warnings = hints.map(({ message, mend }) => `${message} ${mend}`);
  return { case: filled, document: document as CaseDocument, hints, warnings };
}

/** A document of another version is not read on: its faults would be those of the wrong format. */
function versionProblem(document: unknown): CaseProblem | undefined {
  const problem = (code: string, path: string, message: string, mend: string) => ({
    code,
    path,
    message,
    mend,
  });
  if (typeof document !== "object" || document === null || Array.isArray(document)) {
    return problem(
      "not-a-case",
      "",
      "This is not a case document.",
      'A case is an object { ... } that begins with "corelag": 1.',
    );
  }
  const version = (document as Record<string, unknown>)["corelag"];
  if (version === FORMAT_VERSION) return undefined;
  if (version === undefined) {
    return problem(
      "not-a-case",
      "corelag",
      'The document does not say "corelag", so it is not known to be a case.',
      `Begin it with "corelag": ${FORMAT_VERSION}.`,
    );
  }
  if (typeof version === "number" && version > FORMAT_VERSION) {
    return problem(
      "newer-version",
      "corelag",
      `The case is written in version ${version} of the format; this program reads version ${FORMAT_VERSION}.`,
      "Open it with a newer Corelag.",
    );
  }
  return problem(
    "version",
    "corelag",
    `"corelag" is ${JSON.stringify(version)}; the version of the format is ${FORMAT_VERSION}.`,
    `Write "corelag": ${FORMAT_VERSION}.`,
  );
}

/** Conditions that radiate to "surroundings" when no one emissivity can be taken from the materials. */
function radiationProblems(parsed: ParsedCase, filled: Case): CaseProblem[] {
  if (commonEmissivity(parsed, filled.materials) !== undefined) return [];
  return parsed.stages.flatMap((stage, i) =>
    Object.entries(stage.sides).flatMap(([name, condition]) => {
      if (typeof condition === "string" || !("film" in condition)) return [];
      if (condition.surroundings === undefined || condition.emissivity !== undefined) return [];
      const path = ["stages", i, "sides", name];
      return [
        {
          code: "no-emissivity",
          path: pathText(path),
          message: `${spokenPlace(parsed, path)} radiates to surroundings, but no emissivity is known for it.`,
          mend: 'Give "emissivity" in the condition, or one for all materials of the part.',
        },
      ];
    }),
  );
}

/** One problem a place and code, in the order of the document as far as the schema keeps it; not endless. */
function tidy(problems: readonly CaseProblem[]): CaseProblem[] {
  const seen = new Set<string>();
  const once = problems.filter(({ code, path, message }) => {
    const key = `${code}|${path}|${code === "missing" ? "" : message}`;
    return seen.has(key) ? false : seen.add(key);
  });
  if (once.length <= MOST_PROBLEMS) return once;
  const rest = once.length - MOST_PROBLEMS;
  return [
    ...once.slice(0, MOST_PROBLEMS),
    { code: "more", path: "", message: `There are ${rest} more faults.`, mend: "Mend these first." },
  ];
}
