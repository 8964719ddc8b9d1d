/** Icons: 20 x 20, one 1.5 line, butt ends, mitred; the solid part is what moves. Styled by shared.ts. */
import { html, svg } from "lit";
import type { SVGTemplateResult, TemplateResult } from "lit";

const SHAPES = {
  mark: svg`<path d="M3 17V9.5C6 5.5 18 4.5 21 8v9" fill="none"/><path d="M6.5 17v-5c2.5-2.5 8.5-3 11-.8V17" fill="none" stroke-width="1.2"/><path d="M10 17v-2.600c1.2-.9 3-1 4-.2V17z" class="solid"/><path d="M1 17h6m2 0h1m2 0h6m2 0h1m1 0h1" class="chain"/>`,
  undo: svg`<path d="M5 7h7.500a4 4 0 0 1 0 8H8"/><path d="M2.5 7 7 3.500v7z" class="solid"/>`,
  redo: svg`<path d="M15 7H7.500a4 4 0 0 0 0 8H12"/><path d="M17.5 7 13 3.500v7z" class="solid"/>`,
  open: svg`<path d="M3 8v8.500h14V8M3 8l2.5-4h9L17 8z"/><path d="M10 15.5 6.5 11h7z" class="solid" transform="rotate(180 10 13)"/>`,
  save: svg`<path d="M3 9v7.500h14V9"/><path d="M10 3v5"/><path d="M10 13 6.5 8h7z" class="solid"/>`,
  recent: svg`<circle cx="10" cy="10" r="7"/><path d="M10 5.500V10l3.5 2"/>`,
  play: svg`<path d="M5.5 3.500v13L16.5 10z" class="solid"/>`,
  lie: svg`<path d="M3 7h14v6H3z"/><path d="M1 10h4m1.5 0h1.500m1.5 0H14m1.5 0H19" class="thin"/>`,
  stand: svg`<path d="M7 3h6v14H7z"/><path d="M10 1v4m0 1.500V8m0 1.500V14m0 1.500V19" class="thin"/>`,
  turned: svg`<path d="M3 6v8c0 1.8 3 3 7 3V9"/><ellipse cx="10" cy="6" rx="7" ry="3"/><path d="M10 9v8l7-3V6z" class="solid"/>`,
  fit: svg`<path d="M3 7V3h4M13 3h4v4M17 13v4h-4M7 17H3v-4"/><path d="M7 8h6v4H7z" class="solid"/>`,
  point: svg`<path d="M2.5 15.5 9 8.500m3-1 5.5-2"/><path d="M8.5 5.500h4v4h-4z" class="solid"/>`,
  arc: svg`<path d="M3 16C4 8 9 4 17 4"/><circle cx="7" cy="7.5" r="2.2" class="solid"/>`,
  fillet: svg`<path d="M3.5 17V10a6.5 6.5 0 0 1 6.5-6.500h7"/><path d="M3.5 8V3.500H8" class="thin dash"/>`,
  chamfer: svg`<path d="M3.5 17V9.500l6-6H17"/><path d="M3.5 8V3.500H8" class="thin dash"/>`,
  probe: svg`<path d="M17 3 9 11"/><path d="M4 11h10M9 6v10" class="thin"/><circle cx="9" cy="11" r="2.4" class="solid"/>`,
  split: svg`<path d="M3 4.500h14v11H3z"/><path d="M11.5 2 8.5 18" class="thin dash"/>`,
  void: svg`<path d="M3 4.500h14v11H3z"/><ellipse cx="10" cy="10" rx="3.5" ry="2.5" class="solid"/>`,
  measure: svg`<path d="M3 4v12M17 4v12" class="thin"/><path d="M5 10h10"/><path d="M3 10l4-2v4zM17 10l-4-2v4z" class="solid"/>`,
  log: svg`<path d="M3 3v14h14" class="thin"/><path d="M4.5 14.500h1M6.5 11h1M8.5 9h1M10.5 7.500h1M12.5 7h1M14.5 6.500h1.5" stroke-width="2.2"/>`,
  table: svg`<path d="M3 4h14v12H3zM3 8h14M3 12h14M9 4v12" class="thin"/><path d="M3 4h14v4H3z" class="solid"/>`,
  add: svg`<path d="M10 4v12M4 10h12"/>`,
  more: svg`<path d="M3 10h2.500M8.7 10h2.600M14.5 10H17" stroke-width="2.6"/>`,
  care: svg`<path d="M10 3 18 17H2z"/><path d="M10 8v4.500M10 14v1.6" />`,
  bad: svg`<path d="M6.5 2.500h7l4 4v7l-4 4h-7l-4-4v-7z" class="solid"/><path d="M6 10h8" class="knock"/>`,
  good: svg`<path d="M6.5 2.500h7l4 4v7l-4 4h-7l-4-4v-7z"/><path d="m6 10 3 3 5.5-6"/>`,
  print: svg`<path d="M5 8V3h10v5M5 14H3V8h14v6h-2"/><path d="M6 12h8v5.500H6z" class="solid"/>`,
  "jaws-shut": svg`<path d="M1 16h18" class="thin"/><path d="M8.7 16V4H5v3M11.3 16V4H15v3"/>`,
  "jaws-open": svg`<path d="M1 16h18" class="thin"/><path d="M5 16V4H1.500v3M15 16V4h3.500v3"/><path d="M9 12h2v2H9z" class="solid"/>`,
} as const satisfies Record<string, SVGTemplateResult>;

export type IconName = keyof typeof SHAPES;

/** An icon; hidden from listeners, so the control that carries it needs a name. */
export function icon(name: IconName): TemplateResult {
  const box = name === "mark" ? "0 0 24 24" : "0 0 20 20";
  return html`<svg class="icon icon-${name}" viewBox=${box} aria-hidden="true">${SHAPES[name]}</svg>`;
}
