/** Isotherms (or isochrones) on the board: over the field, their labels on the mirrored half. */
import { svg } from "lit";
import type { SVGTemplateResult } from "lit";
import { toShown } from "../../case/units.ts";
import type { UnitSystem } from "../../case/units.ts";
import { digits } from "../controls/figures.ts";
import type { Rgb } from "../colours.ts";
import type { Shown } from "../state.ts";
import { placeLabels } from "./isotherms.ts";
import type { LevelLine } from "./isotherms.ts";
import { inkFor } from "./scene.ts";
import type { Scene } from "./scene.ts";
import { insidePart } from "./sheet.ts";
import type { Sheet } from "./sheet.ts";
import { fromScreen, toMirror, toScreen } from "./view.ts";
import type { Bounds, Spot, View } from "./view.ts";

export interface IsothermPicture {
  readonly scene: Scene;
  readonly view: View;
  readonly bounds: Bounds;
  readonly sheet: Sheet;
  readonly stops: readonly Rgb[];
  readonly shown: Shown;
  readonly units: UnitSystem;
  readonly big: boolean;
}

/** Keeps the drawn lines while nothing that they depend on changes: most updates of the board leave them alone. */
export class IsothermKeeper {
  #picture: IsothermPicture | null = null;
  #drawn: SVGTemplateResult = svg``;

  layer(picture: IsothermPicture): SVGTemplateResult {
    const old = this.#picture;
    const keys = Object.keys(picture) as (keyof IsothermPicture)[];
    if (!old || keys.some((key) => old[key] !== picture[key])) this.#drawn = isothermsLayer(picture);
    this.#picture = picture;
    return this.#drawn;
  }
}

function isothermsLayer({
  scene,
  view,
  bounds,
  sheet,
  stops,
  shown,
  units,
  big,
}: IsothermPicture): SVGTemplateResult {
  const mirror = (r: number, z: number): Spot => toMirror(view, r, z);
  const text = (value: number): string => (shown.by === "arrival" ? clock(value) : degrees(value, units));
  const widthOf = (value: number): number => text(value).length * (big ? 7.4 : 6.6) + 7;
  const room = {
    width: Math.max(0, ...scene.lines.map((line) => widthOf(line.value))),
    height: big ? 14 : 12,
  };
  const labels = placeLabels(scene.lines, mirror, {
    ...room,
    ...labelLine(view, bounds, sheet),
    fits: (x, y) => standsOn(sheet, view, x, y, room),
  });
  return svg`
    ${scene.lines.map(
      (
        line,
      ) => svg`<path class="iso" stroke=${inkFor(stops, scene.range, line.value)} d=${linePath(line, (r, z) => toScreen(view, r, z))}></path>
        <path class="iso mirrored" d=${linePath(line, mirror)}></path>`,
    )}
    ${labels.map(
      ({
        value,
        x,
        y,
      }) => svg`<rect class="chip" x=${x - widthOf(value) / 2} y=${y - room.height / 2} width=${widthOf(value)} height=${room.height} rx="2"></rect>
        <text class="level" x=${x} y=${y + (big ? 4.5 : 4)}>${text(value)}</text>`,
    )}
  `;
}

function linePath({ segments }: LevelLine, project: (r: number, z: number) => Spot): string {
  let path = "";
  for (let i = 0; i + 3 < segments.length; i += 4) {
    const [ax, ay] = project(segments[i]!, segments[i + 1]!);
    const [bx, by] = project(segments[i + 2]!, segments[i + 3]!);
    path += `M${ax.toFixed(1)} ${ay.toFixed(1)}L${bx.toFixed(1)} ${by.toFixed(1)}`;
  }
  return path;
}

/** Labels gather along a slanting line of the mirrored half, from deep inside to the skin near the base. */
function labelLine(view: View, { rMax, zMin, zMax }: Bounds, sheet: Sheet): { from: Spot; to: Spot } {
  const rMin = Math.min(rMax, ...sheet.loops.flatMap((loop) => loop.vertices.map((vertex) => vertex.at[0])));
  const [depth, length] = [rMax - rMin, zMax - zMin];
  return {
    from: toMirror(view, rMin + 0.12 * depth, zMin + 0.66 * length),
    to: toMirror(view, rMin + 0.96 * depth, zMin + 0.08 * length),
  };
}

function standsOn(
  sheet: Sheet,
  view: View,
  x: number,
  y: number,
  room: { width: number; height: number },
): boolean {
  return [-1, 1].every((dx) =>
    [-1, 1].every((dy) => {
      const [r, z] = fromScreen(view, x + (dx * room.width) / 2, y + (dy * (room.height + 2)) / 2);
      return r < 0 && insidePart(sheet, [-r, z]);
    }),
  );
}

function degrees(value: number, units: UnitSystem): string {
  const shown = Number(toShown(value, "temperature", units).toPrecision(7));
  return digits(shown, Number.isInteger(shown) ? 0 : 1);
}

/** "7:50" for 7 h 50 min; below an hour "12:30" minutes and seconds. */
function clock(seconds: number): string {
  const [large, small] = seconds >= 3600 ? [3600, 60] : [60, 1];
  const rounded = Math.round(seconds / small) * small;
  return `${Math.floor(rounded / large)}:${String(Math.round((rounded % large) / small)).padStart(2, "0")}`;
}
