/** What the estimates need to know of a case: plain numbers, gathered by whoever knows profile and stages. */
import type { Curve } from "../case/types.ts";

/** Which way an exposed side looks: outward, into a bore, up or down, or askew (cones, arcs). */
export type Facing = "wall" | "bore" | "end" | "askew";

/** What is done to a side in one stage; curves are over the time of the stage. */
export type SideTreatment =
  | { readonly kind: "insulated" }
  /** W/(m2 K), degC */
  | { readonly kind: "film"; readonly film: number; readonly ambient: Curve }
  /** W/m2 into the part */
  | { readonly kind: "flux"; readonly flux: Curve }
  /** degC */
  | { readonly kind: "held"; readonly held: Curve };

export interface SideFacts {
  readonly name: string;
  /** m2 of the whole turned side */
  readonly area: number;
  readonly facing: Facing;
  readonly treatment: SideTreatment;
}

export interface StageFacts {
  readonly name: string;
  /** s, as the stage went (an "until" stage by the time the field took) */
  readonly duration: number;
  /** every exposed side, insulated ones too; the same sides in every stage */
  readonly sides: readonly SideFacts[];
  /** W released in the whole part, over the time of the stage */
  readonly source: Curve;
}

export interface CaseFacts {
  /** m3 */
  readonly volume: number;
  /** degC: the volume mean where regions start apart */
  readonly start: number;
  /** W/(m K), volume mean where there are several regions, at a mean temperature where it varies */
  readonly conductivity: number;
  /** rho c [J/(m3 K)], likewise */
  readonly volumetricHeatCapacity: number;
  /** largest radius, bore radius (0 for a part that reaches its axis), overall height [m] */
  readonly outerRadius: number;
  readonly boreRadius: number;
  readonly height: number;
  /** radius of the largest ball that fits inside [m], where known */
  readonly thickestRadius?: number;
  readonly stages: readonly StageFacts[];
  /** s from the start of the case, ascending: the instants of the field's history */
  readonly times: Float64Array;
  /** what was averaged or left out on the way here, one sentence each; passed on with the estimates */
  readonly remarks?: readonly string[];
}
