import { css } from "lit";

export const startStyle = css`
  :host {
    display: block;
    min-height: 0;
    overflow: auto;
    background: var(--sheet);
  }
  .start {
    padding: 14px var(--s-5) var(--s-4);
  }
  h2 {
    font-size: 26px;
    font-weight: 620;
    line-height: 1.2;
  }
  .lead {
    margin-bottom: var(--s-3);
  }
  .shapes {
    display: grid;
    grid-template-columns: repeat(4, minmax(0, 1fr));
    border-top: 1px solid var(--rule);
    border-left: 1px solid var(--rule);
  }
  .shape {
    text-align: left;
    display: grid;
    grid-template-rows: 1fr auto auto;
    padding: var(--s-2) var(--s-3) var(--s-2);
    border-right: 1px solid var(--rule);
    border-bottom: 1px solid var(--rule);
    min-height: 128px;
    color: var(--ink);
  }
  .shape:hover,
  .shape[aria-pressed="true"] {
    background: var(--hand-ground);
  }
  .shape[aria-pressed="true"] {
    outline: 2px solid var(--hand);
    outline-offset: -2px;
  }
  .shape:focus-visible {
    outline-offset: -4px;
  }
  .shape svg {
    width: 100%;
    height: 74px;
    fill: none;
    stroke: var(--ink);
    stroke-width: 1.75;
    stroke-linejoin: round;
  }
  .shape .axis {
    stroke: var(--axis);
    stroke-width: 1;
    stroke-dasharray: 9 2.5 2 2.5;
  }
  .shape .hatch {
    stroke: var(--ink-3);
    stroke-width: 0.9;
  }
  .shape .far {
    stroke-width: 1.25;
    stroke: var(--ink-2);
  }
  .shape b {
    font-size: var(--t-ask);
    color: var(--hand);
  }
  .shape small {
    color: var(--ink-2);
    font-size: var(--t-note);
    line-height: 1.25;
  }
  /* once a shape is picked its sizes are in the sentence, which needs the room */
  @media (max-height: 900px) {
    .asking .shape {
      min-height: 0;
      padding-block: var(--s-1);
    }
    .asking .shape small {
      display: none;
    }
    .asking .shape svg {
      height: 62px;
    }
  }
  .or {
    margin-top: 14px;
    font-size: var(--t-ask);
  }
  .sentence {
    margin-top: var(--s-3);
    font-size: var(--t-ask);
    line-height: 1.75;
    max-width: 72em;
    scroll-margin: var(--s-3);
  }
  .with-unit {
    white-space: nowrap;
  }
  .acts {
    display: flex;
    align-items: center;
    gap: var(--s-3);
    margin-top: var(--s-1);
  }
  .fault {
    color: var(--bad);
    font-size: var(--t-note);
    line-height: 1.4;
  }
  @media (min-width: 1600px) {
    .shape {
      min-height: 210px;
    }
    .shape svg {
      height: 130px;
    }
  }
  @media (max-width: 760px) {
    .shapes {
      grid-template-columns: repeat(2, minmax(0, 1fr));
    }
    .acts {
      flex-wrap: wrap;
    }
  }
`;
