import type { CaseDocument } from "../../src/case/types.ts";

/** A small case without a fault, to spoil in one place. */
export function plain(): CaseDocument {
  return {
    corelag: 1,
    part: {
      regions: [
        {
          name: "round",
          material: "m",
          outline: [
            { at: [0, 0], side: "base" },
            { at: [0.1, 0], side: "wall" },
            { at: [0.1, 0.3], side: "top" },
            { at: [0, 0.3], side: "axis" },
          ],
        },
      ],
    },
    materials: { m: { density: 7800, conductivity: 30, heatCapacity: 600 } },
    start: 500,
    stages: [{ lasts: 3600, ambient: 20, sides: { "*": { film: 50 } } }],
  };
}
