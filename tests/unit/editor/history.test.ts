import { describe, expect, it } from "vitest";
import { beginHistory, edit, endGesture, redo, undo } from "../../../src/editor/history.ts";
import { moveVertex } from "../../../src/editor/outline.ts";
import { ingot } from "./ingot.ts";

const at = { region: 0, loop: 0, index: 2 };

describe("history of edits", () => {
  it("undoes and redoes to the very same documents", () => {
    const begun = beginHistory(ingot());
    const moved = edit(begun, "move of point 3", (draft) => moveVertex(draft, at, [0.178, 0.9]));
    expect(moved.document.part.regions[0]!.outline[2]!.at).toEqual([0.178, 0.9]);
    const back = undo(moved);
    expect(back.document).toBe(begun.document);
    expect(redo(back).document).toBe(moved.document);
  });

  it("keeps a drag as one step", () => {
    let history = beginHistory(ingot());
    for (let i = 1; i <= 20; i++)
      history = edit(
        history,
        "move of point 3",
        (draft) => moveVertex(draft, at, [0.16 + i / 1000, 0.9]),
        "drag 1",
      );
    expect(history.done).toHaveLength(1);
    expect(undo(history).document.part.regions[0]!.outline[2]!.at).toEqual([0.16, 0.9]);
  });

  it("parts two gestures of the same name once the first has ended", () => {
    const step = (history: ReturnType<typeof beginHistory>, r: number) =>
      edit(history, "move of point 3", (draft) => moveVertex(draft, at, [r, 0.9]), "keys");
    const once = endGesture(step(beginHistory(ingot()), 0.17));
    const twice = step(once, 0.18);
    expect(twice.done).toHaveLength(2);
  });

  it("forgets what was undone at the next edit, and notes nothing for an edit that changes nothing", () => {
    const moved = edit(beginHistory(ingot()), "a", (draft) => moveVertex(draft, at, [0.17, 0.9]));
    const back = undo(moved);
    expect(edit(back, "nothing", () => undefined)).toBe(back);
    const other = edit(back, "b", (draft) => void (draft.title = "other"));
    expect(other.undone).toHaveLength(0);
    expect(redo(other)).toBe(other);
  });

  it("leaves the documents before untouched, whatever a recipe does", () => {
    const begun = beginHistory(ingot());
    const before = JSON.stringify(begun.document);
    edit(begun, "wild", (draft) => void draft.part.regions[0]!.outline.splice(0, 2));
    expect(JSON.stringify(begun.document)).toBe(before);
  });
});
