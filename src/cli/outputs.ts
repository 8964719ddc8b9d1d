/** Files of a solved case: answers.json, curves, field snapshots. */
import { mkdirSync, writeFileSync } from "node:fs";
import path from "node:path";
import { answersJson } from "../report/answersJson.ts";
import { curvesCsv, nodesCsv, trianglesCsv } from "../report/csv.ts";
import { pvdSeries, vtuSnapshot } from "../report/vtk.ts";
import type { CaseResult } from "../run/result.ts";

/** Snapshots when no times were asked for: enough to play the run, few enough to keep. */
const SNAPSHOTS = 25;

/** Writes everything into a folder, made when missing. Throws the file system's own errors. */
export function writeOutputs(
  result: CaseResult,
  folder: string,
  kinds: readonly string[],
  at: readonly number[],
): void {
  mkdirSync(folder, { recursive: true });
  const write = (name: string, text: string): void => writeFileSync(path.join(folder, name), text);
  write("answers.json", `${JSON.stringify(answersJson(result), null, 1)}\n`);
  write("curves.csv", curvesCsv(result));
  const frames = chosenFrames(result, at);
  if (kinds.includes("csv")) {
    write("nodes.csv", nodesCsv(result, frames));
    write("triangles.csv", trianglesCsv(result));
  }
  if (!kinds.includes("vtu")) return;
  const snapshots = frames.map((frame, i) => ({
    file: `field-${String(i).padStart(4, "0")}.vtu`,
    time: result.frames.times[frame]!,
    frame,
  }));
  for (const { file, frame } of snapshots) write(file, vtuSnapshot(result, frame));
  write("field.pvd", pvdSeries(snapshots));
}

/** The frames at the asked times, or some spread over the run. */
function chosenFrames(result: CaseResult, at: readonly number[]): number[] {
  const { times } = result.frames;
  if (at.length > 0) return at.map((time) => times.indexOf(time)).filter((frame) => frame >= 0);
  const end = times[times.length - 1]!;
  const chosen = new Set<number>();
  for (let i = 0; i < SNAPSHOTS; i++) chosen.add(nearest(times, (end * i) / (SNAPSHOTS - 1)));
  return [...chosen].sort((a, b) => a - b);
}

function nearest(times: Float64Array, time: number): number {
  let best = 0;
  for (let i = 1; i < times.length; i++)
    if (Math.abs(times[i]! - time) < Math.abs(times[best]! - time)) best = i;
  return best;
}
