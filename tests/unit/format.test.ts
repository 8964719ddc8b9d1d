import { describe, expect, test } from "vitest";
import {
  formatDifference,
  formatDoubted,
  formatDuration,
  formatFixed,
  formatPercent,
  formatRange,
  formatTemperature,
} from "../../src/case/format.ts";

/** Thin spaces told as plain ones, so that the expected texts can be read. */
const plain = (text: string): string => text.replaceAll("\u2009", " ").replaceAll("\u2212", "-");

describe("durations", () => {
  test("seconds, then minutes and seconds, then hours and minutes", () => {
    expect(plain(formatDuration(115.2))).toBe("115.2 s");
    expect(plain(formatDuration(725))).toBe("12 min 05 s");
    expect(plain(formatDuration(13560))).toBe("3 h 46 min");
    expect(plain(formatDuration(-13560))).toBe("-3 h 46 min");
  });
  test("ranges in one unit", () => {
    expect(plain(formatRange(53 * 60, 64 * 60, "time"))).toBe("53 to 64 min");
    expect(plain(formatRange(7, 19, "time"))).toBe("7 to 19 s");
    expect(plain(formatRange(60, 60, "time"))).toBe("60 s");
    expect(plain(formatRange(13560, 20000, "time"))).toBe("3 h 46 min to 5 h 33 min");
  });
});

describe("temperatures and differences", () => {
  test("with their units in both systems; a difference is not a temperature", () => {
    expect(plain(formatTemperature(503.7))).toBe("503.7 °C");
    expect(plain(formatTemperature(100, "us"))).toBe("212 °F");
    expect(plain(formatDifference(10))).toBe("10 K");
    expect(plain(formatDifference(10, "us"))).toBe("18 °F");
    expect(plain(formatRange(7, 19, "temperatureDifference"))).toBe("7 to 19 K");
  });
  test("percent with two figures", () => {
    expect(plain(formatPercent(0.0071))).toBe("0.71 %");
    expect(plain(formatPercent(0.264))).toBe("26 %");
  });
});

describe("doubt", () => {
  const told = (...given: Parameters<typeof formatDoubted>) => {
    const { value, doubt } = formatDoubted(...given);
    return plain(`${value} ${doubt}`);
  };
  test("to one figure, and the value to its last digit, zeros kept", () => {
    expect(told(503.688, 0.034, "temperature")).toBe("503.69 °C ±0.03 °C");
    expect(told(5.0003, 0.02, "temperatureDifference")).toBe("5.00 K ±0.02 K");
    expect(told(1234.5, 18, "temperature")).toBe("1230 °C ±20 °C");
    expect(told(115.168, 0.26, "time")).toBe("115.2 s ±0.3 s");
    expect(told(-0.001, 0.1, "temperatureDifference")).toBe("0.0 K ±0.1 K");
    expect(told(100, 1, "temperature", "us")).toBe("212 °F ±2 °F");
    expect(told(0.96, 0.096, "temperatureDifference")).toBe("1.0 K ±0.1 K");
  });
  test("long durations keep to whole minutes", () => {
    expect(told(13560, 20, "time")).toBe("3 h 46 min ±1 min");
    expect(told(13560, 700, "time")).toBe("3 h 46 min ±10 min");
    expect(told(725, 0.4, "time")).toBe("12 min 05 s ±1 s");
  });
  test("no doubt known: nothing is claimed", () => {
    expect(told(503.688, null, "temperature")).toBe("503.7 °C ");
  });
  test("grouping from 10 000", () => {
    expect(plain(formatFixed(1234567.891, -1))).toBe("1 234 567.9");
    expect(plain(formatFixed(-9999, 0))).toBe("-9999");
  });
});
