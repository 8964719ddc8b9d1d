/** Curves of the case document as the signals that drive a march. */
import type { Curve } from "../case/types.ts";
import type { Signal } from "../march/types.ts";

/** A constant or a table over the time of the stage. Throws on a table over temperature: refused before it gets here. */
export function signalOf(curve: Curve): Signal {
  if (typeof curve === "number") return { times: Float64Array.of(0), values: Float64Array.of(curve) };
  if (curve.over !== "time") throw new Error("a curve over temperature cannot drive a linear march");
  return {
    times: Float64Array.from(curve.points, (point) => point[0]),
    values: Float64Array.from(curve.points, (point) => point[1]),
  };
}

/** Value of a signal at a time: linear between its points, constant beyond them. */
export function signalAt({ times, values }: Signal, time: number): number {
  const last = times.length - 1;
  if (time <= times[0]!) return values[0]!;
  if (time >= times[last]!) return values[last]!;
  let i = 1;
  while (times[i]! < time) i++;
  const share = (time - times[i - 1]!) / (times[i]! - times[i - 1]!);
  return values[i - 1]! + share * (values[i]! - values[i - 1]!);
}
