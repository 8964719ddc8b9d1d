/**
 * A case and a result for tests of the page alone. The curves are sums of exponentials made up to have the shape of a
 * heated and cooled ingot; no solver was asked and nothing here is a reference value.
 */
import type { CaseDocument, Question } from "../../src/case/types.ts";
import type { Answer, CaseResult, History } from "../../src/run/result.ts";
import type { Comparison } from "../../src/compare/types.ts";

const HOUR = 3600;

export function fixtureDocument(): CaseDocument {
  return {
    corelag: 1,
    title: "Tapered ingot, heated and air cooled",
    part: {
      regions: [
        {
          name: "ingot",
          material: "steel",
          outline: [
            { at: [0, 0], side: "base" },
            { at: ["200 mm", 0], side: "wall" },
            { at: ["160 mm", "900 mm"], side: "top", through: ["85 mm", "930 mm"] },
            { at: [0, "940 mm"], side: "axis" },
          ],
        },
      ],
    },
    materials: { steel: { density: 7800, conductivity: 29, heatCapacity: 640, source: "invented" } },
    start: "20 degC",
    stages: [
      {
        name: "Furnace",
        lasts: "226 min",
        ambient: [
          ["0 s", "150 degC"],
          ["150 min", "1150 degC"],
        ],
        sides: { "*": { film: 150 } },
      },
      { name: "Carry", lasts: "6 min", ambient: "25 degC", sides: { "*": { film: 60 } } },
      {
        name: "Still air",
        until: { where: "every-point", reaches: "300 degC" },
        atMost: "10 h",
        ambient: "25 degC",
        sides: { "*": { film: 60 } },
      },
    ],
    probes: [{ name: "shoulder", at: ["150 mm", "860 mm"] }],
    questions: [
      { ask: "when", where: "every-point", reaches: "1120 degC" },
      { ask: "when", where: "every-point", reaches: "300 degC", going: "down" },
      { ask: "spread" },
    ],
  };
}

/** Made-up response of a part that lags its surroundings by `lag` and then `tail` hours. */
function follow(hours: number, lag: number, weight: number): number {
  const stages = [
    { from: 0, to: 3.767, start: 20 },
    { from: 3.767, to: 8, start: 0 },
  ];
  const heated = (t: number): number => {
    const ramp = (s: number): number => 150 + 1000 * Math.min(1, s / 2.5);
    let value = 20;
    const dt = 0.01;
    for (let s = 0; s < t; s += dt) value += (dt / lag) * (ramp(s) - value);
    return value;
  };
  const end = stages[0]!.to;
  if (hours <= end) return heated(hours);
  const cooled = hours - end;
  const top = heated(end);
  const quick = weight * Math.exp(-cooled / 0.12);
  return 25 + (top - 25) * ((1 - weight) * Math.exp(-cooled / 2.9) + quick);
}

function sample(lag: number, weight: number, time: Float64Array): Float64Array {
  return time.map((t) => follow(t / HOUR, lag, weight));
}

function history(end: number): History {
  const time = Float64Array.from({ length: 200 }, (_, i) => (i / 199) ** 1.3 * end);
  const hottest = sample(0.42, 0.02, time);
  const coldest = sample(0.75, 0.32, time);
  const swap = time.findIndex((t) => t > 3.9 * HOUR);
  const core = Float64Array.from(time, (_, i) => (i < swap ? coldest[i]! : hottest[i]!));
  return {
    time,
    coldest: Float64Array.from(time, (_, i) => Math.min(coldest[i]!, hottest[i]!)),
    hottest: Float64Array.from(time, (_, i) => Math.max(coldest[i]!, hottest[i]!)),
    mean: sample(0.6, 0.14, time),
    surfaceMean: sample(0.5, 0.24, time),
    heat: time.map((t) => 4e8 * Math.sin((Math.PI * t) / end)),
    probes: { shoulder: sample(0.46, 0.29, time) },
    core: { place: [0, 0.307], temperature: core },
  };
}

const early = (seconds: number, kelvin: number): Comparison => ({
  difference: seconds,
  kelvin,
  seconds,
  side: seconds < -600 ? "unsafe" : "agrees",
});

export function fixtureAnswers(questions: readonly Question[], end: number): Answer[] {
  return questions.map((question, i): Answer => {
    const rest = { numericalUncertainty: 40 + 30 * i, remark: "" };
    if (question.ask === "spread")
      return {
        question,
        value: 377,
        unit: "K",
        at: 7860,
        place: null,
        ...rest,
        numericalUncertainty: 1.6,
        lumped: null,
        series: 248,
        comparison: {
          lumped: null,
          series: { difference: -129, kelvin: -129, seconds: null, side: "unsafe" },
        },
      };
    const value = i === 0 ? 13_538 : end;
    return {
      question,
      value,
      unit: "s",
      at: value,
      place: [0, i === 0 ? 0.307 : 0.121],
      ...rest,
      lumped: value - 3180 - 660 * i,
      series: value - 30 - 270 * i,
      comparison: { lumped: early(-3180 - 660 * i, 41), series: early(-30 - 270 * i, 2) },
    };
  });
}

const SOLVED: readonly Question[] = [
  { ask: "when", where: "every-point", reaches: 1120 },
  { ask: "when", where: "every-point", reaches: 300, going: "down" },
  { ask: "spread" },
];

export function fixtureResult(): CaseResult {
  const end = 7.93 * HOUR;
  const curves = history(end);
  const thinned = Float64Array.from({ length: 80 }, (_, i) => (i / 79) * end);
  return {
    title: "Tapered ingot, heated and air cooled",
    mesh: {
      nodes: 8211,
      triangles: 4020,
      minAngleDeg: 29.3,
      meanQuality: 0.94,
      maxAngleDeg: 112,
      angleHistogram: [0, 0, 0, 0, 0, 0, 0, 0, 0, 2, 5, 10, 30, 90, 300, 700, 900, 1000, 700, 283],
      worstPlace: [0.1, 0.5],
      volume: 0.0937,
      exposedArea: 1.23,
      meshVolume: 0.09369,
      meshExposedArea: 1.2299,
    },
    section: {
      nodes: Float64Array.of(0, 0, 0.2, 0, 0.16, 0.9, 0, 0.94),
      triangles: Uint32Array.of(0, 1, 2, 0, 2, 3),
      triangleRegion: Uint16Array.of(0, 0),
      elements: Uint32Array.of(0, 1, 2, 0, 2, 3),
    },
    frames: {
      times: Float64Array.of(0, end),
      temperatures: [new Float32Array(4).fill(20), new Float32Array(4).fill(280)],
    },
    run: {
      element: 6,
      scheme: "krylov",
      steps: 128,
      rejectedSteps: 0,
      factorizations: 3,
      solves: 92,
      linearIterations: 92,
      timeError: 0.02,
      seconds: 1.4,
      energyImbalance: 2.1e-8,
      heatStored: 1.21e8,
      heatThroughSides: 1.21e8,
      heatFromSources: 0,
      levels: [2080, 8211, 32_621],
      temperatureUncertainty: 0.4,
    },
    stages: [
      { name: "Furnace", began: 0, ended: 13_560 },
      { name: "Carry", began: 13_560, ended: 13_920 },
      { name: "Still air", began: 13_920, ended: end },
    ],
    history: curves,
    estimates: {
      lumped: {
        length: 0.0761,
        biot: 0.42,
        timeConstant: 9000,
        history: { time: thinned, temperature: sample(0.48, 0.3, thinned) },
      },
      series: {
        shape: "cylinder",
        sizes: { radius: 0.19 },
        biot: 1.05,
        fourier: 4.2,
        history: {
          time: thinned,
          core: sample(0.73, 0.03, thinned),
          mean: sample(0.6, 0.14, thinned),
          surface: sample(0.5, 0.24, thinned),
        },
        oneTermCore: sample(0.74, 0.03, thinned),
        remark: "A long round of the part's own V/A.",
      },
      remarks: [],
    },
    answers: fixtureAnswers(SOLVED, end),
    warnings: [],
    quality: "settled",
  };
}
