/** The tag: exact entry of the one thing that is selected, tied to it by a thread. */
import { LitElement, html, nothing } from "lit";
import type { TemplateResult } from "lit";
import { customElement, property, state } from "lit/decorators.js";
import type { MaterialLibrary } from "../../case/library.ts";
import type { CaseDocument } from "../../case/types.ts";
import type { UnitSystem } from "../../case/units.ts";
import { NOTHING } from "../../editor/selection.ts";
import type { Selection } from "../../editor/selection.ts";
import { shared } from "../styles/shared.ts";
import { tagStyle } from "./tagStyle.ts";
import { probeTag, regionTag } from "./tagThings.ts";
import { stageTag } from "./tagConditions.ts";
import { sideTag } from "./tagSide.ts";
import { vertexTag } from "./tagVertex.ts";
import { readSheet } from "./sheet.ts";
import type { Sheet } from "./sheet.ts";

/** Amounts of the part that an entry changes: shown beside it while the hand moves. */
export interface PartAmounts {
  /** kg */
  readonly mass: number;
  /** V/A [m] */
  readonly length: number;
}

/** What the pages of the tag are drawn from. */
export interface TagView {
  readonly host: CorelagTag;
  readonly document: CaseDocument;
  /** the document before the running gesture */
  readonly before: CaseDocument | null;
  readonly sheet: Sheet;
  readonly units: UnitSystem;
  readonly stage: number;
  readonly setStage: (stage: number) => void;
  readonly amounts: PartAmounts | null;
  readonly amountsBefore: PartAmounts | null;
  /** degC at the selected place; NaN where unknown */
  readonly temperature: number;
  readonly library: MaterialLibrary;
}

@customElement("corelag-tag")
export class CorelagTag extends LitElement {
  static override styles = [shared, tagStyle];

  @property({ attribute: false }) document: CaseDocument | null = null;
  @property({ attribute: false }) earlier: CaseDocument | null = null;
  @property({ attribute: false }) selection: Selection = NOTHING;
  @property() units: UnitSystem = "si";
  /** stage at the time cursor */
  @property({ type: Number }) stageNow = 0;
  @property({ attribute: false }) amounts: PartAmounts | null = null;
  @property({ attribute: false }) amountsBefore: PartAmounts | null = null;
  @property({ type: Number }) temperature = Number.NaN;
  @property({ attribute: false }) library: MaterialLibrary = {};

  /** stage that was picked in the tag; null follows the cursor */
  @state() private picked: number | null = null;

  protected override willUpdate(changed: Map<PropertyKey, unknown>): void {
    const stages = this.document?.stages.length ?? 0;
    if (changed.has("selection") || (this.picked ?? 0) >= stages) this.picked = null;
  }

  /** Takes the focus to the first blank, for Enter on the selected thing. */
  override focus(): void {
    this.renderRoot.querySelector<HTMLElement>("corelag-blank, button")?.focus();
  }

  protected override render(): TemplateResult | typeof nothing {
    const { document } = this;
    if (!document || this.selection.kind === "none") return nothing;
    const view: TagView = {
      host: this,
      document,
      before: this.earlier,
      sheet: readSheet(document),
      units: this.units,
      stage: Math.min(this.picked ?? this.stageNow, Math.max(0, document.stages.length - 1)),
      setStage: (stage) => (this.picked = stage),
      amounts: this.amounts,
      amountsBefore: this.amountsBefore,
      temperature: this.temperature,
      library: this.library,
    };
    const page = this.page(view);
    return page === null
      ? nothing
      : html`<aside class="tag" aria-label="Selected"><div class="body">${page}</div></aside>`;
  }

  private page(view: TagView): TemplateResult | null {
    const { selection } = this;
    if (selection.kind === "vertex") return vertexTag(view, selection);
    if (selection.kind === "side") return sideTag(view, selection);
    if (selection.kind === "region") return regionTag(view, selection.region);
    if (selection.kind === "probe") return probeTag(view, selection.index);
    if (selection.kind === "stage") return stageTag(view, selection.index);
    return null;
  }
}

declare global {
  interface HTMLElementTagNameMap {
    "corelag-tag": CorelagTag;
  }
}
