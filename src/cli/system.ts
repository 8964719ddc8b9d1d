/** corelag system: the assembled semi-discrete system at the start state, for any linear-algebra library. */
import { mkdirSync, writeFileSync } from "node:fs";
import path from "node:path";
import { LIBRARY } from "../../presets/materials/index.ts";
import { denseArray, symmetricMatrix } from "../report/matrixMarket.ts";
import { systemOfCase } from "../solveCase.ts";
import { EXIT } from "./exit.ts";
import { tell, tellProblems } from "./terminal.ts";

export interface SystemFlags {
  readonly nodes: number;
  readonly out: string;
  readonly element?: 3 | 6;
}

/** @returns the exit code */
export function writeSystem(text: string, flags: SystemFlags): number {
  const outcome = systemOfCase(text, LIBRARY, flags.nodes, flags.element ?? 3);
  if ("problems" in outcome) {
    tellProblems(outcome.problems);
    return EXIT.wrong;
  }
  const { pattern, capacity, conductance, load, start, nodes } = outcome;
  const columns = [0, 1].map((offset) =>
    Array.from({ length: start.length }, (_, i) => nodes[2 * i + offset]!),
  );
  const files = {
    "capacity.mtx": symmetricMatrix(pattern, capacity, "capacity matrix [J/K], stage 1"),
    "conduction.mtx": symmetricMatrix(pattern, conductance, "conduction plus film terms [W/K], stage 1"),
    "load.mtx": denseArray(
      [load],
      "load at the start of stage 1 [W]: films times surroundings, fluxes, sources",
    ),
    "start.mtx": denseArray([start], "start temperatures [degC]"),
    "nodes.mtx": denseArray(columns, "r, z of each unknown [m]"),
  };
  try {
    mkdirSync(flags.out, { recursive: true });
    for (const [name, content] of Object.entries(files)) writeFileSync(path.join(flags.out, name), content);
  } catch (error) {
    tell(
      `--out ${flags.out}: cannot be written (${(error as NodeJS.ErrnoException).code ?? String(error)}); choose another folder`,
    );
    return EXIT.wrong;
  }
  tell(`${start.length} unknowns written to ${flags.out}`);
  return EXIT.solved;
}
