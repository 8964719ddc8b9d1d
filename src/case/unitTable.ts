/**
 * The units that a quantity may carry. Factors are to SI and exact where the unit is defined by an exact factor.
 *
 * The British thermal unit and the calorie are those of the International Table (1055.05585262 J and 4.1868 J); the
 * thermochemical ones differ by 0.07 %. Every ton, gallon and thousand-Btu with more than one meaning is refused with
 * a word about it instead of guessed.
 */
import { ABSOLUTE_ZERO, BTU, FAHRENHEIT_DEGREE, FAHRENHEIT_ZERO } from "./dimensions.ts";
import type { DimensionVector } from "./dimensions.ts";

export interface Unit {
  readonly names: readonly string[];
  /** SI per unit */
  readonly factor: number;
  readonly vector: DimensionVector;
  /** degC at the zero of the scale, for units that can state a temperature */
  readonly zero?: number;
}

const LENGTH: DimensionVector = [1, 0, 0, 0];
const AREA: DimensionVector = [2, 0, 0, 0];
const VOLUME: DimensionVector = [3, 0, 0, 0];
const MASS: DimensionVector = [0, 1, 0, 0];
const TIME: DimensionVector = [0, 0, 1, 0];
const TEMPERATURE: DimensionVector = [0, 0, 0, 1];
const ENERGY: DimensionVector = [2, 1, -2, 0];
const POWER: DimensionVector = [2, 1, -3, 0];
const NUMBER: DimensionVector = [0, 0, 0, 0];

const unit = (vector: DimensionVector, factor: number, ...names: string[]): Unit => ({
  names,
  factor,
  vector,
});
const scale = (factor: number, zero: number, ...names: string[]): Unit => ({
  names,
  factor,
  vector: TEMPERATURE,
  zero,
});

const INCH = 0.0254;
const POUND = 0.45359237;
const CALORIE = 4.1868;
const HOUR = 3600;

export const UNITS: readonly Unit[] = [
  unit(LENGTH, 1, "m", "metre", "metres", "meter", "meters"),
  unit(LENGTH, 1e-9, "nm"),
  unit(LENGTH, 1e-6, "µm", "um", "micron", "microns"),
  unit(LENGTH, 1e-3, "mm", "millimetre", "millimetres", "millimeter", "millimeters"),
  unit(LENGTH, 1e-2, "cm"),
  unit(LENGTH, 1e-1, "dm"),
  unit(LENGTH, 1e3, "km"),
  unit(LENGTH, INCH, "in", "inch", "inches", '"'),
  unit(LENGTH, 12 * INCH, "ft", "foot", "feet", "'"),
  unit(LENGTH, 36 * INCH, "yd", "yard", "yards"),
  unit(LENGTH, INCH / 1000, "mil", "mils", "thou"),
  unit(AREA, (12 * INCH) ** 2, "sqft"),
  unit(AREA, INCH ** 2, "sqin"),
  unit(VOLUME, 1e-3, "l", "L", "litre", "litres", "liter", "liters"),
  unit(VOLUME, 1e-6, "ml", "mL", "cc"),
  unit(VOLUME, (12 * INCH) ** 3, "cuft"),
  unit(VOLUME, INCH ** 3, "cuin"),
  unit(MASS, 1, "kg"),
  unit(MASS, 1e-3, "g", "gram", "grams"),
  unit(MASS, 1e-6, "mg"),
  unit(MASS, 1e3, "t", "tonne", "tonnes"),
  unit(MASS, POUND, "lb", "lbs", "lbm", "pound", "pounds"),
  unit(MASS, POUND / 16, "oz", "ounce", "ounces"),
  unit(MASS, 14.593902937206364, "slug", "slugs"),
  unit(TIME, 1, "s", "sec", "secs", "second", "seconds"),
  unit(TIME, 1e-3, "ms"),
  unit(TIME, 60, "min", "mins", "minute", "minutes"),
  unit(TIME, HOUR, "h", "hr", "hrs", "hour", "hours"),
  unit(TIME, 24 * HOUR, "d", "day", "days"),
  unit(TIME, 168 * HOUR, "week", "weeks"),
  scale(1, ABSOLUTE_ZERO, "K", "kelvin", "kelvins", "Kelvin", "degK"),
  scale(1, 0, "degC", "C", "Cel", "celsius", "Celsius"),
  scale(FAHRENHEIT_DEGREE, FAHRENHEIT_ZERO, "degF", "F", "fahrenheit", "Fahrenheit"),
  scale(FAHRENHEIT_DEGREE, ABSOLUTE_ZERO, "degR", "R", "rankine", "Rankine"),
  unit(ENERGY, 1, "J", "joule", "joules", "Ws"),
  unit(ENERGY, 1e3, "kJ"),
  unit(ENERGY, 1e6, "MJ"),
  unit(ENERGY, 1e9, "GJ"),
  unit(ENERGY, HOUR, "Wh"),
  unit(ENERGY, 1e3 * HOUR, "kWh"),
  unit(ENERGY, 1e6 * HOUR, "MWh"),
  unit(ENERGY, CALORIE, "cal"),
  unit(ENERGY, 1e3 * CALORIE, "kcal"),
  unit(ENERGY, BTU, "Btu", "BTU", "btu"),
  unit(ENERGY, 1e6 * BTU, "MMBtu", "MMBTU"),
  unit(POWER, 1, "W", "watt", "watts"),
  unit(POWER, 1e-3, "mW"),
  unit(POWER, 1e3, "kW"),
  unit(POWER, 1e6, "MW"),
  unit(POWER, BTU / HOUR, "Btuh", "BTUH"),
  unit(NUMBER, 0.01, "%", "percent"),
  unit([1, 1, -2, 0], 1, "N"),
  unit([1, 1, -2, 0], 4.4482216152605, "lbf"),
];

/** Names with more than one meaning, and what to write instead. */
export const AMBIGUOUS: Readonly<Record<string, string>> = {
  ton: "a ton may be 1000 kg, 2000 lb or 2240 lb: write kg, t or lb",
  tons: "a ton may be 1000 kg, 2000 lb or 2240 lb: write kg, t or lb",
  gal: "gallons differ: write litres (l) or cubic inches (in3)",
  gallon: "gallons differ: write litres (l) or cubic inches (in3)",
  MBtu: "MBtu is a thousand to some and a million to others: write Btu or MMBtu",
  MBTU: "MBtu is a thousand to some and a million to others: write Btu or MMBtu",
  M: "write m for metres or min for minutes",
  Cal: "write cal or kcal",
};

const BY_NAME: ReadonlyMap<string, Unit> = new Map(UNITS.flatMap((u) => u.names.map((name) => [name, u])));
const BY_LOWER_NAME: ReadonlyMap<string, readonly Unit[]> = groupByLowerName();

function groupByLowerName(): Map<string, Unit[]> {
  const groups = new Map<string, Unit[]>();
  for (const [name, found] of BY_NAME) {
    const group = groups.get(name.toLowerCase()) ?? [];
    if (!group.includes(found)) group.push(found);
    groups.set(name.toLowerCase(), group);
  }
  return groups;
}

/**
 * The units that a run of letters stands for: one unit, or several written without a space between them ("mK" in
 * W/mK, "kgK"). Other capitals are forgiven where only one unit can be meant and the name has two letters or more.
 *
 * @returns undefined when the letters are no units
 */
export function unitsNamed(letters: string): readonly Unit[] | undefined {
  const whole = BY_NAME.get(letters);
  if (whole) return [whole];
  const inOtherCapitals = letters.length > 1 ? BY_LOWER_NAME.get(letters.toLowerCase()) : undefined;
  if (inOtherCapitals?.length === 1) return inOtherCapitals;
  for (let cut = letters.length - 1; cut > 0; cut--) {
    const head = BY_NAME.get(letters.slice(0, cut));
    const rest = head && unitsNamed(letters.slice(cut));
    if (rest) return [head, ...rest];
  }
  return undefined;
}
