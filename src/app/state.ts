/**
 * The state of the page: one `AppState` for the life of the page. Values are signals; an element that reads some
 * of them inside render() follows them with `new Follow(this, () => ...)` (follow.ts), but most elements get plain
 * properties from `corelag-app` and send events upwards (events.ts).
 */
import { batch, computed, signal } from "@preact/signals-core";
import type { CaseDocument, CaseProblem } from "../case/types.ts";
import { beginHistory, edit, endGesture, redo, replace, undo } from "../editor/history.ts";
import type { History, Recipe } from "../editor/history.ts";
import { NOTHING } from "../editor/selection.ts";
import type { Selection } from "../editor/selection.ts";
import type { CaseResult, RunFailure } from "../run/result.ts";

/**
 * empty: no part yet. preview: the coarse run is under way or is what is shown, the hand may still move.
 * settling: refining. settled: done. waiting: the document has faults, the last good result stays.
 * failed: the run broke off, or the solver could not be started.
 */
export type Status = "empty" | "preview" | "settling" | "settled" | "waiting" | "failed";
export type UnitSystem = "si" | "us";
export type Theme = "light" | "dark" | "system";
export type Pane = "answers" | "proof" | "hand";
/** What colours the section: the temperature at the cursor, or when each point answers question `answer`. */
export type Shown = { readonly by: "temperature" } | { readonly by: "arrival"; readonly answer: number };

export interface Progress {
  readonly doing: string;
  /** 0 to 1 */
  readonly fraction: number;
}

export interface EditOptions {
  /** edits that carry the same gesture name in a row are one step of undo */
  readonly gesture?: string;
}

export class AppState {
  readonly #history = signal<History | null>(null);
  /** what lay on the sheet before it was cleared, for undo */
  readonly #aside = signal<History | null>(null);

  /** the document as edited; null until a part was begun */
  readonly document = computed<CaseDocument | null>(() => this.#history.value?.document ?? null);
  /** faults of the document, all at once; empty when it is sound */
  readonly problems = signal<readonly CaseProblem[]>([]);
  /** the last good result */
  readonly result = signal<CaseResult | null>(null);
  /** the document that `result` was worked out from */
  readonly resultDocument = signal<CaseDocument | null>(null);
  readonly status = signal<Status>("empty");
  readonly progress = signal<Progress | null>(null);
  readonly failure = signal<RunFailure | null>(null);
  /** what is shown is not (or not yet) the answer to what stands on the sheet */
  readonly stale = computed(
    () => this.result.value !== null && this.resultDocument.value !== this.document.value,
  );
  /** a gesture is under way */
  readonly dragging = signal(false);
  /** the document before the running gesture, for "was ..." and the ghost outline; null between gestures */
  readonly before = signal<CaseDocument | null>(null);

  /** time cursor [s from the start of the case] */
  readonly cursor = signal(0);
  readonly selection = signal<Selection>(NOTHING);
  /** number of the answer in focus, from 0; null for none */
  readonly focusedAnswer = signal<number | null>(null);
  readonly shown = signal<Shown>({ by: "temperature" });
  readonly units = signal<UnitSystem>("si");
  readonly theme = signal<Theme>("system");
  readonly pane = signal<Pane>("answers");
  /** the mesh is laid over the section */
  readonly meshShown = signal(false);
  /** a short plain message for the page's live region, for example after opening a file that could not be read */
  readonly message = signal("");

  /** label of the step that undo would take back; null when there is none */
  readonly undoLabel = computed(() => {
    if (this.#history.value) return this.#history.value.done.at(-1)?.label ?? null;
    return this.#aside.value ? "new part" : null;
  });
  readonly redoLabel = computed(() => this.#history.value?.undone[0]?.label ?? null);

  /** Lays a document on the sheet; what was there can be had back by undo. */
  open(document: CaseDocument): void {
    batch(() => {
      const before = this.#history.value ?? this.#aside.value;
      const label = `opening of ${document.title || "a case"}`;
      this.#history.value = before ? replace(before, label, document) : beginHistory(document);
      this.#aside.value = null;
      this.#forget();
      this.status.value = "preview";
    });
  }

  /** Clears the sheet: the start page. Undo brings back what was there. */
  clear(): void {
    batch(() => {
      this.#aside.value = this.#history.value ?? this.#aside.value;
      this.#history.value = null;
      this.#forget();
      this.status.value = "empty";
    });
  }

  #forget(): void {
    this.problems.value = [];
    this.result.value = null;
    this.resultDocument.value = null;
    this.failure.value = null;
    this.progress.value = null;
    this.dragging.value = false;
    this.before.value = null;
    this.cursor.value = 0;
    this.selection.value = NOTHING;
    this.focusedAnswer.value = null;
    this.shown.value = { by: "temperature" };
  }

  /** Changes the document by a recipe on a draft. `label` stands behind "Undo: ", for example "move of point 3". */
  edit(label: string, recipe: Recipe, options: EditOptions = {}): void {
    const history = this.#history.value;
    if (!history) return;
    batch(() => {
      if (options.gesture !== undefined && !this.dragging.value) {
        this.dragging.value = true;
        this.before.value = history.document;
      }
      this.#history.value = edit(history, label, recipe, options.gesture);
    });
  }

  /** The hand has let go: the running gesture is over. */
  rest(): void {
    batch(() => {
      if (this.#history.value) this.#history.value = endGesture(this.#history.value);
      this.dragging.value = false;
      this.before.value = null;
    });
  }

  /** Throws the running gesture away. */
  back(): void {
    const moved = this.dragging.value && this.before.value !== this.document.value;
    this.rest();
    if (moved) this.undo();
  }

  undo(): void {
    batch(() => {
      if (this.#history.value) this.#history.value = undo(this.#history.value);
      else if (this.#aside.value) {
        this.#history.value = this.#aside.value;
        this.#aside.value = null;
        this.status.value = "preview";
      }
    });
  }

  redo(): void {
    if (this.#history.value) this.#history.value = redo(this.#history.value);
  }
}
