/** Which simple body stands for a part, and the estimates that follow, for parts whose answer is known. */
import { describe, expect, test } from "vitest";
import { lumpedResponse, productResponse, seriesResponse } from "../../src/analytic/response.ts";
import type { Curve } from "../../src/case/types.ts";
import { estimateCase } from "../../src/compare/estimateCase.ts";
import type { CaseFacts, Facing, SideFacts, SideTreatment } from "../../src/compare/facts.ts";
import { chooseShape, exchangingSides } from "../../src/compare/shape.ts";

const film = (coefficient: number, ambient: Curve): SideTreatment => ({
  kind: "film",
  film: coefficient,
  ambient,
});
const side = (name: string, facing: Facing, area: number, treatment: SideTreatment): SideFacts => ({
  name,
  facing,
  area,
  treatment,
});
const insulated: SideTreatment = { kind: "insulated" };
const still = film(30, 20);
const steel = { start: 800, conductivity: 30, volumetricHeatCapacity: 4e6 };
const times = Float64Array.of(0, 10, 100, 1000, 5000);

/** A plain round, with what is done to its wall, upper and lower end. */
function roundFacts(radius: number, height: number, wall: SideTreatment, top = wall, base = top): CaseFacts {
  const sides = [
    side("wall", "wall", 2 * Math.PI * radius * height, wall),
    side("top", "end", Math.PI * radius ** 2, top),
    side("base", "end", Math.PI * radius ** 2, base),
  ];
  return {
    ...steel,
    volume: Math.PI * radius ** 2 * height,
    outerRadius: radius,
    boreRadius: 0,
    height,
    thickestRadius: Math.min(radius, height / 2),
    stages: [{ name: "cooling", duration: 5000, sides, source: 0 }],
    times,
  };
}

function ringFacts(bore: number, outer: number, height: number, treatment: SideTreatment): CaseFacts {
  const sides = [
    side("outside", "wall", 2 * Math.PI * outer * height, treatment),
    side("bore", "bore", 2 * Math.PI * bore * height, treatment),
    side("faces", "end", 2 * Math.PI * (outer ** 2 - bore ** 2), treatment),
  ];
  return {
    ...roundFacts(outer, height, treatment),
    volume: Math.PI * (outer ** 2 - bore ** 2) * height,
    boreRadius: bore,
    stages: [{ name: "cooling", duration: 5000, sides, source: 0 }],
  };
}

function ballFacts(radius: number, treatment: SideTreatment): CaseFacts {
  const skin = side("skin", "askew", 4 * Math.PI * radius ** 2, treatment);
  return {
    ...roundFacts(radius, 2 * radius, treatment),
    volume: (4 / 3) * Math.PI * radius ** 3,
    stages: [{ name: "cooling", duration: 5000, sides: [skin], source: 0 }],
  };
}

const chosen = (facts: CaseFacts) => chooseShape(facts, exchangingSides(facts))!;

describe("the simple body that stands for a part", () => {
  test("a ball is a ball", () => {
    const got = chosen(ballFacts(0.05, still));
    expect(got.shape).toBe("sphere");
    expect(got.sizes.radius).toBeCloseTo(0.05, 12);
    expect(got.remark).toContain("ball");
  });
  test("a round as long as it is wide has a ball's V/A, and is still a round", () => {
    const got = chosen(roundFacts(0.05, 0.1, still));
    expect(got.shape).toBe("finite-cylinder");
    expect(got.sizes.radius).toBeCloseTo(0.05, 12);
    expect(got.sizes.halfHeight).toBeCloseTo(0.05, 10);
  });
  test.each([
    [0.05, 0.4],
    [0.1, 0.03],
    [0.025, 0.2],
  ])("a round of radius %f and height %f keeps its own sizes", (radius, height) => {
    const got = chosen(roundFacts(radius, height, still));
    expect(got.shape).toBe("finite-cylinder");
    expect(got.sizes.radius).toBeCloseTo(radius, 12);
    expect(got.sizes.halfHeight).toBeCloseTo(height / 2, 10);
  });
  test("on an insulated base the whole height counts, as half of a round twice as high", () => {
    const got = chosen(roundFacts(0.05, 0.1, still, still, insulated));
    expect(got.sizes.halfHeight).toBeCloseTo(0.1, 10);
  });
  test("with insulated ends a round of any length is a long one; with an insulated wall it is a slab", () => {
    expect(chosen(roundFacts(0.05, 0.01, still, insulated))).toMatchObject({ shape: "cylinder" });
    expect(chosen(roundFacts(0.05, 0.01, still, insulated)).sizes.radius).toBeCloseTo(0.05, 12);
    const slab = chosen(roundFacts(0.05, 0.3, insulated, still));
    expect(slab.shape).toBe("slab");
    expect(slab.sizes.halfThickness).toBeCloseTo(0.15, 12);
    expect(chosen(roundFacts(0.05, 0.3, insulated, still, insulated)).sizes.halfThickness).toBeCloseTo(
      0.3,
      12,
    );
  });
  test("a bar fifty diameters long is a long round, a plate a hundredth as high as wide a slab", () => {
    expect(chosen(roundFacts(0.01, 1, still)).shape).toBe("cylinder");
    expect(chosen(roundFacts(0.5, 0.01, still)).shape).toBe("slab");
  });
  test("a ring is a slab that keeps V/A: the hub ring has 16.15 mm", () => {
    const got = chosen(ringFacts(0.09, 0.15, 0.07, still));
    expect(got.shape).toBe("slab");
    expect(got.sizes.halfThickness).toBeCloseTo(0.01615384615384616, 12);
    expect(got.remark).toContain("bore");
  });
  test("a closed shell is a wall, not a solid", () => {
    // walls and floor 3 mm, outside 80 mm wide, 150 mm high: skin inside and out, insulated inside
    const solid = roundFacts(0.04, 0.15, still);
    const inside = side("inside", "bore", 2 * Math.PI * 0.037 * 0.147 + Math.PI * 0.037 ** 2, insulated);
    const facts: CaseFacts = {
      ...solid,
      volume: Math.PI * (0.04 ** 2 * 0.15 - 0.037 ** 2 * 0.147),
      thickestRadius: 0.0015,
      stages: solid.stages.map((stage) => ({ ...stage, sides: [...stage.sides, inside] })),
    };
    const got = chosen(facts);
    expect(got.shape).toBe("slab");
    expect(got.sizes.halfThickness).toBeGreaterThan(0.0025);
    expect(got.sizes.halfThickness).toBeLessThan(0.003);
  });
  test("a stepped roll takes its barrel's radius and keeps V/A", () => {
    // barrel 400 x 600 mm, two necks 220 x 300 mm: V/A 69.16 mm
    const [barrel, neck] = [0.2, 0.11];
    const area = 2 * Math.PI * (barrel * 0.6 + neck * 0.6) + 2 * Math.PI * barrel ** 2;
    const facts: CaseFacts = {
      ...roundFacts(barrel, 1.2, still),
      volume: Math.PI * (barrel ** 2 * 0.6 + neck ** 2 * 0.6),
      thickestRadius: barrel,
      stages: [
        {
          name: "soak",
          duration: 5000,
          source: 0,
          sides: [side("wall", "wall", area * 0.8, still), side("ends", "end", area * 0.2, still)],
        },
      ],
    };
    expect(facts.volume / area).toBeCloseTo(0.06916, 5);
    const { shape, sizes, remark } = chosen(facts);
    expect(shape).toBe("finite-cylinder");
    expect(sizes.radius).toBe(0.2);
    const { radius, halfHeight } = sizes as { radius: number; halfHeight: number };
    expect((radius * halfHeight) / (2 * halfHeight + radius)).toBeCloseTo(facts.volume / area, 12);
    expect(remark).toContain("thickest spot");
  });
  test("a squat odd part takes half its thickness and keeps V/A", () => {
    const flat: CaseFacts = {
      ...roundFacts(0.2, 0.06, still),
      volume: 0.8 * Math.PI * 0.04 * 0.06,
      thickestRadius: 0.028,
    };
    const { sizes, shape } = chosen(flat);
    const { radius, halfHeight } = sizes as { radius: number; halfHeight: number };
    expect(shape).toBe("finite-cylinder");
    expect(halfHeight).toBe(0.028);
    const area = flat.stages[0]!.sides.reduce((sum, { area: own }) => sum + own, 0);
    expect((radius * halfHeight) / (2 * halfHeight + radius)).toBeCloseTo(flat.volume / area, 12);
  });
  test("nothing exchanges heat: no body", () => {
    const facts = roundFacts(0.05, 0.1, insulated);
    expect(chooseShape(facts, exchangingSides(facts))).toBeNull();
  });
});

describe("estimates of a case", () => {
  const at = (time: Float64Array, values: Float64Array, instant: number) => values[time.indexOf(instant)]!;

  test("a round: both estimates are their closed forms at the instants of the field", () => {
    const { lumped, series, remarks } = estimateCase(roundFacts(0.05, 0.2, film(300, 20)));
    expect(remarks).toEqual([]);
    expect(lumped!.length).toBeCloseTo(0.05 / 2.5, 12);
    expect(lumped!.biot).toBeCloseTo((300 * 0.02) / 30, 12);
    expect(lumped!.timeConstant).toBeCloseTo((4e6 * 0.02) / 300, 9);
    expect(series!.biot).toBeCloseTo((300 * 0.05) / 30, 12);
    expect(series!.fourier).toBeCloseTo((7.5e-6 * 5000) / 0.0025, 12);
    for (const time of times) {
      const theta = lumpedResponse(lumped!.biot, (7.5e-6 * time) / lumped!.length ** 2);
      expect(at(lumped!.history.time, lumped!.history.temperature, time)).toBeCloseTo(20 + 780 * theta, 8);
      const core = productResponse([
        { geometry: "cylinder", biot: 0.5, fourier: (7.5e-6 * time) / 0.0025, position: 0 },
        { geometry: "slab", biot: 1, fourier: (7.5e-6 * time) / 0.01, position: 0 },
      ]);
      expect(at(series!.history.time, series!.history.core, time)).toBeCloseTo(20 + 780 * core.theta, 5);
    }
    expect(series!.remark).toContain("One term");
  });

  test("wall and ends with their own films: each direction has its own, and nothing is averaged", () => {
    const { series } = estimateCase(roundFacts(0.06, 0.02, film(200, 25), film(60, 25)));
    const time = times[2]!;
    const core = productResponse([
      { geometry: "cylinder", biot: 0.4, fourier: (7.5e-6 * time) / 0.0036, position: 0 },
      { geometry: "slab", biot: 0.02, fourier: (7.5e-6 * time) / 0.0001, position: 0 },
    ]);
    expect(at(series!.history.time, series!.history.core, time)).toBeCloseTo(25 + 775 * core.theta, 5);
    expect(series!.remark).not.toContain("differ");
  });

  test("films and surroundings that differ are averaged, and the remark says so", () => {
    const ring = ringFacts(0.09, 0.15, 0.07, still);
    const [outside, bore, faces] = ring.stages[0]!.sides;
    const sides = [{ ...outside!, treatment: film(40, 100) }, bore!, faces!];
    const { series, lumped } = estimateCase({ ...ring, stages: [{ ...ring.stages[0]!, sides }] });
    expect(series!.remark).toContain("surroundings differ");
    expect(series!.remark).toContain("films differ");
    // both end in the mean of the surroundings, weighted by film and area
    const [g1, g2] = [40 * outside!.area, 30 * (bore!.area + faces!.area)];
    const end = (g1 * 100 + g2 * 20) / (g1 + g2);
    const long = { ...ring, stages: [{ ...ring.stages[0]!, sides, duration: 1e6 }] };
    const ended = estimateCase({ ...long, times: Float64Array.of(0, 1e6) });
    expect(ended.series!.history.core.at(-1)).toBeCloseTo(end, 6);
    expect(ended.lumped!.history.temperature.at(-1)).toBeCloseTo(end, 6);
    expect(lumped).not.toBeNull();
  });

  test("held all round: the series has an infinite Biot number, one temperature has nothing to say", () => {
    const { lumped, series, remarks } = estimateCase(ballFacts(0.05, { kind: "held", held: 100 }));
    expect(lumped).toBeNull();
    expect(remarks.join(" ")).toContain("held");
    expect(series!.biot).toBe(Infinity);
    const exact = 100 + 700 * seriesResponse("sphere", Infinity, (7.5e-6 * 100) / 0.0025, 0).theta;
    expect(at(series!.history.time, series!.history.core, 100)).toBeCloseTo(exact, 6);
  });

  test("held ends and a wall with a film go together only at one temperature", () => {
    const together = estimateCase(roundFacts(0.05, 0.1, film(30, 100), { kind: "held", held: 100 }));
    expect(together.series).not.toBeNull();
    const apart = estimateCase(roundFacts(0.05, 0.1, film(30, 20), { kind: "held", held: 100 }));
    expect(apart.series).toBeNull();
    expect(apart.remarks.join(" ")).toContain("differ");
    const mixed = estimateCase(roundFacts(0.05, 0.1, film(30, 20), film(30, 20), { kind: "held", held: 20 }));
    expect(mixed.series).toBeNull();
    expect(mixed.remarks.join(" ")).toContain("Held sides");
  });

  test("driven by flux or source: one temperature only, and the remark says why", () => {
    const flux = estimateCase(roundFacts(0.05, 0.1, film(30, 20), { kind: "flux", flux: 5000 }));
    expect(flux.series).toBeNull();
    expect(flux.remarks.join(" ")).toContain("heat in through a side");
    expect(flux.lumped).not.toBeNull();
    const plain = roundFacts(0.05, 0.1, film(30, 20));
    const source = estimateCase({
      ...plain,
      stages: plain.stages.map((stage) => ({ ...stage, source: 100 })),
    });
    expect(source.series).toBeNull();
    expect(source.lumped!.history.temperature.at(-1)).toBeGreaterThan(20);
  });

  test("insulated all round: one temperature that stays, no series", () => {
    const { lumped, series, remarks } = estimateCase(roundFacts(0.05, 0.1, insulated));
    expect(series).toBeNull();
    expect(remarks.join(" ")).toContain("no side exchanges");
    expect(lumped!.history.temperature.every((value) => value === 800)).toBe(true);
  });

  test("remarks of whoever gathered the facts are passed on", () => {
    const facts = { ...roundFacts(0.05, 0.1, still), remarks: ["Two materials were averaged."] };
    expect(estimateCase(facts).remarks).toEqual(["Two materials were averaged."]);
  });

  test("a bar through air and oil: 300 degC at the core after 115.17 s, 76.50 s by one temperature", () => {
    // bar 50 x 200 mm, k 28, rho 7800, c 620, 850 degC; 6 s at 90 in 25 degC, then 900 in 60 degC; recomputed apart
    const base = roundFacts(0.025, 0.2, film(90, 25));
    const oil = roundFacts(0.025, 0.2, film(900, 60));
    const facts: CaseFacts = {
      ...base,
      start: 850,
      conductivity: 28,
      volumetricHeatCapacity: 7800 * 620,
      stages: [
        { ...base.stages[0]!, name: "air", duration: 6 },
        { ...oil.stages[0]!, name: "oil", duration: 300 },
      ],
      times: Float64Array.of(0, 6, 76.5039134135978, 115.1686607688423, 306),
    };
    const { lumped, series } = estimateCase(facts);
    expect(lumped!.length).toBeCloseTo(0.01111111111111111, 12);
    expect(lumped!.biot).toBeCloseTo(0.3571428571428572, 12);
    expect(at(lumped!.history.time, lumped!.history.temperature, 76.5039134135978)).toBeCloseTo(300, 6);
    // the other route stepped through the stages with its own cells: a tenth of a kelvin
    expect(Math.abs(at(series!.history.time, series!.history.core, 115.1686607688423) - 300)).toBeLessThan(
      0.1,
    );
  });
});
