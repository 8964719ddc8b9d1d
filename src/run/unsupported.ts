/**
 * Fields of the case document that this version cannot solve yet. They are refused by name: none is ignored in
 * silence.
 */
import type { Case, CaseProblem, Condition, Curve } from "../case/types.ts";

/** One problem for each field that would otherwise be ignored. */
export function unsupportedFields(input: Case): CaseProblem[] {
  const problems: CaseProblem[] = [];
  const refuse = (path: string, what: string, mend: string): void => {
    problems.push({ code: "not-solved-yet", path, message: `this version does not solve ${what} yet`, mend });
  };
  for (const [name, material] of Object.entries(input.materials)) {
    const path = `materials.${name}`;
    const whole = material.library !== undefined;
    if (isTable(material.conductivity) && used(input, name))
      refuse(whole ? path : `${path}.conductivity`, "a conductivity that varies", constantMend(whole));
    if (isTable(material.heatCapacity) && used(input, name))
      refuse(whole ? path : `${path}.heatCapacity`, "a heat capacity that varies", constantMend(whole));
    if (material.latent && used(input, name))
      refuse(
        whole ? path : `${path}.latent`,
        "melting and freezing",
        "take the latent heat out, or wait for a later version",
      );
  }
  if (input.contacts.length > 0)
    refuse(
      "part.contacts",
      "contact conductance",
      "take the contacts out: regions that touch then touch perfectly",
    );
  input.regions.forEach((region, i) => {
    if (isTable(region.source))
      refuse(`part.regions[${i}].source`, "a source that varies", "give one number in W/m3");
  });
  input.stages.forEach((stage, i) => {
    for (const [side, condition] of Object.entries(stage.sides))
      unsupportedCondition(condition, `stages[${i}].sides.${side}`, refuse);
  });
  return problems;
}

function unsupportedCondition(
  condition: Condition,
  path: string,
  refuse: (path: string, what: string, mend: string) => void,
): void {
  if (condition.kind !== "film") return;
  if (isTable(condition.film))
    refuse(`${path}.film`, "a film coefficient that varies", "give one number, the mean over the stage");
  if (condition.emissivity > 0)
    refuse(
      `${path}.emissivity`,
      "radiation by its own law",
      "take the emissivity out and add its share to the film coefficient",
    );
}

const isTable = (curve: Curve): boolean => typeof curve !== "number";
const used = (input: Case, material: string): boolean =>
  input.regions.some((region) => region.material === material);
const constantMend = (fromLibrary: boolean): string =>
  fromLibrary
    ? "pick a library entry with constant values, or give constant values of your own"
    : "give one number, the mean over the temperatures of the run";
