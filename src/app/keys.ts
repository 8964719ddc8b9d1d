/** Keys that act anywhere on the page. Letters and digits act only outside fields. */
import { tinykeys } from "tinykeys";
import type { CorelagApp } from "./app.ts";

/** Starts listening; gives back what ends it. */
export function pageKeys(app: CorelagApp): () => void {
  const { state } = app;
  const act =
    (deed: () => void) =>
    (event: KeyboardEvent): void => {
      event.preventDefault();
      deed();
    };
  const letter =
    (deed: () => void) =>
    (event: KeyboardEvent): void => {
      if (!inField(event) && !event.defaultPrevented) act(deed)(event);
    };
  const undo =
    (deed: "undo" | "redo") =>
    (event: KeyboardEvent): void => {
      if (!inField(event)) act(() => app.perform({ kind: deed }))(event);
    };
  const answer = (index: number): void => {
    if (index < (state.result.peek()?.answers.length ?? 0)) {
      state.pane.value = "answers";
      state.focusedAnswer.value = index;
    }
  };
  const digits = Object.fromEntries(
    Array.from({ length: 9 }, (_, i) => [String(i + 1), letter(() => answer(i))]),
  );
  return tinykeys(window, {
    "$mod+z": undo("undo"),
    "$mod+y": undo("redo"),
    "$mod+Shift+Z": undo("redo"),
    "$mod+s": act(() => app.perform({ kind: "save" })),
    "Shift+?": letter(() => app.perform({ kind: "keys" })),
    u: letter(() => void (state.units.value = state.units.peek() === "si" ? "us" : "si")),
    a: letter(() => toggleArrival(app)),
    ...digits,
  });
}

/** The arrival of the answer in focus over the part, or back to temperature. */
function toggleArrival({ state }: CorelagApp): void {
  const index = state.focusedAnswer.peek();
  if (state.shown.peek().by === "arrival") state.shown.value = { by: "temperature" };
  else if (index !== null && state.result.peek()?.answers[index]?.question.ask === "when")
    state.shown.value = { by: "arrival", answer: index };
}

/** Whether the key goes into a field, a list or a menu. */
function inField(event: KeyboardEvent): boolean {
  const target = event.composedPath()[0];
  return (
    target instanceof HTMLElement &&
    (target.matches("input, textarea, select, [contenteditable], [role=listbox], [role=menu]") ||
      target.isContentEditable)
  );
}
