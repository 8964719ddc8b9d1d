/**
 * The stated numerical uncertainty against the true error, on cases with an exact series: plate, long round, sphere and
 * short round at Bi 0.1, 1, 10 and 50, readings at centre, surface and mean at six Fourier numbers, and times to a level.
 * It has to cover the true error in at least 95 % of the answers, and at the median be no more than 10 times too wide.
 */
import { describe, expect, it } from "vitest";
import { productResponse, seriesResponse } from "../../src/analytic/response.ts";
import type { ProductFactor } from "../../src/analytic/response.ts";
import type { CaseDocument, VertexDocument } from "../../src/case/types.ts";
import type { SolveOptions } from "../../src/solveCase.ts";
import { cylinder, simpleCase, solved, sphere } from "../helpers/solve.ts";

const SIZE = 0.05;
const [K, RHO, C] = [40, 7850, 600];
const DIFFUSIVITY = K / (RHO * C);
const timeOf = (fourier: number): number => (fourier * SIZE * SIZE) / DIFFUSIVITY;
const BIOTS = [0.1, 1, 10, 50];
const FOURIERS = [0.02, 0.05, 0.1, 0.2, 0.5, 1];

interface Exact {
  readonly name: string;
  readonly outline: VertexDocument[];
  readonly sides: (film: number) => CaseDocument["stages"][number]["sides"];
  readonly probes: Readonly<Record<string, [number, number]>>;
  /** theta at a place and Fourier number */
  readonly theta: (place: string, biot: number, fourier: number) => number;
}

type Simple = ProductFactor["geometry"];
const simple = (geometry: Simple) => (place: string, biot: number, fourier: number) =>
  seriesResponse(geometry, biot, fourier, place === "mean" ? "mean" : place === "centre" ? 0 : 1).theta;

const EXACT: Exact[] = [
  {
    name: "plate",
    outline: cylinder(0.03, SIZE),
    sides: (film) => ({ base: "insulated", wall: "insulated", top: { film } }),
    probes: { centre: [0, 0], surface: [0, SIZE] },
    theta: simple("slab"),
  },
  {
    name: "long round",
    outline: cylinder(SIZE, 0.03),
    sides: (film) => ({ base: "insulated", top: "insulated", wall: { film } }),
    probes: { centre: [0, 0.015], surface: [SIZE, 0.015] },
    theta: simple("cylinder"),
  },
  {
    name: "sphere",
    outline: sphere(SIZE),
    sides: (film) => ({ skin: { film } }),
    probes: { centre: [0, 0], surface: [SIZE, 0] },
    theta: simple("sphere"),
  },
  {
    name: "short round",
    outline: cylinder(SIZE, 3 * SIZE),
    sides: (film) => ({ "*": { film } }),
    probes: { centre: [0, 1.5 * SIZE], surface: [SIZE, 3 * SIZE] },
    theta: (place, biot, fourier) => {
      const position = place === "mean" ? "mean" : place === "centre" ? 0 : 1;
      return productResponse([
        { geometry: "cylinder", biot, fourier, position },
        { geometry: "slab", biot: 1.5 * biot, fourier: fourier / 1.5 ** 2, position },
      ]).theta;
    },
  },
];

/** Fourier number at which theta of a place falls to a level, by halving. */
function fourierAt(exact: Exact, place: string, biot: number, level: number): number {
  let [low, high] = [1e-4, 200];
  for (let i = 0; i < 80; i++) {
    const middle = Math.sqrt(low * high);
    if (exact.theta(place, biot, middle) > level) low = middle;
    else high = middle;
  }
  return low;
}

interface Held {
  readonly error: number;
  readonly stated: number;
}

async function heldAnswers(exact: Exact, biot: number, options: SolveOptions): Promise<Held[]> {
  const places = [...Object.keys(exact.probes), "mean"];
  const lasts = Math.max(
    timeOf(1.2),
    ...places.map((place) => 1.1 * timeOf(fourierAt(exact, place, biot, 0.4))),
  );
  const readings = FOURIERS.flatMap((fourier) => places.map((place) => ({ place, fourier })));
  const result = await solved(
    simpleCase({
      outline: exact.outline,
      k: K,
      rho: RHO,
      c: C,
      start: 100,
      ambient: 0,
      lasts,
      sides: exact.sides((biot * K) / SIZE),
      probes: Object.entries(exact.probes).map(([name, at]) => ({ name, at })),
      questions: [
        ...readings.map(({ place, fourier }) => ({
          ask: "reading" as const,
          where: place,
          at: timeOf(fourier),
        })),
        ...places.map((place) => ({ ask: "when" as const, where: place, reaches: 40 })),
      ],
    }),
    options,
  );
  const truth = [
    ...readings.map(({ place, fourier }) => 100 * exact.theta(place, biot, fourier)),
    ...places.map((place) => timeOf(fourierAt(exact, place, biot, 0.4))),
  ];
  return result.answers.map((answer, i) => ({
    error: Math.abs(answer.value! - truth[i]!),
    stated: answer.numericalUncertainty!,
  }));
}

describe.each([
  ["six-node triangles", {}],
  ["linear triangles", { element: 3 }],
] satisfies [string, SolveOptions][])("with %s", (_, options) => {
  it("the stated uncertainty covers the true error in 95 % of the answers, and is not wide of it", async () => {
    const held: Held[] = [];
    for (const exact of EXACT)
      for (const biot of BIOTS) held.push(...(await heldAnswers(exact, biot, options)));
    expect(held.length).toBe(EXACT.length * BIOTS.length * 21);
    // errors below a ten-millionth of the span are rounding of both sides, and prove nothing
    const telling = held.filter(({ error, stated }) => Math.max(error, stated) > 1e-5);
    const covered = telling.filter(({ error, stated }) => error <= stated).length / telling.length;
    const widths = telling.map(({ error, stated }) => stated / Math.max(error, 1e-12)).sort((a, b) => a - b);
    expect(telling.length).toBeGreaterThan(100);
    expect(covered).toBeGreaterThanOrEqual(0.95);
    expect(widths[widths.length >> 1]).toBeLessThan(10);
  });
});
