/** Everything the drawing functions of the strip need, worked out once per change of data or size. */
import type { CaseDocument } from "../../case/types.ts";
import type { UnitSystem } from "../../case/units.ts";
import type { CaseResult } from "../../run/result.ts";
import { temperatureRange } from "../colours.ts";
import type { Range } from "../colours.ts";
import { along, curvesOf, extent, pathOf, pointsOf } from "./curves.ts";
import type { Curve } from "./curves.ts";
import { marksOf } from "./marks.ts";
import type { AnswerMark } from "./marks.ts";
import { endOf, scheduleOf } from "./schedule.ts";
import type { StageBlock } from "./schedule.ts";
import { makeScales } from "./scales.ts";
import type { Room, Scales } from "./scales.ts";

export interface DrawnCurve extends Curve {
  readonly points: Float64Array;
  readonly path: string;
}

export interface Frame {
  readonly schedule: readonly StageBlock[];
  readonly scales: Scales;
  readonly curves: readonly DrawnCurve[];
  readonly ghosts: readonly string[];
  readonly marks: readonly AnswerMark[];
  /** what the map spans; null without a result */
  readonly range: Range | null;
  /** points all along the lines, to find room for words */
  readonly crowd: Float64Array;
  /** last instant the cursor can go to [s] */
  readonly end: number;
  readonly system: UnitSystem;
}

export interface FrameInputs {
  readonly document: CaseDocument;
  readonly result: CaseResult | null;
  /** result before the running gesture, drawn as a ghost */
  readonly was: CaseResult | null;
  readonly system: UnitSystem;
  readonly room: Room;
  /** scales to keep while the hand drags something along them */
  readonly kept: Scales | null;
}

/** px between the points that stand for a line when room is sought */
const CROWD_STEP = 5;

export function makeFrame(inputs: FrameInputs): Frame {
  const { document, result, was, system, room } = inputs;
  const schedule = scheduleOf(document, result, system);
  const curves = result === null ? [] : curvesOf(result);
  const marks = result === null ? [] : marksOf(result);
  const end = result === null ? endOf(schedule) : (result.stages.at(-1)?.ended ?? endOf(schedule));
  const scales =
    inputs.kept ?? newScales(schedule, curves, marks, Math.max(end, endOf(schedule)), room, system);
  const drawn = curves.map((curve) => {
    const points = pointsOf(curve, scales);
    return { ...curve, points, path: pathOf(points) };
  });
  const ghosts =
    was === null || was === result
      ? []
      : curvesOf(was)
          .filter(({ habit }) => habit === "core" || habit === "skin")
          .map((curve) => pathOf(pointsOf(curve, scales)));
  const crowd = crowdOf(drawn, schedule, marks, scales);
  const range = result === null ? null : temperatureRange(result);
  return { schedule, scales, curves: drawn, ghosts, marks, range, crowd, end, system };
}

function newScales(
  schedule: readonly StageBlock[],
  curves: readonly Curve[],
  marks: readonly AnswerMark[],
  lasts: number,
  room: Room,
  system: UnitSystem,
): Scales {
  const knots = schedule.flatMap((block) =>
    block.lines.flatMap((line) => line.knots.map((knot) => knot.degC)),
  );
  const levels = marks.map((mark) => mark.degC);
  return makeScales(room, Math.max(lasts, 1e-3), extent(curves, [...knots, ...levels]), system);
}

function crowdOf(
  curves: readonly DrawnCurve[],
  schedule: readonly StageBlock[],
  marks: readonly AnswerMark[],
  scales: Scales,
): Float64Array {
  const lines = curves.map((curve) => along(curve.points, CROWD_STEP));
  for (const { level } of marks) {
    if (level === null) continue;
    const y = scales.y(level.degC);
    lines.push(along(Float64Array.of(scales.x(level.from), y, scales.x(level.to), y), CROWD_STEP));
  }
  for (const block of schedule)
    for (const line of block.lines) {
      const points = line.knots.flatMap((knot) => [scales.x(knot.at), scales.y(knot.degC)]);
      lines.push(along(Float64Array.from(points), CROWD_STEP));
    }
  const all = new Float64Array(lines.reduce((sum, line) => sum + line.length, 0));
  let filled = 0;
  for (const line of lines) {
    all.set(line, filled);
    filled += line.length;
  }
  return all;
}
