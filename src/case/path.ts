/** Paths into the document, as in "part.regions[0].outline[2].at" and "stages[0].sides["*"]". */

export type PathStep = string | number;

export function pathText(steps: readonly PathStep[]): string {
  let text = "";
  for (const step of steps) {
    if (typeof step === "number") text += `[${step}]`;
    else if (/^[A-Za-z_]\w*$/.test(step)) text += text === "" ? step : `.${step}`;
    else text += `[${JSON.stringify(step)}]`;
  }
  return text;
}

/** The steps of a written path; the inverse of `pathText`. */
export function pathSteps(text: string): PathStep[] {
  const steps: PathStep[] = [];
  for (const match of text.matchAll(/\[(\d+)\]|\[("(?:[^"\\]|\\.)*")\]|([A-Za-z_]\w*)/g)) {
    if (match[1] !== undefined) steps.push(Number(match[1]));
    else if (match[2] !== undefined) steps.push(JSON.parse(match[2]) as string);
    else if (match[3] !== undefined) steps.push(match[3]);
  }
  return steps;
}

/** What stands at a path of any value; undefined when the path leads nowhere. */
export function valueAt(document: unknown, steps: readonly PropertyKey[]): unknown {
  let value = document;
  for (const step of steps) {
    if (typeof value !== "object" || value === null || !Object.hasOwn(value, step)) return undefined;
    value = (value as Record<PropertyKey, unknown>)[step];
  }
  return value;
}

/** A place of the document in words: 'Region "ingot"', 'Point 3 of region "ingot"', 'Stage "quench"'. */
export function spokenPlace(document: unknown, steps: readonly PathStep[]): string {
  const [first, second, third, fourth, fifth] = steps;
  if (first === "part" && second === "regions" && typeof third === "number") {
    const region = named("region", document, steps.slice(0, 3), third);
    const inLoop = fourth === "outline" ? steps[4] : fourth === "holes" ? steps[5] : undefined;
    if (typeof inLoop !== "number") return capital(region);
    const hole = fourth === "holes" ? ` of hole ${Number(fifth) + 1}` : "";
    return `Point ${inLoop + 1}${hole} of ${region}`;
  }
  if (first === "part")
    return second === "contacts" && typeof third === "number" ? `Contact ${third + 1}` : "The part";
  if (first === "materials" && second !== undefined) return `Material "${second}"`;
  if (typeof second !== "number") return "The case";
  const one = { stages: "stage", probes: "probe" }[String(first)];
  if (one === "stage" && third === "sides" && fourth !== undefined) {
    return `Side "${fourth}" in ${named("stage", document, steps.slice(0, 2), second)}`;
  }
  if (one) return capital(named(one, document, steps.slice(0, 2), second));
  return first === "questions" ? `Question ${second + 1}` : "The case";
}

function named(kind: string, document: unknown, steps: readonly PathStep[], index: number): string {
  const name = valueAt(document, [...steps, "name"]);
  return typeof name === "string" && name !== "" ? `${kind} "${name}"` : `${kind} ${index + 1}`;
}

function capital(words: string): string {
  return `${words[0]?.toUpperCase() ?? ""}${words.slice(1)}`;
}
