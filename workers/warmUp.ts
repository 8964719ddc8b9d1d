/** A small case that is solved once when the worker starts, so that compilers have seen the whole way. */
import type { CaseDocument } from "../src/case/types.ts";

export const warmUpCase: CaseDocument = {
  corelag: 1,
  title: "Warm-up (invented)",
  part: {
    regions: [
      {
        name: "disc",
        material: "steel",
        outline: [
          { at: [0, 0], side: "base" },
          { at: [0.05, 0], side: "rim", through: [0.055, 0.01] },
          { at: [0.05, 0.02], side: "top" },
          { at: [0, 0.02], side: "axis" },
        ],
      },
    ],
  },
  materials: { steel: { density: 7800, conductivity: 40, heatCapacity: 500 } },
  start: 100,
  stages: [{ lasts: 600, ambient: 20, sides: { "*": { film: 50 } } }],
  questions: [{ ask: "when", where: "every-point", reaches: 60 }, { ask: "spread" }],
};
