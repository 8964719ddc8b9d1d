/** Which inputs do not say where they come from. */
import type { CaseDocument } from "../../case/types.ts";

/** Names of the used materials whose values carry no source of their own. Library materials carry theirs. */
export function unsourced(document: CaseDocument): string[] {
  const used = new Set(document.part.regions.map((region) => region.material));
  return Object.entries(document.materials)
    .filter(([name, material]) => used.has(name) && !("library" in material) && !material.source?.trim())
    .map(([name]) => `The values of ${name}`);
}
