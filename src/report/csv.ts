/** Curves, nodes and triangles as CSV: a header line with units, a point for the decimal, one record a line. */
import type { CaseResult } from "../run/result.ts";

/** Curves over time: one line per kept instant, field first, then the estimates where there are any. */
export function curvesCsv(result: CaseResult): string {
  const { history, estimates } = result;
  const columns: [string, ArrayLike<number>][] = [
    ["time_s", history.time],
    ["core_degC", history.core.temperature],
    ["coldest_degC", history.coldest],
    ["hottest_degC", history.hottest],
    ["mean_degC", history.mean],
    ["surface_mean_degC", history.surfaceMean],
    ["heat_taken_up_J", history.heat],
    ...Object.entries(history.probes).map(([name, values]): [string, ArrayLike<number>] => [
      `probe ${name}_degC`,
      values,
    ]),
  ];
  if (estimates.lumped) {
    const { time, temperature } = estimates.lumped.history;
    columns.push(["lumped_degC", interpolate(time, temperature, history.time)]);
  }
  if (estimates.series) {
    const { time, core, mean, surface } = estimates.series.history;
    columns.push(["series_core_degC", interpolate(time, core, history.time)]);
    columns.push(["series_mean_degC", interpolate(time, mean, history.time)]);
    columns.push(["series_surface_degC", interpolate(time, surface, history.time)]);
  }
  return table(columns);
}

/**
 * Nodes of the drawn mesh with the temperature at each chosen frame: r, z [m], degC. With trianglesCsv it is the
 * field for stress work: node numbers count from 0 in both.
 */
export function nodesCsv(result: CaseResult, frames: readonly number[]): string {
  const { nodes } = result.section;
  const count = nodes.length / 2;
  const index = Array.from({ length: count }, (_, i) => i);
  return table([
    ["node", index],
    ["r_m", index.map((i) => nodes[2 * i]!)],
    ["z_m", index.map((i) => nodes[2 * i + 1]!)],
    ...frames.map((frame): [string, ArrayLike<number>] => [
      `T_degC at ${result.frames.times[frame]!} s`,
      result.frames.temperatures[frame]!,
    ]),
  ]);
}

/** Triangles of the drawn mesh: three node numbers from 0, counter-clockwise, and the region number. */
export function trianglesCsv(result: CaseResult): string {
  const { triangles, triangleRegion } = result.section;
  const index = Array.from({ length: triangleRegion.length }, (_, i) => i);
  const corner = (c: number): number[] => index.map((i) => triangles[3 * i + c]!);
  return table([
    ["triangle", index],
    ["node_a", corner(0)],
    ["node_b", corner(1)],
    ["node_c", corner(2)],
    ["region", triangleRegion],
  ]);
}

function table(columns: readonly (readonly [string, ArrayLike<number>])[]): string {
  const lines = [columns.map(([name]) => quoted(name)).join(",")];
  for (let i = 0; i < columns[0]![1].length; i++)
    lines.push(columns.map(([, values]) => String(values[i])).join(","));
  return `${lines.join("\n")}\n`;
}

/** Quotes a name that holds a comma, a quote or a line end, and disarms one that a spreadsheet would run. */
function quoted(name: string): string {
  const disarmed = /^[=+\-@\t\r]/.test(name) ? `'${name}` : name;
  return /[",\r\n]/.test(disarmed) ? `"${disarmed.replaceAll('"', '""')}"` : disarmed;
}

/** Values of a curve at other instants, linear between its own. */
function interpolate(times: Float64Array, values: Float64Array, at: Float64Array): Float64Array {
  let i = 1;
  return at.map((time) => {
    while (i < times.length - 1 && times[i]! < time) i++;
    const share = (time - times[i - 1]!) / (times[i]! - times[i - 1]!);
    return values[i - 1]! + Math.min(1, Math.max(0, share)) * (values[i]! - values[i - 1]!);
  });
}
