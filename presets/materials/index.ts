/**
 * The library of materials. Each value carries its source and how sure it is; see `library.json`.
 *
 * Plain names hold constant values near room temperature (or at the temperature that the title says); names that end
 * in "-over-temperature" hold tables, and "-melting" the latent heat as well.
 */
import type { MaterialLibrary } from "../../src/case/library.ts";
import library from "./library.json";

export const LIBRARY = library as unknown as MaterialLibrary;
