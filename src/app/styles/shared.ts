/** Styles that every element takes: type, icons, and the controls of this page (blank, act, tool, pick, ball). */
import { css } from "lit";

export const shared = css`
  :host {
    font: var(--w-text) var(--t-body) / var(--lh-text) var(--face);
    font-feature-settings:
      "tnum" 1,
      "lnum" 1;
    font-variant-numeric: tabular-nums lining-nums;
    color: var(--ink);
  }
  :host([hidden]),
  [hidden] {
    display: none !important;
  }
  *,
  ::before,
  ::after {
    box-sizing: border-box;
  }
  h1,
  h2,
  h3,
  p,
  ul,
  ol,
  dl,
  dd,
  figure {
    margin: 0;
    padding: 0;
    font: inherit;
  }
  ul,
  ol {
    list-style: none;
  }
  button,
  input,
  select,
  textarea,
  output {
    font: inherit;
    color: inherit;
    font-feature-settings: inherit;
    letter-spacing: inherit;
  }
  button {
    background: none;
    border: 0;
    padding: 0;
    margin: 0;
    cursor: pointer;
    text-align: inherit;
  }
  b {
    font-weight: var(--w-firm);
  }
  :focus-visible {
    outline: 2px solid var(--hand);
    outline-offset: 2px;
    border-radius: var(--r-blank);
  }
  .space {
    flex: 1;
  }
  /* read by listeners only */
  .heard {
    position: absolute;
    width: 1px;
    height: 1px;
    margin: -1px;
    overflow: hidden;
    clip-path: inset(50%);
    white-space: nowrap;
  }

  /* icons: 20 x 20, one 1.5 line, butt ends, mitred; the solid part is what moves */
  .icon {
    width: 20px;
    height: 20px;
    fill: none;
    stroke: currentColor;
    stroke-width: 1.5;
    stroke-linejoin: miter;
    flex: none;
  }
  .icon .solid {
    fill: currentColor;
    stroke: none;
  }
  .icon .thin,
  .icon .chain {
    stroke-width: 1;
  }
  .icon .dash {
    stroke-dasharray: 2 1.5;
  }
  .icon .knock {
    stroke: var(--sheet);
    stroke-width: 2;
  }

  .group {
    display: flex;
  }
  .tool {
    width: var(--touch);
    height: var(--touch);
    display: grid;
    place-items: center;
    flex: none;
    color: var(--ink-2);
    border-radius: var(--r-blank);
    border-block: 2px solid transparent;
  }
  .tool:hover {
    background: var(--hand-ground);
    color: var(--hand-strong);
  }
  .tool[aria-pressed="true"],
  .tool[aria-expanded="true"] {
    color: var(--hand);
    border-bottom-color: var(--hand);
    border-radius: 0;
  }
  .tool:disabled {
    color: var(--rule-strong);
    opacity: 0.55;
    cursor: default;
    background: none;
  }
  .pick {
    display: flex;
    border: 1px solid var(--rule-strong);
    border-radius: var(--r-blank);
    height: calc(var(--touch) - 4px);
  }
  .pick button {
    padding: 0 var(--s-2);
    color: var(--ink-2);
    white-space: nowrap;
    font-size: var(--t-note);
  }
  .pick button:hover {
    background: var(--hand-ground);
    color: var(--hand-strong);
  }
  .pick button[aria-pressed="true"] {
    background: var(--hand-ground);
    color: var(--hand-strong);
    font-weight: var(--w-firm);
  }

  /* a blank: the one control of this page, a gap in a sentence */
  .blank {
    position: relative;
    color: var(--hand);
    font-weight: var(--w-firm);
    border-bottom: 1.5px solid var(--hand);
    padding: 0 2px;
    border-radius: var(--r-blank) var(--r-blank) 0 0;
    line-height: 1.2;
    white-space: nowrap;
    transition: background var(--m-quick);
  }
  .blank:hover {
    background: var(--hand-ground);
    color: var(--hand-strong);
  }
  .blank.quiet {
    color: var(--ink);
    border-color: transparent;
  }
  .blank.quiet:hover {
    border-color: var(--hand);
  }
  .blank.empty {
    color: var(--ink-3);
    font-weight: var(--w-text);
    border-color: var(--rule-strong);
    padding-right: 36px;
  }
  .blank:disabled {
    color: var(--ink-3);
    border-color: var(--rule-strong);
    cursor: default;
    background: none;
  }
  .blank[aria-invalid="true"] {
    border-color: var(--bad);
    color: var(--bad);
  }

  /* a button that says what happens */
  .act {
    display: inline-flex;
    align-items: center;
    gap: var(--s-1);
    color: var(--hand);
    border: 1px solid var(--rule-strong);
    border-radius: var(--r-blank);
    padding: 0 var(--s-3);
    min-height: var(--touch);
    font-weight: var(--w-firm);
    white-space: nowrap;
    background: var(--sheet);
  }
  .act:hover {
    background: var(--hand-ground);
    border-color: var(--hand);
    color: var(--hand-strong);
  }
  .act.main {
    background: var(--hand);
    color: var(--on-hand);
    border-color: var(--hand);
  }
  .act.main:hover {
    background: var(--hand-strong);
    border-color: var(--hand-strong);
  }
  .act.plain {
    border-color: transparent;
    background: none;
  }
  .act.plain:hover {
    background: var(--hand-ground);
  }
  .act:disabled {
    color: var(--ink-3);
    border-color: var(--rule);
    background: var(--well);
    cursor: default;
  }
  .act .icon {
    width: 17px;
    height: 17px;
    margin-left: -4px;
  }

  /* a word that acts, inside small print */
  .link {
    color: var(--hand);
    text-decoration: underline;
    text-underline-offset: 3px;
    text-decoration-thickness: 1px;
    min-height: 26px;
  }
  .link:hover {
    color: var(--hand-strong);
    background: var(--hand-ground);
  }
  .aside {
    color: var(--ink-2);
    font-size: var(--t-note);
  }
  .lead {
    color: var(--ink-2);
    font-size: var(--t-ask);
  }

  .ball {
    font-style: normal;
    font-size: var(--t-scale);
    font-weight: var(--w-firm);
    display: inline-grid;
    place-items: center;
    width: 18px;
    height: 18px;
    border: 1.25px solid var(--ink);
    border-radius: 50%;
    line-height: 1;
    background: var(--sheet);
  }
  .ball.lit {
    background: var(--hand);
    border-color: var(--hand);
    color: var(--on-hand);
  }

  /* judgement: a full-width band, always with its mark and words */
  .verdict {
    padding: var(--s-2) var(--s-4) 10px;
  }
  .verdict h2 {
    display: flex;
    gap: var(--s-2);
    align-items: center;
    font-size: var(--t-ask);
    font-weight: var(--w-firm);
    line-height: 1.25;
  }
  .verdict p {
    font-size: var(--t-note);
    line-height: 1.36;
    padding-left: 28px;
  }
  .verdict.bad {
    background: var(--bad-ground);
    --sheet: var(--bad-ground);
  }
  .verdict.bad h2 {
    color: var(--bad);
  }
  .verdict.care {
    background: var(--care-ground);
    --sheet: var(--care-ground);
  }
  .verdict.care h2 {
    color: var(--care);
  }
  .verdict.good {
    background: var(--good-ground);
    --sheet: var(--good-ground);
  }
  .verdict.good h2 {
    color: var(--good);
  }
  .verdict.stale {
    background: var(--stale-ground);
    --sheet: var(--stale-ground);
  }
  .verdict.stale h2 {
    color: var(--stale);
  }

  /* a menu under a blank or a tool */
  .menu {
    position: absolute;
    z-index: 5;
    min-width: 200px;
    padding: var(--s-1) 0;
    background: var(--sheet);
    border: 1px solid var(--rule-strong);
    border-radius: var(--r-blank);
    color: var(--ink);
    max-height: min(70vh, 480px);
    overflow: auto;
  }
  .menu [role^="menuitem"],
  .menu [role="option"] {
    display: flex;
    align-items: center;
    gap: var(--s-2);
    width: 100%;
    min-height: var(--touch);
    padding: var(--s-1) var(--s-4);
    color: var(--hand);
    font-size: var(--t-body);
  }
  .menu [role^="menuitem"]:hover,
  .menu [role="option"]:hover,
  .menu [role^="menuitem"]:focus-visible,
  .menu [role="option"]:focus-visible {
    background: var(--hand-ground);
    outline-offset: -2px;
  }
  .menu [aria-checked="true"],
  .menu [aria-selected="true"] {
    font-weight: var(--w-firm);
  }
  .menu h3 {
    padding: var(--s-2) var(--s-4) 2px;
    color: var(--ink-2);
    font-size: var(--t-note);
  }

  @media (min-width: 1600px) {
    .icon {
      width: 22px;
      height: 22px;
    }
    .ball {
      width: 22px;
      height: 22px;
    }
  }
  @media (pointer: coarse) {
    .blank::after {
      content: "";
      position: absolute;
      inset: -11px -4px;
    }
  }
  @media (forced-colors: active) {
    .pick button[aria-pressed="true"],
    .ball.lit {
      forced-color-adjust: none;
      background: Highlight;
      color: HighlightText;
    }
    .tool,
    .blank.quiet {
      border-color: Canvas;
    }
    .tool[aria-pressed="true"] {
      border-bottom-color: CanvasText;
    }
    .blank:hover,
    .tool:hover,
    .act:hover {
      outline: 1px solid Highlight;
    }
  }
`;

/** Line habits of both drawings, the section and the treatment chart: graduations, scales, balloons. */
export const drawing = css`
  svg text {
    fill: var(--ink-3);
    font-size: var(--t-scale);
  }
  .tick {
    stroke: var(--rule-strong);
    stroke-width: 1;
    fill: none;
  }
  .scale-ground {
    fill: var(--ground);
  }
  .pointer {
    fill: var(--hand);
  }
  circle.ball {
    fill: var(--sheet);
    stroke: var(--ink);
    stroke-width: 1.25;
  }
  circle.ball.lit {
    fill: var(--hand);
    stroke: var(--hand);
  }
  text.ball-n {
    fill: var(--ink);
    font-weight: var(--w-firm);
    font-size: var(--t-scale);
    text-anchor: middle;
  }
  text.ball-n.lit {
    fill: var(--on-hand);
  }
`;
