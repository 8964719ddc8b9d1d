/** Estimates through several stages: closed forms, superposition, other routes to the same numbers. */
import { describe, expect, test } from "vitest";
import type { Curve } from "../../src/case/types.ts";
import type { Geometry } from "../../src/analytic/geometry.ts";
import { firstPhi, lumpedHistory, secondPhi } from "../../src/analytic/lumped.ts";
import { productResponse, seriesResponse } from "../../src/analytic/response.ts";
import { seriesHistory } from "../../src/analytic/stagedSeries.ts";
import type { SeriesBody, SeriesStage } from "../../src/analytic/stagedSeries.ts";

const GEOMETRIES = ["slab", "cylinder", "sphere"] as const;
const over = (...points: [number, number][]): Curve => ({ over: "time", points });
const film = (area: number, coefficient: number, ambient: Curve) => ({
  area,
  film: coefficient,
  ambient,
  flux: 0,
});

describe("one temperature", () => {
  const body = { heatCapacity: 4000, start: 20 };
  const times = Float64Array.of(0, 1, 10, 300, 3600, 20000);

  test("constant surroundings: the exponential, to rounding", () => {
    const got = lumpedHistory(body, [{ duration: 20000, sides: [film(0.5, 12, 180)], source: 0 }], times);
    times.forEach((t, i) => expect(got[i]).toBeCloseTo(180 - 160 * Math.exp((-6 * t) / 4000), 10));
  });
  test("several sides pull towards their own surroundings: conductance-weighted", () => {
    const sides = [film(0.5, 12, 180), film(0.25, 8, 20), film(3, 0, 5000)];
    const got = lumpedHistory(body, [{ duration: 1e6, sides, source: 0 }], Float64Array.of(1e6));
    expect(got[0]).toBeCloseTo((6 * 180 + 2 * 20) / 8, 9);
  });
  test("flux and source alone: heat over heat capacity, also along a ramp", () => {
    const sides = [{ area: 2, film: 0, ambient: 0, flux: over([0, 0], [100, 50]) }];
    const got = lumpedHistory(body, [{ duration: 100, sides, source: 40 }], Float64Array.of(50, 100));
    expect(got[0]).toBeCloseTo(20 + (2 * 0.25 * 50 * 50 + 40 * 50) / 4000, 12);
    expect(got[1]).toBeCloseTo(20 + (2 * 0.25 * 100 * 100 + 40 * 100) / 4000, 12);
  });
  test("a ramp ends in a lag of slope times time constant", () => {
    const ramp = over([0, 20], [1e5, 1020]);
    const got = lumpedHistory(
      body,
      [{ duration: 1e5, sides: [film(0.5, 12, ramp)], source: 0 }],
      Float64Array.of(1e5),
    );
    expect(got[0]).toBeCloseTo(1020 - 0.01 * (4000 / 6), 9);
  });
  test("cutting a stage in two, or a table in more points, changes nothing", () => {
    const table = over([0, 20], [1000, 500], [5000, 100]);
    const whole = lumpedHistory(body, [{ duration: 9000, sides: [film(1, 7, table)], source: 3 }], times);
    const finer = over([0, 20], [250, 140], [1000, 500], [3000, 300], [5000, 100], [6000, 100]);
    const again = lumpedHistory(body, [{ duration: 9000, sides: [film(1, 7, finer)], source: 3 }], times);
    const later = over([0, 500], [4000, 100]);
    const halves = [
      { duration: 1000, sides: [film(1, 7, table)], source: 3 },
      { duration: 8000, sides: [film(1, 7, later)], source: 3 },
    ];
    const cut = lumpedHistory(body, halves, times);
    times.forEach((_, i) => {
      expect(again[i]).toBeCloseTo(whole[i]!, 9);
      expect(cut[i]).toBeCloseTo(whole[i]!, 9);
    });
  });
  test("a hub ring 48.96 min in a fan oven and 90 s carried through air ends at 155.27 degC", () => {
    // bore 180, outside 300, width 70 mm, k 45, rho 7850, c 480; film 30 at 200 degC, then 12 at 20 degC, all round;
    // time and temperature recomputed apart
    const volume = Math.PI * (0.15 ** 2 - 0.09 ** 2) * 0.07;
    const area = 2 * Math.PI * (0.15 + 0.09) * 0.07 + 2 * Math.PI * (0.15 ** 2 - 0.09 ** 2);
    expect(volume / area).toBeCloseTo(0.01615384615384616, 15);
    const lift = 48.96018144115053 * 60;
    const stages = [
      { duration: lift, sides: [film(area, 30, 200)], source: 0 },
      { duration: 90, sides: [film(area, 12, 20)], source: 0 },
    ];
    const got = lumpedHistory(
      { heatCapacity: 7850 * 480 * volume, start: 20 },
      stages,
      Float64Array.of(lift + 90),
    );
    expect(got[0]).toBeCloseTo(155.26570048309176, 9);
  });
  test("the two helper functions are smooth through zero", () => {
    for (const z of [-0.1000001, -0.0999999, -1e-3, -1e-9, 0, 0.0999999, 0.1000001, -30]) {
      expect(firstPhi(z)).toBeCloseTo(z === 0 ? 1 : Math.expm1(z) / z, 14);
      const exact =
        z === 0
          ? 0.5
          : Math.abs(z) < 1e-2
            ? 0.5 + z / 6 + (z * z) / 24 + z ** 3 / 120
            : (Math.expm1(z) / z - 1) / z;
      expect(secondPhi(z)).toBeCloseTo(exact, 11);
    }
  });
  test("impossible bodies are refused", () => {
    const stage = { duration: 1, sides: [film(1, Infinity, 20)], source: 0 };
    expect(() => lumpedHistory({ heatCapacity: 0, start: 0 }, [stage], times)).toThrow(RangeError);
    expect(() => lumpedHistory(body, [], times)).toThrow(RangeError);
    expect(() => lumpedHistory(body, [stage], times)).toThrow(/finite/);
  });
});

describe("series through stages", () => {
  const steel = { conductivity: 30, volumetricHeatCapacity: 4e6, start: 800 };
  const round = (geometry: Geometry): SeriesBody => ({ ...steel, directions: [{ geometry, length: 0.1 }] });
  const finite: SeriesBody = {
    ...steel,
    directions: [
      { geometry: "cylinder", length: 0.1 },
      { geometry: "slab", length: 0.15 },
    ],
  };
  const times = Float64Array.of(0, 1e-3, 0.1, 2, 30, 200, 900, 4000, 20000);

  test.each(GEOMETRIES)("%s: one stage is the full series, from the first instant on", (geometry) => {
    for (const coefficient of [2, 300, 1e5, Infinity]) {
      const got = seriesHistory(
        round(geometry),
        [{ duration: 2e4, films: [coefficient], ambient: 50 }],
        times,
      );
      times.forEach((time, i) => {
        const at = (place: number | "mean") =>
          50 + 750 * seriesResponse(geometry, (coefficient * 0.1) / 30, (7.5e-6 * time) / 0.01, place).theta;
        expect(got.core[i]).toBeCloseTo(at(0), 6);
        expect(got.mean[i]).toBeCloseTo(at("mean"), 6);
        expect(got.surface[i]).toBeCloseTo(at(1), 6);
        expect(got.edge[i]).toBe(got.surface[i]);
      });
      expect(got.bridgedShare).toBe(0);
    }
  });

  test("finite cylinder: one stage is the product, edge and surface mean included", () => {
    const got = seriesHistory(finite, [{ duration: 2e4, films: [300, 80], ambient: 50 }], times);
    times.forEach((time, i) => {
      const at = (xi: number | "mean", eta: number | "mean") =>
        50 +
        750 *
          productResponse([
            { geometry: "cylinder", biot: 1, fourier: (7.5e-6 * time) / 0.01, position: xi },
            { geometry: "slab", biot: 0.4, fourier: (7.5e-6 * time) / 0.0225, position: eta },
          ]).theta;
      expect(got.core[i]).toBeCloseTo(at(0, 0), 6);
      expect(got.mean[i]).toBeCloseTo(at("mean", "mean"), 6);
      expect(got.edge[i]).toBeCloseTo(at(1, 1), 6);
      // areas: wall 2 pi 0.1 0.3, ends 2 pi 0.01
      expect(got.surface[i]).toBeCloseTo((0.03 * at(1, "mean") + 0.01 * at("mean", 1)) / 0.04, 6);
    });
  });

  test("same film, other surroundings: the superposition of two steps", () => {
    const stages = [
      { duration: 500, films: [300], ambient: 50 },
      { duration: 2e4, films: [300], ambient: 400 },
    ];
    const later = Float64Array.of(500, 501, 530, 900, 4000);
    const got = seriesHistory(round("sphere"), stages, later);
    later.forEach((time, i) => {
      const theta = (t: number, place: number | "mean") =>
        seriesResponse("sphere", 1, (7.5e-6 * t) / 0.01, place).theta;
      const at = (place: number | "mean") =>
        50 + 750 * theta(time, place) + 350 * (1 - theta(time - 500, place));
      expect(got.core[i]).toBeCloseTo(at(0), 6);
      expect(got.mean[i]).toBeCloseTo(at("mean"), 6);
      expect(got.surface[i]).toBeCloseTo(at(1), 6);
    });
  });

  test("a table of surroundings is the integral of its steps", () => {
    const table = over([0, 800], [600, 200], [1500, 500]);
    const later = Float64Array.of(100, 600, 601, 1200, 1500, 5000);
    for (const body of [round("slab"), finite]) {
      const films = body.directions.map(() => 300);
      const got = seriesHistory(body, [{ duration: 6000, films, ambient: table }], later);
      const stairs = stairsOf(body, films, 0.25, later, (t) => (t < 600 ? -1 : t < 1500 ? 1 / 3 : 0));
      later.forEach((_, i) => expect(Math.abs(got.mean[i]! - stairs[i]!)).toBeLessThan(2e-4));
    }
  });

  test.each(GEOMETRIES)(
    "%s: three stages with other films agree with a fine one-dimensional march",
    (geometry) => {
      const stages: SeriesStage[] = [
        { duration: 300, films: [90], ambient: 25 },
        { duration: 200, films: [2000], ambient: over([0, 60], [200, 90]) },
        { duration: 2000, films: [0], ambient: 20 },
      ];
      const later = Float64Array.of(30, 299, 310, 400, 500, 520, 900, 2500);
      const got = seriesHistory(round(geometry), stages, later);
      const march = finiteVolumes(geometry, 0.1, steel, stages, later);
      later.forEach((_, i) => {
        expect(Math.abs(got.core[i]! - march.core[i]!), `core ${i}`).toBeLessThan(0.05);
        expect(Math.abs(got.mean[i]! - march.mean[i]!), `mean ${i}`).toBeLessThan(0.05);
        expect(Math.abs(got.surface[i]! - march.surface[i]!), `surface ${i}`).toBeLessThan(0.3);
      });
      expect(got.bridgedShare).toBe(0);
    },
  );

  test("held surfaces: from a film to a held skin and back", () => {
    const stages: SeriesStage[] = [
      { duration: 300, films: [900], ambient: 25 },
      { duration: 200, films: [Infinity], ambient: 100 },
      { duration: 2000, films: [50], ambient: 20 },
    ];
    const later = Float64Array.of(300, 320, 500, 530, 2000);
    const got = seriesHistory(round("cylinder"), stages, later);
    const march = finiteVolumes("cylinder", 0.1, steel, stages, later);
    later.forEach((_, i) => {
      expect(Math.abs(got.core[i]! - march.core[i]!)).toBeLessThan(0.1);
      expect(Math.abs(got.mean[i]! - march.mean[i]!)).toBeLessThan(0.1);
    });
  });

  test("an instant under other films and back leaves a finite cylinder as it was", () => {
    const plain = [{ duration: 5000, films: [300, 80], ambient: 50 }];
    const broken = [
      { duration: 400, films: [300, 80], ambient: 50 },
      { duration: 0, films: [0, 4000], ambient: 900 },
      { duration: 4600, films: [300, 80], ambient: 50 },
    ];
    const later = Float64Array.of(450, 600, 5000);
    const [a, b] = [seriesHistory(finite, plain, later), seriesHistory(finite, broken, later)];
    later.forEach((_, i) => {
      expect(Math.abs(b.core[i]! - a.core[i]!)).toBeLessThan(2e-3);
      expect(Math.abs(b.mean[i]! - a.mean[i]!)).toBeLessThan(2e-3);
      expect(Math.abs(b.edge[i]! - a.edge[i]!)).toBeLessThan(1e-2);
    });
  });

  test("an insulated stage evens out: the core goes to the mean and the mean stays", () => {
    const stages = [
      { duration: 100, films: [900, 900], ambient: 20 },
      { duration: 30000, films: [0, 0], ambient: 777 },
    ];
    const got = seriesHistory(finite, stages, Float64Array.of(100, 130, 30100));
    expect(got.mean[1]).toBeCloseTo(got.mean[0]!, 6);
    expect(got.core[2]).toBeCloseTo(got.mean[0]!, 6);
    expect(got.edge[2]).toBeCloseTo(got.mean[0]!, 6);
  });

  test("readings in the first instants of a later stage are bridged, said so, and lie between their neighbours", () => {
    const stages = [
      { duration: 500, films: [300, 300], ambient: 50 },
      { duration: 500, films: [900, 900], ambient: 20 },
    ];
    const got = seriesHistory(finite, stages, Float64Array.of(500, 500.001, 500.01, 500.1, 505));
    expect(got.bridgedShare).toBeGreaterThan(0.0002);
    expect(got.bridgedShare).toBeLessThan(0.002);
    for (let i = 1; i < 5; i++) {
      expect(got.edge[i]).toBeLessThan(got.edge[i - 1]!);
      expect(got.mean[i]).toBeLessThan(got.mean[i - 1]!);
    }
  });

  test("a ball heated by 21.33 K/h: 3.75, 4.72, 4.94 K across after 1, 2, 3 h, skin lag towards 12.22 K", () => {
    // ball of 90 mm, k 1.1, rho 2500, c 1100, film 20; lag: slope R^2/alpha (1/6 - 1/6 + 1/(3 Bi))
    const body = {
      conductivity: 1.1,
      volumetricHeatCapacity: 2.75e6,
      start: 20,
      directions: [{ geometry: "sphere", length: 0.045 }],
    } as const;
    const slope = 21 + 1 / 3;
    const ramp = over([0, 20], [360000, 20 + slope * 100]);
    const hours = Float64Array.of(3600, 7200, 10800, 360000);
    const got = seriesHistory(body, [{ duration: 360000, films: [20], ambient: ramp }], hours);
    [3.75, 4.72, 4.94].forEach((across, i) =>
      expect(Math.abs(got.surface[i]! - got.core[i]! - across)).toBeLessThan(0.006),
    );
    const lag = 20 + slope * 100 - got.surface[3]!;
    expect(lag).toBeCloseTo(((slope / 3600) * 2.75e6 * 0.045) / (3 * 20), 5);
    expect(Math.abs(lag - 12.22)).toBeLessThan(0.005);
  });

  test("a bar through air and oil: 300 degC at the centre 115.2 s after leaving the furnace", () => {
    // bar 50 x 200 mm, k 28, rho 7800, c 620; 6 s at 90 in 25 degC, then 900 in oil at 60 degC; other films likewise
    const bar: SeriesBody = {
      conductivity: 28,
      volumetricHeatCapacity: 7800 * 620,
      start: 850,
      directions: [
        { geometry: "cylinder", length: 0.025 },
        { geometry: "slab", length: 0.1 },
      ],
    };
    for (const [oil, time] of [
      [900, 115.2],
      [450, 192.5],
      [1800, 75.9],
    ] as const) {
      const stages = [
        { duration: 6, films: [90, 90], ambient: 25 },
        { duration: 400, films: [oil, oil], ambient: 60 },
      ];
      const got = seriesHistory(bar, stages, Float64Array.of(time - 0.3, time + 0.3));
      expect(got.core[0]).toBeGreaterThan(300);
      expect(got.core[1]).toBeLessThan(300);
    }
  });

  test("no stage, or a size that is none, is refused", () => {
    expect(() => seriesHistory(finite, [], times)).toThrow(RangeError);
    const flat = { ...steel, directions: [{ geometry: "slab", length: 0 }] } as const;
    expect(() => seriesHistory(flat, [{ duration: 1, films: [1], ambient: 0 }], times)).toThrow(RangeError);
  });
});

/** Mean of a body in surroundings that start at its own temperature and move by `slopeAt`, as many small steps. */
function stairsOf(
  body: SeriesBody,
  films: readonly number[],
  step: number,
  times: Float64Array,
  slopeAt: (time: number) => number,
): number[] {
  const answer = (time: number) =>
    1 -
    productResponse(
      body.directions.map(({ geometry, length }, d) => ({
        geometry,
        biot: (films[d]! * length) / body.conductivity,
        fourier: (body.conductivity * time) / body.volumetricHeatCapacity / length ** 2,
        position: "mean" as const,
      })),
    ).theta;
  return [...times].map((time) => {
    let temperature = body.start;
    for (let t = 0; t < Math.min(time, 1500) - 1e-9; t += step)
      temperature += slopeAt(t + step / 2) * step * answer(time - t - step / 2);
    return temperature;
  });
}

/** A plain one-dimensional finite-volume march with Crank-Nicolson steps: slow, simple, another route altogether. */
function finiteVolumes(
  geometry: Geometry,
  length: number,
  material: { conductivity: number; volumetricHeatCapacity: number; start: number },
  stages: readonly SeriesStage[],
  times: Float64Array,
): Record<"core" | "mean" | "surface", number[]> {
  const dimension = { slab: 1, cylinder: 2, sphere: 3 }[geometry];
  const [cells, dt] = [400, 0.25];
  const dx = length / cells;
  const face = (i: number) => (i * dx) ** (dimension - 1);
  const volume = (i: number) => (((i + 1) * dx) ** dimension - (i * dx) ** dimension) / dimension;
  const u = new Float64Array(cells).fill(material.start);
  const out = { core: [] as number[], mean: [] as number[], surface: [] as number[] };
  let [clock, next] = [0, 0];
  for (const stage of stages) {
    const h = stage.films[0]!;
    const series = h === 0 ? 0 : 1 / (1 / h + dx / 2 / material.conductivity);
    const ambient = (t: number) =>
      typeof stage.ambient === "number"
        ? stage.ambient
        : stage.ambient.points[0]![1] +
          ((stage.ambient.points[1]![1] - stage.ambient.points[0]![1]) * t) / stage.ambient.points[1]![0];
    const steps = Math.round(stage.duration / dt);
    for (let k = 0; k <= steps; k++) {
      if (k > 0) crankNicolson(k);
      while (next < times.length && Math.abs(times[next]! - clock) < 1e-9 && (k > 0 || clock === 0)) {
        const total = u.reduce((sum, value, i) => sum + value * volume(i), 0);
        out.core.push(u[0]!);
        out.mean.push(total / (length ** dimension / dimension));
        // from the outermost cell to the skin
        out.surface.push(
          u[cells - 1]! - (series * (u[cells - 1]! - ambient(k * dt)) * dx) / 2 / material.conductivity,
        );
        next++;
      }
    }
    /** One step; the first four of a stage fully implicit, which damps the jump. */
    function crankNicolson(k: number): void {
      const implicit = k <= 4 ? 1 : 0.5;
      const [a, b, c, d] = [0, 0, 0, 0].map(() => new Float64Array(cells)) as [
        Float64Array,
        Float64Array,
        Float64Array,
        Float64Array,
      ];
      for (let i = 0; i < cells; i++) {
        const west = i > 0 ? (material.conductivity * face(i)) / dx : 0;
        const east = i < cells - 1 ? (material.conductivity * face(i + 1)) / dx : 0;
        const skin = i === cells - 1 ? series * face(cells) : 0;
        const capacity = (material.volumetricHeatCapacity * volume(i)) / dt;
        const now = ambient(k * dt) * implicit + ambient((k - 1) * dt) * (1 - implicit);
        const old = west * ((u[i - 1] ?? 0) - u[i]!) + east * ((u[i + 1] ?? 0) - u[i]!) - skin * u[i]!;
        a[i] = -implicit * west;
        c[i] = -implicit * east;
        b[i] = capacity + implicit * (west + east + skin);
        d[i] = capacity * u[i]! + (1 - implicit) * old + skin * now;
      }
      for (let i = 1; i < cells; i++) {
        const factor = a[i]! / b[i - 1]!;
        b[i]! -= factor * c[i - 1]!;
        d[i]! -= factor * d[i - 1]!;
      }
      for (let i = cells - 1; i >= 0; i--) u[i] = (d[i]! - (i < cells - 1 ? c[i]! * u[i + 1]! : 0)) / b[i]!;
      clock += dt;
    }
  }
  return out;
}
