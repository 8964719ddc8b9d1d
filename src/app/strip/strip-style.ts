import { css } from "lit";

/** Line habits of the treatment chart. */
export const stripStyle = css`
  :host {
    display: block;
    position: relative;
    min-width: 0;
    min-height: 0;
    background: var(--sheet);
    border-top: 1px solid var(--rule-strong);
    user-select: none;
    -webkit-user-select: none;
  }
  .chart {
    position: absolute;
    inset: 0;
    width: 100%;
    height: 100%;
    overflow: hidden;
  }
  .plot {
    fill: transparent;
    cursor: col-resize;
    touch-action: pan-y;
  }
  .gridline {
    stroke: var(--grid);
    stroke-width: 1;
    fill: none;
  }
  .paint.pale {
    opacity: 0.4;
  }
  .reach {
    fill: transparent;
  }
  g[tabindex] {
    outline: none;
  }

  /* stages */
  .block {
    fill: transparent;
  }
  .stage,
  .add {
    cursor: pointer;
  }
  .stage:hover .block,
  .add:hover .block {
    fill: var(--hand-ground);
  }
  .stage.chosen .block {
    fill: var(--hand-ground);
  }
  .stage:focus-visible .block,
  .add:focus-visible .block {
    stroke: var(--hand);
    stroke-width: 2;
  }
  text.stage-name {
    fill: var(--ink);
    font-size: var(--t-body);
    font-weight: var(--w-firm);
  }
  text.stage-does {
    fill: var(--hand);
    font-size: var(--t-note);
    font-weight: var(--w-firm);
  }
  text.hung {
    fill: var(--hand);
    font-size: var(--t-note);
    font-weight: var(--w-firm);
    paint-order: stroke;
    stroke: var(--sheet);
    stroke-width: 4px;
  }
  .hung-name {
    fill: var(--ink);
  }
  .thread {
    stroke: var(--ink-3);
    fill: none;
  }
  .edge {
    stroke: var(--rule-strong);
    stroke-width: 1;
    opacity: 0.55;
    pointer-events: none;
  }
  .grip {
    cursor: ew-resize;
    touch-action: none;
  }
  .grip .bars {
    stroke: var(--hand);
    stroke-width: 1.5;
  }
  .grip:hover .reach {
    fill: var(--hand-ground);
  }
  .grip:focus-visible .reach,
  .knob:focus-visible .reach {
    stroke: var(--hand);
    stroke-width: 2;
  }

  /* surroundings */
  .ambient {
    stroke: var(--hand);
    stroke-width: var(--lw-ambient);
    fill: none;
    stroke-linejoin: miter;
  }
  .jump {
    stroke: var(--hand);
    stroke-width: 1.25;
    stroke-dasharray: 1.5 3;
    fill: none;
  }
  .knob {
    cursor: ns-resize;
    touch-action: none;
  }
  .square {
    fill: var(--sheet);
    stroke: var(--hand);
    stroke-width: 1.5;
  }
  .knob:hover .square,
  .knob:focus-visible .square {
    fill: var(--hand);
  }
  text.amb,
  text.figure {
    fill: var(--hand);
    font-size: var(--t-note);
    font-weight: var(--w-firm);
    paint-order: stroke;
    stroke: var(--sheet);
    stroke-width: 4px;
    pointer-events: none;
  }

  /* curves */
  .core,
  .skin,
  .mean,
  .probe,
  .crosses,
  .lumped,
  .series,
  .ghost,
  .asked,
  .drop,
  .bracket,
  .span {
    fill: none;
    pointer-events: none;
  }
  .core {
    stroke: var(--ink);
    stroke-width: var(--lw-core);
  }
  .skin {
    stroke: var(--ink);
    stroke-width: var(--lw-skin);
  }
  .mean {
    stroke: var(--ink-3);
    stroke-width: var(--lw-mean);
  }
  .probe {
    stroke: var(--ink-2);
    stroke-width: var(--lw-hair);
  }
  .crosses {
    stroke: var(--ink-2);
    stroke-width: 1.25;
  }
  .lumped {
    stroke: var(--ink-2);
    stroke-width: 1.5;
    stroke-dasharray: var(--dash-lumped);
  }
  .series {
    stroke: var(--ink);
    stroke-width: 1.6;
    stroke-dasharray: var(--dash-series);
  }
  .ghost {
    stroke: var(--stale);
    stroke-width: 1.25;
    stroke-dasharray: var(--dash-ghost);
    opacity: 0.8;
  }
  .old :is(.core, .skin, .mean, .probe, .crosses, .lumped, .series) {
    stroke: var(--stale);
  }
  .asked {
    stroke: var(--hand);
    stroke-width: 1;
    stroke-dasharray: var(--dash-asked);
  }
  .drop {
    stroke: var(--ink-3);
    stroke-width: 0.75;
  }
  .bracket {
    stroke: var(--ink);
    stroke-width: 1.25;
  }
  .span {
    stroke: var(--ink);
    stroke-width: 1.5;
  }
  .at {
    fill: var(--ink);
  }

  /* the cursor and its reading */
  .time {
    cursor: col-resize;
    touch-action: none;
  }
  .cursor {
    stroke: var(--hand);
    stroke-width: 2;
  }
  .flag {
    fill: var(--hand);
  }
  .time:hover .flag {
    fill: var(--hand-strong);
  }
  .time:focus-visible .flag {
    stroke: var(--hand);
    stroke-width: 2;
    paint-order: stroke;
    filter: drop-shadow(0 0 0 var(--sheet));
    outline: 2px solid var(--hand);
    outline-offset: 2px;
  }
  text.flag-t {
    fill: var(--on-hand);
    font-size: var(--t-note);
    font-weight: var(--w-firm);
  }
  .read {
    pointer-events: none;
  }
  text.key {
    fill: var(--ink);
    font-size: var(--t-note);
    paint-order: stroke;
    stroke: var(--sheet);
    stroke-width: 4px;
  }
  text.key.v {
    font-weight: var(--w-firm);
  }
  .pale text.key.v {
    fill: var(--stale);
    font-weight: 460;
  }
  .dot {
    fill: var(--sheet);
    stroke: var(--ink);
    stroke-width: 1.5;
  }

  /* tools and the empty strip */
  .corner {
    position: absolute;
    left: 0;
    bottom: 0;
    width: var(--scale);
    height: 30px;
    display: grid;
    place-items: center;
  }
  .corner .tool,
  .tools .tool {
    height: 30px;
    border-block-width: 0;
  }
  .corner .tool {
    color: var(--hand);
    width: 100%;
  }
  .corner .tool:disabled {
    color: var(--rule-strong);
  }
  .tools {
    position: absolute;
    right: var(--s-1);
    top: 0;
    display: flex;
    height: 29px;
    align-items: center;
    background: var(--ground);
  }
  .tools .tool[aria-pressed="true"] {
    border-bottom: 2px solid var(--hand);
  }
  .empty {
    position: absolute;
    left: calc(var(--scale) + var(--s-4));
    right: var(--s-4);
    top: 46px;
    color: var(--ink-2);
    font-size: var(--t-ask);
  }
  corelag-curve-table {
    position: absolute;
    inset: 30px 0 0 0;
  }
  @media (forced-colors: active) {
    .time {
      forced-color-adjust: none;
    }
    .flag {
      fill: Highlight;
    }
    .cursor {
      stroke: Highlight;
    }
    text.flag-t {
      fill: HighlightText;
    }
    .stage:hover .block,
    .stage.chosen .block {
      stroke: Highlight;
    }
  }
`;
