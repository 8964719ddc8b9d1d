import { LitElement, css, nothing, svg } from "lit";
import type { PropertyValues } from "lit";
import { customElement, property, state } from "lit/decorators.js";
import { html } from "lit";
import { calliperScale } from "./calliper-scale.ts";
import type { CalliperKind } from "./calliper-scale.ts";

/**
 * The picture of the doubt under an answer: the answer as a thick line between the jaws of its numerical doubt, each
 * estimate in its own line habit, and a red line across the gap where an estimate errs on the unsafe side. It is
 * hidden from listeners: the list under it says the same in words.
 */
@customElement("corelag-calliper")
export class CorelagCalliper extends LitElement {
  static override styles = css`
    :host {
      display: block;
      height: 29px;
      margin: 1px 0 3px;
    }
    svg {
      display: block;
      width: 100%;
      height: 100%;
      overflow: visible;
    }
    text {
      fill: var(--ink-3);
      font: var(--w-text) var(--t-scale) var(--face);
      font-variant-numeric: tabular-nums lining-nums;
      text-anchor: middle;
    }
    path {
      fill: none;
    }
    .base {
      stroke: var(--rule-strong);
    }
    .best {
      stroke: var(--ink);
      stroke-width: 2.5;
      transition: transform var(--m-settle) var(--m-ease);
    }
    .jaws {
      stroke: var(--ink);
      stroke-width: 1;
    }
    .lumped {
      stroke: var(--ink-2);
      stroke-width: 2;
      stroke-dasharray: 4 2;
    }
    .series {
      stroke: var(--ink);
      stroke-width: 2;
      stroke-dasharray: 1.5 2;
    }
    .gap {
      stroke: var(--bad);
      stroke-width: 1;
    }
    .unsafe {
      stroke: var(--bad);
    }
    @media (min-width: 1600px) {
      :host {
        height: 38px;
        margin: 4px 0 6px;
      }
    }
  `;

  @property() kind: CalliperKind = "number";
  /** all in one unit: s for times, else the shown unit */
  @property({ attribute: false }) value: number | null = null;
  @property({ attribute: false }) doubt: number | null = null;
  @property({ attribute: false }) lumped: number | null = null;
  @property({ attribute: false }) series: number | null = null;
  /** whether an estimate errs on the unsafe side */
  @property({ type: Boolean, attribute: "lumped-unsafe" }) lumpedUnsafe = false;
  @property({ type: Boolean, attribute: "series-unsafe" }) seriesUnsafe = false;

  @state() private width = 0;
  @state() private height = 0;
  private readonly observer = new ResizeObserver(() => {
    this.width = this.clientWidth;
    this.height = this.clientHeight;
  });

  override connectedCallback(): void {
    super.connectedCallback();
    this.setAttribute("aria-hidden", "true");
    this.observer.observe(this);
  }

  override disconnectedCallback(): void {
    super.disconnectedCallback();
    this.observer.disconnect();
  }

  protected override shouldUpdate(changed: PropertyValues<this>): boolean {
    return changed.size > 0;
  }

  protected override render() {
    if (this.value === null || this.width < 40) return html``;
    return html`<svg>${this.drawing(this.value)}</svg>`;
  }

  private drawing(value: number) {
    const { kind, doubt, lumped, series, width } = this;
    const scale = calliperScale(kind, value, doubt, [lumped, series], width);
    const base = this.height - 15;
    const x = (at: number): string => scale.x(at).toFixed(1);
    const mark = (at: number | null, habit: string, unsafe: boolean) =>
      at === null
        ? nothing
        : svg`${unsafe ? svg`<path class="gap" d="M${x(at)} ${base - 5.5}H${x(value)}" />` : nothing}<path
            class="${habit} ${unsafe ? "unsafe" : ""}" d="M${x(at)} ${base}v-13" />`;
    const lines = scale.lines.map(({ at, rank }) => `M${x(at)} ${base}v${rank === 2 ? 5 : 2.5}`).join("");
    return svg`<path class="base" d="M0 ${base + 0.5}H${width}${lines}" />
      ${scale.lines.map(({ at, label }) =>
        label === ""
          ? nothing
          : svg`<text x=${Math.max(12, Math.min(width - 14, scale.x(at))).toFixed(1)} y=${this.height}>${label}</text>`,
      )}
      ${mark(lumped, "lumped", this.lumpedUnsafe)}${mark(series, "series", this.seriesUnsafe)}
      ${doubt === null ? nothing : this.jaws(scale.x(value - doubt), scale.x(value + doubt), base)}
      <path class="best" d="M${x(value)} ${base}v-15" />`;
  }

  private jaws(from: number, to: number, base: number) {
    if (to - from < 9) return nothing; // inside the thickness of the line itself
    const [a, b] = [from.toFixed(1), to.toFixed(1)];
    return svg`<path class="jaws" d="M${a} ${base}v-9M${b} ${base}v-9M${a} ${base - 4.5}H${b}" />`;
  }
}

declare global {
  interface HTMLElementTagNameMap {
    "corelag-calliper": CorelagCalliper;
  }
}
