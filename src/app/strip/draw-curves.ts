/** Draws the curves, the asked levels and the balloons of the answers. */
import { nothing, svg } from "lit";
import type { SVGTemplateResult } from "lit";
import { along } from "./curves.ts";
import { cross, f } from "./draw-scales.ts";
import type { DrawnCurve, Frame } from "./frame.ts";
import type { AnswerMark } from "./marks.ts";
import { bestPlace } from "./place-labels.ts";
import type { Box } from "./place-labels.ts";
import { boundsOf } from "./reading.ts";

/** Thin lines first, the core last, so that it lies on top. */
const ORDER = ["lumped", "mean", "probe", "skin", "series", "core"] as const;

export function drawCurves({ curves, ghosts }: Frame): SVGTemplateResult {
  const sorted = [...curves].sort((a, b) => ORDER.indexOf(a.habit) - ORDER.indexOf(b.habit));
  return svg`${ghosts.map((path) => svg`<path class="ghost" d=${path} />`)}${sorted.map(drawCurve)}`;
}

/** px between the crosses on the curve of a probe: the mark it has in the section */
const CROSS_APART = 90;

function drawCurve(curve: DrawnCurve): SVGTemplateResult {
  const line = svg`<path class=${curve.habit} d=${curve.path} />`;
  return curve.habit === "probe" ? svg`${line}<path class="crosses" d=${crosses(curve.points)} />` : line;
}

function crosses(points: Float64Array): string {
  const at = along(points, CROSS_APART);
  let path = "";
  for (let i = 0; i < at.length; i += 2) path += cross(at[i]!, at[i + 1]!);
  return path;
}

export function drawLevels({ scales, marks }: Frame): SVGTemplateResult {
  const path = marks
    .flatMap(({ level }) => (level === null ? [] : [level]))
    .map(({ degC, from, to }) => `M${f(scales.x(from))} ${f(scales.y(degC))}H${f(scales.x(to))}`)
    .join("");
  return svg`<path class="asked" d=${path} />`;
}

export interface PlacedBalloon {
  readonly mark: AnswerMark;
  readonly x: number;
  readonly y: number;
}

export const balloonSize = (height: number): number => (height > 300 ? 10 : 8.5);

/** Places for the balloons: beside their point, where there is least on the sheet, never on one another. */
export function placeBalloons({ scales, marks, crowd }: Frame): PlacedBalloon[] {
  const radius = balloonSize(scales.room.height);
  const taken: Box[] = [];
  return marks.map((mark) => {
    const [x, y] = [scales.x(mark.at), scales.y(mark.degC)];
    const reach = radius + 6;
    const offsets = [
      [reach, -reach + 2],
      [-reach, reach - 2],
      [-reach, -reach + 2],
      [reach, reach - 2],
      [reach + 2, 0],
      [-reach - 2, 0],
      [2.6 * reach, -reach],
      [-2.6 * reach, reach],
    ] as const;
    const boxes = offsets.map(([dx, dy]) => around(x + dx, y + dy, radius));
    const box = bestPlace(boxes, boundsOf(scales), taken, crowd) ?? boxes[0]!;
    taken.push(box);
    return { mark, x: box.x + radius, y: box.y + radius };
  });
}

const around = (x: number, y: number, radius: number): Box => ({
  x: x - radius,
  y: y - radius,
  width: 2 * radius,
  height: 2 * radius,
});

export function drawMarks(
  frame: Frame,
  balloons: readonly PlacedBalloon[],
  lit: number | null,
): SVGTemplateResult {
  const { scales } = frame;
  return svg`${balloons.map(({ mark, x, y }) => {
    const own = [scales.x(mark.at), scales.y(mark.degC)] as const;
    return svg`${mark.bracket === null ? nothing : drawBracket(frame, mark)}
      ${mark.drops ? svg`<path class="drop" d="M${f(own[0])} ${f(own[1])}V${scales.bottom}" />` : nothing}
      <path class="drop" d=${thread(own, x, y, balloonSize(scales.room.height))} />
      ${mark.bracket === null ? svg`<circle class="at" cx=${f(own[0])} cy=${f(own[1])} r="2.5" />` : nothing}
      ${drawBalloon(x, y, mark.index, mark.index === lit, balloonSize(scales.room.height))}`;
  })}`;
}

/** A thread from the point to the rim of its balloon; the bracket of a spread is its own. */
function thread([x0, y0]: readonly [number, number], x: number, y: number, radius: number): string {
  const length = Math.hypot(x - x0, y - y0);
  const share = length > radius ? 1 - radius / length : 0;
  return `M${f(x0)} ${f(y0)}L${f(x0 + share * (x - x0))} ${f(y0 + share * (y - y0))}`;
}

function drawBracket({ scales }: Frame, { at, bracket }: AnswerMark): SVGTemplateResult {
  const [x, low, high] = [scales.x(at), scales.y(bracket![0]), scales.y(bracket![1])];
  return svg`<path class="bracket" d="M${f(x - 4)} ${f(high)}h8M${f(x - 4)} ${f(low)}h8M${f(x)} ${f(high)}V${f(low)}" />`;
}

function drawBalloon(x: number, y: number, index: number, lit: boolean, radius: number): SVGTemplateResult {
  const state = lit ? " lit" : "";
  return svg`<circle class="ball${state}" cx=${f(x)} cy=${f(y)} r=${radius} /><text class="ball-n${state}" x=${f(x)}
    y=${f(y + 4.2)}>${index + 1}</text>`;
}
