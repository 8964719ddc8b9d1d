/** What the command line or the page may force; everything else comes from the case. */
import type { ElementOrder } from "../fem/elementMesh.ts";
import type { SchemeName } from "../march/types.ts";

export interface SolveOptions {
  /** fix the mesh near that many unknowns and switch refinement off */
  readonly nodes?: number;
  /** in place of the case's accuracy: share of the temperature span, 0 to 1 */
  readonly accuracy?: number;
  readonly scheme?: SchemeName;
  readonly element?: ElementOrder;
  /** exact output times [s from the start of the case] */
  readonly at?: readonly number[];
  /** the first mesh only, for a moving hand */
  readonly previewOnly?: boolean;
}
