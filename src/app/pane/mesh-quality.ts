/** How well the triangles are shaped: a bar per step of smallest angle, and a switch that lays the mesh on the section. */
import { css, html, svg } from "lit";
import type { TemplateResult } from "lit";
import type { MeshFacts } from "../../run/result.ts";

const WIDTH = 320;
const HEIGHT = 64;
const FOOT = 16;
/** degrees at which the scale under the bars is marked */
const MARKS = [0, 15, 30, 45, 60];

export const meshQualityStyle = css`
  .angles {
    display: block;
    width: calc(100% - 2 * var(--s-4));
    margin: var(--s-2) var(--s-4);
    overflow: visible;
  }
  .angles rect {
    fill: var(--ink-3);
  }
  .angles path {
    stroke: var(--rule-strong);
    fill: none;
  }
  .angles text {
    fill: var(--ink-3);
    font-size: var(--t-scale);
    text-anchor: middle;
  }
  .angles .worst {
    stroke: var(--bad);
    stroke-width: 2;
  }
  .lay {
    margin: 0 var(--s-4);
  }
`;

/** The bars; the worst corner carries its own mark. One sentence says the same to those who listen. */
export function angleBars({ angleHistogram, minAngleDeg }: MeshFacts): TemplateResult {
  const most = Math.max(...angleHistogram, 1);
  const step = WIDTH / angleHistogram.length;
  const floor = HEIGHT - FOOT;
  const tall = (count: number): number => (count === 0 ? 0 : Math.max(1.5, (count / most) * (floor - 4)));
  const bars = angleHistogram.map(
    (count, i) =>
      svg`<rect x=${i * step + 0.75} y=${floor - tall(count)} width=${step - 1.5} height=${tall(count)}></rect>`,
  );
  const marks = MARKS.map((degrees) => {
    const x = (degrees / 60) * WIDTH;
    return svg`<path d="M${x} ${floor}v4"></path><text x=${x} y=${HEIGHT}>${degrees}°</text>`;
  });
  const worst = (minAngleDeg / 60) * WIDTH;
  return html`<svg
    class="angles"
    viewBox="0 0 ${WIDTH} ${HEIGHT}"
    role="img"
    aria-label=${spoken(angleHistogram, minAngleDeg)}
  >
    ${bars}
    <path d="M0 ${floor}H${WIDTH}"></path>
    ${marks}
    <path class="worst" d="M${worst} ${floor + 1}V6"></path>
  </svg>`;
}

function spoken(histogram: readonly number[], worst: number): string {
  const total = histogram.reduce((sum, count) => sum + count, 0);
  const step = 60 / histogram.length;
  const good = histogram.reduce((sum, count, i) => sum + (i * step >= 45 ? count : 0), 0);
  return `Sharpest corner of each triangle, 0 to 60 degrees: ${Math.round((100 * good) / total)} % are above 45 degrees, the worst has ${worst.toFixed(1)}.`;
}

/** The switch under the bars. */
export function meshSwitch(shown: boolean, toggle: () => void): TemplateResult {
  return html`<p class="lay">
    <button class="act" type="button" aria-pressed=${shown} @click=${toggle}>
      ${shown ? "Take the mesh off the section" : "Lay the mesh over the section"}
    </button>
  </p>`;
}
