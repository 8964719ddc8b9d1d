import { css } from "lit";

export const appStyle = css`
  :host {
    display: block;
    height: 100%;
  }
  .app {
    position: relative;
    height: 100%;
    display: grid;
    grid-template:
      "head head" var(--head) "section side" minmax(0, 1fr) "strip side" var(--strip)
      / minmax(0, 1fr) var(--answers);
  }
  corelag-head {
    grid-area: head;
    min-width: 0;
  }
  main {
    grid-area: section;
    display: grid;
    grid-template: minmax(0, 1fr) / minmax(0, 1fr);
    min-width: 0;
    min-height: 0;
  }
  corelag-strip {
    grid-area: strip;
    border-top: 1px solid var(--rule-strong);
    min-width: 0;
  }
  corelag-pane {
    grid-area: side;
    border-left: 1px solid var(--rule);
    min-width: 0;
    min-height: 0;
  }
  .dropping::after {
    content: "";
    position: absolute;
    inset: 4px;
    border: 2px dashed var(--hand);
    pointer-events: none;
    z-index: 6;
  }
  .notice {
    position: absolute;
    top: calc(var(--head) + var(--caption));
    left: calc(var(--scale) + var(--s-3));
    max-width: min(620px, calc(100% - 2 * var(--s-5)));
    z-index: 4;
    display: flex;
    gap: var(--s-3);
    align-items: center;
    background: var(--care-ground);
    color: var(--ink);
    padding: var(--s-2) var(--s-3);
    font-size: var(--t-note);
  }
  .notice:not(:has(span)) {
    display: none;
  }
  .notice .icon {
    color: var(--care);
  }
  @media (max-width: 1000px) {
    .app {
      grid-template:
        "head" var(--head) "section" minmax(396px, 1fr) "strip" var(--strip) "side" minmax(0, 1fr)
        / minmax(0, 1fr);
    }
    corelag-pane {
      border-left: 0;
      border-top: 1px solid var(--rule-strong);
    }
  }
  /* 200 % zoom and low windows: the sheet scrolls, nothing is cut */
  @media (max-width: 1000px) and (max-height: 1000px), (max-width: 760px) {
    :host,
    .app {
      height: auto;
    }
    .app {
      grid-template-rows: var(--head) minmax(396px, auto) var(--strip) auto;
    }
  }
  @media print {
    :host,
    .app {
      height: auto;
    }
    .app {
      display: block;
    }
    corelag-head,
    main,
    corelag-strip {
      display: none;
    }
  }
`;
