/** The field of a result as the board shows it now: values at the cursor or arrivals, their range and their lines. */
import { fromShown, toShown } from "../../case/units.ts";
import type { UnitSystem } from "../../case/units.ts";
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
  /** lines stand at round values of these units */
  readonly units: UnitSystem;
  /** px per m, so that lines in a thin wall do not run together */
  readonly scale: number;
}

/** Lines closer than this run together [px]. */
const CLOSEST_LINES = 5;
/** Parts of an octave of zoom within which the step between lines stays. */
const ZOOM_GRAIN = 2;

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
      old.units === ask.units &&
      zoomGrain(old.scale) === zoomGrain(ask.scale) &&
      (ask.shown.by === "arrival" || old.cursor === ask.cursor);
    if (!same || !this.#scene) this.#scene = this.#make(ask);
    this.#ask = ask;
    return this.#scene;
  }

  #make({ result, cursor, shown, step, scale, units }: SceneAsk): Scene {
    const values =
      shown.by === "arrival" ? this.#arrival(result, shown.answer) : fieldAt(result.frames, cursor);
    const { low, high } = extremes(result.section, values);
    const range = shown.by === "arrival" ? rangeOf(low.value, high.value) : temperatureRange(result);
    const time = shown.by === "arrival";
    const least = (CLOSEST_LINES * steepness(result.section, values)) / scale;
    // K or s of one unit in which the lines are round
    const unit = time ? 1 : fromShown(1, "temperatureDifference", units);
    const chosen = chooseStep(
      (range.to - range.from) / unit,
      (high.value - low.value) / unit,
      least / unit,
      time,
    );
    const wanted = step ?? chosen * unit;
    const levels = time
      ? levelsBetween(low.value, high.value, wanted)
      : roundTemperatures(low.value, high.value, wanted, units);
    const lines = levelLines(result.section, values, levels);
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

/** Temperatures [degC] between two others that are multiples of a step [K] in the shown unit. */
function roundTemperatures(from: number, to: number, step: number, units: UnitSystem): number[] {
  const [low, high] = [toShown(from, "temperature", units), toShown(to, "temperature", units)];
  return levelsBetween(low, high, toShown(step, "temperatureDifference", units)).map((level) =>
    fromShown(level, "temperature", units),
  );
}

const zoomGrain = (scale: number): number => Math.round(ZOOM_GRAIN * Math.log2(scale));

/**
 * A round step: about 24 over the whole run, finer while the field is nearly even, coarser where lines would run
 * together (`least` keeps most of them apart).
 */
function chooseStep(range: number, span: number, least: number, time: boolean): number {
  if (time) return TIME_STEPS.find((step) => range / step <= 10 && step >= least) ?? TIME_STEPS.at(-1)!;
  const even = roundStep(range, 24);
  const step = span >= 3 * even || span < 0.5 ? even : Math.max(0.1, Math.min(even, roundStep(span, 6)));
  return step >= least ? step : roundStep(least, 1);
}

/** Share of the section that may be steeper than the steepness that sets the step. */
const STEEPEST = 0.25;

/** Slope of the field [K/m, s/m] that all but the steepest quarter of the section stays below. */
function steepness({ nodes, triangles }: SectionMesh, values: Float32Array): number {
  const slopes: { slope: number; area: number }[] = [];
  let whole = 0;
  for (let t = 0; t < triangles.length; t += 3) {
    const [a, b, c] = [triangles[t]!, triangles[t + 1]!, triangles[t + 2]!];
    const [br, bz] = [nodes[2 * b]! - nodes[2 * a]!, nodes[2 * b + 1]! - nodes[2 * a + 1]!];
    const [cr, cz] = [nodes[2 * c]! - nodes[2 * a]!, nodes[2 * c + 1]! - nodes[2 * a + 1]!];
    const area = br * cz - bz * cr;
    const [vb, vc] = [values[b]! - values[a]!, values[c]! - values[a]!];
    const slope = Math.hypot(vb * cz - vc * bz, vc * br - vb * cr) / area;
    if (!Number.isFinite(slope)) continue;
    slopes.push({ slope, area });
    whole += area;
  }
  slopes.sort((p, q) => q.slope - p.slope);
  let above = 0;
  for (const { slope, area } of slopes) {
    above += area;
    if (above > STEEPEST * whole) return slope;
  }
  return 0;
}

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
