import { LitElement, css, html, nothing } from "lit";
import type { TemplateResult } from "lit";
import { customElement, property, query, state } from "lit/decorators.js";
import { classMap } from "lit/directives/class-map.js";

export interface MenuItem {
  readonly value: string;
  readonly label: string;
  /** a few words of what it means, in lesser ink behind the label */
  readonly note?: string;
  readonly disabled?: boolean;
  /** a hairline above this item */
  readonly parted?: boolean;
}

const GAP = 4;
const EDGE = 8;
/** ms within which typed letters make one word */
const TYPE_AHEAD = 700;

/**
 * A list that opens under the thing it belongs to, in the top layer, so that no pane cuts it off. Arrow keys, Home,
 * End and letters move; Enter and Space pick; Esc and Tab close and give the focus back.
 *
 * @fires pick - CustomEvent<{ value: string }>
 * @fires toggle - CustomEvent<{ open: boolean }>
 */
@customElement("corelag-menu")
export class CorelagMenu extends LitElement {
  static override styles = css`
    .list {
      position: fixed;
      inset: auto;
      margin: 0;
      padding: 0;
      overflow: auto;
      max-height: min(420px, calc(100vh - 16px));
      min-width: 120px;
      max-width: min(420px, calc(100vw - 16px));
      color: var(--ink);
      background: var(--sheet);
      border: 1px solid var(--rule-strong);
      border-radius: var(--r-blank, 2px);
      font: var(--w-text, 440) var(--t-body, 15px) / 1.3 var(--face, sans-serif);
      font-variant-numeric: tabular-nums lining-nums;
    }
    .list:focus-visible {
      outline: 2px solid var(--hand);
      outline-offset: 0;
    }
    .item {
      display: flex;
      align-items: baseline;
      gap: var(--s-3, 12px);
      min-height: var(--touch, 32px);
      padding: 0 var(--s-3, 12px) 0 26px;
      cursor: pointer;
      position: relative;
      white-space: nowrap;
    }
    .item > span {
      line-height: var(--touch, 32px);
    }
    .item small {
      margin-left: auto;
      color: var(--ink-2);
      font-size: var(--t-note, 13.5px);
    }
    .item.parted {
      border-top: 1px solid var(--rule);
    }
    .item.at {
      background: var(--hand-ground);
      color: var(--hand-strong);
    }
    .item.chosen {
      font-weight: var(--w-firm, 600);
    }
    .item.chosen::before {
      content: "";
      position: absolute;
      left: 11px;
      top: calc(var(--touch, 32px) / 2 - 3.5px);
      width: 7px;
      height: 7px;
      background: var(--hand);
    }
    .item[aria-disabled="true"] {
      color: var(--ink-3);
      cursor: default;
    }
    @media (forced-colors: active) {
      .item.at {
        outline: 2px solid Highlight;
        outline-offset: -2px;
      }
    }
  `;

  @property() kind: "listbox" | "menu" = "menu";
  @property() label = "";
  @property({ attribute: false }) items: readonly MenuItem[] = [];
  @property() value = "";
  @state() private at = 0;
  @query(".list") private list!: HTMLElement | null;

  private anchor: HTMLElement | null = null;
  private word = "";
  private wordAt = 0;

  /** Opens under `anchor`, at the chosen item. */
  show(anchor: HTMLElement): void {
    if (this.list === null || this.items.length === 0) return;
    this.anchor = anchor;
    this.at = Math.max(
      0,
      this.items.findIndex((item) => item.value === this.value),
    );
    this.list.showPopover();
    this.place();
    this.list.focus();
  }

  hide(): void {
    this.list?.hidePopover();
  }

  protected override render(): TemplateResult {
    return html`<div
      class="list"
      popover="auto"
      tabindex="-1"
      role=${this.kind}
      aria-label=${this.label === "" ? nothing : this.label}
      aria-activedescendant="item-${this.at}"
      @toggle=${this.toggled}
      @keydown=${this.keyed}
    >
      ${this.items.map((item, index) => this.item(item, index))}
    </div>`;
  }

  private item(item: MenuItem, index: number): TemplateResult {
    const chosen = this.kind === "listbox" && item.value === this.value;
    return html`<div
      id="item-${index}"
      class=${classMap({ item: true, at: index === this.at, chosen, parted: item.parted === true })}
      role=${this.kind === "listbox" ? "option" : "menuitem"}
      aria-selected=${this.kind === "listbox" ? (chosen ? "true" : "false") : nothing}
      aria-disabled=${item.disabled === true ? "true" : nothing}
      @pointermove=${() => (this.at = index)}
      @click=${() => this.pick(index)}
    >
      <span>${item.label}</span>${item.note === undefined ? nothing : html`<small>${item.note}</small>`}
    </div>`;
  }

  /** Below the anchor where there is room, else above, and never over the edge of the window. */
  private place(): void {
    if (this.list === null || this.anchor === null) return;
    const box = this.anchor.getBoundingClientRect();
    const own = this.list.getBoundingClientRect();
    const below = window.innerHeight - box.bottom - GAP - EDGE;
    const above = box.top - GAP - EDGE;
    const top =
      own.height <= below || below >= above ? box.bottom + GAP : Math.max(EDGE, box.top - GAP - own.height);
    this.list.style.top = `${top}px`;
    this.list.style.left = `${Math.max(EDGE, Math.min(box.left - 26, window.innerWidth - own.width - EDGE))}px`;
    this.list.style.maxHeight = `${Math.max(below, above)}px`;
    this.shadowRoot?.getElementById(`item-${this.at}`)?.scrollIntoView({ block: "nearest" });
  }

  private toggled(event: ToggleEvent): void {
    const open = event.newState === "open";
    this.dispatchEvent(new CustomEvent("toggle", { detail: { open }, bubbles: true, composed: true }));
    if (!open && this.shadowRoot?.activeElement === this.list) this.anchor?.focus();
  }

  private keyed(event: KeyboardEvent): void {
    event.stopPropagation();
    const last = this.items.length - 1;
    if (event.key === "ArrowDown") this.go(this.at + 1, 1);
    else if (event.key === "ArrowUp") this.go(this.at - 1, -1);
    else if (event.key === "Home") this.go(0, 1);
    else if (event.key === "End") this.go(last, -1);
    else if (event.key === "Enter" || (event.key === " " && this.word === "")) this.pick(this.at);
    else if (event.key === "Escape" || event.key === "Tab") return this.leave(event);
    else if (event.key.length === 1) this.type(event.key);
    else return;
    event.preventDefault();
  }

  private leave(event: KeyboardEvent): void {
    if (event.key === "Escape") event.preventDefault();
    this.hide();
    this.anchor?.focus();
  }

  private go(to: number, direction: number): void {
    let at = to;
    while (this.items[at]?.disabled === true) at += direction;
    if (this.items[at] === undefined) return;
    this.at = at;
    void this.updateComplete.then(() =>
      this.shadowRoot?.getElementById(`item-${at}`)?.scrollIntoView({ block: "nearest" }),
    );
  }

  private type(letter: string): void {
    const now = Date.now();
    this.word = now - this.wordAt > TYPE_AHEAD ? letter : this.word + letter;
    this.wordAt = now;
    const word = this.word.toLowerCase();
    const found = this.items.findIndex(
      (item) => item.label.toLowerCase().startsWith(word) && item.disabled !== true,
    );
    if (found >= 0) this.go(found, 1);
  }

  private pick(index: number): void {
    const item = this.items[index];
    if (item === undefined || item.disabled === true) return;
    this.hide();
    this.anchor?.focus();
    this.dispatchEvent(
      new CustomEvent("pick", { detail: { value: item.value }, bubbles: true, composed: true }),
    );
  }
}

declare global {
  interface HTMLElementTagNameMap {
    "corelag-menu": CorelagMenu;
  }
}
