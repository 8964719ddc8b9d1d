import { css } from "lit";

export const headStyle = css`
  header {
    display: flex;
    align-items: center;
    gap: var(--s-3);
    height: var(--head);
    padding: 0 var(--s-3) 0 var(--s-4);
    border-bottom: 1px solid var(--rule);
    background: var(--ground);
  }
  .icon-mark {
    width: 26px;
    height: 26px;
    margin-right: -4px;
  }
  .name {
    font-weight: 700;
    letter-spacing: 0.01em;
    font-size: var(--t-ask);
  }
  .title {
    font-size: var(--t-ask);
    padding-left: var(--s-3);
    border-left: 1px solid var(--rule-strong);
    line-height: 24px;
    white-space: nowrap;
    overflow: hidden;
    text-overflow: ellipsis;
    min-width: 0;
    font-weight: var(--w-firm);
  }
  .kept {
    color: var(--ink-3);
    font-size: var(--t-note);
    white-space: nowrap;
  }
  .status {
    position: relative;
    display: flex;
    align-items: center;
    gap: var(--s-2);
    white-space: nowrap;
    padding: 0 var(--s-2);
    height: var(--touch);
    transition: background var(--m-quick);
  }
  .status.stale {
    background: var(--stale-ground);
    color: var(--stale);
  }
  .done {
    position: absolute;
    left: 0;
    right: 0;
    bottom: 0;
    height: 2px;
    background: currentColor;
    transform-origin: left;
  }
  .jaws path {
    transition:
      transform var(--m-settle) var(--m-ease),
      opacity var(--m-settle);
  }
  .jaws .left {
    transform: translateX(-3.6px);
  }
  .jaws .right {
    transform: translateX(3.6px);
  }
  .settling .jaws .left {
    transform: translateX(-1.6px);
  }
  .settling .jaws .right {
    transform: translateX(1.6px);
  }
  .settled .jaws .left,
  .settled .jaws .right {
    transform: none;
  }
  .settled .jaws .work {
    opacity: 0;
  }
  @media (max-width: 1180px) {
    .kept {
      display: none;
    }
  }
  @media (max-width: 1000px) {
    .name {
      display: none;
    }
  }
  @media (max-width: 760px) {
    .pick {
      display: none;
    }
    .files .tool:not(.more) {
      display: none;
    }
    header {
      gap: var(--s-1);
      padding-right: var(--s-1);
    }
    .status span {
      overflow: hidden;
      text-overflow: ellipsis;
      max-width: 26vw;
    }
  }
  @media (forced-colors: active) {
    .status.stale {
      outline: 1px solid GrayText;
    }
  }
`;
