/** A shape as a small line drawing, lying: the upper half hatched, the lower in outline, the axis as a chain line. */
import { html, svg } from "lit";
import type { TemplateResult } from "lit";
import type { VertexDocument } from "../../case/types.ts";
import { arcOfSide, sheetLoop } from "../../editor/outline.ts";
import { onArc } from "../../editor/arcs.ts";
import type { Place } from "../../editor/arcs.ts";

const WIDTH = 128;
const HEIGHT = 90;
const MARGIN = { across: 20, up: 7 };
const HATCH = 6;
const ARC_STEPS = 14;

export function shapePicture(outline: readonly VertexDocument[], id: string): TemplateResult {
  const points = outlinePoints(outline);
  const rMax = Math.max(...points.map(([r]) => r), 1e-9);
  const zMax = Math.max(...points.map(([, z]) => z), 1e-9);
  const scale = Math.min((WIDTH - 2 * MARGIN.across) / zMax, (HEIGHT / 2 - MARGIN.up) / rMax);
  const [x0, y0] = [(WIDTH - zMax * scale) / 2, HEIGHT / 2];
  const path = (sign: 1 | -1): string =>
    `M${points.map(([r, z]) => `${(x0 + z * scale).toFixed(1)} ${(y0 - sign * r * scale).toFixed(1)}`).join("L")}Z`;
  const hatch = Array.from({ length: 36 }, (_, k) => `M${k * HATCH - 90} ${HEIGHT}l90 ${-HEIGHT}`).join("");
  return html`<svg viewBox="0 0 ${WIDTH} ${HEIGHT}" aria-hidden="true">
    ${svg`<clipPath id="clip-${id}"><path d=${path(1)}></path></clipPath>
      <g clip-path="url(#clip-${id})"><path class="hatch" d=${hatch}></path></g>
      <path class="far" d=${path(-1)}></path><path d=${path(1)}></path>
      <path class="axis" d="M2 ${y0}H${WIDTH - 2}"></path>`}
  </svg>`;
}

function outlinePoints(outline: readonly VertexDocument[]): Place[] {
  return sheetLoop(outline).flatMap((vertex, i): Place[] => {
    const arc = arcOfSide(outline, i);
    if (!arc) return [vertex.at];
    return Array.from({ length: ARC_STEPS }, (_, k) =>
      onArc(arc, arc.from + (k / ARC_STEPS) * (arc.to - arc.from)),
    );
  });
}
