/** The blank that says what a region is made of: a material of the document, or one of the library. */
import { html } from "lit";
import type { TemplateResult } from "lit";
import type { LibraryMaterial, MaterialLibrary } from "../../case/library.ts";
import type { CaseDocument } from "../../case/types.ts";
import type { MenuItem } from "../controls/menu.ts";
import { sendEdit } from "../events.ts";

const FROM_LIBRARY = "library:";

export function materialBlank(
  host: HTMLElement,
  document: CaseDocument,
  region: number,
  library: MaterialLibrary,
): TemplateResult {
  const name = document.part.regions[region]?.material ?? "";
  const take = (event: Event): void => {
    const { raw } = (event as CustomEvent<{ raw: string }>).detail;
    sendEdit(host, "material", (draft) => setMaterial(draft, region, raw));
  };
  return html`<corelag-blank
    kind="choice"
    .label=${`material of ${document.part.regions[region]?.name ?? "the part"}`}
    .value=${name}
    .options=${options(document, library)}
    @change=${take}
  ></corelag-blank>`;
}

/** Whether this version solves a material: constant values, no melting. Others are not offered. */
export function isSolved(material: LibraryMaterial): boolean {
  return (
    typeof material.conductivity === "number" && typeof material.heatCapacity === "number" && !material.latent
  );
}

function options(document: CaseDocument, library: MaterialLibrary): MenuItem[] {
  const own = Object.entries(document.materials).map(([name, material]): MenuItem => {
    const title = "library" in material ? library[material.library]?.title : undefined;
    return { value: name, label: title ?? name, note: "library" in material ? "library" : "entered" };
  });
  const taken = new Set(Object.values(document.materials).map((m) => ("library" in m ? m.library : "")));
  const more = Object.entries(library)
    .filter(([key, material]) => !taken.has(key) && isSolved(material))
    .map(([key, { title }], i): MenuItem => ({
      value: FROM_LIBRARY + key,
      label: title,
      ...(i === 0 && { parted: true }),
    }));
  return [...own, ...more];
}

/** Makes a region of another material; a material that nothing is made of any more is dropped from the document. */
function setMaterial(draft: CaseDocument, region: number, picked: string): void {
  const target = draft.part.regions[region];
  if (!target) return;
  const key = picked.startsWith(FROM_LIBRARY) ? picked.slice(FROM_LIBRARY.length) : null;
  const name = key ?? picked;
  if (key !== null) draft.materials[name] = { library: key };
  target.material = name;
  const used = new Set(draft.part.regions.map((each) => each.material));
  draft.materials = Object.fromEntries(
    Object.entries(draft.materials).filter(([each, material]) => used.has(each) || !("library" in material)),
  );
}
