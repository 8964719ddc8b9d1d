import { describe, expect, it } from "vitest";
import { readCase } from "../../../src/case/readCase.ts";
import { beginCase, firstLimit } from "../../../src/editor/begin.ts";
import {
  addProbe,
  conditionOf,
  dropCondition,
  probeIsAsked,
  removeProbe,
  renameProbe,
  renameSide,
  setFilmValue,
} from "../../../src/editor/conditions.ts";
import { siOf, writtenLike } from "../../../src/editor/quantities.ts";
import { shapeOutline, SHAPES } from "../../../src/case/shapes.ts";
import { LIBRARY } from "../../../presets/materials/index.ts";
import { ingot } from "./ingot.ts";

describe("conditions", () => {
  it("a value typed at one side is that side's own; the rest of the film is taken over", () => {
    const document = ingot();
    setFilmValue(document, 0, "wall", "film", "60 W/(m2 K)");
    expect(conditionOf(document.stages[0], "wall")).toEqual({
      condition: { film: "60 W/(m2 K)" },
      own: true,
    });
    expect(conditionOf(document.stages[0], "crown")).toEqual({ condition: { film: 45 }, own: false });
    dropCondition(document, 0, "wall");
    expect(conditionOf(document.stages[0], "wall")?.own).toBe(false);
  });

  it("a renamed side takes its condition along in every stage", () => {
    const document = ingot();
    renameSide(document, 0, "base", "foot");
    expect(document.part.regions[0]!.outline[0]!.side).toBe("foot");
    expect(document.stages[0]!.sides).toEqual({ "*": { film: 45 }, foot: "insulated" });
  });
});

describe("probes", () => {
  it("a renamed probe is renamed where it is asked for", () => {
    const document = ingot();
    renameProbe(document, 0, "heart");
    expect(document.questions![0]).toMatchObject({ where: "heart" });
  });

  it("a probe that is asked for stays, another goes", () => {
    const document = ingot();
    expect(addProbe(document, [0.05, 0.2])).toBe(1);
    expect(document.probes![1]).toEqual({ name: "probe 2", at: [0.05, 0.2] });
    expect(probeIsAsked(document, 0)).toBe(true);
    removeProbe(document, 0);
    removeProbe(document, 1);
    expect(document.probes!.map((probe) => probe.name)).toEqual(["core"]);
  });
});

describe("quantities that are written back", () => {
  it.each([
    ["120 mm", 0.178, "length", "178 mm"],
    ["4.5 in", 0.127, "length", "5 in"],
    [0.12, 0.1 + 0.2, "length", 0.3],
    ["450 degF", 260, "temperature", "500 degF"],
    ["4 ft 2 in", 1, "length", 1],
    ["nonsense", 0.2, "length", 0.2],
  ] as const)("%s becomes %s as %s: %s", (old, value, dimension, written) => {
    const result = writtenLike(old, value, dimension);
    expect(result).toBe(written);
    expect(siOf(result, dimension)).toBeCloseTo(value, 9);
  });
});

describe("a case to begin with", () => {
  it.each(SHAPES.map((shape) => shape.kind))("from the shape %s can be read", (kind) => {
    const made = shapeOutline(kind);
    if (!("outline" in made)) throw new Error("standard sizes are at fault");
    const document = beginCase({
      name: kind,
      outline: made.outline,
      material: "carbon-steel",
      start: 850,
      ambient: 20,
      film: 40,
      reaches: firstLimit(850, 20),
    });
    expect(readCase(document, LIBRARY)).toHaveProperty("case");
  });

  it("asks for a round temperature between start and surroundings", () => {
    expect(firstLimit(850, 20)).toBe(60);
    expect(firstLimit(20, 200)).toBe(191);
    expect(firstLimit(25, 5)).toBe(6);
  });
});
