/** The files of the hand-over: names and contents from a result. Nothing here touches the page. */
import { strToU8, zipSync } from "fflate";
import { curvesCsv, nodesCsv, trianglesCsv } from "../../report/csv.ts";
import { pvdSeries, vtuSnapshot } from "../../report/vtk.ts";
import type { CaseResult } from "../../run/result.ts";

export interface OutFile {
  readonly name: string;
  readonly type: string;
  readonly content: string | Uint8Array<ArrayBuffer>;
}

/** A title as the beginning of a file name: letters and digits, hyphens between, at most 60. */
export function stem(title: string): string {
  const plain = title
    .normalize("NFKD")
    .replace(/[\u0300-\u036f]/g, "")
    .toLowerCase()
    .replace(/[^a-z0-9]+/g, "-")
    .replace(/^-|-$/g, "");
  return plain.slice(0, 60).replace(/-$/, "") || "case";
}

export function curvesFile(result: CaseResult): OutFile {
  return { name: `${stem(result.title)}-curves.csv`, type: "text/csv", content: curvesCsv(result) };
}

/** Number of the frame nearest to a time [s]. */
export function nearestFrame(times: Float64Array, at: number): number {
  let best = 0;
  for (let i = 1; i < times.length; i++) if (Math.abs(times[i]! - at) < Math.abs(times[best]! - at)) best = i;
  return best;
}

/** Nodes and triangles at the frame nearest to a time, in one archive: the two files belong together. */
export function nodesFile(result: CaseResult, at: number): OutFile {
  const frame = nearestFrame(result.frames.times, at);
  const name = stem(result.title);
  return archive(`${name}-nodes.zip`, {
    [`${name}-nodes.csv`]: nodesCsv(result, [frame]),
    [`${name}-triangles.csv`]: trianglesCsv(result),
  });
}

/** All kept fields as .vtu snapshots with the .pvd that names their times, in one archive. */
export function snapshotsFile(result: CaseResult): OutFile {
  const name = stem(result.title);
  const width = String(result.frames.times.length - 1).length;
  const files: Record<string, string> = {};
  const series = Array.from(result.frames.times, (time, frame) => {
    const file = `${name}-${String(frame).padStart(width, "0")}.vtu`;
    files[file] = vtuSnapshot(result, frame);
    return { file, time };
  });
  files[`${name}.pvd`] = pvdSeries(series);
  return archive(`${name}-fields.zip`, files);
}

function archive(name: string, files: Readonly<Record<string, string>>): OutFile {
  const bytes = Object.fromEntries(Object.entries(files).map(([file, text]) => [file, strToU8(text)]));
  return { name, type: "application/zip", content: new Uint8Array(zipSync(bytes, { level: 6 })) };
}
