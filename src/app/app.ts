/** The page: the grid of head, section, treatment and pane; the only element that holds and changes the state. */
import { LitElement, css, html } from "lit";
import { customElement } from "lit/decorators.js";
import { Follow } from "./follow.ts";
import { AppState } from "./state.ts";
import { shared } from "./styles/shared.ts";
import "./strip/strip.ts";
import "./pane/pane.ts";

@customElement("corelag-app")
export class CorelagApp extends LitElement {
  readonly state = new AppState();
  readonly follow = new Follow(this, () => {
    const s = this.state;
    return [
      s.document.value,
      s.result.value,
      s.status.value,
      s.cursor.value,
      s.selection.value,
      s.units.value,
      s.pane.value,
    ];
  });

  override render() {
    const s = this.state;
    return html`
      <corelag-strip
        .document=${s.document.value}
        .result=${s.result.value}
        .status=${s.status.value}
        .stale=${s.stale.value}
        .dragging=${s.dragging.value}
        .cursor=${s.cursor.value}
        .selection=${s.selection.value}
        .focusedAnswer=${s.focusedAnswer.value}
        .shown=${s.shown.value}
        .units=${s.units.value}
      ></corelag-strip>
      <corelag-pane
        .document=${s.document.value}
        .result=${s.result.value}
        .problems=${s.problems.value}
        .failure=${s.failure.value}
        .status=${s.status.value}
        .stale=${s.stale.value}
        .dragging=${s.dragging.value}
        .cursor=${s.cursor.value}
        .selection=${s.selection.value}
        .focusedAnswer=${s.focusedAnswer.value}
        .shown=${s.shown.value}
        .units=${s.units.value}
        .pane=${s.pane.value}
      ></corelag-pane>
    `;
  }

  static override styles = [shared, css``];
}

declare global {
  interface HTMLElementTagNameMap {
    "corelag-app": CorelagApp;
  }
}
