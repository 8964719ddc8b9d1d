/** Parts from which the outlines of the shapes are put together. */
import type { QuantityPair, VertexDocument } from "./types.ts";

export type Place = readonly [r: number, z: number];

/** Places are written to the nanometre, so that a case file shows 0.035 and not 0.035000000000000003. */
const DIGITS = 1e9;

export function at([r, z]: Place): QuantityPair {
  return [Math.round(r * DIGITS) / DIGITS, Math.round(z * DIGITS) / DIGITS];
}

export function vertex(side: string, r: number, z: number): VertexDocument {
  return { at: at([r, z]), side };
}

/** The place on a circle under an angle [rad] from the r direction. */
export function arcAround(centre: Place, radius: number, angle: number): QuantityPair {
  return at([centre[0] + radius * Math.cos(angle), centre[1] + radius * Math.sin(angle)]);
}

/** Middle of the arc of a cap with its pole on the axis, over a rim of a radius, so high. */
export function capArc(rim: number, z: number, height: number): QuantityPair {
  const radius = (rim * rim + height * height) / (2 * height);
  const half = Math.atan2(rim, radius - height) / 2;
  return at([radius * Math.sin(half), z + height - radius * (1 - Math.cos(half))]);
}
