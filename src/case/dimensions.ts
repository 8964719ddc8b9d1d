/**
 * The dimensions that a quantity of a case can have: exponents of length, mass, time and temperature, the words a
 * message uses, and the units in which the page shows it. SI inside; temperatures in degC.
 */

/** Exponents of m, kg, s and K. */
export type DimensionVector = readonly [length: number, mass: number, time: number, temperature: number];
export type UnitSystem = "si" | "us";

/** A unit to show a value in: shown = (value - offset) / factor. */
export interface ShownUnit {
  /** as written behind the number */
  readonly text: string;
  /** SI per shown unit */
  readonly factor: number;
  /** SI value at the shown zero; only temperatures have one */
  readonly offset?: number;
}

export interface DimensionFacts {
  readonly vector: DimensionVector;
  /** with its article, for messages: "a length" */
  readonly spoken: string;
  /** the unit a bare number has */
  readonly bare: string;
  /** a well-formed example, for messages */
  readonly example: string;
  readonly shown: Readonly<Record<UnitSystem, ShownUnit>>;
}

/** International Table Btu [J]; the only Btu here (ISO 31-4, exact from the IT calorie 4.1868 J). */
export const BTU = 1055.05585262;
const POUND = 0.45359237;
const FOOT = 0.3048;
const INCH = 0.0254;
const HOUR = 3600;
/** K per degree Fahrenheit */
export const FAHRENHEIT_DEGREE = 5 / 9;
/** degC at 0 K */
export const ABSOLUTE_ZERO = -273.15;
/** degC at 0 degF */
export const FAHRENHEIT_ZERO = -160 / 9;

function facts(
  vector: DimensionVector,
  spoken: string,
  bare: string,
  example: string,
  si: ShownUnit,
  us: ShownUnit,
): DimensionFacts {
  return { vector, spoken, bare, example, shown: { si, us } };
}
const unit = (text: string, factor: number, offset?: number): ShownUnit =>
  offset === undefined ? { text, factor } : { text, factor, offset };

const SECONDS = unit("s", 1);
const PLAIN = unit("", 1);

export const DIMENSIONS = {
  length: facts([1, 0, 0, 0], "a length", "m", "120 mm", unit("mm", 1e-3), unit("in", INCH)),
  area: facts([2, 0, 0, 0], "an area", "m2", "0.5 m2", unit("cm²", 1e-4), unit("in²", INCH ** 2)),
  volume: facts([3, 0, 0, 0], "a volume", "m3", "2 l", unit("cm³", 1e-6), unit("in³", INCH ** 3)),
  mass: facts([0, 1, 0, 0], "a mass", "kg", "25 kg", unit("kg", 1), unit("lb", POUND)),
  time: facts([0, 0, 1, 0], "a time", "s", "2 h", SECONDS, SECONDS),
  temperature: facts(
    [0, 0, 0, 1],
    "a temperature",
    "degC",
    "450 degC",
    unit("°C", 1, 0),
    unit("°F", FAHRENHEIT_DEGREE, FAHRENHEIT_ZERO),
  ),
  temperatureDifference: facts(
    [0, 0, 0, 1],
    "a temperature difference",
    "K",
    "10 K",
    unit("K", 1),
    unit("°F", FAHRENHEIT_DEGREE),
  ),
  density: facts(
    [-3, 1, 0, 0],
    "a density",
    "kg/m3",
    "7850 kg/m3",
    unit("kg/m³", 1),
    unit("lb/ft³", POUND / FOOT ** 3),
  ),
  conductivity: facts(
    [1, 1, -3, -1],
    "a conductivity",
    "W/(m K)",
    "45 W/(m K)",
    unit("W/(m K)", 1),
    unit("Btu/(h ft °F)", BTU / (HOUR * FOOT * FAHRENHEIT_DEGREE)),
  ),
  heatCapacity: facts(
    [2, 0, -2, -1],
    "a specific heat capacity",
    "J/(kg K)",
    "480 J/(kg K)",
    unit("J/(kg K)", 1),
    unit("Btu/(lb °F)", BTU / (POUND * FAHRENHEIT_DEGREE)),
  ),
  filmCoefficient: facts(
    [0, 1, -3, -1],
    "a film coefficient",
    "W/(m2 K)",
    "12 W/(m2 K)",
    unit("W/(m² K)", 1),
    unit("Btu/(h ft² °F)", BTU / (HOUR * FOOT ** 2 * FAHRENHEIT_DEGREE)),
  ),
  heatFlux: facts(
    [0, 1, -3, 0],
    "a heat flux",
    "W/m2",
    "5 kW/m2",
    unit("W/m²", 1),
    unit("Btu/(h ft²)", BTU / (HOUR * FOOT ** 2)),
  ),
  heatSource: facts(
    [-1, 1, -3, 0],
    "a heat source",
    "W/m3",
    "20 kW/m3",
    unit("W/m³", 1),
    unit("Btu/(h ft³)", BTU / (HOUR * FOOT ** 3)),
  ),
  latentHeat: facts(
    [2, 0, -2, 0],
    "a latent heat",
    "J/kg",
    "270 kJ/kg",
    unit("kJ/kg", 1e3),
    unit("Btu/lb", BTU / POUND),
  ),
  energy: facts([2, 1, -2, 0], "an amount of heat", "J", "12 MJ", unit("kJ", 1e3), unit("Btu", BTU)),
  power: facts([2, 1, -3, 0], "a heat flow", "W", "3 kW", unit("W", 1), unit("Btu/h", BTU / HOUR)),
  rate: facts(
    [0, 0, -1, 1],
    "a rate of temperature",
    "K/s",
    "5 K/s",
    unit("K/s", 1),
    unit("°F/s", FAHRENHEIT_DEGREE),
  ),
  share: facts([0, 0, 0, 0], "a plain number", "a plain number", "0.8", PLAIN, PLAIN),
} as const satisfies Record<string, DimensionFacts>;

export type Dimension = keyof typeof DIMENSIONS;

/** Words for a dimension vector: the name of a dimension of the case, or its exponents ("m s^-1"). */
export function spokenDimension(vector: DimensionVector): string {
  for (const facts of Object.values(DIMENSIONS)) if (sameVector(facts.vector, vector)) return facts.spoken;
  const bases = ["m", "kg", "s", "K"];
  const parts = vector.flatMap((power, i) =>
    power === 0 ? [] : [power === 1 ? bases[i] : `${bases[i]}^${power}`],
  );
  return `of the dimension ${parts.join(" ")}`;
}

export function sameVector(a: DimensionVector, b: DimensionVector): boolean {
  return a.every((power, i) => power === b[i]);
}
