/** The solver's worker: thin. It knows when to pause, when to give way to a newer edit, and how results cross. */
import { expose } from "comlink";
import { LIBRARY } from "../presets/materials/index.ts";
import { KeptWork, solveCase } from "../src/solveCase.ts";
import type { RunContext } from "../src/solveCase.ts";
import type { SolveOutcome } from "../src/run/result.ts";
import { warmUpCase } from "./warmUp.ts";
import type { SolveEvent, Solver, SolveRequest } from "./protocol.ts";

/** Longest stretch of work without letting a message in [ms], and shortest time between two progress messages. */
const STRETCH = 16;
const PROGRESS_EVERY = 80;

/** Meshes, factors and bases of the edits before: most edits leave most of them standing. */
const kept = new KeptWork();
let newest = -1;
const ended = new Set<number>();

/** A pause that messages can get through: posting to oneself is not enough in every host, a timer is. */
const rest = (): Promise<void> => new Promise((resolve) => setTimeout(resolve, 0));

function contextFor(job: number, onEvent: (event: SolveEvent) => void): RunContext {
  let paused = performance.now();
  let told = 0;
  return {
    cancelled: () => job < newest || ended.has(job),
    progress: (doing, fraction) => {
      if (performance.now() - told < PROGRESS_EVERY) return;
      told = performance.now();
      onEvent({ kind: "progress", job, doing, fraction });
    },
    breathe: async () => {
      if (performance.now() - paused < STRETCH) return;
      await rest();
      paused = performance.now();
    },
    preview: (result) => onEvent({ kind: "preview", job, result }),
    clock: () => performance.now() / 1000,
    kept,
  };
}

const solver: Solver = {
  async warm(): Promise<void> {
    const context: RunContext = {
      cancelled: () => false,
      progress: () => undefined,
      clock: () => performance.now() / 1000,
    };
    await solveCase(warmUpCase, LIBRARY, { previewOnly: true }, context);
  },

  async solve(request: SolveRequest, onEvent: (event: SolveEvent) => void): Promise<SolveOutcome> {
    newest = Math.max(newest, request.job);
    const options = request.depth === "preview" ? { previewOnly: true } : {};
    const outcome = await solveCase(request.document, LIBRARY, options, contextFor(request.job, onEvent));
    ended.delete(request.job);
    return outcome;
  },

  cancel(job: number): void {
    ended.add(job);
  },
};

expose(solver);
