import { css } from "lit";

export const tagStyle = css`
  :host {
    display: block;
  }
  .tag {
    padding: 1px;
    background: var(--rule-strong);
    clip-path: polygon(
      var(--chamfer) 0,
      100% 0,
      100% 100%,
      var(--chamfer) 100%,
      0 calc(100% - var(--chamfer)),
      0 var(--chamfer)
    );
  }
  .body {
    position: relative;
    background: var(--ground);
    padding: var(--s-2) var(--s-3) 10px 26px;
    clip-path: polygon(8.6px 0, 100% 0, 100% 100%, 8.6px 100%, 0 calc(100% - 8.6px), 0 8.6px);
  }
  .body::before {
    content: "";
    position: absolute;
    left: 9px;
    top: 14px;
    width: 8px;
    height: 8px;
    border-radius: 50%;
    background: var(--sheet);
    border: 1.5px solid var(--hand);
  }
  h2 {
    font-size: var(--t-ask);
    font-weight: var(--w-firm);
    display: flex;
    align-items: baseline;
    flex-wrap: wrap;
    gap: 0 var(--s-2);
  }
  h2 small {
    font-size: var(--t-note);
    font-weight: var(--w-text);
    color: var(--ink-2);
  }
  .in {
    color: var(--ink-2);
    font-size: var(--t-note);
    margin: 2px 0 var(--s-1);
  }
  dl {
    margin: 0;
    display: grid;
    grid-template-columns: auto 1fr auto;
    column-gap: var(--s-2);
  }
  dl > div {
    display: grid;
    grid-column: 1 / -1;
    grid-template-columns: subgrid;
    align-items: baseline;
    padding: 3px 0;
    border-top: 1px solid var(--rule);
  }
  dt {
    color: var(--ink-2);
    white-space: nowrap;
  }
  dd {
    text-align: right;
    white-space: nowrap;
    min-width: 0;
  }
  dd + dd {
    text-align: left;
    color: var(--ink-2);
    font-size: var(--t-note);
    min-width: 52px;
  }
  dd.wide {
    grid-column: 2 / -1;
    white-space: normal;
  }
  .gives {
    border-top: 1px solid var(--rule);
    padding-top: 5px;
    font-size: var(--t-note);
    color: var(--ink);
  }
  .lack {
    color: var(--bad);
    font-weight: var(--w-firm);
  }
  .links {
    display: flex;
    flex-wrap: wrap;
    gap: 2px var(--s-3);
    margin-top: var(--s-1);
    font-size: var(--t-note);
    border-top: 1px solid var(--rule);
    padding-top: 2px;
  }
  @media (max-width: 1000px) {
    .body {
      --touch: 32px;
      padding-right: 10px;
    }
  }
  @media (forced-colors: active) {
    .tag {
      clip-path: none;
      border: 1px solid CanvasText;
    }
    .body {
      clip-path: none;
    }
  }
`;
