/**
 * Every edit of the document, to be taken back and done again.
 *
 * A step keeps the documents before and after it. They are immutable and share whatever did not change, so a
 * step costs what it touched and undo cannot drift from what was on the sheet. The edits of one gesture (a drag,
 * a run of arrow keys on one point) are one step.
 */
import { produce } from "immer";
import type { CaseDocument } from "../case/types.ts";
import { LONGEST_HISTORY } from "./defaults.ts";

/** Changes a draft in place; it may be called again on a newer document. */
export type Recipe = (draft: CaseDocument) => void;

export interface EditStep {
  /** what was done, as it stands behind "Undo: ", for example "move of point 3" */
  readonly label: string;
  /** edits that carry the same name in a row are one step; undefined: a step of its own */
  readonly gesture: string | undefined;
  readonly before: CaseDocument;
  readonly after: CaseDocument;
}

export interface History {
  readonly document: CaseDocument;
  readonly done: readonly EditStep[];
  readonly undone: readonly EditStep[];
}

/** A history that starts at `document`: nothing to undo. */
export function beginHistory(document: CaseDocument): History {
  return { document: produce(document, () => undefined), done: [], undone: [] };
}

/** The history after one edit; the same object when the recipe changed nothing. */
export function edit(history: History, label: string, recipe: Recipe, gesture?: string): History {
  const after = produce(history.document, (draft) => recipe(draft as CaseDocument));
  if (after === history.document) return history;
  const last = history.done.at(-1);
  const merges = gesture !== undefined && last?.gesture === gesture;
  const step: EditStep = { label, gesture, before: merges ? last.before : history.document, after };
  const kept = merges ? history.done.slice(0, -1) : history.done;
  return { document: after, done: [...kept, step].slice(-LONGEST_HISTORY), undone: [] };
}

/** Lays another document on the sheet, as one step that can be taken back. */
export function replace(history: History, label: string, document: CaseDocument): History {
  const step: EditStep = { label, gesture: undefined, before: history.document, after: document };
  return { document, done: [...history.done, step].slice(-LONGEST_HISTORY), undone: [] };
}

/** Ends the running gesture, so that the next edit of the same name is a step of its own. */
export function endGesture(history: History): History {
  const last = history.done.at(-1);
  if (!last?.gesture) return history;
  return { ...history, done: [...history.done.slice(0, -1), { ...last, gesture: undefined }] };
}

/** Takes the last step back; the same object when there is none. */
export function undo(history: History): History {
  const step = history.done.at(-1);
  if (!step) return history;
  return {
    document: step.before,
    done: history.done.slice(0, -1),
    undone: [{ ...step, gesture: undefined }, ...history.undone],
  };
}

/** Does the last undone step again; the same object when there is none. */
export function redo(history: History): History {
  const [step, ...rest] = history.undone;
  if (!step) return history;
  return { document: step.after, done: [...history.done, step], undone: rest };
}
