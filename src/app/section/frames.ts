/** What is drawn from the frames of a result: the field at an instant, and when each point gets to a temperature. */
import type { CaseResult, Frames } from "../../run/result.ts";

/** Node temperatures [degC] at a time [s], linear between frames. */
export function fieldAt(frames: Frames, time: number, out?: Float32Array): Float32Array {
  const { times, temperatures } = frames;
  const after = firstAfter(times, time);
  const values = out ?? new Float32Array(temperatures[0]?.length ?? 0);
  const right = temperatures[Math.min(after, temperatures.length - 1)];
  const left = temperatures[Math.max(0, after - 1)];
  if (!left || !right) return values;
  const span = after > 0 && after < times.length ? times[after]! - times[after - 1]! : 0;
  const part = span > 0 ? (time - times[after - 1]!) / span : 0;
  for (let i = 0; i < values.length; i++) values[i] = left[i]! + part * (right[i]! - left[i]!);
  return values;
}

function firstAfter(times: Float64Array, time: number): number {
  let [low, high] = [0, times.length];
  while (low < high) {
    const middle = (low + high) >> 1;
    if (times[middle]! > time) high = middle;
    else low = middle + 1;
  }
  return low;
}

/**
 * Time [s] at which each node first passes `level` [degC] in the asked direction; NaN where it does not.
 * A node that is past the level when the run begins counts only once it has been on the other side.
 */
export function arrivalTimes(frames: Frames, level: number, going: "up" | "down"): Float32Array {
  const { times, temperatures } = frames;
  const sign = going === "up" ? 1 : -1;
  const arrival = new Float32Array(temperatures[0]?.length ?? 0).fill(Number.NaN);
  for (let k = 1; k < times.length; k++) {
    const [before, now] = [temperatures[k - 1]!, temperatures[k]!];
    for (let i = 0; i < arrival.length; i++) {
      const [a, b] = [sign * (before[i]! - level), sign * (now[i]! - level)];
      if (Number.isNaN(arrival[i]!) && a < 0 && b >= 0)
        arrival[i] = times[k - 1]! + (a / (a - b)) * (times[k]! - times[k - 1]!);
    }
  }
  return arrival;
}

/** Which way a "when" question goes: as said, else away from where the run starts. */
export function goingOf(result: CaseResult, level: number, said?: "up" | "down"): "up" | "down" {
  return said ?? (result.history.mean[0]! < level ? "up" : "down");
}

/** Value of a nodal field at (r, z), NaN off the mesh; scans the triangles, which is fast enough for one pointer. */
export function valueAt(section: CaseResult["section"], values: Float32Array, r: number, z: number): number {
  const { nodes, triangles } = section;
  for (let t = 0; t < triangles.length; t += 3) {
    const [a, b, c] = [triangles[t]!, triangles[t + 1]!, triangles[t + 2]!];
    const [ar, az] = [nodes[2 * a]!, nodes[2 * a + 1]!];
    const [br, bz] = [nodes[2 * b]! - ar, nodes[2 * b + 1]! - az];
    const [cr, cz] = [nodes[2 * c]! - ar, nodes[2 * c + 1]! - az];
    const area = br * cz - bz * cr;
    const u = ((r - ar) * cz - (z - az) * cr) / area;
    const v = (br * (z - az) - bz * (r - ar)) / area;
    if (u >= -1e-6 && v >= -1e-6 && u + v <= 1 + 1e-6)
      return (1 - u - v) * values[a]! + u * values[b]! + v * values[c]!;
  }
  return Number.NaN;
}
