import { css } from "lit";

/** A ruled row: the question, its answer, the picture of the doubt, what the quick estimates say. */
export const askStyle = css`
  :host {
    display: block;
    break-inside: avoid;
  }
  .ask {
    display: flow-root;
    padding: 7px var(--s-4);
    border-bottom: 1px solid var(--rule);
    position: relative;
  }
  .ask:hover {
    background: var(--sheet);
  }
  :host([lit]) .ask,
  .ask:focus-within {
    background: var(--sheet);
  }
  :host([lit]) .ask {
    outline: 2px solid var(--hand);
    outline-offset: -2px;
  }
  .ask:focus-visible {
    outline: 2px solid var(--hand);
    outline-offset: -2px;
    border-radius: 0;
  }
  h3 {
    display: flow-root;
    font-size: var(--t-ask);
    line-height: 1.3;
    padding-right: 26px;
  }
  .tail {
    white-space: nowrap;
  }
  .ball {
    margin-right: var(--s-2);
    vertical-align: 2px;
    cursor: grab;
    touch-action: none;
  }
  .more {
    position: absolute;
    right: var(--s-2);
    top: 4px;
    height: 28px;
    opacity: 0;
  }
  .ask:hover .more,
  .ask:focus-within .more,
  :host([lit]) .more {
    opacity: 1;
  }
  .answer {
    display: flex;
    flex-wrap: wrap;
    align-items: baseline;
    gap: 0 var(--s-2);
    margin-top: 1px;
  }
  .answer output {
    font-size: var(--t-answer);
    font-weight: 620;
    line-height: 1.12;
    letter-spacing: -0.005em;
    white-space: nowrap;
  }
  .pm {
    color: var(--ink-2);
    white-space: nowrap;
  }
  .where {
    margin-left: auto;
    color: var(--ink-2);
    font-size: var(--t-note);
  }
  .remark {
    font-size: var(--t-note);
    line-height: 1.36;
    color: var(--ink);
    margin: 2px 0;
  }
  .waiting output {
    width: 7em;
    background: repeating-linear-gradient(135deg, var(--rule-strong) 0 1px, transparent 1px 5px) 0 100% / 100%
      60% no-repeat;
    opacity: 0.6;
  }
  .says-also {
    font-size: var(--t-note);
    line-height: 1.34;
    display: grid;
    grid-template-columns: auto 1fr;
    column-gap: var(--s-3);
  }
  .says-also li {
    display: grid;
    grid-template-columns: subgrid;
    grid-column: 1 / -1;
  }
  .says-also li > span:first-child {
    color: var(--ink-2);
    padding-left: 32px;
    position: relative;
  }
  .says-also li > span:first-child::before {
    content: "";
    position: absolute;
    left: 0;
    top: 0.62em;
    width: 23px;
    border-top: 2px dashed var(--ink-2);
  }
  .k-series > span:first-child::before {
    border-top-style: dotted !important;
    border-color: var(--ink) !important;
  }
  em.bad {
    font-style: normal;
    color: var(--bad);
    font-weight: var(--w-firm);
  }

  /* stale: the figure stays readable, loses its weight and gains a hatch underneath */
  .pale .answer output {
    color: var(--stale);
    font-weight: 460;
    background: repeating-linear-gradient(135deg, var(--stale) 0 1px, transparent 1px 5px) 0 100% / 100% 4px
      no-repeat;
  }
  .pale .pm,
  .pale .where,
  .pale .remark,
  .pale .says-also,
  .pale .says-also span,
  .pale em.bad {
    color: var(--stale);
    font-weight: var(--w-text);
  }
  .pale corelag-calliper {
    opacity: 0.6;
  }
  @media (min-width: 1600px) {
    .ask {
      padding-top: 16px;
      padding-bottom: 16px;
    }
    .more {
      top: 12px;
    }
  }
  @media (pointer: coarse) {
    .more {
      opacity: 1;
      height: 44px;
      top: 0;
    }
    h3 {
      padding-right: 40px;
    }
  }
  @media (forced-colors: active) {
    .pale .answer output {
      text-decoration: underline dotted;
    }
    em.bad {
      text-decoration: underline;
    }
  }
`;
