/** The drawing tools and the switches of the view, at the right of the caption. */
import { html } from "lit";
import type { TemplateResult } from "lit";
import { icon } from "../icons.ts";
import type { Mode } from "./boardHand.ts";
import type { CorelagSection } from "./section.ts";

export const MODE_WORDS: Readonly<Record<Exclude<Mode, "take">, string>> = {
  point: "Click the outline where the new point should stand.",
  bend: "Click the side that should become an arc.",
  probe: "Click the place of the probe.",
};

export function sectionTools(section: CorelagSection): TemplateResult {
  const tool = (
    mode: Exclude<Mode, "take">,
    name: "point" | "arc" | "probe",
    label: string,
  ): TemplateResult =>
    html`<button
      class="tool"
      title=${label}
      aria-label=${label}
      aria-pressed=${section.mode === mode}
      @click=${(event: MouseEvent) => section.hand.tool(mode, event.detail === 0)}
    >
      ${icon(name)}
    </button>`;
  const turn = (lying: boolean, name: "lie" | "stand", label: string): TemplateResult =>
    html`<button
      class="tool"
      title=${label}
      aria-label=${label}
      aria-pressed=${section.view.lying === lying}
      @click=${() => section.turn(lying)}
    >
      ${icon(name)}
    </button>`;
  return html`
    <span class="group draw" role="group" aria-label="Draw">
      ${tool("point", "point", "Insert a point")}${tool("bend", "arc", "Bend a side into an arc")}${tool("probe", "probe", "Set a probe")}
    </span>
    <span class="group" role="group" aria-label="View">
      ${turn(true, "lie", "Lie down")}${turn(false, "stand", "Stand up")}
      <button
        class="tool"
        title="Fit to the sheet"
        aria-label="Fit to the sheet"
        @click=${() => section.fit()}
      >
        ${icon("fit")}
      </button>
    </span>
  `;
}
