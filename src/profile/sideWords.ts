/** Sides and places of an outline in words, and their paths in the document. */
import type { Case, Region } from "../case/types.ts";
import { formatNumber } from "../case/units.ts";
import type { Place } from "./types.ts";

/** A side by its place in the outline; -1 in all for a probe. */
export interface SidePlace {
  readonly region: number;
  readonly loop: number;
  readonly side: number;
}

/** Path of the vertex at which a side starts. */
export function vertexPath(region: Region | undefined, { region: r, loop, side }: SidePlace): string {
  const start = `part.regions[${r}]`;
  if (loop > 0) return `${start}.holes[${loop - 1}][${side}]`;
  return region && region.outline.length > 0 ? `${start}.outline[${side}]` : `${start}.outline`;
}

/** 'side "wall" of "ingot"'; sides without a name by their number. */
export function sideWords(given: Case, { region, loop, side }: SidePlace): string {
  const owner = given.regions[region];
  const vertices = loop > 0 ? owner?.holes[loop - 1] : owner?.outline;
  const name = vertices?.[side]?.side ?? `side ${side + 1}`;
  const shared = (vertices?.filter((vertex) => vertex.side === name).length ?? 0) > 1;
  const number = shared ? ` (from point ${side + 1})` : "";
  const hole = loop > 0 ? ` of hole ${loop}` : "";
  return `${/^side \d+$/.test(name) ? name : `side "${name}"`}${number}${hole} of "${owner?.name ?? region + 1}"`;
}

export function spokenPlace(place: Place): string {
  return `r ${formatNumber(place[0] * 1000)}, z ${formatNumber(place[1] * 1000)} mm`;
}

export function millimetres(length: number): string {
  return `${formatNumber(length * 1000, 3)} mm`;
}
