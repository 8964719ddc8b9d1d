/** Which scheme marches a stage. */
import { implicitEuler } from "./implicitEuler.ts";
import { krylov } from "./krylov.ts";
import { trBdf2 } from "./trBdf2.ts";
import type { Scheme, SchemeName } from "./types.ts";

/** The scheme of that name; without one, the Krylov march, which is exact in time where a stage is linear. */
export function chooseScheme(name: SchemeName | undefined): Scheme {
  switch (name) {
    case "implicit-euler":
      return implicitEuler;
    case "krylov":
    case undefined:
      return krylov;
    case "tr-bdf2":
      return trBdf2;
  }
}
