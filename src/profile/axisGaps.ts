/** Outlines that were to end on the axis and stop short of it. */
import type { Case, CaseProblem, Vertex } from "../case/types.ts";
import { JOIN_SHARE, NARROW_BORE_SHARE } from "./defaults.ts";
import { millimetres, sideWords, vertexPath } from "./sideWords.ts";

const CLOSE_IT = "Put its points on r = 0, or say that there is a bore by another name of the side.";

/**
 * Without doubt (`doubtful` false, faults): a side called "axis" that is off the axis. Doubtful (hints): a straight
 * side along z that is nearer to the axis than any bore is likely to be, or that starts on the axis and ends beside it.
 */
export function axisGaps(given: Case, doubtful: boolean): CaseProblem[] {
  const radii = given.regions.flatMap((region) => region.outline.map((vertex) => Math.abs(vertex.at[0])));
  const largest = Math.max(...radii);
  return given.regions.flatMap((region, r) =>
    region.outline.flatMap((vertex, i) => {
      const gap = gapOf(vertex, region.outline[(i + 1) % region.outline.length]!);
      if (!(gap > JOIN_SHARE * largest)) return [];
      const isAxis = vertex.side.toLowerCase() === "axis";
      if (isAxis === doubtful || (doubtful && !(gap < NARROW_BORE_SHARE * largest))) return [];
      const at = { region: r, loop: 0, side: i };
      const words = sideWords(given, at);
      return [
        {
          code: "outline-gap-to-axis",
          path: vertexPath(region, at),
          message: doubtful
            ? `The outline leaves a gap of ${millimetres(gap)} to the axis at ${words}; it is taken as a bore.`
            : `S${words.slice(1)} leaves a gap of ${millimetres(gap)} to the axis.`,
          mend: doubtful ? "Put its points on r = 0 if the part is solid." : CLOSE_IT,
          places: [vertex.at],
        },
      ];
    }),
  );
}

/** Largest r of a straight side that runs along the axis more than away from it; none: 0. Negative r is told elsewhere. */
function gapOf(start: Vertex, end: Vertex): number {
  const along = Math.abs(end.at[1] - start.at[1]);
  const away = Math.abs(end.at[0] - start.at[0]);
  if (start.through || away > 0.1 * along)
    return start.side.toLowerCase() === "axis" ? Math.max(start.at[0], end.at[0], 0) : 0;
  return Math.max(start.at[0], end.at[0], 0);
}
