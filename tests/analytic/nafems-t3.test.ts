/**
 * NAFEMS, The Standard NAFEMS Benchmarks, Rev. 3, 1990, test T3: a plate 0.1 m thick, one face held at 0 C, the other at
 * 100 sin(pi t / 40) C; 0.02 m from that face at 32 s 36.60 C published, 36.6031 recomputed by Duhamel's sine series
 * (definition seen in a public example text). A thin annulus of large radius stands in for the plate: its curvature shifts
 * the temperature by less than thickness / radius of the difference across it.
 */
import { describe, expect, it } from "vitest";
import type { SolveOptions } from "../../src/solveCase.ts";
import { readings, simpleCase, solved, tube } from "../helpers/solve.ts";

const RADIUS = 50;
const THICKNESS = 0.1;

describe.each([
  ["krylov", {}],
  ["tr-bdf2", { scheme: "tr-bdf2", nodes: 900 }],
] satisfies [string, SolveOptions][])("by %s", (_, options) => {
  it("T3: a sinusoidal face temperature, 36.60 C at the point after 32 s", async () => {
    const wave = Array.from({ length: 129 }, (_v, i): [number, number] => [
      (32 * i) / 128,
      100 * Math.sin((Math.PI * 32 * i) / 128 / 40),
    ]);
    const result = await solved(
      simpleCase({
        outline: tube(RADIUS, RADIUS + THICKNESS, 0.04),
        k: 35,
        rho: 7200,
        c: 440.5,
        start: 0,
        lasts: 32,
        sides: { bore: { held: 0 }, wall: { held: wave }, base: "insulated", top: "insulated" },
        probes: [{ name: "point", at: [RADIUS + THICKNESS - 0.02, 0.02] }],
        questions: [{ ask: "reading", where: "point", at: 32 }],
      }),
      options,
    );
    expect(Math.abs(readings(result)[0]! - 36.603116)).toBeLessThan(0.05);
    expect(result.run.energyImbalance).toBeLessThan(1e-6);
  });
});
