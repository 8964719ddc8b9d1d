/** The preset cases, in the order in which they are offered. All their data is invented, and each says so. */
import type { CaseDocument } from "../../src/case/types.ts";
import aluminiumCone from "./aluminium-cone.json";
import ballInOil from "./ball-in-oil.json";
import bottleShell from "./bottle-shell.json";
import heatedDisc from "./heated-disc.json";
import hubRing from "./hub-ring.json";
import jarOfPuree from "./jar-of-puree.json";
import quenchedBar from "./quenched-bar.json";
import sleeveOnCore from "./sleeve-on-core.json";
import sprayedTube from "./sprayed-tube.json";
import steppedRoll from "./stepped-roll.json";
import taperedIngot from "./tapered-ingot.json";

export interface PresetCase {
  /** name of its file, without the ending */
  readonly id: string;
  readonly document: CaseDocument;
}

const preset = (id: string, document: unknown): PresetCase => ({ id, document: document as CaseDocument });

/** The case that the page and `npm start` open with. */
export const BUNDLED_CASE = preset("tapered-ingot", taperedIngot);

export const CASES: readonly PresetCase[] = [
  BUNDLED_CASE,
  preset("stepped-roll", steppedRoll),
  preset("hub-ring", hubRing),
  preset("ball-in-oil", ballInOil),
  preset("quenched-bar", quenchedBar),
  preset("sprayed-tube", sprayedTube),
  preset("aluminium-cone", aluminiumCone),
  preset("bottle-shell", bottleShell),
  preset("sleeve-on-core", sleeveOnCore),
  preset("jar-of-puree", jarOfPuree),
  preset("heated-disc", heatedDisc),
];
