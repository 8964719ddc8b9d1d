import type { CaseDocument } from "../../../src/case/types.ts";

/** A tapered ingot with a crown; invented data. */
export function ingot(): CaseDocument {
  return {
    corelag: 1,
    title: "Tapered ingot",
    part: {
      regions: [
        {
          name: "ingot",
          material: "steel",
          outline: [
            { at: [0, 0], side: "base" },
            { at: ["200 mm", 0], side: "wall" },
            { at: [0.16, 0.9], side: "crown", through: [0.085, 0.93] },
            { at: [0, 0.94], side: "axis" },
          ],
        },
      ],
    },
    materials: { steel: { density: 7800, conductivity: 30, heatCapacity: 640 } },
    start: 1100,
    stages: [
      { name: "still air", lasts: 3600, ambient: 25, sides: { "*": { film: 45 }, base: "insulated" } },
    ],
    probes: [{ name: "core", at: [0, 0.45] }],
    questions: [{ ask: "when", where: "core", reaches: 80 }],
  };
}
