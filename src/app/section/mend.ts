/** The mend card: a fault of the document at its place, what is wrong and what can be done at once. */
import { LitElement, css, html, nothing } from "lit";
import type { TemplateResult } from "lit";
import { customElement, property } from "lit/decorators.js";
import { pathSteps } from "../../case/path.ts";
import type { CaseDocument, CaseProblem } from "../../case/types.ts";
import { conditionOf } from "../../editor/conditions.ts";
import { closeToAxis, FEWEST_VERTICES, removeVertex } from "../../editor/outline.ts";
import type { LoopIndex } from "../../editor/outline.ts";
import { NOTHING } from "../../editor/selection.ts";
import type { Selection } from "../../editor/selection.ts";
import { send, sendEdit } from "../events.ts";
import { icon } from "../icons.ts";
import { shared } from "../styles/shared.ts";
import { readSheet } from "./sheet.ts";
import { capital } from "./spoken.ts";

/** The point or side that a path of the document leads to; null where it leads elsewhere. */
export function placeOfPath(path: string): LoopIndex | null {
  const steps = pathSteps(path);
  if (steps[0] !== "part" || steps[1] !== "regions" || typeof steps[2] !== "number") return null;
  const [, , region, where, number, index] = steps;
  if (where === "outline" && typeof number === "number") return { region, loop: 0, index: number };
  if (where === "holes" && typeof number === "number" && typeof index === "number")
    return { region, loop: number + 1, index };
  return null;
}

@customElement("corelag-mend")
export class CorelagMend extends LitElement {
  static override styles = [
    shared,
    css`
      .card {
        background: var(--bad-ground);
        --sheet: var(--bad-ground);
        padding: var(--s-2) var(--s-3) var(--s-3) var(--s-4);
        clip-path: polygon(
          var(--chamfer) 0,
          100% 0,
          100% 100%,
          var(--chamfer) 100%,
          0 calc(100% - var(--chamfer)),
          0 var(--chamfer)
        );
      }
      h2 {
        color: var(--bad);
        font-weight: var(--w-firm);
        font-size: var(--t-ask);
        display: flex;
        gap: var(--s-2);
        line-height: 1.25;
        margin-bottom: var(--s-1);
      }
      .acts {
        display: flex;
        flex-wrap: wrap;
        gap: var(--s-2);
        margin: var(--s-2) 0;
      }
      .act {
        padding: 0 var(--s-2);
      }
      .act:not(.main) {
        background: none;
      }
      @media (forced-colors: active) {
        .card {
          border: 1px solid CanvasText;
        }
      }
    `,
  ];

  @property({ attribute: false }) document: CaseDocument | null = null;
  @property({ attribute: false }) problems: readonly CaseProblem[] = [];
  @property({ attribute: false }) selection: Selection = NOTHING;
  /** what undo would take back; null when there is nothing */
  @property({ attribute: false }) undoLabel: string | null = null;

  protected override render(): TemplateResult | typeof nothing {
    const [first] = this.problems;
    if (!first || !this.document) return nothing;
    const others = this.problems.length - 1;
    return html`<div class="card" role="alert" aria-label="Fault">
      <h2>${icon("bad")}<span>${headline(first)}</span></h2>
      <p>${rest(first)}</p>
      <p class="acts">${this.acts(first)}</p>
      <p class="aside">
        ${capital(first.mend)}${others > 0 ? html` <b>${others === 1 ? "One more fault" : `${others} more faults`}</b> after this.` : nothing}
      </p>
    </div>`;
  }

  /** The point to act on: the selected one in an outline that is at fault, else where the fault says. */
  private pointOf(problem: CaseProblem): LoopIndex | null {
    const place = placeOfPath(problem.path);
    return place && this.selection.kind === "vertex" ? this.selection : place;
  }

  /** A side that lacks a condition is taken into the tag, where one is picked. */
  private conditionActs(problem: CaseProblem): TemplateResult {
    const stage = pathSteps(problem.path)[1];
    const found = typeof stage === "number" ? sideWithout(this.document!, stage) : null;
    return html`${this.undoAct()}${
      found
        ? html`<button class="act" @click=${() => send(this, "corelag-select", { kind: "side", ...found })}>
            Pick one for it
          </button>`
        : nothing
    }`;
  }

  /** A gap to the axis can be closed at once. */
  private gapActs(problem: CaseProblem): TemplateResult {
    const side = placeOfPath(problem.path);
    if (!side) return html`${this.undoAct()}`;
    const close = (): void =>
      sendEdit(this, "closing the gap to the axis", (draft) => closeToAxis(draft, side));
    return html`<button class="act main" @click=${close}>Close the gap</button>${this.undoAct()}`;
  }

  private undoAct(): TemplateResult | typeof nothing {
    if (this.undoLabel === null) return nothing;
    return html`<button class="act main" @click=${() => send(this, "corelag-do", { kind: "undo" })}>
      ${putBackWords(this.undoLabel)}
    </button>`;
  }

  private acts(problem: CaseProblem): TemplateResult {
    if (problem.code === "side-without-condition") return this.conditionActs(problem);
    if (problem.code === "outline-gap-to-axis") return this.gapActs(problem);
    const place = this.pointOf(problem);
    const loop = place && loopLength(this.document!, place);
    const take = (at: LoopIndex) => (): void =>
      sendEdit(this, `taking out point ${at.index + 1}`, (draft) => removeVertex(draft, at));
    const show = (at: LoopIndex) => (): void => send(this, "corelag-select", { kind: "vertex", ...at });
    const selected = this.selection.kind === "vertex";
    return html`${this.undoAct()}
    ${
      place && loop && loop > FEWEST_VERTICES
        ? html`<button class="act" @click=${take(place)}>Take point ${place.index + 1} out</button>`
        : nothing
    }
    ${place && !selected ? html`<button class="act" @click=${show(place)}>Type point ${place.index + 1}</button>` : nothing}`;
  }
}

/** The first exposed side that a stage says nothing about. */
function sideWithout(document: CaseDocument, stage: number): LoopIndex | null {
  for (const loop of readSheet(document).loops)
    for (const side of loop.sides)
      if (!side.onAxis && !side.joint && conditionOf(document.stages[stage], side.name) === undefined)
        return { region: loop.region, loop: loop.loop, index: side.index };
  return null;
}

function loopLength(document: CaseDocument, { region, loop }: LoopIndex): number | undefined {
  const found = document.part.regions[region];
  return loop === 0 ? found?.outline.length : found?.holes?.[loop - 1]?.length;
}

/** "Put point 3 back" for a move, "Undo: ..." for the rest. */
function putBackWords(label: string): string {
  const moved = /^move of (?<what>.+)$/.exec(label)?.groups?.["what"];
  return moved ? `Put ${moved} back` : `Undo: ${label}`;
}

/** What a fault of the outline is called over its place; other faults are called by their first sentence. */
const HEADLINES: Readonly<Record<string, string>> = {
  "outline-not-a-number": "A point has no number",
  "outline-few-sides": "The outline has too few sides",
  "outline-no-area": "The outline encloses nothing",
  "outline-gap": "The outline is open here",
  "outline-zero-length": "A side has no length",
  "outline-duplicate": "Two sides lie on each other",
  "outline-crossing": "The outline crosses itself here",
  "outline-thin-wall": "The wall is too thin here",
  "outline-in-pieces": "The part falls apart here",
  "outline-void-outside": "A void lies outside the part",
  "outline-overlap": "Two regions overlap here",
  "outline-negative-radius": "The outline crosses the axis",
  "outline-gap-to-axis": "The outline leaves a gap to the axis",
  "outline-stands-apart": "A region stands apart",
  "probe-outside": "A probe lies outside the part",
  "not-solved-yet": "Not solved by this version",
  "side-without-condition": "A side needs a condition",
};

function headline({ code, message }: CaseProblem): string {
  return HEADLINES[code] ?? capital(firstSentence(message).replace(/\.$/, ""));
}

function rest({ code, message }: CaseProblem): string {
  return code in HEADLINES ? capital(message) : message.slice(firstSentence(message).length).trim();
}

const firstSentence = (message: string): string => /^.*?[.!?](?=\s|$)/su.exec(message)?.[0] ?? message;

declare global {
  interface HTMLElementTagNameMap {
    "corelag-mend": CorelagMend;
  }
}
