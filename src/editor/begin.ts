/** A case to begin with: a shape, a material and one plain stage, so that there is something to see at once. */
import type { CaseDocument, Quantity, VertexDocument } from "../case/types.ts";

export interface Beginning {
  readonly name: string;
  readonly outline: VertexDocument[];
  /** name in the material library */
  readonly material: string;
  readonly start: Quantity;
  readonly ambient: Quantity;
  readonly film: Quantity;
  /** degC that every point is asked to reach */
  readonly reaches: number;
}

/** Longest that a new part is followed while it has not got there [s]: two weeks, so that no ordinary part is cut off. */
const AT_MOST = 14 * 86_400;
/** Share of the difference to the surroundings that is left when a new part counts as through. */
const LEFT_OVER = 0.05;

/** Where a new part should get to: 95 % of the way to its surroundings, a round number [degC]. */
export function firstLimit(start: number, ambient: number): number {
  const exact = ambient + LEFT_OVER * (start - ambient);
  const step = Math.abs(start - ambient) > 200 ? 10 : Math.abs(start - ambient) > 20 ? 1 : 0.1;
  const rounded = Number((Math.round(exact / step) * step).toFixed(1));
  return rounded === ambient ? exact : rounded;
}

export function beginCase(beginning: Beginning): CaseDocument {
  const { name, material, reaches } = beginning;
  return {
    corelag: 1,
    title: `New ${name}`,
    notes: "",
    part: { regions: [{ name, material, outline: beginning.outline }] },
    materials: { [material]: { library: material } },
    start: beginning.start,
    stages: [
      {
        name: "Still air",
        until: { where: "every-point", reaches },
        atMost: AT_MOST,
        ambient: beginning.ambient,
        sides: { "*": { film: beginning.film } },
      },
    ],
    questions: [{ ask: "when", where: "every-point", reaches }, { ask: "spread" }],
  };
}
