/**
 * The case, twice: `CaseDocument` is what a person wrote (units as strings, optional fields left out) and what is
 * saved again; `Case` is what everything after reading works with: SI, temperatures in degC, defaults filled in.
 */

/** A number in SI (temperatures in degC), or a string that carries its unit, for example "120 mm". */
export type Quantity = number | string;
export type QuantityPair = [Quantity, Quantity];
export type CurveDocument =
  Quantity | QuantityPair[] | { over: "time" | "temperature"; points: QuantityPair[] };

export interface VertexDocument {
  at: QuantityPair;
  side?: string;
  through?: QuantityPair;
}
export interface RegionDocument {
  name: string;
  material: string;
  outline: VertexDocument[];
  holes?: VertexDocument[][];
  start?: Quantity;
  source?: CurveDocument;
}
export interface ContactDocument {
  between: [string, string];
  conductance: CurveDocument;
}
export type MaterialDocument =
  | { library: string }
  | {
      density: Quantity;
      conductivity: CurveDocument;
      heatCapacity: CurveDocument;
      emissivity?: Quantity;
      latent?: { heat: Quantity; solidus: Quantity; liquidus: Quantity };
      source?: string;
    };
export type ConditionDocument =
  | "insulated"
  | { film: CurveDocument; ambient?: CurveDocument; emissivity?: Quantity; surroundings?: CurveDocument }
  | { flux: CurveDocument }
  | { held: CurveDocument };
export interface StageDocument {
  name?: string;
  lasts?: Quantity;
  until?: { where: string; reaches: Quantity; going?: "up" | "down" };
  atMost?: Quantity;
  ambient?: CurveDocument;
  sides: Record<string, ConditionDocument>;
}
export interface ProbeDocument {
  name: string;
  at: QuantityPair;
}
export type QuestionDocument =
  | { ask: "when"; where: string; reaches: Quantity; going?: "up" | "down" }
  | { ask: "reading"; where: string; at: Quantity }
  | { ask: "spread"; stage?: string }
  | { ask: "passage"; where: string; from: Quantity; to: Quantity }
  | { ask: "rate"; where: string; at: Quantity }
  | { ask: "held-above" | "held-below"; where: string; level: Quantity }
  | { ask: "dose"; where: string; reference: Quantity; z: Quantity }
  | { ask: "heat"; until?: Quantity };

export interface CaseDocument {
  corelag: 1;
  title?: string;
  notes?: string;
  part: { regions: RegionDocument[]; contacts?: ContactDocument[] };
  materials: Record<string, MaterialDocument>;
  start: Quantity;
  stages: StageDocument[];
  probes?: ProbeDocument[];
  questions?: QuestionDocument[];
  accuracy?: number;
}

// --- read: SI, defaults filled in ---------------------------------------------------------------------------------

/** A constant, or a piecewise linear table over one variable, held constant beyond its ends. */
export type Curve =
  number | { readonly over: "time" | "temperature"; readonly points: readonly (readonly [number, number])[] };

export interface Vertex {
  readonly at: readonly [r: number, z: number];
  /** name of the side that starts here; "side 3" of the loop when none was given */
  readonly side: string;
  readonly through?: readonly [number, number];
}
export interface Region {
  readonly name: string;
  readonly material: string;
  readonly outline: readonly Vertex[];
  readonly holes: readonly (readonly Vertex[])[];
  /** degC */
  readonly start: number;
  /** W/m3 */
  readonly source: Curve;
}
export interface Contact {
  readonly between: readonly [string, string];
  /** W/(m2 K) */
  readonly conductance: Curve;
}
export interface Material {
  /** kg/m3 */
  readonly density: number;
  /** W/(m K), a constant or over temperature */
  readonly conductivity: Curve;
  /** J/(kg K), a constant or over temperature */
  readonly heatCapacity: Curve;
  readonly emissivity?: number;
  readonly latent?: { readonly heat: number; readonly solidus: number; readonly liquidus: number };
  readonly source: string;
  /** name in the material library, when taken from there */
  readonly library?: string;
}
export type Condition =
  | { readonly kind: "insulated" }
  | {
      readonly kind: "film";
      readonly film: Curve;
      readonly ambient: Curve;
      /** 0 when the side does not radiate */
      readonly emissivity: number;
      readonly surroundings: Curve;
    }
  | { readonly kind: "flux"; readonly flux: Curve }
  | { readonly kind: "held"; readonly held: Curve };
export type Where = string;
export interface Stage {
  readonly name: string;
  /** longest duration [s]: `lasts`, or `atMost` of an "until" stage */
  readonly lasts: number;
  readonly until?: { readonly where: Where; readonly reaches: number; readonly going?: "up" | "down" };
  /** degC, a constant or over the time of the stage */
  readonly ambient: Curve | undefined;
  /** by side name; "*" stands for every exposed side not named */
  readonly sides: Readonly<Record<string, Condition>>;
}
export interface Probe {
  readonly name: string;
  readonly at: readonly [r: number, z: number];
}
export type Question =
  | { readonly ask: "when"; readonly where: Where; readonly reaches: number; readonly going?: "up" | "down" }
  | { readonly ask: "reading"; readonly where: Where; readonly at: number }
  | { readonly ask: "spread"; readonly stage?: string }
  | { readonly ask: "passage"; readonly where: Where; readonly from: number; readonly to: number }
  | { readonly ask: "rate"; readonly where: Where; readonly at: number }
  | { readonly ask: "held-above" | "held-below"; readonly where: Where; readonly level: number }
  | { readonly ask: "dose"; readonly where: Where; readonly reference: number; readonly z: number }
  | { readonly ask: "heat"; readonly until?: number };

export interface Case {
  readonly title: string;
  readonly notes: string;
  readonly regions: readonly Region[];
  readonly contacts: readonly Contact[];
  readonly materials: Readonly<Record<string, Material>>;
  /** degC */
  readonly start: number;
  readonly stages: readonly Stage[];
  readonly probes: readonly Probe[];
  readonly questions: readonly Question[];
  /** aim for temperatures, as a share of the run's temperature span */
  readonly accuracy: number;
}

/** One fault of a document, as plain data: it crosses the worker and is shown at its place in the page. */
export interface CaseProblem {
  /** stable word for the kind of fault, for tests and for the page, for example "outline-crosses" */
  readonly code: string;
  /** path into the document, for example part.regions[0].outline[2].at; "" for the document as a whole */
  readonly path: string;
  /** what is wrong, with what was found there */
  readonly message: string;
  /** how to mend it */
  readonly mend: string;
  /** places in the section [m] to mark, where the fault has any */
  readonly places?: readonly (readonly [r: number, z: number])[];
}
