/** What the hand takes on the drawing: elements carry their thing as data attributes. */
import type { Place } from "../../editor/arcs.ts";
import type { LoopIndex } from "../../editor/outline.ts";
import type { Selection } from "../../editor/selection.ts";
import type { Grip } from "./hand.ts";
import type { Sheet, SheetLoop, SheetSide } from "./sheet.ts";

/** The thing under an event; null on the bare board. */
export function gripOf(event: Event): Grip | null {
  const target = event.composedPath()[0];
  const element = target instanceof Element ? target.closest<SVGElement>("[data-grip]") : null;
  return element && readGrip(element);
}

export function readGrip({ dataset }: SVGElement): Grip | null {
  const index = Number(dataset["index"]);
  if (dataset["grip"] === "probe") return { kind: "probe", index };
  const place = { region: Number(dataset["region"]), loop: Number(dataset["loop"]), index };
  const kind = dataset["grip"];
  if (kind === "side" || kind === "bulge") return { kind, ...place };
  return kind === "vertex" || kind === "size" ? { kind: "vertex", ...place } : null;
}

export function selectionOf(grip: Grip): Selection {
  return grip.kind === "bulge" ? { ...grip, kind: "side" } : grip;
}

/** Unit normal of a side's chord, away from the part. */
export function outwardOf(loop: SheetLoop, side: SheetSide): Place {
  const [from, to] = [side.points[0]!, side.points.at(-1)!];
  const chord = Math.hypot(to[0] - from[0], to[1] - from[1]) || 1;
  let twiceArea = 0;
  loop.vertices.forEach(({ at }, i) => {
    const next = loop.vertices[(i + 1) % loop.vertices.length]!.at;
    twiceArea += at[0] * next[1] - next[0] * at[1];
  });
  // same rule for outlines and holes as `moveSide`: away from what the loop encloses
  const sign = twiceArea > 0 ? 1 : -1;
  return [(sign * (to[1] - from[1])) / chord, (-sign * (to[0] - from[0])) / chord];
}

/** The loop that a point or side belongs to. */
export function loopIn(sheet: Sheet, { region, loop }: LoopIndex): SheetLoop | undefined {
  return sheet.loops.find((each) => each.region === region && each.loop === loop);
}
