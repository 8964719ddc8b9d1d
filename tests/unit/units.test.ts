import { describe, expect, test } from "vitest";
import {
  formatNumber,
  formatQuantity,
  fromShown,
  parseQuantity,
  shownUnit,
  toShown,
} from "../../src/case/units.ts";
import type { Dimension } from "../../src/case/units.ts";
import { DIMENSIONS } from "../../src/case/dimensions.ts";
import { UNITS } from "../../src/case/unitTable.ts";

function valueOf(text: string | number, dimension: Dimension, bareUnit?: string): number {
  const read = parseQuantity(text, dimension, bareUnit);
  if ("fault" in read) throw new Error(`${read.fault.message} ${read.fault.mend}`);
  return read.value;
}
function faultOf(text: string | number, dimension: Dimension): string {
  const read = parseQuantity(text, dimension);
  if ("value" in read) throw new Error(`${text} was read as ${read.value}`);
  return `${read.fault.message} ${read.fault.mend}`;
}

/**
 * Values from outside: the inch 25.4 mm, the pound 0.45359237 kg and the Btu (IT) 1055.05585262 J are exact by
 * definition [ISO 31, NIST SP 811]; the compound factors 5.678263 (film), 1.730735 (conductivity), 4186.8 (heat
 * capacity), 2326 (J/kg), 3.154591 (flux) and 27679.90 (lb/in3) are those of NIST SP 811, appendix B (from memory).
 */
const READ: readonly [string | number, Dimension, number][] = [
  [0.2, "length", 0.2],
  ["120 mm", "length", 0.12],
  ["120mm", "length", 0.12],
  ["-3.5e1 mm", "length", -0.035],
  ["3/8 in", "length", 0.009525],
  ["4 1/2 in", "length", 0.1143],
  ["4-1/2 in", "length", 0.1143],
  ['4½"', "length", 0.1143],
  ["5' 3 1/2\"", "length", 1.6129],
  ["5'6\"", "length", 1.6764],
  ["5 ft 3 in", "length", 1.6002],
  ["250 µm", "length", 250e-6],
  ["250 μm", "length", 250e-6],
  ["40 thou", "length", 0.001016],
  ["25 000 mm", "length", 25],
  ["2 h", "time", 7200],
  ["1 h 30 min", "time", 5400],
  ["1h30min", "time", 5400],
  ["1h5min", "time", 3900],
  ["1:30:00", "time", 5400],
  ["90 s", "time", 90],
  ["450 degF", "temperature", 232.22222222222223],
  ["450 °F", "temperature", 232.22222222222223],
  ["450 F", "temperature", 232.22222222222223],
  ["450 deg F", "temperature", 232.22222222222223],
  ["20 °C", "temperature", 20],
  ["20 C", "temperature", 20],
  ["−40 degrees Celsius", "temperature", -40],
  ["300 K", "temperature", 26.85],
  ["491.67 degR", "temperature", 0],
  ["10 K", "temperatureDifference", 10],
  ["18 degF", "temperatureDifference", 10],
  ["10 °C", "temperatureDifference", 10],
  ["0.28 lb/in3", "density", 0.28 * 27679.904710203],
  ["490 lb/ft^3", "density", 490 * 16.018463373960142],
  ["7.85 g/cm³", "density", 7850],
  ["7.85 kg/l", "density", 7850],
  ["45 W/mK", "conductivity", 45],
  ["45 W/(m·K)", "conductivity", 45],
  ["45 W/m/K", "conductivity", 45],
  ["45 W m⁻¹ K⁻¹", "conductivity", 45],
  ["0.45 W/(cm K)", "conductivity", 45],
  ["26 Btu/(h ft °F)", "conductivity", 26 * 1.7307346663713912],
  ["26 BTU/h/ft/F", "conductivity", 26 * 1.7307346663713912],
  ["312 BTU in/(h ft2 degF)", "conductivity", 26 * 1.7307346663713912],
  ["312 BTU-in/hr-ft2-F", "conductivity", 26 * 1.7307346663713912],
  ["0.11 cal/(cm s °C)", "conductivity", 0.11 * 418.68],
  ["480 J/kgK", "heatCapacity", 480],
  ["0.48 kJ/(kg °C)", "heatCapacity", 480],
  ["0.11 BTU/lb/F", "heatCapacity", 0.11 * 4186.8],
  ["30 BTU/(h ft2 degF)", "filmCoefficient", 30 * 5.678263341113487],
  ["30 BTU/h/ft2/F", "filmCoefficient", 30 * 5.678263341113487],
  ["30 Btu per hour per sq ft per degree F", "filmCoefficient", 30 * 5.678263341113487],
  ["12 W/m²K", "filmCoefficient", 12],
  ["12 W/m2 K", "filmCoefficient", 12],
  ["12 W/(m²·K)", "filmCoefficient", 12],
  ["12 W m^-2 K^-1", "filmCoefficient", 12],
  ["5 kW/m2", "heatFlux", 5000],
  ["1000 BTU/h ft2", "heatFlux", 1000 * 3.154590745060438],
  ["20 kW/m3", "heatSource", 20000],
  ["270 kJ/kg", "latentHeat", 270000],
  ["100 Btu/lb", "latentHeat", 232600],
  ["2 kWh", "energy", 7.2e6],
  ["80 %", "share", 0.8],
  ["0.8", "share", 0.8],
];

describe("a quantity is read into SI", () => {
  test.each(READ)("%s as %s is %d", (text, dimension, value) => {
    expect(valueOf(text, dimension)).toBeCloseTo(value, 10 - Math.ceil(Math.log10(Math.abs(value) + 1)));
  });
  test("a film of 30 Btu/(h ft2 F) is 170.3479 W/(m2 K), with the International Table Btu", () => {
    expect(valueOf("30 BTU/(h ft2 degF)", "filmCoefficient")).toBeCloseTo(170.3479, 4);
  });
  test("the unit beside a field serves a text that carries none", () => {
    expect(valueOf("120", "length", "mm")).toBeCloseTo(0.12, 12);
    expect(valueOf("32", "temperature", "°F")).toBeCloseTo(0, 12);
    expect(valueOf("1 cm", "length", "mm")).toBeCloseTo(0.01, 12);
  });
  test("every unit of the table is read under each of its names", () => {
    for (const unit of UNITS) {
      for (const name of unit.names) {
        const dimension = (Object.keys(DIMENSIONS) as Dimension[]).find((key) =>
          DIMENSIONS[key].vector.every((power, i) => power === unit.vector[i]),
        );
        if (dimension === undefined) continue;
        expect(valueOf(`3 ${name}`, dimension), name).toBeCloseTo(3 * unit.factor + (unit.zero ?? 0), 9);
      }
    }
  });
  test("no name stands for two units", () => {
    const names = UNITS.flatMap((unit) => unit.names);
    expect(new Set(names).size).toBe(names.length);
  });
});

describe("a faulty quantity says what was given and what is expected", () => {
  const faults: readonly [string | number, Dimension, RegExp][] = [
    ["2 kg", "length", /"2 kg" is a mass; a length is expected.*"120 mm"/],
    ["120", "length", /carries no unit/],
    ["120 foo", "length", /unit "foo", which is not known/],
    ["1,5 mm", "length", /comma.*1\.5 mm/],
    ["1,500 mm", "length", /comma/],
    ["", "time", /is empty; a time/],
    ["fast", "time", /does not begin with a number/],
    ["1:30", "time", /hours and minutes or minutes and seconds/],
    ["3 ton", "mass", /2000 lb/],
    ["30 W/m2", "filmCoefficient", /is a heat flux; a film coefficient/],
    ["30 J/(kg K)", "conductivity", /specific heat capacity; a conductivity/],
    ["5 m/s", "length", /of the dimension m s\^-1/],
    ["1e999 m", "length", /too large/],
    [Number.NaN, "length", /NaN/],
    [Number.POSITIVE_INFINITY, "time", /finite/],
    ["12 W/(m2 K", "filmCoefficient", /bracket that is not closed/],
    ["12 W/", "filmCoefficient", /nothing behind/],
    ["12 mm)", "length", /"\)"/],
    ["20 C 5 C", "temperature", /more than one number/],
    ["2 h 3 mm", "time", /part that is a length/],
    ["45 K/s", "temperature", /is a rate of temperature/],
  ];
  test.each(faults)("%s as %s", (text, dimension, pattern) => {
    expect(faultOf(text, dimension)).toMatch(pattern);
  });
});

describe("a value is written for reading", () => {
  test("in both systems, with a thin space", () => {
    expect(formatQuantity(0.12, "length", "si")).toBe("120\u2009mm");
    expect(formatQuantity(0.1143, "length", "us")).toBe("4.5\u2009in");
    expect(formatQuantity(1100, "temperature", "us")).toBe("2012\u2009°F");
    expect(formatQuantity(10, "temperatureDifference", "us")).toBe("18\u2009°F");
    expect(formatQuantity(-5.25, "temperature", "si")).toBe("\u22125.25\u2009°C");
    expect(formatQuantity(170.3479, "filmCoefficient", "us", 3)).toBe("30\u2009Btu/(h ft² °F)");
    expect(formatQuantity(0.8, "share", "us")).toBe("0.8");
  });
  test("times as they are said", () => {
    expect(formatQuantity(115.2, "time", "si")).toBe("115.2\u2009s");
    expect(formatQuantity(2958, "time", "si")).toBe("49\u2009min 18\u2009s");
    expect(formatQuantity(14700, "time", "us")).toBe("4\u2009h 05\u2009min");
    expect(formatQuantity(3599.7, "time", "us")).toBe("1\u2009h 00\u2009min");
  });
  test("numbers are grouped from 10 000", () => {
    expect(formatNumber(9999)).toBe("9999");
    expect(formatNumber(25000)).toBe("25\u2009000");
    expect(formatNumber(1234567, 7)).toBe("1\u2009234\u2009567");
    expect(formatNumber(0.00001234)).toBe("1.234e-5");
    expect(formatNumber(5.2e10)).toBe("5.2e10");
    expect(formatNumber(-0)).toBe("0");
  });
  test("what is shown reads back as the same value, in every dimension and both systems", () => {
    for (const dimension of Object.keys(DIMENSIONS) as Dimension[]) {
      for (const system of ["si", "us"] as const) {
        const shown = toShown(12.5, dimension, system);
        expect(fromShown(shown, dimension, system)).toBeCloseTo(12.5, 10);
        const text = `${shown} ${shownUnit(dimension, system)}`;
        expect(valueOf(text, dimension), text).toBeCloseTo(12.5, 9);
        expect(valueOf(formatQuantity(12.5, dimension, system, 12), dimension)).toBeCloseTo(12.5, 6);
      }
    }
  });
});
