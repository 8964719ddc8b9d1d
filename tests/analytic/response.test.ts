/** Dimensionless responses against tables computed apart, worked product shapes and the semi-infinite solid. */
import { describe, expect, test } from "vitest";
import type { Geometry } from "../../src/analytic/geometry.ts";
import { scaledErfc } from "../../src/analytic/erfc.ts";
import {
  lumpedResponse,
  oneTermResponse,
  productResponse,
  seriesResponse,
} from "../../src/analytic/response.ts";
import { skinLayerResponse } from "../../src/analytic/skinLayer.ts";
import { GEOMETRIES as GEOMETRY_FUNCTIONS } from "../../src/analytic/geometry.ts";
import { spectrumOf } from "../../src/analytic/spectrum.ts";
import { numberIn, readTable } from "../helpers/readTable.ts";

const GEOMETRIES = ["slab", "cylinder", "sphere"] as const;
const PLACES = [
  ["theta_centre", 0],
  ["theta_mid_x0.5", 0.5],
  ["theta_surface", 1],
  ["theta_mean", "mean"],
] as const;

describe("full series", () => {
  // Carslaw & Jaeger 2nd ed. 1959 secs. 3.11, 7.7, 9.4; ten decimals in the table
  test("96 points of transient_points.csv, four places each, to 1e-10", () => {
    const rows = readTable("transient_points");
    expect(rows.length).toBe(96);
    for (const row of rows) {
      const [geometry, biot, fourier] = [row.geometry as Geometry, numberIn(row, "Bi"), numberIn(row, "Fo")];
      for (const [column, place] of PLACES) {
        const value = seriesResponse(geometry, biot, fourier, place);
        expect(Math.abs(value.theta - numberIn(row, column)), JSON.stringify(row)).toBeLessThan(1e-10);
        expect(value.errorBound).toBeLessThanOrEqual(1e-13);
      }
      for (const [column, place] of [
        ["theta_centre_one_term", 0],
        ["theta_mean_one_term", "mean"],
      ] as const)
        expect(oneTermResponse(geometry, biot, fourier, place)).toBeCloseTo(numberIn(row, column), 9);
      const lost = 1 - seriesResponse(geometry, biot, fourier, "mean").theta;
      expect(lost).toBeCloseTo(numberIn(row, "Q_over_Q0"), 9);
    }
  });

  test.each(GEOMETRIES)("%s: series and skin layer, two routes, meet where both hold", (geometry) => {
    // the cylinder's layer form neglects a share of about Fo/4, which its bound owns up to
    for (const biot of [1e-3, 0.5, 0.50001, 0.99, 1, 1.000001, 3, 80, 1000, Infinity])
      for (const fourier of geometry === "cylinder" ? [1e-5, 1e-4] : [1e-3, 2e-3, 4e-3])
        for (const place of [0, 0.5, 0.9, 0.97, 1, "mean"] as const) {
          const layer = skinLayerResponse(geometry, biot, fourier, place);
          const series = slowSeries(geometry, biot, fourier, place);
          expect(Math.abs(layer.theta - series), `${biot} ${fourier} ${place}`).toBeLessThanOrEqual(
            layer.errorBound + 2e-11,
          );
        }
  });

  test.each(GEOMETRIES)(
    "%s: from the very first instants on, theta is continuous and bounded honestly",
    (geometry) => {
      for (const biot of [0.001, 1, 30, 1000, Infinity])
        for (const place of [0, 0.7, 1, "mean"] as const) {
          let before = seriesResponse(geometry, biot, 0, place).theta;
          for (let exponent = -12; exponent <= 1; exponent += 0.05) {
            const { theta, errorBound } = seriesResponse(geometry, biot, 10 ** exponent, place);
            expect(theta).toBeLessThanOrEqual(before + 2 * errorBound + 1e-12);
            expect(theta).toBeGreaterThanOrEqual(-1e-12);
            expect(errorBound).toBeLessThan(1.1e-5);
            before = theta;
          }
        }
    },
  );

  test("a held surface has left at once, the rest has not", () => {
    expect(seriesResponse("slab", Infinity, 0, 1).theta).toBe(0);
    expect(seriesResponse("slab", Infinity, 0, 0.5).theta).toBe(1);
    expect(seriesResponse("cylinder", Infinity, 0, "mean").theta).toBe(1);
  });
  test("an insulated body stays as it is", () => {
    for (const geometry of GEOMETRIES)
      for (const fourier of [0, 1e-5, 0.1, 10])
        expect(seriesResponse(geometry, 0, fourier, 0.4).theta).toBeCloseTo(1, 12);
  });
  test("impossible places and times are refused", () => {
    expect(() => seriesResponse("slab", 1, -1, 0)).toThrow(RangeError);
    expect(() => seriesResponse("slab", 1, 1, 1.5)).toThrow(RangeError);
    expect(() => oneTermResponse("slab", 1, NaN, 0)).toThrow(RangeError);
  });
});

describe("semi-infinite solid", () => {
  // Carslaw & Jaeger sec. 2.7; the slab's skin layer with x = 2 eta sqrt(Fo), Bi = beta / sqrt(Fo)
  test("49 points of semi_infinite_convection.csv to 1e-10", () => {
    const rows = readTable("semi_infinite_convection");
    expect(rows.length).toBe(49);
    const fourier = 1e-4;
    for (const row of rows) {
      const [eta, beta] = Object.values(row).map((text) => (text === "inf" ? Infinity : Number(text)));
      const { theta } = skinLayerResponse("slab", beta! / 1e-2, fourier, 1 - 2 * eta! * 1e-2);
      expect(Math.abs(1 - theta - Number(Object.values(row)[2])), JSON.stringify(row)).toBeLessThan(1e-10);
    }
  });
  test("the scaled complementary error function is smooth over its two branches and right at known places", () => {
    // Abramowitz & Stegun Table 7.1 (from memory): erfc(0.5), erfc(1), erfc(2)
    expect(scaledErfc(0)).toBe(1);
    expect(scaledErfc(0.5) * Math.exp(-0.25)).toBeCloseTo(0.4795001222, 10);
    expect(scaledErfc(1) * Math.exp(-1)).toBeCloseTo(0.1572992071, 10);
    expect(scaledErfc(2) * Math.exp(-4)).toBeCloseTo(0.004677734981, 12);
    expect(scaledErfc(-1) * Math.exp(-1)).toBeCloseTo(2 - 0.1572992071, 10);
    expect(scaledErfc(2 - 1e-9) / scaledErfc(2)).toBeCloseTo(1, 8);
    expect(scaledErfc(1e8) * 1e8 * Math.sqrt(Math.PI)).toBeCloseTo(1, 12);
    expect(scaledErfc(Infinity)).toBe(0);
  });
});

describe("product shapes", () => {
  // analytic_cases.csv, PROD-A and PROD-B: Carslaw & Jaeger secs. 1.15, 8.4; six decimals of a degree
  const cases = readTable("analytic_cases");
  const value = (id: string) =>
    numberIn(
      cases.find((row) => row.id === id)!,
      "value",
    );

  test.each([60, 300, 900, 1800])(
    "PROD-A: cylinder 100 x 200 mm after %i s, five places, to 1e-6 degC",
    (time) => {
      const diffusivity = 40 / (7850 * 600);
      const at = (xi: number | "mean", eta: number | "mean") =>
        20 +
        830 *
          productResponse([
            {
              geometry: "cylinder",
              biot: (500 * 0.05) / 40,
              fourier: (diffusivity * time) / 0.05 ** 2,
              position: xi,
            },
            {
              geometry: "slab",
              biot: (500 * 0.1) / 40,
              fourier: (diffusivity * time) / 0.1 ** 2,
              position: eta,
            },
          ]).theta;
      expect(Math.abs(at(0, 0) - value(`PROD-A-${time}-centre`))).toBeLessThan(1e-6);
      expect(Math.abs(at(1, 0) - value(`PROD-A-${time}-mid_side_surface`))).toBeLessThan(1e-6);
      expect(Math.abs(at(0, 1) - value(`PROD-A-${time}-end_face_centre`))).toBeLessThan(1e-6);
      expect(Math.abs(at(1, 1) - value(`PROD-A-${time}-rim`))).toBeLessThan(1e-6);
      expect(Math.abs(at("mean", "mean") - value(`PROD-A-${time}-mean`))).toBeLessThan(1e-6);
    },
  );

  test.each([30, 120, 600])(
    "PROD-B: disc with another film on rim and flats after %i s, to 1e-6 degC",
    (time) => {
      const diffusivity = 16 / (7900 * 500);
      const at = (xi: number, eta: number) =>
        25 +
        575 *
          productResponse([
            {
              geometry: "cylinder",
              biot: (200 * 0.06) / 16,
              fourier: (diffusivity * time) / 0.06 ** 2,
              position: xi,
            },
            {
              geometry: "slab",
              biot: (60 * 0.01) / 16,
              fourier: (diffusivity * time) / 0.01 ** 2,
              position: eta,
            },
          ]).theta;
      expect(Math.abs(at(0, 0) - value(`PROD-B-${time}-centre`))).toBeLessThan(1e-6);
      expect(Math.abs(at(1, 0) - value(`PROD-B-${time}-rim_mid_height`))).toBeLessThan(1e-6);
      expect(Math.abs(at(0, 1) - value(`PROD-B-${time}-flat_face_centre`))).toBeLessThan(1e-6);
    },
  );

  test("PROD-C: a long bar cut once is a skin layer times a cylinder", () => {
    const diffusivity = 40 / (7850 * 600);
    for (const time of [60, 300])
      for (const depth of ["0", "0.02", "0.05"]) {
        // any half length long enough serves: 2 m
        const slab = skinLayerResponse(
          "slab",
          (500 * 2) / 40,
          (diffusivity * time) / 4,
          1 - Number(depth) / 2,
        );
        const round = seriesResponse("cylinder", 0.625, (diffusivity * time) / 0.0025, 0);
        expect(Math.abs(20 + 830 * slab.theta * round.theta - value(`PROD-C-${time}-${depth}`))).toBeLessThan(
          2e-6,
        );
      }
  });

  test("a quenched bar at 60 s: 503.69 degC by the full product, 572.4 degC by one term of each", () => {
    // bar 50 x 200 mm, k 28, rho 7800, c 620, 850 to 60 degC, film 900; recomputed apart: 503.68805, 572.37894
    const diffusivity = 28 / (7800 * 620);
    const factors = [
      {
        geometry: "cylinder",
        biot: (900 * 0.025) / 28,
        fourier: (diffusivity * 60) / 0.025 ** 2,
        position: 0,
      },
      { geometry: "slab", biot: (900 * 0.1) / 28, fourier: (diffusivity * 60) / 0.1 ** 2, position: 0 },
    ] as const;
    expect(60 + 790 * productResponse(factors).theta).toBeCloseTo(503.68805314583966, 6);
    const oneTerm = factors.map((f) => oneTermResponse(f.geometry, f.biot, f.fourier, f.position));
    expect(60 + 790 * oneTerm[0]! * oneTerm[1]!).toBeCloseTo(572.3789388392458, 6);
  });
});

describe("rules of thumb, measured", () => {
  test("lumped: its closed form", () => {
    expect(lumpedResponse(0.1, 0)).toBe(1);
    expect(lumpedResponse(0.1, 10)).toBeCloseTo(Math.exp(-1), 15);
  });

  // one_term_validity.csv: worst over a grid of Biot numbers, the place of the worst given in the row
  test("one_term_validity.csv: the worst one-term error at its Biot number, all 72 rows", () => {
    const rows = readTable("one_term_validity");
    expect(rows.length).toBe(72);
    const places: Record<string, number | "mean"> = { centre: 0, mid: 0.5, surface: 1, mean: "mean" };
    for (const row of rows) {
      const error = (biot: number) => {
        const [geometry, fourier, place] = [
          row.geometry as Geometry,
          numberIn(row, "Fo"),
          places[row.where!]!,
        ];
        const exact = seriesResponse(geometry, biot, fourier, place).theta;
        const off = oneTermResponse(geometry, biot, fourier, place) - exact;
        return { off, percent: (100 * off) / exact };
      };
      // the table gives the Biot number to four digits
      const label = JSON.stringify(row);
      expect(
        Math.abs(error(numberIn(row, "at_Bi")).off - numberIn(row, "max_abs_error_theta")),
        label,
      ).toBeLessThan(2e-6);
      if (numberIn(row, "at_Bi_rel") < Infinity || row.where !== "surface")
        expect(
          Math.abs(error(numberIn(row, "at_Bi_rel")).percent - numberIn(row, "max_rel_error_percent")),
          label,
        ).toBeLessThan(2e-3);
    }
  });

  // lumped_error.csv: what "Bi = 0.1" is worth, on V/A and on the radius
  test("lumped_error.csv: worst error, its instant, and the errors in time, all 36 rows", () => {
    const rows = readTable("lumped_error");
    expect(rows.length).toBe(36);
    const places: Record<string, number | "mean"> = { centre: 0, surface: 1, mean: "mean" };
    for (const row of rows) {
      const [geometry, biot] = [row.geometry as Geometry, numberIn(row, "Bi_on_L_or_R")];
      const dimension = { slab: 1, cylinder: 2, sphere: 3 }[geometry];
      const place = places[row.where!]!;
      // Bi and Fo on L or R; V/A is L / d, so the lumped exponent is d Bi Fo
      const exact = (fourier: number) => seriesResponse(geometry, biot, fourier, place).theta;
      const lumped = (fourier: number) => lumpedResponse(dimension * biot, fourier);
      const label = JSON.stringify(row);
      const at = numberIn(row, "at_Fo");
      const worst = numberIn(row, "max_lumped_minus_exact_percent_of_start_excess");
      expect(Math.abs(100 * (lumped(at) - exact(at)) - worst), label).toBeLessThan(2e-4);
      for (const nearby of [0.9, 0.97, 1.03, 1.1])
        expect(Math.abs(100 * (lumped(at * nearby) - exact(at * nearby)))).toBeLessThanOrEqual(
          Math.abs(worst) + 1e-4,
        );
      for (const left of [50, 10, 1]) {
        const lumpedFourier = -Math.log(left / 100) / (dimension * biot);
        const error = numberIn(row, `time_error_percent_to_${left}pct_left`);
        const exactFourier = lumpedFourier / (1 + error / 100);
        // the table gives the error in time to three decimals of a percent
        const slope = dimension * biot * exactFourier * 1e-5 * (left / 100);
        expect(Math.abs(exact(exactFourier) - left / 100), label).toBeLessThan(slope + 1e-6);
      }
    }
  });
});

/** The series summed far beyond need, without the switch to the layer form. */
function slowSeries(geometry: Geometry, biot: number, fourier: number, place: number | "mean"): number {
  const spectrum = spectrumOf(geometry, biot);
  let sum = 0;
  for (let n = 1; n <= 1200; n++) {
    const { zeta, coefficient, mean } = spectrum.mode(n);
    const shape = place === "mean" ? mean : GEOMETRY_FUNCTIONS[geometry].shape(zeta * place);
    sum += coefficient * Math.exp(-zeta * zeta * fourier) * shape;
  }
  return sum;
}
