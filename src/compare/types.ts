/** The quick estimates of a case and how they compare with the field: plain data. */

export type SeriesShape = "slab" | "cylinder" | "sphere" | "finite-cylinder";

/** The one-temperature (lumped) estimate. */
export interface LumpedEstimate {
  /** volume over exposed area [m] */
  readonly length: number;
  /** film times that length over conductivity */
  readonly biot: number;
  /** s from start to 1/e of the difference to the surroundings */
  readonly timeConstant: number;
  readonly history: { readonly time: Float64Array; readonly temperature: Float64Array };
}

/** The eigenfunction series of the nearest simple shape. */
export interface SeriesEstimate {
  readonly shape: SeriesShape;
  /** m: radius, height, half thickness, as the shape has them */
  readonly sizes: Readonly<Record<string, number>>;
  /** film times the shape's own length (radius or half thickness) over conductivity */
  readonly biot: number;
  /** Fourier number at the end of the run, on the same length */
  readonly fourier: number;
  readonly history: {
    readonly time: Float64Array;
    readonly core: Float64Array;
    readonly mean: Float64Array;
    /** mean of the surface */
    readonly surface: Float64Array;
    /** the point that follows the surroundings first: the edge of a finite cylinder; the surface where left out */
    readonly edge?: Float64Array;
  };
  /** the first term alone, at the centre: what charts and hand calculations use */
  readonly oneTermCore: Float64Array;
  /** how the sizes were chosen, in a sentence */
  readonly remark: string;
}

export interface Estimates {
  readonly lumped: LumpedEstimate | null;
  readonly series: SeriesEstimate | null;
  /** why an estimate is missing */
  readonly remarks: readonly string[];
}

/** What may be done with the quick estimate, in words; the headline leads with what to do. */
export interface Verdict {
  readonly tone: "good" | "care" | "bad";
  readonly headline: string;
  readonly detail: string;
  /** largest error of the one-temperature estimate over all answers, as a share; null when nothing could be compared */
  readonly worst: number | null;
  /** film coefficient up to which the estimate stays within the tolerance [W/(m2 K)], once it has been sought */
  readonly filmLimit?: number;
}

/** One estimate beside one answer of the field. */
export interface Comparison {
  /** estimate minus field, in the unit of the answer */
  readonly difference: number;
  /** estimate minus field as a temperature [K] at the instant of the answer; null where that has no meaning */
  readonly kelvin: number | null;
  /** estimate minus field in time [s], negative: the estimate is early; null where that has no meaning */
  readonly seconds: number | null;
  /** size of the error as a share: of the answer, or of the span of temperatures where the answer is one */
  readonly share?: number;
  /** an estimate that runs ahead of the part (early, or too small a spread) errs on the unsafe side */
  readonly side: "safe" | "unsafe" | "agrees";
}
