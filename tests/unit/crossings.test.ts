import { describe, expect, it } from "vitest";
import { firstComing, firstReached, timeReached } from "../../src/heat/crossings.ts";

/** Newton cooling from 100 to 0, time constant 10, sampled every 5: exact passings are 10 ln(100 / level). */
const times = Array.from({ length: 13 }, (_, i) => 5 * i);
const at = (time: number): number => 100 * Math.exp(-time / 10);
const curve = { times, values: times.map(at), at };
const passes = (level: number): number => 10 * Math.log(100 / level);

describe("passing a level", () => {
  it("is found on the curve, not between its samples", () => {
    for (const level of [99, 60.6, 50, 12.3])
      expect(firstReached(curve, level, "down")).toBeCloseTo(passes(level), 7);
  });

  it("never reached is null, reached from the start is the start", () => {
    expect(firstReached(curve, 0.1, "down")).toBeNull();
    expect(firstReached(curve, 100, "down")).toBe(0);
    expect(firstReached(curve, 50, "up")).toBe(0);
  });

  it("two levels passed between the same two samples are told apart (passages were once cut to the sample)", () => {
    const first = firstReached(curve, 95, "down")!;
    expect(firstReached(curve, 70, "down", first)).toBeCloseTo(passes(70), 7);
  });

  it("a part that starts below a level has fallen to it only after it was above", () => {
    const hump = {
      times: [0, 1, 2, 3],
      values: [20, 80, 60, 20],
      at: (t: number) => (t < 1 ? 20 + 60 * t : t < 2 ? 100 - 20 * t : 140 - 40 * t),
    };
    expect(firstReached(hump, 50, "down")).toBe(0);
    expect(firstComing(hump, 50, "down")).toBeCloseTo(2.25, 8);
    expect(firstComing(hump, 50, "up")).toBeCloseTo(0.5, 8);
    expect(firstComing(hump, 90, "down")).toBe(0);
    expect(firstComing(hump, 90, "up")).toBeNull();
  });

  it("time spent beyond a level counts whole and partial intervals", () => {
    expect(timeReached(curve, 50, "down")).toBeCloseTo(60 - passes(50), 7);
    expect(timeReached(curve, 50, "up")).toBeCloseTo(passes(50), 7);
  });
});
