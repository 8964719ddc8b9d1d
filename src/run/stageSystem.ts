/** The linear system of one stage: films onto the part's conduction, surroundings and fluxes as driven loads. */
import type { Case, Condition, Stage } from "../case/types.ts";
import { addFilm, edgeAreas } from "../fem/assemble.ts";
import type { ElementMesh } from "../fem/elementMesh.ts";
import type { HeldUnknowns, LinearSystem, Load, Signal } from "../march/types.ts";
import { groupEdges } from "./conditions.ts";
import type { EdgeGroup, NamedSide } from "./conditions.ts";
import type { KeptWork } from "./kept.ts";
import { constant } from "./partSystem.ts";
import type { PartSystem } from "./partSystem.ts";
import { signalOf } from "./signals.ts";

/** One stage: the system to march, and what is needed to balance its heat. */
export interface StageSystem {
  readonly linear: LinearSystem;
  /** how many of the loads, from the first on, come through sides; the rest are sources */
  readonly sideLoads: number;
  /** W/K per unknown: skin temperature times this is the heat that leaves through films */
  readonly filmWeights: Float64Array;
}

/** What of a stage depends on its films and on which sides are held or heated, but on no temperature and no flux. */
export interface StageMatrices {
  readonly conductance: Float64Array;
  readonly filmWeights: Float64Array;
  /** one per group of edges: film times area [W/K], or area [m2] of a flux; null for held sides */
  readonly vectors: readonly (Float64Array | null)[];
  /** one per group of edges; null where nothing is held */
  readonly held: readonly (Uint32Array | null)[];
  /** sums of vectors that are driven alike, by the numbers of their groups: kept so that they are recognised */
  readonly sums: Map<string, Float64Array>;
}

/** The system of one stage. Loads through sides come first, sources last. */
export function buildStage(
  input: Case,
  sides: readonly NamedSide[],
  part: PartSystem,
  stage: Stage,
  kept: KeptWork,
): StageSystem {
  const groups = groupEdges(part.mesh, sides, stage);
  const key = JSON.stringify(
    groups.map(({ condition, edges }) => [condition.kind, filmOf(condition), edges]),
  );
  const matrices = kept.stage(part.matrices, key, () => stageMatrices(part, groups));
  const loads = sideLoads(groups, matrices);
  const sources = input.regions.flatMap((region, i): Load[] => {
    const source = constant(region.source);
    return source === 0 ? [] : [{ vector: part.interior.regionVolumes[i]!, signal: signalOf(source) }];
  });
  const held = groups.flatMap(({ condition }, g): HeldUnknowns[] =>
    condition.kind === "held" ? [{ unknowns: matrices.held[g]!, signal: signalOf(condition.held) }] : [],
  );
  return {
    linear: {
      pattern: part.target.pattern,
      capacity: part.interior.capacity,
      conductance: matrices.conductance,
      loads: [...loads, ...sources],
      held,
      coordinates: part.mesh.nodes,
    },
    sideLoads: loads.length,
    filmWeights: matrices.filmWeights,
  };
}

const filmOf = (condition: Condition): number | null =>
  condition.kind === "film" ? constant(condition.film) : null;

function stageMatrices(part: PartSystem, groups: readonly EdgeGroup[]): StageMatrices {
  const { mesh, interior, target } = part;
  const conductance = interior.conduction.slice();
  const filmWeights = new Float64Array(mesh.nodes.length / 2);
  const taken = new Set<number>();
  const vectors = groups.map(({ condition, edges }) => {
    if (condition.kind === "flux") return edgeAreas(mesh, edges);
    if (condition.kind !== "film") return null;
    const vector = addFilm(mesh, target.pattern, edges, constant(condition.film), conductance);
    for (let i = 0; i < vector.length; i++) filmWeights[i]! += vector[i]!;
    return vector;
  });
  const held = groups.map(({ condition, edges }) =>
    condition.kind === "held" ? nodesOf(mesh, edges, taken) : null,
  );
  return { conductance, filmWeights, vectors, held, sums: new Map() };
}

/** Groups that are driven by equal signals make one load: fewer bases for the march. */
function sideLoads(groups: readonly EdgeGroup[], { vectors, sums }: StageMatrices): Load[] {
  const alike: { signal: Signal; members: number[] }[] = [];
  groups.forEach(({ condition }, g) => {
    if (condition.kind !== "film" && condition.kind !== "flux") return;
    const signal = signalOf(condition.kind === "film" ? condition.ambient : condition.flux);
    const same = alike.find(
      (other) => equal(other.signal.times, signal.times) && equal(other.signal.values, signal.values),
    );
    if (same) same.members.push(g);
    else alike.push({ signal, members: [g] });
  });
  return alike.map(({ signal, members }) => ({ signal, vector: sumOf(members, vectors, sums) }));
}

function sumOf(
  members: readonly number[],
  vectors: StageMatrices["vectors"],
  sums: Map<string, Float64Array>,
): Float64Array {
  if (members.length === 1) return vectors[members[0]!]!;
  const key = members.join();
  let sum = sums.get(key);
  if (!sum) {
    sum = new Float64Array(vectors[members[0]!]!.length);
    for (const g of members) for (let i = 0; i < sum.length; i++) sum[i]! += vectors[g]![i]!;
    sums.set(key, sum);
  }
  return sum;
}

const equal = (a: Float64Array, b: Float64Array): boolean =>
  a.length === b.length && a.every((value, i) => value === b[i]);

/** Nodes of some edges, each taken once: where two held sides meet, the first one holds the corner. */
function nodesOf(mesh: ElementMesh, edges: readonly number[], taken: Set<number>): Uint32Array {
  const nodes: number[] = [];
  for (const edge of edges)
    for (let i = 0; i < mesh.nodesPerEdge; i++) {
      const node = mesh.edges[mesh.nodesPerEdge * edge + i]!;
      if (taken.has(node)) continue;
      taken.add(node);
      nodes.push(node);
    }
  return Uint32Array.from(nodes);
}
