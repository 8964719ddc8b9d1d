/** Moves a question among the others with the pointer: a line shows where it would come to stand. */

/** Where a lifted row comes to stand: its number after the move, from the middles of the rows and the pointer. */
export function landing(middles: readonly number[], from: number, y: number): number {
  const above = middles.filter((middle, i) => i !== from && middle < y).length;
  return above;
}

/**
 * Follows the pointer until it is let go; Esc puts the row back.
 *
 * @param rows  the rows in their order
 * @param done  called with the new number of the row, when it differs
 */
export function liftQuestion(
  rows: readonly HTMLElement[],
  from: number,
  event: PointerEvent,
  done: (to: number) => void,
): void {
  const row = rows[from];
  if (row === undefined || event.button !== 0) return;
  event.preventDefault();
  let to = from;
  const clear = (): void =>
    rows.forEach((each) => each.classList.remove("drop-before", "drop-after", "lifted"));
  const move = (next: PointerEvent): void => {
    const middles = rows.map((each) => {
      const box = each.getBoundingClientRect();
      return box.top + box.height / 2;
    });
    to = landing(middles, from, next.clientY);
    clear();
    row.classList.add("lifted");
    if (to !== from) rows[to]?.classList.add(to < from ? "drop-before" : "drop-after");
  };
  const end = (next: Event): void => {
    window.removeEventListener("pointermove", move);
    window.removeEventListener("pointerup", end);
    window.removeEventListener("pointercancel", end);
    window.removeEventListener("keydown", escape, true);
    clear();
    if (next.type === "pointerup" && to !== from) done(to);
  };
  const escape = (next: KeyboardEvent): void => {
    if (next.key === "Escape") end(next);
  };
  window.addEventListener("pointermove", move);
  window.addEventListener("pointerup", end);
  window.addEventListener("pointercancel", end);
  window.addEventListener("keydown", escape, true);
}
