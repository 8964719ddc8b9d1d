/** The first sheet: pick the nearest shape, fill the blanks of one sentence, and the part lies there. */
import { LitElement, html } from "lit";
import type { TemplateResult } from "lit";
import { customElement, property, state } from "lit/decorators.js";
import type { MaterialLibrary } from "../../case/library.ts";
import { shapeOutline, shapeOf, SHAPES, standardSizes } from "../../case/shapes.ts";
import type { Shape, ShapeKind, ShapeSize } from "../../case/shapes.ts";
import type { Quantity } from "../../case/types.ts";
import { shownUnit } from "../../case/units.ts";
import type { Dimension, UnitSystem } from "../../case/units.ts";
import { beginCase, firstLimit } from "../../editor/begin.ts";
import { siOf, tidy } from "../../editor/quantities.ts";
import { send } from "../events.ts";
import { isSolved } from "../section/materialBlank.ts";
import { quantityBlank } from "../section/quantityBlank.ts";
import { shared } from "../styles/shared.ts";
import { shapePicture } from "./shapePicture.ts";
import { startStyle } from "./startStyle.ts";

/** What a new part is made of and how it begins, until the hand says otherwise. */
const FIRST_MATERIAL = "carbon-steel";
const FIRST_START = 850;
const FIRST_AMBIENT = 20;
/** W/(m2 K): film of a hot part in still air, radiation counted in */
const FIRST_FILM = 40;

/** The size words in the order they are spoken, without their capital. */
const spoken = (label: string): string => label.charAt(0).toLowerCase() + label.slice(1);

@customElement("corelag-start")
export class CorelagStart extends LitElement {
  static override styles = [shared, startStyle];

  @property() units: UnitSystem = "si";
  @property({ attribute: false }) library: MaterialLibrary = {};

  @state() private kind: ShapeKind | null = null;
  @state() private sizes: Readonly<Record<string, Quantity>> = {};
  @state() private material = FIRST_MATERIAL;
  @state() private from: Quantity = FIRST_START;
  @state() private ambient: Quantity = FIRST_AMBIENT;
  @state() private film: Quantity = FIRST_FILM;

  protected override render(): TemplateResult {
    return html`
      <div class="start ${this.kind === null ? "" : "asking"}">
        <h2>What do you heat or cool?</h2>
        <p class="lead">
          Pick the nearest shape; its sizes are asked next and every point can be moved later.
        </p>
        <div class="shapes" role="group" aria-label="Shapes">
          ${SHAPES.map((shape) => this.#shape(shape))}
        </div>
        ${this.kind === null ? this.#orOpen() : this.#sentence(shapeOf(this.kind))}
      </div>
    `;
  }

  #shape(shape: Shape): TemplateResult {
    const picked = shape.kind === this.kind;
    const outline = shapeOutline(shape.kind, picked ? this.#metres() : {});
    const drawn = "outline" in outline ? outline.outline : shape.outline(standardSizes(shape.kind));
    return html`<button class="shape" aria-pressed=${picked} @click=${() => this.#pick(shape.kind)}>
      ${shapePicture(drawn, shape.kind)}<b>${shape.label}</b><small>${ASKED[shape.kind]}</small>
    </button>`;
  }

  #pick(kind: ShapeKind): void {
    this.kind = kind;
    this.sizes = Object.fromEntries(
      Object.entries(standardSizes(kind)).map(([name, metres]) => [name, tidy(metres)]),
    );
    void this.updateComplete.then(() =>
      this.renderRoot.querySelector(".sentence")?.scrollIntoView({ block: "nearest" }),
    );
  }

  #metres(): Record<string, number> {
    return Object.fromEntries(Object.entries(this.sizes).map(([name, size]) => [name, siOf(size, "length")]));
  }

  #orOpen(): TemplateResult {
    return html`<p class="or">
      Or
      <button class="blank" @click=${() => send(this, "corelag-do", { kind: "open" })}>open a case</button>,
      or drop a file on this sheet.
    </p>`;
  }

  // --- the sentence -------------------------------------------------------------------------------------------------------

  #sentence(shape: Shape): TemplateResult {
    const made = shapeOutline(shape.kind, this.#metres());
    const faults = "faults" in made ? made.faults : [];
    return html`<div class="sentence">
      <p>
        A ${spoken(shape.label)} with
        ${shape.sizes.map((size, i) => this.#size(size, i, shape.sizes.length))}, of
        <corelag-blank
          kind="choice"
          label="material"
          .value=${this.material}
          .options=${this.#materials()}
          @change=${(event: CustomEvent<{ raw: string }>) => (this.material = event.detail.raw)}
        ></corelag-blank
        >. It begins at
        ${this.#entry("start temperature", this.from, "temperature", 10, (typed) => (this.from = typed))} in
        surroundings at
        ${this.#entry("surroundings", this.ambient, "temperature", 5, (typed) => (this.ambient = typed))} with
        a film of ${this.#entry("film", this.film, "filmCoefficient", 5, (typed) => (this.film = typed))}.
      </p>
      ${faults.map((fault) => html`<p class="fault" role="alert"><b>${fault.message}</b> ${fault.mend}</p>`)}
      <p class="acts">
        <button class="act main" ?disabled=${faults.length > 0} @click=${this.#begin}>
          Lay it on the sheet
        </button>
        <span class="aside">Stages, sides and questions can be changed there.</span>
      </p>
    </div>`;
  }

  #size(size: ShapeSize, index: number, count: number): TemplateResult {
    const before = index === 0 ? "" : index === count - 1 ? " and " : ", ";
    return html`${before}${spoken(size.label)}
    ${this.#entry(size.label, this.sizes[size.name], "length", this.units === "si" ? 1 : 0.05, (typed) => {
      this.sizes = { ...this.sizes, [size.name]: typed };
    })}`;
  }

  #entry(
    label: string,
    value: Quantity | undefined,
    dimension: Dimension,
    step: number,
    take: (typed: string) => void,
  ): TemplateResult {
    return html`<span class="with-unit"
      >${quantityBlank({ label, value, dimension, units: this.units, step, ...(dimension !== "temperature" && { least: 0 }), take })}&thinsp;${shownUnit(dimension, this.units)}</span
    >`;
  }

  #materials(): { value: string; label: string }[] {
    return Object.entries(this.library)
      .filter(([, material]) => isSolved(material))
      .map(([value, { title }]) => ({ value, label: title }));
  }

  readonly #begin = (): void => {
    const made = this.kind && shapeOutline(this.kind, this.#metres());
    if (!made || !("outline" in made)) return;
    const reaches = firstLimit(siOf(this.from, "temperature"), siOf(this.ambient, "temperature"));
    const { material, film, ambient, from } = this;
    const name = spoken(shapeOf(this.kind!).label);
    send(this, "corelag-do", {
      kind: "begin",
      document: beginCase({ name, outline: made.outline, material, start: from, ambient, film, reaches }),
    });
  };
}

/** What is asked about each shape, in as few words as fit under its picture. */
const ASKED: Readonly<Record<ShapeKind, string>> = {
  ingot: "two diameters, height, crown",
  "stepped-shaft": "barrel and neck: diameter, length",
  ring: "bore, outside, width",
  sphere: "diameter",
  "plain-round": "diameter, length",
  tube: "outside, wall, length",
  cone: "two diameters, height",
  "bottle-shell": "body, neck, heel, wall",
};

declare global {
  interface HTMLElementTagNameMap {
    "corelag-start": CorelagStart;
  }
}
