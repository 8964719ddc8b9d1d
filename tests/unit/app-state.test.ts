import { describe, expect, it } from "vitest";
import { AppState } from "../../src/app/state.ts";
import { moveVertex } from "../../src/editor/outline.ts";
import { ingot } from "./editor/ingot.ts";

const at = { region: 0, loop: 0, index: 2 };
const r = (state: AppState): unknown => state.document.value?.part.regions[0]?.outline[2]?.at[0];

describe("state of the page", () => {
  it("a drag is one step, and Escape takes it back as if it had not been", () => {
    const state = new AppState();
    state.open(ingot());
    for (const to of [0.17, 0.18])
      state.edit("move of point 3", (draft) => moveVertex(draft, at, [to, 0.9]), { gesture: "drag 1" });
    expect(state.dragging.value).toBe(true);
    expect(state.before.value?.part.regions[0]?.outline[2]?.at[0]).toBe(0.16);
    state.back();
    expect(r(state)).toBe(0.16);
    expect(state.dragging.value).toBe(false);
    expect(state.undoLabel.value).toBeNull();
  });

  it("after a rest the next gesture is a step of its own", () => {
    const state = new AppState();
    state.open(ingot());
    for (const to of [0.17, 0.18]) {
      state.edit("move of point 3", (draft) => moveVertex(draft, at, [to, 0.9]), { gesture: "keys" });
      state.rest();
    }
    state.undo();
    expect(r(state)).toBe(0.17);
    state.undo();
    expect(r(state)).toBe(0.16);
  });

  it("opening another case, or clearing the sheet, loses nothing: undo brings it back", () => {
    const state = new AppState();
    state.open(ingot());
    state.open({ ...ingot(), title: "other" });
    expect(state.undoLabel.value).toBe("opening of other");
    state.undo();
    expect(state.document.value?.title).toBe("Tapered ingot");
    state.clear();
    expect(state.status.value).toBe("empty");
    expect(state.undoLabel.value).toBe("new part");
    state.undo();
    expect(state.document.value?.title).toBe("Tapered ingot");
    expect(state.status.value).toBe("preview");
  });

  it("what is shown is stale as soon as the document differs from the one it was worked out from", () => {
    const state = new AppState();
    state.open(ingot());
    expect(state.stale.value).toBe(false);
    state.result.value = {} as never;
    state.resultDocument.value = state.document.value;
    expect(state.stale.value).toBe(false);
    state.edit("title", (draft) => void (draft.title = "new"));
    expect(state.stale.value).toBe(true);
    state.undo();
    expect(state.stale.value).toBe(false);
  });
});
