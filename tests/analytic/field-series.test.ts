/**
 * The field against exact series: plate, long round, sphere and short round at Bi 0.1, 1 and 10. Values of
 * tests/data/transient_points.csv (recomputed series, checked against the printed one-term tables; provenance there) and
 * products of our own series. Each within 0.2 % of the temperature span at the default accuracy, energy to 1e-6.
 */
import { describe, expect, it } from "vitest";
import { productResponse } from "../../src/analytic/response.ts";
import type { CaseDocument, VertexDocument } from "../../src/case/types.ts";
import { cylinder, readings, simpleCase, solved, sphere } from "../helpers/solve.ts";
import { numberIn, readTable } from "../helpers/readTable.ts";

const SIZE = 0.05;
const K = 40;
const RHO = 7850;
const C = 600;
const DIFFUSIVITY = K / (RHO * C);
const FOURIERS = [0.05, 0.1, 0.2, 0.5, 1];
const BIOTS = [0.1, 1, 10];
const SPAN = 100; // start 100, surroundings 0: theta is degC / 100
const ALLOWED = 0.002 * SPAN;

const timeOf = (fourier: number): number => (fourier * SIZE * SIZE) / DIFFUSIVITY;
const points = readTable("transient_points");

interface Shape {
  readonly geometry: string;
  readonly outline: VertexDocument[];
  readonly sides: (film: number) => CaseDocument["stages"][number]["sides"];
  readonly centre: [number, number];
  readonly surface: [number, number];
}

const SHAPES: Shape[] = [
  {
    geometry: "slab",
    outline: cylinder(0.03, SIZE),
    sides: (film) => ({ base: "insulated", wall: "insulated", top: { film } }),
    centre: [0, 0],
    surface: [0, SIZE],
  },
  {
    geometry: "cylinder",
    outline: cylinder(SIZE, 0.03),
    sides: (film) => ({ base: "insulated", top: "insulated", wall: { film } }),
    centre: [0, 0.015],
    surface: [SIZE, 0.015],
  },
  {
    geometry: "sphere",
    outline: sphere(SIZE),
    sides: (film) => ({ skin: { film } }),
    centre: [0, 0],
    surface: [SIZE, 0],
  },
];

function caseFor(shape: Shape, biot: number): CaseDocument {
  return simpleCase({
    outline: shape.outline,
    k: K,
    rho: RHO,
    c: C,
    start: SPAN,
    ambient: 0,
    lasts: timeOf(1.2),
    sides: shape.sides((biot * K) / SIZE),
    probes: [
      { name: "centre", at: shape.centre },
      { name: "surface", at: shape.surface },
    ],
    questions: FOURIERS.flatMap((fourier) =>
      ["centre", "surface", "mean"].map((where) => ({ ask: "reading" as const, where, at: timeOf(fourier) })),
    ),
  });
}

describe.each(SHAPES)("$geometry", (shape) => {
  it.each(BIOTS)("at Bi %s agrees with the series at centre, surface and mean", async (biot) => {
    const result = await solved(caseFor(shape, biot));
    const found = readings(result);
    FOURIERS.forEach((fourier, i) => {
      const row = points.find(
        (each) =>
          each["geometry"] === shape.geometry &&
          numberIn(each, "Bi") === biot &&
          numberIn(each, "Fo") === fourier,
      );
      expect(row, `table row for Fo ${fourier}`).toBeDefined();
      ["theta_centre", "theta_surface", "theta_mean"].forEach((column, c) => {
        const expected = SPAN * numberIn(row!, column);
        expect(Math.abs(found[3 * i + c]! - expected), `${column} at Fo ${fourier}`).toBeLessThan(ALLOWED);
      });
    });
    expect(result.run.energyImbalance).toBeLessThan(1e-6);
    for (const values of [result.history.coldest, result.history.hottest])
      for (const value of values) {
        expect(value).toBeGreaterThan(-1e-3 * SPAN);
        expect(value).toBeLessThan(1.001 * SPAN);
      }
  });
});

describe("finite cylinder", () => {
  it.each(BIOTS)("at Bi %s agrees with the product of plate and long round", async (biot) => {
    const film = (biot * K) / SIZE;
    const height = 3 * SIZE; // half height 1.5 radii
    const at = (fourier: number, r: number | "mean", z: number | "mean"): number =>
      SPAN *
      productResponse([
        { geometry: "cylinder", biot, fourier, position: r },
        { geometry: "slab", biot: 1.5 * biot, fourier: fourier / 1.5 ** 2, position: z },
      ]).theta;
    const result = await solved(
      simpleCase({
        outline: cylinder(SIZE, height),
        k: K,
        rho: RHO,
        c: C,
        start: SPAN,
        ambient: 0,
        lasts: timeOf(1.2),
        sides: { "*": { film } },
        probes: [
          { name: "centre", at: [0, height / 2] },
          { name: "edge", at: [SIZE, height] },
        ],
        questions: FOURIERS.flatMap((fourier) =>
          ["centre", "edge", "mean"].map((where) => ({
            ask: "reading" as const,
            where,
            at: timeOf(fourier),
          })),
        ),
      }),
    );
    const found = readings(result);
    FOURIERS.forEach((fourier, i) => {
      [at(fourier, 0, 0), at(fourier, 1, 1), at(fourier, "mean", "mean")].forEach((expected, c) =>
        expect(Math.abs(found[3 * i + c]! - expected), `reading ${c} at Fo ${fourier}`).toBeLessThan(ALLOWED),
      );
    });
  });

  it("with D 100 x 200 mm, k 40, h 500, 850 to 20 C gives the tabled temperatures after 300 s", async () => {
    const tabled = (quantity: string): number =>
      numberIn(
        readTable("analytic_cases").find((row) => row["id"] === `PROD-A-300-${quantity}`)!,
        "value",
      );
    const result = await solved(
      simpleCase({
        outline: cylinder(0.05, 0.2),
        k: 40,
        rho: 7850,
        c: 600,
        start: 850,
        ambient: 20,
        lasts: 400,
        sides: { "*": { film: 500 } },
        probes: [
          { name: "centre", at: [0, 0.1] },
          { name: "side", at: [0.05, 0.1] },
          { name: "end", at: [0, 0.2] },
          { name: "rim", at: [0.05, 0.2] },
        ],
        questions: ["centre", "side", "end", "rim", "mean"].map((where) => ({
          ask: "reading" as const,
          where,
          at: 300,
        })),
      }),
    );
    const expected = ["centre", "mid_side_surface", "end_face_centre", "rim", "mean"].map(tabled);
    readings(result).forEach((value, i) => expect(Math.abs(value - expected[i]!)).toBeLessThan(0.002 * 830));
  });
});
