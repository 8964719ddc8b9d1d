/** A blank that holds one quantity of the document, in the units the page shows. */
import { html } from "lit";
import type { TemplateResult } from "lit";
import type { Quantity } from "../../case/types.ts";
import { parseQuantity, shownUnit, toShown } from "../../case/units.ts";
import type { Dimension, UnitSystem } from "../../case/units.ts";
import { siOf } from "../../editor/quantities.ts";
import "../controls/blank.ts";
import { digits } from "../controls/figures.ts";

export interface QuantityEntry {
  /** name for listeners, for example "film of the wall" */
  readonly label: string;
  readonly value: Quantity | undefined;
  readonly dimension: Dimension;
  readonly units: UnitSystem;
  /** arrow keys and scrubbing, in the shown unit */
  readonly step: number;
  readonly least?: number;
  readonly most?: number;
  /** decimals that are always shown, for coordinates */
  readonly decimals?: number;
  readonly placeholder?: string;
  readonly disabled?: boolean;
  /** accepted: the text with its unit */
  readonly take: (typed: string) => void;
  /** on the way, while keys or a scrub move the number */
  readonly way?: (typed: string) => void;
  readonly back?: () => void;
}

/** The blank alone; its unit stands beside it (`unitText`). */
export function quantityBlank(entry: QuantityEntry): TemplateResult {
  const { dimension, units } = entry;
  const si = siOf(entry.value, dimension);
  const shown = toShown(si, dimension, units);
  const unit = shownUnit(dimension, units);
  const known = Number.isFinite(shown);
  const text = known ? figure(shown, entry.decimals) : entry.value === undefined ? "" : String(entry.value);
  const raw = (event: Event): string => (event as CustomEvent<{ raw: string }>).detail.raw;
  return html`<corelag-blank
    kind="number"
    .value=${text}
    .number=${known ? Number(shown.toPrecision(9)) : undefined}
    .label=${unit === "" ? entry.label : `${entry.label}, ${unit}`}
    .unit=${unit}
    .step=${entry.step}
    .least=${entry.least ?? -Infinity}
    .most=${entry.most ?? Infinity}
    .placeholder=${entry.placeholder ?? ""}
    .disabled=${entry.disabled ?? false}
    .check=${(typed: string) => faultOf(typed, dimension, entry.value === undefined)}
    @scrub=${(event: Event) => (entry.way ?? entry.take)(raw(event))}
    @change=${(event: Event) => entry.take(raw(event))}
    @putback=${() => entry.back?.()}
  ></corelag-blank>`;
}

function faultOf(
  typed: string,
  dimension: Dimension,
  mayBeEmpty: boolean,
): { message: string; mend: string } | null {
  if (mayBeEmpty && typed.trim() === "") return null;
  const read = parseQuantity(typed, dimension);
  return "fault" in read ? read.fault : null;
}

/** Up to five figures, no zeros behind, or so many decimals. */
function figure(shown: number, decimals?: number): string {
  if (decimals !== undefined) return digits(shown, decimals);
  const tidy = Number(shown.toPrecision(5));
  const [, part = ""] = String(tidy).split(".");
  return digits(tidy, part.includes("e") ? 6 : Math.min(6, part.length));
}
