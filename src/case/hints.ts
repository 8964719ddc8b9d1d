/** What is allowed but looks like a slip: said beside the answers, never a reason to refuse the case. */
import { LIKELY } from "./defaults.ts";
import type { MaterialLibrary } from "./library.ts";
import { pathText } from "./path.ts";
import type { PathStep } from "./path.ts";
import type { Case, CaseProblem, Condition, Curve } from "./types.ts";
import { formatNumber } from "./units.ts";

/** Hints on a case that was read. */
export function hintsOf(given: Case, library: MaterialLibrary): CaseProblem[] {
  return [
    ...materialHints(given),
    ...validityHints(given, library),
    ...extentHints(given),
    ...treatmentHints(given),
    ...questionHints(given),
  ];
}

function hint(code: string, path: readonly PathStep[], message: string, mend: string): CaseProblem {
  return { code, path: pathText(path), message, mend };
}

/** A value outside its likely bounds; "did you mean" when a factor of a thousand mends it. */
function unlikely(
  curve: Curve,
  kind: keyof typeof LIKELY,
  what: string,
  unit: string,
  path: readonly PathStep[],
): CaseProblem[] {
  const [low, high] = LIKELY[kind];
  const values = typeof curve === "number" ? [curve] : curve.points.map((point) => point[1]);
  const odd = values.find((value) => value !== 0 && (value < low || value > high));
  if (odd === undefined) return [];
  const mended = [odd / 1000, odd * 1000].find((value) => value >= low && value <= high);
  const message = `${what} is ${formatNumber(odd)} ${unit}, outside ${formatNumber(low)} to ${formatNumber(high)} where such values lie.`;
  const mend =
    mended === undefined || kind === "temperature"
      ? "Check the value and its unit."
      : `Did you mean ${formatNumber(mended)}?`;
  return [hint("unlikely-value", path, message, mend)];
}

function materialHints(given: Case): CaseProblem[] {
  const used = new Set(given.regions.map((region) => region.material));
  return Object.entries(given.materials).flatMap(([name, material]) => {
    const at = (field: string) => ["materials", name, field];
    const unused = used.has(name)
      ? []
      : [
          hint(
            "material-unused",
            ["materials", name],
            `No region is made of "${name}".`,
            "Take it out, or name it in a region.",
          ),
        ];
    return [
      ...unused,
      ...unlikely(material.density, "density", `The density of "${name}"`, "kg/m³", at("density")),
      ...unlikely(
        material.conductivity,
        "conductivity",
        `The conductivity of "${name}"`,
        "W/(m K)",
        at("conductivity"),
      ),
      ...unlikely(
        material.heatCapacity,
        "heatCapacity",
        `The heat capacity of "${name}"`,
        "J/(kg K)",
        at("heatCapacity"),
      ),
    ];
  });
}

/** Regions that start far outside the temperatures for which their library values hold. */
function validityHints(given: Case, library: MaterialLibrary): CaseProblem[] {
  return given.regions.flatMap(({ material, start, name }) => {
    const entry = library[given.materials[material]?.library ?? ""];
    if (!entry || (start >= entry.valid[0] && start <= entry.valid[1])) return [];
    const [from, to] = entry.valid;
    return [
      hint(
        "outside-validity",
        ["materials", material],
        `"${name}" starts at ${formatNumber(start)} °C; the values of ${entry.title} hold from ${from} to ${to} °C.`,
        "Take an entry over temperature, or give values for the temperatures of this case.",
      ),
    ];
  });
}

function extentHints(given: Case): CaseProblem[] {
  const places = given.regions.flatMap((region) => region.outline.map((vertex) => vertex.at));
  const extent = (k: 0 | 1): number =>
    Math.max(...places.map((at) => at[k])) - Math.min(...places.map((at) => at[k]));
  const size = Math.max(extent(0), extent(1));
  const [low, high] = LIKELY.extent;
  if (size >= low && size <= high) return [];
  const meant =
    size > high ? 'A bare number is metres; for millimetres write "200 mm".' : "A bare number is metres.";
  return [hint("unlikely-size", ["part"], `The part is ${formatNumber(size)} m across.`, meant)];
}

function treatmentHints(given: Case): CaseProblem[] {
  const hints: CaseProblem[] = [];
  given.stages.forEach((stage, i) => {
    for (const [name, condition] of Object.entries(stage.sides)) {
      const path = ["stages", i, "sides", name];
      if (condition.kind === "film") hints.push(...filmHints(condition, name, stage.name, path));
      if (condition.kind === "held")
        hints.push(
          ...unlikely(condition.held, "temperature", `The temperature of "${name}"`, "°C", [...path, "held"]),
        );
    }
  });
  return [...hints, ...emissivityHints(given)];
}

function filmHints(
  film: Extract<Condition, { kind: "film" }>,
  side: string,
  stage: string,
  path: readonly PathStep[],
): CaseProblem[] {
  return [
    ...unlikely(film.film, "filmCoefficient", `The film of "${side}" in stage "${stage}"`, "W/(m² K)", [
      ...path,
      "film",
    ]),
    ...unlikely(film.ambient, "temperature", `The ambient of "${side}" in stage "${stage}"`, "°C", path),
  ];
}

/** An emissivity that a person wrote and no condition uses. */
function emissivityHints(given: Case): CaseProblem[] {
  const radiates = given.stages.some((stage) =>
    Object.values(stage.sides).some((condition) => condition.kind === "film" && condition.emissivity > 0),
  );
  if (radiates) return [];
  return Object.entries(given.materials).flatMap(([name, material]) =>
    material.emissivity === undefined || material.library !== undefined
      ? []
      : [
          hint(
            "emissivity-unused",
            ["materials", name, "emissivity"],
            `The emissivity of "${name}" is not used: no side radiates.`,
            'Give the condition an "emissivity", or "surroundings" to radiate to.',
          ),
        ],
  );
}

/** Questions whose answer is known to be "never" or that look at nothing. */
function questionHints(given: Case): CaseProblem[] {
  const longest = given.stages.reduce((sum, stage) => sum + stage.lasts, 0);
  const last = given.stages.at(-1);
  return given.questions.flatMap((question, i) => {
    const path = ["questions", i];
    if (question.ask === "when" && last && question.reaches === last.ambient) {
      return [
        hint(
          "question-at-ambient",
          [...path, "reaches"],
          `Question ${i + 1} asks for ${question.reaches} °C, the temperature of the surroundings; no point ever quite gets there.`,
          "Ask for a temperature one or two degrees short of it.",
        ),
      ];
    }
    if (question.ask === "reading" && question.at > longest) {
      return [
        hint(
          "question-too-late",
          [...path, "at"],
          `Question ${i + 1} asks for ${formatNumber(question.at)} s; the treatment is over after ${formatNumber(longest)} s.`,
          "Ask earlier, or let the last stage last longer.",
        ),
      ];
    }
    if (question.ask === "passage" && question.from === question.to) {
      return [
        hint(
          "question-empty",
          [...path, "to"],
          `Question ${i + 1} passes from ${question.from} °C to the same temperature.`,
          "Give two temperatures.",
        ),
      ];
    }
    return [];
  });
}
