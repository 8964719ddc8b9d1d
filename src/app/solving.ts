/** Keeps the result in step with the document: reads it at every edit, asks the solver, takes over what it tells. */
import { batch, effect } from "@preact/signals-core";
import type { MaterialLibrary } from "../case/library.ts";
import { readCase } from "../case/readCase.ts";
import type { CaseDocument } from "../case/types.ts";
import type { CaseResult, SolveOutcome } from "../run/result.ts";
import type { SolveEvent } from "../../workers/protocol.ts";
import { SolverClient } from "./solverClient.ts";
import type { Depth } from "./solverClient.ts";
import type { AppState } from "./state.ts";

export class Solving {
  readonly #client: SolverClient;
  readonly #stop: () => void;
  #asked: { document: CaseDocument; depth: Depth } | null = null;

  constructor(
    private readonly state: AppState,
    private readonly library: MaterialLibrary,
    start?: () => Worker,
  ) {
    this.#client = new SolverClient(
      {
        event: (event, document) => this.#event(event, document),
        outcome: (outcome, document, depth) => this.#outcome(outcome, document, depth),
        restarted: () => (state.message.value = "The solver had to be started again. The sums go on."),
        broken: (why) => this.#broken(why),
      },
      start,
    );
    this.#client.warm();
    this.#stop = effect(() => this.#follow(state.document.value, state.dragging.value));
  }

  close(): void {
    this.#stop();
    this.#client.close();
  }

  /** After a failure: the same document again. */
  retry(): void {
    const document = this.state.document.peek();
    if (!document) return;
    this.state.failure.value = null;
    this.state.status.value = "preview";
    this.#asked = { document, depth: "settle" };
    this.#client.retry(document);
  }

  #follow(document: CaseDocument | null, dragging: boolean): void {
    const depth: Depth = dragging ? "preview" : "settle";
    if (!document) {
      this.#asked = null;
      return this.#client.cancel();
    }
    if (this.#asked?.document === document && (this.#asked.depth === depth || depth === "preview")) return;
    const fresh = this.#asked?.document !== document;
    this.#asked = { document, depth };
    const { state } = this;
    // only what this effect follows may start it again
    queueMicrotask(() => {
      if (this.#asked?.document !== document) return;
      const read = readCase(document, this.library);
      if ("problems" in read) {
        this.#client.cancel();
        batch(() => {
          state.problems.value = read.problems;
          state.status.value = "waiting";
          state.progress.value = null;
        });
        return;
      }
      if (fresh) state.status.value = state.status.peek() === "waiting" ? "waiting" : "preview";
      else if (depth === "settle" && state.problems.peek().length === 0) state.status.value = "settling";
      this.#client.ask(document, depth);
    });
  }

  #event(event: SolveEvent, document: CaseDocument): void {
    const { state } = this;
    if (event.kind === "progress") state.progress.value = { doing: event.doing, fraction: event.fraction };
    else this.#take(event.result, document, "settling");
  }

  #outcome(outcome: SolveOutcome, document: CaseDocument, depth: Depth): void {
    const { state } = this;
    if (outcome.kind === "solved")
      return this.#take(outcome.result, document, depth === "settle" ? "settled" : "preview");
    batch(() => {
      state.progress.value = null;
      if (outcome.kind === "refused") {
        state.problems.value = outcome.problems;
        state.status.value = "waiting";
      } else if (outcome.kind === "failed") {
        state.failure.value = outcome.failure;
        state.status.value = "failed";
      }
    });
  }

  #take(result: CaseResult, document: CaseDocument, status: "preview" | "settling" | "settled"): void {
    const { state } = this;
    batch(() => {
      const first = state.result.peek() === null;
      state.result.value = result;
      state.resultDocument.value = document;
      state.problems.value = [];
      state.failure.value = null;
      if (status !== "settling") state.progress.value = null;
      const current = state.document.peek() === document;
      state.status.value = current ? status : "preview";
      const end = result.stages.at(-1)?.ended ?? 0;
      if (first && state.cursor.peek() === 0) state.cursor.value = widestInstant(result);
      else if (state.cursor.peek() > end) state.cursor.value = end;
    });
  }

  #broken(why: string): void {
    const { state } = this;
    batch(() => {
      state.progress.value = null;
      state.failure.value = {
        message: `The solver stopped twice (${why}).`,
        mend: "Nothing is lost. Try again; if it stops again, reload the page.",
        reached: 0,
      };
      state.status.value = "failed";
    });
  }
}

/** The instant at which hottest and coldest are furthest apart: the section then has most to show. */
export function widestInstant({ history }: CaseResult): number {
  let best = 0;
  history.time.forEach((_, i) => {
    if (history.hottest[i]! - history.coldest[i]! > history.hottest[best]! - history.coldest[best]!) best = i;
  });
  return history.time[best] ?? 0;
}
