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
    readonly surface: Float64Array;
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

/** One estimate beside one answer of the field. */
export interface Comparison {
  /** estimate minus field, in the unit of the answer */
  readonly difference: number;
  /** estimate minus field as a temperature [K] at the instant of the answer; null where that has no meaning */
  readonly kelvin: number | null;
  /** estimate minus field in time [s], negative: the estimate is early; null where that has no meaning */
  readonly seconds: number | null;
  /** an estimate that runs ahead of the part (early, or too small a spread) errs on the unsafe side */
  readonly side: "safe" | "unsafe" | "agrees";
}
