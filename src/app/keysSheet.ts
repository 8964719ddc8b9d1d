/** The list of keys, over the sheet until it is closed. */
import { LitElement, css, html } from "lit";
import type { TemplateResult } from "lit";
import { customElement, query } from "lit/decorators.js";
import { shared } from "./styles/shared.ts";

const KEYS: readonly (readonly [place: string, rows: readonly (readonly [keys: string, does: string])[]])[] =
  [
    [
      "Section",
      [
        ["Arrows", "move by 1 mm; Shift 10, Alt 0.1"],
        ["Enter", "type it"],
        ["N, P", "next, previous point"],
        ["I, B", "insert a point, bend a side"],
        ["Delete", "take it out"],
        ["Esc", "puts back, or lets go"],
        ["F", "fit to the sheet"],
      ],
    ],
    [
      "Treatment",
      [
        ["Left, Right", "one graduation; Shift ten"],
        ["Home, End", "start, end"],
        ["Space", "play"],
        ["[ and ]", "stage edges"],
        ["Up, Down", "on a knob: 1 K; Shift 10"],
      ],
    ],
    [
      "Anywhere",
      [
        ["Ctrl Z, Ctrl Y", "undo, redo"],
        ["Ctrl S", "save the case"],
        ["1 to 9", "go to an answer"],
        ["A", "its arrival over the part"],
        ["U", "other units"],
        ["?", "these keys"],
      ],
    ],
  ];

@customElement("corelag-keys")
export class CorelagKeys extends LitElement {
  static override styles = [
    shared,
    css`
      .sheet {
        inset: auto var(--s-3) auto auto;
        top: calc(var(--head) + 2px);
        margin: 0;
        padding: var(--s-3) var(--s-4) var(--s-4);
        border: 1px solid var(--rule-strong);
        background: var(--ground);
        color: var(--ink);
        max-height: calc(100vh - var(--head) - 20px);
        overflow: auto;
      }
      h2 {
        font-size: var(--t-ask);
        font-weight: var(--w-firm);
      }
      h3 {
        margin-top: var(--s-2);
        color: var(--ink-2);
        font-size: var(--t-note);
      }
      dl {
        display: grid;
        grid-template-columns: auto 1fr;
        gap: 1px var(--s-4);
      }
      dt {
        color: var(--hand);
        font-weight: var(--w-firm);
      }
      .act {
        margin-top: var(--s-3);
      }
    `,
  ];

  @query(".sheet") private sheet!: HTMLElement;

  show(): void {
    this.sheet.showPopover();
    this.sheet.querySelector("button")?.focus();
  }

  protected override render(): TemplateResult {
    return html`<section class="sheet" popover="auto" aria-label="Keys">
      <h2>Keys</h2>
      ${KEYS.map(
        ([place, rows]) =>
          html`<h3>${place}</h3>
            <dl>
              ${rows.map(
                ([keys, does]) =>
                  html`<dt>${keys}</dt>
                    <dd>${does}</dd>`,
              )}
            </dl>`,
      )}
      <button class="act" @click=${() => this.sheet.hidePopover()}>Close</button>
    </section>`;
  }
}

declare global {
  interface HTMLElementTagNameMap {
    "corelag-keys": CorelagKeys;
  }
}
