/** Keeps the case on this machine between visits, and the choices of the page. */
import type { CaseDocument } from "../case/types.ts";
import type { Theme, UnitSystem } from "./state.ts";

export interface Kept {
  readonly document: CaseDocument | null;
  readonly cursor: number;
  readonly units: UnitSystem;
  readonly theme: Theme;
}

const KEY = "corelag.sheet.1";

/** What was kept; null on a first visit, or where the browser keeps nothing. */
export function readKept(): Partial<Kept> | null {
  try {
    const text = localStorage.getItem(KEY);
    const value: unknown = text === null ? null : JSON.parse(text);
    return typeof value === "object" ? (value as Partial<Kept> | null) : null;
  } catch {
    return null;
  }
}

/** @returns whether it was kept; storage can be full or denied */
export function keep(kept: Kept): boolean {
  try {
    localStorage.setItem(KEY, JSON.stringify(kept));
    return true;
  } catch {
    return false;
  }
}
