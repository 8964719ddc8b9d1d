/** The library of materials as reading a case sees it: entries by name, every value with where it comes from. */
import type { Curve } from "./types.ts";

/**
 * How sure a value is: "seen" in a public copy of the source that is named, recalled "from memory", or "computed"
 * here from a formula of the source.
 */
export type Provenance = "seen" | "from memory" | "computed";

export interface ValueSource {
  readonly source: string;
  readonly provenance: Provenance;
  /** anything a reader should know, for example that sources disagree */
  readonly remark?: string;
}

export interface LibraryMaterial {
  /** for people: "carbon steel, values at 20 °C" */
  readonly title: string;
  /** kg/m3 */
  readonly density: number;
  /** W/(m K) */
  readonly conductivity: Curve;
  /** J/(kg K) */
  readonly heatCapacity: Curve;
  readonly emissivity?: number;
  readonly latent?: { readonly heat: number; readonly solidus: number; readonly liquidus: number };
  /** degC between which the values hold */
  readonly valid: readonly [from: number, to: number];
  readonly sources: {
    readonly density: ValueSource;
    readonly conductivity: ValueSource;
    readonly heatCapacity: ValueSource;
    readonly emissivity?: ValueSource;
    readonly latent?: ValueSource;
  };
}

export type MaterialLibrary = Readonly<Record<string, LibraryMaterial>>;

/** One line on where the values of an entry come from, those from memory named as such. */
export function sourceLine(material: LibraryMaterial): string {
  const byText = new Map<string, string[]>();
  const names: Readonly<Record<string, string>> = { heatCapacity: "heat capacity", latent: "latent heat" };
  for (const [field, from] of Object.entries(material.sources) as [string, ValueSource][]) {
    const text = `${from.source} (${from.provenance})`;
    byText.set(text, [...(byText.get(text) ?? []), names[field] ?? field]);
  }
  return [...byText].map(([text, fields]) => `${fields.join(", ")}: ${text}`).join("; ");
}

/** True when any value of the entry was recalled and not seen in its source. */
export function fromMemory(material: LibraryMaterial): boolean {
  return Object.values(material.sources).some((from) => from.provenance === "from memory");
}
