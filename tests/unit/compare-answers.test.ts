/** Questions answered by estimates, compared with the field, and judged. */
import { describe, expect, test } from "vitest";
import type { Question } from "../../src/case/types.ts";
import {
  answerFromEstimate,
  historyOfLumped,
  historyOfSeries,
  readingOfEstimate,
} from "../../src/compare/answerFromEstimate.ts";
import type { EstimateHistory, PartContext } from "../../src/compare/answerFromEstimate.ts";
import { answerByEstimates, compareAnswer } from "../../src/compare/compareAnswer.ts";
import { curveThrough, firstReached, readCurve, slopeOfCurve } from "../../src/compare/estimateCurve.ts";
import { estimateCase } from "../../src/compare/estimateCase.ts";
import type { CaseFacts } from "../../src/compare/facts.ts";
import { estimateInstants } from "../../src/compare/instants.ts";
import type { Comparison } from "../../src/compare/types.ts";
import { verdict } from "../../src/compare/verdict.ts";
import type { ComparedAnswer } from "../../src/compare/verdict.ts";

const TAU = 1000;
const END = 8000;
const stages = [{ name: "air", began: 0, ended: END }];
const context: PartContext = { stages, heatCapacity: 5000, coreProbes: new Set(["middle"]) };
const time = estimateInstants(
  [{ name: "air", duration: END, sides: [], source: 0 }],
  Float64Array.of(0, END),
);
/** 20 + 480 exp(-(t - delay) / tau), held at 500 before the delay. */
const cooling = (delay: number) => time.map((t) => 20 + 480 * Math.exp(-Math.max(0, t - delay) / TAU));
const instantOf = (level: number, delay = 0) => delay + TAU * Math.log(480 / (level - 20));
const lumped = historyOfLumped({
  length: 1,
  biot: 1,
  timeConstant: TAU,
  history: { time, temperature: cooling(0) },
});
const series: EstimateHistory = {
  time,
  core: cooling(300),
  mean: cooling(100),
  surface: cooling(0),
  edge: cooling(0),
  uniform: false,
};
const ask = (question: Question, history: EstimateHistory = series) =>
  answerFromEstimate(question, history, context);

describe("curves of an estimate", () => {
  test("between instants they follow an exponential to a millionth of the span", () => {
    const curve = curveThrough(time, cooling(0), stages);
    for (let t = 3; t < END; t += 37) {
      expect(Math.abs(readCurve(curve, t) - (20 + 480 * Math.exp(-t / TAU)))).toBeLessThan(5e-4);
      expect(Math.abs(slopeOfCurve(curve, t) / (-0.48 * Math.exp(-t / TAU)) - 1)).toBeLessThan(1e-2);
    }
  });
  test("a bend at the joint of two stages stays a bend", () => {
    const joint = [
      { name: "up", began: 0, ended: 10 },
      { name: "down", began: 10, ended: 20 },
    ];
    const curve = curveThrough(Float64Array.of(0, 5, 10, 15, 20), Float64Array.of(0, 5, 10, 5, 0), joint);
    for (const t of [1, 4, 7, 9.9, 10, 10.1, 13, 18])
      expect(readCurve(curve, t)).toBeCloseTo(10 - Math.abs(10 - t), 12);
    expect(firstReached(curve, 7, "up")).toBeCloseTo(7, 9);
    expect(firstReached(curve, 7, "down", 10)).toBeCloseTo(13, 9);
  });
});

describe("answers of an estimate", () => {
  test("when: every point waits for the core, any point for the edge; mean and surface by their curves", () => {
    const when = (where: string) => ask({ ask: "when", where, reaches: 80 });
    expect(when("every-point")).toBeCloseTo(instantOf(80, 300), 1);
    expect(when("hottest")).toBeCloseTo(instantOf(80, 300), 1);
    expect(when("any-point")).toBeCloseTo(instantOf(80), 1);
    expect(when("coldest")).toBeCloseTo(instantOf(80), 1);
    expect(when("mean")).toBeCloseTo(instantOf(80, 100), 1);
    expect(when("surface-mean")).toBeCloseTo(instantOf(80), 1);
  });
  test("when: there already, or never", () => {
    expect(ask({ ask: "when", where: "mean", reaches: 500 })).toBe(0);
    expect(ask({ ask: "when", where: "mean", reaches: 600, going: "down" })).toBe(0);
    expect(ask({ ask: "when", where: "mean", reaches: 20 })).toBeNull();
    expect(ask({ ask: "when", where: "mean", reaches: 900 })).toBeNull();
  });
  test("probes: one temperature answers for all, a series for a probe at the core only", () => {
    expect(ask({ ask: "when", where: "middle", reaches: 80 })).toBeCloseTo(instantOf(80, 300), 1);
    expect(ask({ ask: "when", where: "rim", reaches: 80 })).toBeNull();
    expect(ask({ ask: "when", where: "rim", reaches: 80 }, lumped)).toBeCloseTo(instantOf(80), 1);
  });
  test("reading, also beyond the run", () => {
    expect(ask({ ask: "reading", where: "mean", at: 1100 })).toBeCloseTo(20 + 480 / Math.E, 3);
    expect(ask({ ask: "reading", where: "every-point", at: 1300 })).toBeCloseTo(20 + 480 / Math.E, 3);
    expect(ask({ ask: "reading", where: "mean", at: END + 1 })).toBeNull();
  });
  test("spread: core against edge; none for one temperature; by stage", () => {
    // the made-up curves have a corner where the spread is largest, which falls between two instants
    expect(Math.abs(ask({ ask: "spread" })! - 480 * (1 - Math.exp(-0.3)))).toBeLessThan(3);
    expect(ask({ ask: "spread" }, lumped)).toBe(0);
    expect(ask({ ask: "spread", stage: "air" })).toBe(ask({ ask: "spread" }));
    expect(ask({ ask: "spread", stage: "oil" })).toBeNull();
  });
  test("passage and rate", () => {
    const passage = ask({ ask: "passage", where: "mean", from: 400, to: 250 });
    expect(passage).toBeCloseTo(instantOf(250) - instantOf(400), 1);
    expect(ask({ ask: "passage", where: "mean", from: 400, to: 10 })).toBeNull();
    expect(ask({ ask: "rate", where: "mean", at: 220 })! / (-200 / TAU)).toBeCloseTo(1, 2);
  });
  test("time at temperature: every point while the coldest is there, any point while the hottest is", () => {
    expect(ask({ ask: "held-above", where: "every-point", level: 200 })).toBeCloseTo(instantOf(200), 1);
    expect(ask({ ask: "held-above", where: "any-point", level: 200 })).toBeCloseTo(instantOf(200, 300), 1);
    expect(ask({ ask: "held-below", where: "every-point", level: 200 })).toBeCloseTo(
      END - instantOf(200, 300),
      1,
    );
  });
  test("dose: minutes at the reference temperature", () => {
    const flat = historyOfLumped({
      length: 1,
      biot: 1,
      timeConstant: 1,
      history: { time, temperature: time.map(() => 60) },
    });
    expect(ask({ ask: "dose", where: "mean", reference: 60, z: 7 }, flat)).toBeCloseTo(END / 60, 9);
    expect(ask({ ask: "dose", where: "mean", reference: 67, z: 7 }, flat)).toBeCloseTo(END / 600, 9);
  });
  test("heat: taken up since the start, negative when given off", () => {
    expect(ask({ ask: "heat" })).toBeCloseTo(5000 * (series.mean.at(-1)! - 500), 6);
    expect(ask({ ask: "heat", until: 1100 })! / (5000 * (480 / Math.E - 480))).toBeCloseTo(1, 6);
    expect(ask({ ask: "heat", until: END + 1 })).toBeNull();
  });
  test("the estimate's temperature at an instant, for the difference in K", () => {
    const question: Question = { ask: "when", where: "every-point", reaches: 80 };
    expect(readingOfEstimate(question, lumped, instantOf(80, 300), context)).toBeCloseTo(
      20 + 60 * Math.exp(-0.3),
      3,
    );
    expect(readingOfEstimate({ ask: "heat" }, lumped, 5, context)).toBeNull();
  });
});

describe("comparison", () => {
  const field = (value: number, slope = -0.1, numericalUncertainty: number | null = null) => ({
    value,
    at: value,
    slope,
    numericalUncertainty,
  });
  const side = (question: Question, value: number, estimate: number, slope = -0.1) =>
    compareAnswer(question, field(value, slope), estimate, null, 500)!.side;
  const when: Question = { ask: "when", where: "mean", reaches: 80 };
  const reading: Question = { ask: "reading", where: "mean", at: 1 };

  test("when: early is unsafe, late is safe; K from the estimate's own curve", () => {
    expect(compareAnswer(when, field(1000), 900, 71, 500)).toEqual({
      difference: -100,
      kelvin: -9,
      seconds: -100,
      share: 0.1,
      side: "unsafe",
    });
    expect(side(when, 1000, 1100)).toBe("safe");
  });
  test("half a percent, or the numerical uncertainty where that is larger, is agreement", () => {
    expect(side(when, 1000, 996)).toBe("agrees");
    expect(side(when, 1000, 994)).toBe("unsafe");
    expect(compareAnswer(when, field(1000, -0.1, 20), 985, null, 500)!.side).toBe("agrees");
    expect(side(reading, 10, 12.4)).toBe("agrees");
    expect(side(reading, 10, 12.6)).toBe("safe");
  });
  test("reading: further on than the part is unsafe, whichever way it goes", () => {
    expect(side(reading, 100, 80)).toBe("unsafe");
    expect(side(reading, 100, 120)).toBe("safe");
    expect(side(reading, 100, 120, 0.1)).toBe("unsafe");
    expect(side(reading, 100, 120, 0)).toBe("unsafe");
    // 20 K colder on a curve that falls by 0.1 K/s: 200 s early
    const late = { ...field(100), at: 1000 };
    expect(compareAnswer(reading, late, 80, null, 500)).toMatchObject({ kelvin: -20, seconds: -200 });
  });
  test("reading: where the part hardly moves, a difference is no time (6.6 K were once told as 7 h early)", () => {
    const still = { ...field(850, -2.4e-4), at: 0.5 };
    expect(compareAnswer(reading, still, 843.4, null, 790)).toMatchObject({ seconds: null });
  });
  test("spread, passage, rate, time at temperature, dose and heat", () => {
    expect(side({ ask: "spread" }, 90, 0)).toBe("unsafe");
    expect(side({ ask: "spread" }, 90, 99)).toBe("safe");
    expect(side({ ask: "passage", where: "mean", from: 800, to: 500 }, 60, 40)).toBe("unsafe");
    expect(side({ ask: "rate", where: "mean", at: 700 }, -10, -20)).toBe("unsafe");
    expect(side({ ask: "rate", where: "mean", at: 700 }, -10, -5)).toBe("safe");
    expect(side({ ask: "held-above", where: "mean", level: 60 }, 100, 200)).toBe("unsafe");
    expect(side({ ask: "dose", where: "mean", reference: 60, z: 7 }, 100, 50)).toBe("safe");
    expect(side({ ask: "heat" }, -1e6, -1.1e6)).toBe("unsafe");
  });
  test("no estimate or no answer: no comparison", () => {
    expect(compareAnswer(when, field(1000), null, null, 500)).toBeNull();
    expect(compareAnswer(when, { ...field(1000), value: null }, 900, null, 500)).toBeNull();
  });
  test("both estimates at once, from the estimates of a case", () => {
    const treatment = { kind: "film", film: 30, ambient: 20 } as const;
    const facts: CaseFacts = {
      volume: (4 / 3) * Math.PI * 1e-3,
      start: 800,
      conductivity: 2,
      volumetricHeatCapacity: 4e6,
      outerRadius: 0.1,
      boreRadius: 0,
      height: 0.2,
      stages: [
        {
          name: "air",
          duration: 40000,
          source: 0,
          sides: [{ name: "skin", facing: "askew", area: 0.04 * Math.PI, treatment }],
        },
      ],
      times: Float64Array.of(0, 40000),
    };
    const estimates = estimateCase(facts);
    const own = {
      stages: [{ name: "air", began: 0, ended: 40000 }],
      heatCapacity: 4e6 * facts.volume,
      coreProbes: new Set<string>(),
      span: 780,
    };
    const exact = answerFromEstimate(
      { ask: "when", where: "every-point", reaches: 80 },
      historyOfSeries(estimates.series!),
      own,
    )!;
    const got = answerByEstimates(
      { ask: "when", where: "every-point", reaches: 80 },
      field(exact),
      estimates,
      own,
    );
    expect(got.series).toBe(exact);
    expect(got.comparison.series!.side).toBe("agrees");
    expect(got.comparison.series!.kelvin).toBeCloseTo(0, 6);
    // Bi = 1.5: one temperature cools too fast
    expect(got.lumped!).toBeLessThan(0.8 * exact);
    expect(got.comparison.lumped!.side).toBe("unsafe");
    expect(got.comparison.lumped!.kelvin!).toBeLessThan(-10);
    const none = answerByEstimates(
      { ask: "spread" },
      field(100),
      { lumped: null, series: null, remarks: [] },
      own,
    );
    expect(none).toEqual({ lumped: null, series: null, comparison: { lumped: null, series: null } });
  });
});

describe("verdict", () => {
  const plain = (text: string) => text.replaceAll("\u2009", " ");
  const when: Question = { ask: "when", where: "every-point", reaches: 80 };
  const answered = (
    question: Question,
    value: number,
    estimate: number,
    other: number | null = null,
  ): ComparedAnswer => {
    const beside = (given: number | null): Comparison | null =>
      compareAnswer(
        question,
        { value, at: value, slope: -0.1, numericalUncertainty: null },
        given,
        null,
        500,
      );
    return { question, value, comparison: { lumped: beside(estimate), series: beside(other) } };
  };

  test("early beyond the tolerance: do not use it, and by how much", () => {
    const got = verdict([answered(when, 13560, 13560 - 53 * 60), answered(when, 20000, 20000 - 64 * 60)]);
    expect(got.tone).toBe("bad");
    expect(plain(got.headline)).toBe(
      "Do not use the quick estimate here. It comes 53 to 64 min early, on the unsafe side.",
    );
    expect(got.worst).toBeCloseTo(0.2345, 3);
  });
  test("a hub ring, 0.7 % out: it will do", () => {
    const got = verdict([answered(when, 49.3108 * 60, 48.9602 * 60)]);
    expect(got.tone).toBe("good");
    expect(plain(got.headline)).toBe(
      "The quick estimate will do for this part: 0.71 % out, early rather than late.",
    );
  });
  test("late beyond the tolerance: only as a bound", () => {
    const got = verdict([answered(when, 1000, 1200)]);
    expect(got.tone).toBe("care");
    expect(plain(got.headline)).toBe(
      "Use the quick estimate only as a bound. It comes 200 s late, on the safe side.",
    );
  });
  test("one unsafe answer among many outweighs them", () => {
    expect(
      verdict([answered(when, 1000, 1000), answered(when, 1000, 1300), answered(when, 1000, 900)]).tone,
    ).toBe("bad");
  });
  test("the tolerance is the user's", () => {
    const answers = [answered(when, 1000, 970)];
    expect(verdict(answers).tone).toBe("good");
    expect(verdict(answers, 0.02).tone).toBe("bad");
  });
  test("agreement within a large numerical uncertainty is not a miss", () => {
    const comparison = compareAnswer(
      when,
      { value: 100, at: 100, slope: -1, numericalUncertainty: 20 },
      90,
      null,
      500,
    );
    expect(
      verdict([{ question: when, value: 100, comparison: { lumped: comparison, series: null } }]).tone,
    ).toBe("good");
  });
  test("temperatures and spreads are measured against the span", () => {
    expect(verdict([answered({ ask: "spread" }, 3, 0)]).tone).toBe("good");
    const got = verdict([answered({ ask: "spread" }, 90, 0)]);
    expect(plain(got.headline)).toContain("It misses 90 K between the hottest and the coldest place");
    const ahead = verdict([answered({ ask: "reading", where: "mean", at: 60 }, 503.7, 440)]);
    expect(plain(ahead.headline)).toContain("It reads 63.7 K ahead of the part");
  });
  test("each kind of question has its words", () => {
    const words = (question: Question, value: number, estimate: number) =>
      plain(verdict([answered(question, value, estimate)]).headline);
    expect(words({ ask: "passage", where: "mean", from: 800, to: 500 }, 60, 40)).toContain(
      "It takes 20 s too little for the passage",
    );
    expect(words({ ask: "rate", where: "mean", at: 700 }, -10, -20)).toContain("It is 100 % too fast");
    expect(words({ ask: "held-above", where: "mean", level: 60 }, 100, 200)).toContain(
      "It promises 100 s too much at temperature",
    );
    expect(words({ ask: "dose", where: "mean", reference: 60, z: 7 }, 100, 150)).toContain(
      "It promises a dose 50 % too large",
    );
    expect(words({ ask: "heat" }, -1e6, -1.2e6)).toContain("It is 20 % out");
  });
  test("the series is told beside it", () => {
    expect(verdict([answered(when, 1000, 900, 1001)]).detail).toContain("The series agrees.");
    expect(plain(verdict([answered(when, 1000, 900, 980)]).detail)).toContain(
      "The series is 2 % out at most, on the unsafe side.",
    );
  });
  test("nothing to compare", () => {
    const none: ComparedAnswer = { question: when, value: 10, comparison: { lumped: null, series: null } };
    expect(verdict([none])).toMatchObject({ tone: "care", worst: null });
    expect(verdict([]).headline).toContain("no quick estimate");
  });
});
