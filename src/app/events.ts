/**
 * What elements say upwards. Elements get values as properties and send these events; they bubble through shadow
 * roots to `corelag-app`, which alone changes the state.
 */
import type { CaseDocument } from "../case/types.ts";
import type { Recipe } from "../editor/history.ts";
import type { Selection } from "../editor/selection.ts";
import type { Pane, Shown, Theme, UnitSystem } from "./state.ts";

export interface EventDetails {
  /** changes the document; edits of one gesture in a row are one step of undo */
  "corelag-edit": { label: string; recipe: Recipe; gesture?: string };
  /** the hand has let go: the gesture is over and the answers may settle */
  "corelag-rest": null;
  /** throws the running gesture away (Escape while dragging) */
  "corelag-back": null;
  /** moves the time cursor [s from the start of the case] */
  "corelag-cursor": number;
  "corelag-select": Selection;
  /** number of the answer in focus, from 0; null for none */
  "corelag-ask": number | null;
  /** what the section is coloured by */
  "corelag-show": Shown;
  "corelag-pane": Pane;
  "corelag-units": UnitSystem;
  "corelag-theme": Theme;
  "corelag-do": Deed;
  /** whether the mesh is laid over the section */
  "corelag-mesh": boolean;
}

/** Whole-case deeds of the head and the keys. */
export type Deed =
  | { kind: "undo" | "redo" | "save" | "picture" | "open" | "new" | "retry" | "keys" }
  | { kind: "read"; text: string; name: string }
  | { kind: "begin"; document: CaseDocument }
  /** a case that comes with the page; "" for the first */
  | { kind: "preset"; name: string };

/** Sends one of the events above from an element. */
export function send<Name extends keyof EventDetails>(
  from: HTMLElement,
  name: Name,
  detail: EventDetails[Name],
): void {
  from.dispatchEvent(new CustomEvent(name, { detail, bubbles: true, composed: true }));
}

/** Sends an edit of the document. */
export function sendEdit(from: HTMLElement, label: string, recipe: Recipe, gesture?: string): void {
  send(from, "corelag-edit", gesture === undefined ? { label, recipe } : { label, recipe, gesture });
}

declare global {
  interface HTMLElementEventMap {
    "corelag-edit": CustomEvent<EventDetails["corelag-edit"]>;
    "corelag-rest": CustomEvent<EventDetails["corelag-rest"]>;
    "corelag-back": CustomEvent<EventDetails["corelag-back"]>;
    "corelag-cursor": CustomEvent<EventDetails["corelag-cursor"]>;
    "corelag-select": CustomEvent<EventDetails["corelag-select"]>;
    "corelag-ask": CustomEvent<EventDetails["corelag-ask"]>;
    "corelag-show": CustomEvent<EventDetails["corelag-show"]>;
    "corelag-pane": CustomEvent<EventDetails["corelag-pane"]>;
    "corelag-units": CustomEvent<EventDetails["corelag-units"]>;
    "corelag-theme": CustomEvent<EventDetails["corelag-theme"]>;
    "corelag-do": CustomEvent<EventDetails["corelag-do"]>;
    "corelag-mesh": CustomEvent<EventDetails["corelag-mesh"]>;
  }
}
