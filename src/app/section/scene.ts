/** The field of a result as the board shows it now: values at the cursor or arrivals, their range and their lines. */
import type { CaseResult, SectionMesh } from "../../run/result.ts";
import { colourAt, shareOf, temperatureRange, wantsDarkInk } from "../colours.ts";
import type { Range, Rgb } from "../colours.ts";
import type { Shown } from "../state.ts";
import { arrivalTimes, fieldAt, goingOf, valueAt } from "./frames.ts";
import { levelLines, levelsBetween, roundStep } from "./isotherms.ts";
import type { LevelLine } from "./isotherms.ts";

export interface Scene {
  readonly mesh: SectionMesh;
  readonly values: Float32Array;
  readonly range: Range;
  /** K or s between two lines */
  readonly step: number;
  readonly lines: readonly LevelLine[];
  /** lowest and highest value now, with the node it is at */
  readonly low: Extreme;
  readonly high: Extreme;
}

export interface Extreme {
  readonly value: number;
  readonly place: readonly [r: number, z: number];
}

export interface SceneAsk {
  readonly result: CaseResult;
  readonly cursor: number;
  readonly shown: Shown;
  /** wanted step between lines; null: a round one */
  readonly step: number | null;
}

/** Round steps of time between two isochrones [s]. */
const TIME_STEPS = [
  1, 2, 5, 10, 20, 30, 60, 120, 300, 600, 1200, 1800, 3600, 7200, 14_400, 43_200, 86_400,
] as const;

/** Keeps the last scene: most updates of the board change nothing in it. */
export class SceneKeeper {
  #ask: SceneAsk | null = null;
  #scene: Scene | null = null;
  #arrivals: { result: CaseResult; answer: number; values: Float32Array } | null = null;

  /** The scene, the same object while what was asked is the same. */
  scene(ask: SceneAsk): Scene {
    const old = this.#ask;
    const same =
      old &&
      old.result === ask.result &&
      old.step === ask.step &&
      sameShown(old.shown, ask.shown) &&
      (ask.shown.by === "arrival" || old.cursor === ask.cursor);
    if (!same || !this.#scene) this.#scene = this.#make(ask);
    this.#ask = ask;
    return this.#scene;
  }

  #make({ result, cursor, shown, step }: SceneAsk): Scene {
    const values =
      shown.by === "arrival" ? this.#arrival(result, shown.answer) : fieldAt(result.frames, cursor);
    const { low, high } = extremes(result.section, values);
    const range = shown.by === "arrival" ? rangeOf(low.value, high.value) : temperatureRange(result);
    const used =
      step ??
      (shown.by === "arrival" ? timeStep(range.to - range.from) : roundStep(range.to - range.from, 24));
    const wanted = step ?? fitStep(used, high.value - low.value, shown.by === "arrival");
    const lines = levelLines(result.section, values, levelsBetween(low.value, high.value, wanted));
    return { mesh: result.section, values, range, step: wanted, lines, low, high };
  }

  #arrival(result: CaseResult, answer: number): Float32Array {
    const held = this.#arrivals;
    if (held?.result === result && held.answer === answer) return held.values;
    const question = result.answers[answer]?.question;
    const values =
      question?.ask === "when"
        ? arrivalTimes(result.frames, question.reaches, goingOf(result, question.reaches, question.going))
        : new Float32Array(result.section.nodes.length / 2).fill(Number.NaN);
    this.#arrivals = { result, answer, values };
    return values;
  }
}

const sameShown = (a: Shown, b: Shown): boolean =>
  a.by === b.by && (a.by === "temperature" || (b.by === "arrival" && a.answer === b.answer));

const rangeOf = (from: number, to: number): Range =>
  to > from ? { from, to } : { from: from - 1, to: from + 1 };

/** A finer round step while the field is nearly even, so that some lines are always seen; never below 0.1. */
function fitStep(step: number, span: number, time: boolean): number {
  if (time || span >= 3 * step || span < 0.5) return step;
  return Math.max(0.1, Math.min(step, roundStep(span, 6)));
}

const timeStep = (span: number): number => TIME_STEPS.find((step) => span / step <= 10) ?? TIME_STEPS.at(-1)!;

function extremes(mesh: SectionMesh, values: Float32Array): { low: Extreme; high: Extreme } {
  let [low, high] = [-1, -1];
  for (let i = 0; i < values.length; i++) {
    const value = values[i]!;
    if (Number.isNaN(value)) continue;
    if (low < 0 || value < values[low]!) low = i;
    if (high < 0 || value > values[high]!) high = i;
  }
  const at = (i: number): Extreme => ({
    value: values[i] ?? Number.NaN,
    place: [mesh.nodes[2 * i] ?? 0, mesh.nodes[2 * i + 1] ?? 0],
  });
  return { low: at(low), high: at(high) };
}

export const sceneValueAt = (scene: Scene, r: number, z: number): number =>
  valueAt(scene.mesh, scene.values, Math.abs(r), z);

/** The token of the lines that read best on the field where it has this value. */
export function inkFor(
  stops: readonly Rgb[],
  range: Range,
  value: number,
): "var(--iso-dark)" | "var(--iso-light)" {
  return wantsDarkInk(colourAt(stops, shareOf(range, value))) ? "var(--iso-dark)" : "var(--iso-light)";
}
