/**
 * The places a question can name: a probe, every-point, any-point, mean, surface-mean, coldest, hottest. Each is a
 * track: one temperature for a field, and the place that has it.
 */
import { extremeOf } from "../fem/extremes.ts";
import type { Extreme } from "../fem/extremes.ts";
import type { Going } from "../heat/crossings.ts";
import type { PartSystem } from "./partSystem.ts";

export interface Track {
  readonly name: string;
  /** temperature of the track for a field [degC] */
  of(field: Float64Array): number;
  /** where that temperature is; null for means */
  placeOf(field: Float64Array): readonly [number, number] | null;
}

export interface Tracks {
  readonly coldest: Track;
  readonly hottest: Track;
  readonly mean: Track;
  readonly surfaceMean: Track;
  readonly probes: ReadonlyMap<string, Track>;
}

/** @param probeNodes unknown of each probe */
export function buildTracks(part: PartSystem, probeNodes: ReadonlyMap<string, number>): Tracks {
  const { mesh, interior } = part;
  const probes = new Map<string, Track>();
  for (const [name, node] of probeNodes) {
    const place = [mesh.nodes[2 * node]!, mesh.nodes[2 * node + 1]!] as const;
    probes.set(name, { name, of: (field) => field[node]!, placeOf: () => place });
  }
  return {
    coldest: extremeTrack("coldest", (field) => extremeOf(mesh, field, -1)),
    hottest: extremeTrack("hottest", (field) => extremeOf(mesh, field, 1)),
    mean: meanTrack("mean", interior.volumes),
    surfaceMean: meanTrack("surface-mean", part.exposedAreas),
    probes,
  };
}

function extremeTrack(name: string, find: (field: Float64Array) => Extreme): Track {
  return { name, of: (field) => find(field).value, placeOf: (field) => find(field).place };
}

function meanTrack(name: string, weights: Float64Array): Track {
  const total = weights.reduce((sum, weight) => sum + weight, 0);
  return { name, of: (field) => dot(weights, field) / total, placeOf: () => null };
}

export function dot(a: Float64Array, b: Float64Array): number {
  let sum = 0;
  for (let i = 0; i < a.length; i++) sum += a[i]! * b[i]!;
  return sum;
}

/**
 * The track behind the `where` of a question about reaching a level. The last point to get there is the hottest one
 * while the part cools and the coldest one while it heats; the first point is the other way round.
 */
export function trackFor(tracks: Tracks, where: string, going: Going): Track {
  switch (where) {
    case "every-point":
      return going === "down" ? tracks.hottest : tracks.coldest;
    case "any-point":
      return going === "down" ? tracks.coldest : tracks.hottest;
    case "coldest":
      return tracks.coldest;
    case "hottest":
      return tracks.hottest;
    case "mean":
      return tracks.mean;
    case "surface-mean":
      return tracks.surfaceMean;
    default: {
      const probe = tracks.probes.get(where);
      if (!probe) throw new Error(`no probe is called "${where}"`);
      return probe;
    }
  }
}
