import { css } from "lit";

/** A blank: blue-green words over a line, in the sentence's own type. */
export const blankStyle = css`
  :host {
    display: inline;
    font-variant-numeric: tabular-nums lining-nums;
  }
  :host([hidden]) {
    display: none;
  }
  .blank {
    position: relative;
    display: inline-grid;
    max-width: 100%;
    vertical-align: baseline;
    color: var(--hand);
    font: inherit;
    font-weight: var(--w-firm, 600);
    font-feature-settings: inherit;
    line-height: 1.2;
    white-space: nowrap;
    text-align: start;
    background: none;
    border: 0;
    border-bottom: 1.5px solid var(--hand);
    border-radius: var(--r-blank, 2px) var(--r-blank, 2px) 0 0;
    padding: 0 2px;
    margin: 0;
    cursor: pointer;
    transition: background var(--m-quick, 90ms);
  }
  .blank:hover {
    background: var(--hand-ground);
    color: var(--hand-strong);
  }
  .blank:focus-visible,
  .blank:focus-within {
    outline: 2px solid var(--hand);
    outline-offset: 2px;
    border-radius: var(--r-blank, 2px);
  }
  .number {
    cursor: ew-resize;
    touch-action: pan-y;
  }
  .number:focus-within {
    cursor: text;
  }
  .sizer,
  input {
    grid-area: 1 / 1;
    font: inherit;
    letter-spacing: inherit;
    padding: 0;
    margin: 0;
    border: 0;
  }
  .sizer {
    visibility: hidden;
    white-space: pre;
    min-width: 1ch;
    overflow: hidden;
  }
  input {
    width: 100%;
    min-width: 0;
    color: inherit;
    background: none;
    outline: none;
    cursor: inherit;
    text-overflow: ellipsis;
    font-feature-settings: inherit;
    font-variant-numeric: inherit;
    text-align: inherit;
  }
  input::selection {
    background: var(--hand);
    color: var(--on-hand);
  }
  input::placeholder {
    color: var(--ink-3);
    opacity: 1;
  }
  .quiet {
    color: var(--ink);
    font-weight: inherit;
    border-color: transparent;
    margin-inline: -2px;
  }
  .quiet:hover {
    border-color: var(--hand);
  }
  .empty {
    color: var(--ink-3);
    font-weight: var(--w-text, 440);
    border-color: var(--rule-strong);
    padding-right: 28px;
  }
  .faulty {
    color: var(--bad);
    border-bottom: 2px solid var(--bad);
  }
  .disabled {
    color: var(--ink-3);
    border-color: var(--rule-strong);
    cursor: default;
  }
  .disabled:hover {
    background: none;
    color: var(--ink-3);
  }
  /* floats below the line the blank stands in, so that the sentence is not torn apart */
  .fault {
    float: left;
    width: 100%;
    color: var(--bad);
    font-size: var(--t-note, 13.5px);
    font-weight: var(--w-text, 440);
    line-height: 1.3;
    white-space: normal;
    margin: 3px 0 4px;
  }
  .fault b {
    font-weight: var(--w-firm, 600);
  }
  .for-listeners {
    position: absolute;
    width: 1px;
    height: 1px;
    overflow: hidden;
    clip-path: inset(50%);
    white-space: nowrap;
  }
  @media (pointer: coarse) {
    .blank::after {
      content: "";
      position: absolute;
      inset: -11px -4px;
    }
    .number::after {
      display: none;
    }
    .number input {
      margin-block: -11px;
      padding-block: 11px;
    }
  }
  @media (forced-colors: active) {
    .blank:hover {
      outline: 1px solid Highlight;
    }
    .quiet {
      border-color: Canvas;
    }
    .faulty {
      border-bottom-style: double;
      border-bottom-width: 4px;
    }
  }
`;
