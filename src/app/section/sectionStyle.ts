import { css } from "lit";

export const sectionStyle = css`
  :host {
    display: grid;
    grid-template-rows: var(--caption) minmax(0, 1fr);
    background: var(--sheet);
    min-width: 0;
    min-height: 0;
  }
  .caption {
    display: flex;
    align-items: center;
    gap: var(--s-4);
    padding: 0 var(--s-3) 0 var(--s-4);
    font-size: var(--t-ask);
    white-space: nowrap;
    min-width: 0;
  }
  .caption .says {
    overflow: hidden;
    padding: 4px 2px;
    margin: -4px -2px;
    text-overflow: ellipsis;
    min-width: 0;
  }
  .caption .group {
    flex: none;
  }
  .caption .draw + .group {
    border-left: 1px solid var(--rule);
    padding-left: var(--s-2);
    margin-left: calc(-1 * var(--s-2));
  }
  .board {
    position: relative;
    min-height: 0;
    overflow: hidden;
    touch-action: none;
  }
  .field,
  .lines {
    position: absolute;
    inset: 0;
    width: 100%;
    height: 100%;
    display: block;
  }
  .field {
    forced-color-adjust: none;
  }
  .lines {
    user-select: none;
    -webkit-user-select: none;
  }
  .mode {
    cursor: crosshair;
  }
  .panning {
    cursor: grabbing;
  }
  corelag-facts {
    position: absolute;
    left: calc(var(--scale) + var(--s-3));
    right: var(--s-3);
    bottom: calc(var(--zrule) + var(--s-1));
  }
  .cards {
    position: absolute;
    right: var(--s-3);
    top: 2px;
    width: var(--tag);
    display: grid;
    gap: var(--s-2);
    max-height: calc(var(--tag-room, 420px) + 4px);
    overflow: auto;
  }
  .cards.mends {
    width: calc(var(--tag) + 26px);
  }
  .readout {
    position: absolute;
    pointer-events: none;
    background: var(--sheet);
    border: 1px solid var(--rule-strong);
    padding: 1px 6px;
    font-size: var(--t-note);
    white-space: nowrap;
    color: var(--ink-2);
  }
  .readout b {
    color: var(--ink);
    margin-right: var(--s-1);
  }

  /* the drawing: thick 2, thin 1 */
  .line {
    stroke: var(--outline);
    stroke-width: var(--lw-outline);
    fill: none;
    stroke-linejoin: round;
    stroke-linecap: round;
    transition: stroke-width var(--m-quick);
  }
  .mirror {
    stroke: var(--mirror);
    stroke-width: var(--lw-mirror);
    fill: none;
  }
  .axis {
    stroke: var(--axis);
    stroke-width: var(--lw-thin);
    stroke-dasharray: var(--dash-axis);
  }
  .ghost {
    stroke: var(--stale);
    stroke-width: 1.25;
    stroke-dasharray: var(--dash-ghost);
    fill: none;
  }
  .hit {
    fill: transparent;
    stroke: transparent;
    stroke-width: 16;
    pointer-events: all;
    outline: none;
  }
  path.hit {
    fill: none;
    pointer-events: stroke;
  }
  .side,
  .point,
  .probe,
  .bulge {
    cursor: pointer;
    outline: none;
  }
  .extent {
    fill: none;
    stroke: none;
    pointer-events: none;
  }
  .side:hover .line,
  .side:focus-visible .line,
  .side.on .line {
    stroke: var(--hand);
    stroke-width: var(--lw-selected);
  }
  .side.within .line {
    stroke: var(--hand);
  }
  .side.lacks .line {
    stroke: var(--bad);
    stroke-dasharray: 7 4;
  }
  .side.faulty .line {
    stroke: var(--bad);
    stroke-width: 2.5;
  }
  text.note {
    fill: var(--hand);
    font-size: var(--t-note);
    font-weight: var(--w-firm);
    paint-order: stroke;
    stroke: var(--sheet);
    stroke-width: 4px;
    visibility: hidden;
    pointer-events: none;
  }
  .side:hover text.note,
  .side:focus-visible text.note,
  .side.on text.note,
  text.note.lack {
    visibility: visible;
  }
  text.note.lack {
    fill: var(--bad);
  }
  .thread {
    stroke: var(--hand);
    stroke-width: 1.25;
    fill: none;
  }
  .thread-end {
    fill: var(--hand);
  }
  .thread.bad {
    stroke: var(--bad);
  }
  .dim {
    stroke: var(--ink-3);
    stroke-width: var(--lw-hair);
    fill: none;
  }
  .dim-head {
    fill: var(--ink-3);
  }
  svg text.size {
    fill: var(--hand);
    font-size: var(--t-note);
    font-weight: var(--w-firm);
    paint-order: stroke;
    stroke: var(--sheet);
    stroke-width: 4px;
    cursor: pointer;
  }
  svg text.size:hover {
    fill: var(--hand-strong);
    text-decoration: underline;
  }
  .plumb {
    stroke: var(--hand);
    stroke-dasharray: 2 3;
    fill: none;
  }
  .box {
    fill: var(--sheet);
    stroke: var(--hand);
    stroke-width: 1.75;
    transition: transform var(--m-quick);
    transform-box: fill-box;
    transform-origin: center;
  }
  .point:hover .box,
  .bulge:hover .box {
    transform: scale(1.25);
  }
  .point.on .box {
    fill: var(--hand);
  }
  .halo {
    fill: none;
    stroke: var(--hand);
    stroke-width: 1.25;
    opacity: 0;
  }
  .point:focus-visible .halo,
  .dragging .halo {
    opacity: 1;
  }
  .iso {
    fill: none;
    stroke-width: var(--lw-iso);
    stroke-linecap: round;
  }
  .iso.mirrored {
    stroke: var(--ink-2);
    stroke-width: 0.9;
  }
  .chip {
    fill: var(--sheet);
  }
  svg text.level {
    fill: var(--ink);
    font-size: var(--t-scale);
    font-weight: var(--w-firm);
    text-anchor: middle;
  }
  .probe .ring {
    fill: none;
    stroke: var(--on-field);
    stroke-width: 1.5;
  }
  .probe .cross {
    stroke: var(--on-field);
    stroke-width: 1;
    fill: none;
  }
  .probe.outside .ring {
    stroke-dasharray: 2 2;
  }
  svg .probe text {
    fill: var(--on-field);
    font-size: var(--t-note);
    font-weight: 650;
  }
  svg .probe text.beside {
    fill: var(--ink);
    paint-order: stroke;
    stroke: var(--sheet);
    stroke-width: 4px;
  }
  .probe .reads {
    visibility: hidden;
    font-weight: var(--w-text);
  }
  .probe:hover .reads,
  .probe:focus-visible .reads,
  .probe.on .reads,
  .probe.outside .reads {
    visibility: visible;
  }
  .probe:focus-visible .hit,
  .probe.on .hit {
    stroke: var(--hand);
    stroke-width: 1.5;
  }
  .balloons {
    pointer-events: none;
  }
  svg text.coordinates {
    fill: var(--hand);
    font-size: var(--t-note);
    font-weight: var(--w-firm);
    paint-order: stroke;
    stroke: var(--sheet);
    stroke-width: 4px;
  }
  .mark {
    stroke: var(--ink-3);
    stroke-width: 1;
    fill: none;
  }
  .mark.held {
    fill: var(--ink-2);
    stroke: none;
  }
  .mark.flux {
    fill: var(--ink-2);
  }
  .fault-ring {
    fill: none;
    stroke: var(--bad);
    stroke-width: 2.25;
  }

  /* where the sheet scrolls, a finger on the bare board scrolls it; things are still taken hold of */
  @media (max-width: 1000px) {
    .board {
      touch-action: pan-y;
    }
    .side,
    .point,
    .probe,
    .bulge {
      touch-action: none;
    }
  }
  @media (max-width: 1340px) {
    .lesser {
      display: none;
    }
  }
  @media (max-width: 760px) {
    .cards,
    .cards.mends {
      position: static;
      width: auto;
      margin: var(--s-2);
    }
    .draw {
      display: none;
    }
    :host {
      grid-template-rows: auto 396px auto;
    }
    .caption {
      flex-wrap: wrap;
      padding-block: var(--s-2);
    }
  }
  @media (forced-colors: active) {
    .line,
    .iso {
      stroke-linecap: butt;
    }
  }
`;
