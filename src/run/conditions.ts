/** Which condition stands on which exposed edge of the mesh, stage by stage. */
import type { Case, CaseProblem, Condition, Stage } from "../case/types.ts";
import type { ElementMesh } from "../fem/elementMesh.ts";

/** What this file needs to know of a side of the profile; sides are numbered region, loop, side. */
export interface NamedSide {
  readonly name: string;
  readonly region: number;
  /** "axis" sides lie on r = 0 and take no condition; "interface" sides touch another region all along */
  readonly kind: "axis" | "exposed" | "interface" | "partly";
}

/** Exposed side edges that share one condition. */
export interface EdgeGroup {
  readonly condition: Condition;
  readonly edges: readonly number[];
}

/** The condition of a side by its name, else that of "*". */
export function conditionOf(stage: Stage, side: string): Condition | undefined {
  return Object.hasOwn(stage.sides, side) ? stage.sides[side] : stage.sides["*"];
}

/** Side edges with nothing of the part on their right, sides on the axis left out. */
export function exposedEdges(mesh: ElementMesh, sides: readonly NamedSide[]): number[] {
  const exposed: number[] = [];
  for (let edge = 0; edge < mesh.edgeSides.length / 2; edge++)
    if (mesh.edgeSides[2 * edge + 1]! < 0 && sides[mesh.edgeSides[2 * edge]!]!.kind !== "axis")
      exposed.push(edge);
  return exposed;
}

/** Exposed edges of one stage, gathered by condition in the order in which conditions first appear along the part. */
export function groupEdges(mesh: ElementMesh, sides: readonly NamedSide[], stage: Stage): EdgeGroup[] {
  const groups = new Map<Condition, number[]>();
  for (const edge of exposedEdges(mesh, sides)) {
    const condition = conditionOf(stage, sides[mesh.edgeSides[2 * edge]!]!.name);
    if (!condition || condition.kind === "insulated") continue;
    const edges = groups.get(condition);
    if (edges) edges.push(edge);
    else groups.set(condition, [edge]);
  }
  return [...groups].map(([condition, edges]) => ({ condition, edges }));
}

/** Every exposed side needs a condition in every stage, and a side that is not exposed takes none. */
export function conditionProblems(input: Case, sides: readonly NamedSide[]): CaseProblem[] {
  const problems: CaseProblem[] = [];
  input.stages.forEach((stage, s) => {
    const path = `stages[${s}].sides`;
    const open = sides.filter(
      (side) => (side.kind === "exposed" || side.kind === "partly") && !conditionOf(stage, side.name),
    );
    for (const name of new Set(open.map((side) => side.name)))
      problems.push({
        code: "side-without-condition",
        path,
        message: `side "${name}" has no condition in stage "${stage.name}"`,
        mend: `add "${name}" with a film, a flux, a held temperature or "insulated", or "*" for all sides not named`,
      });
    for (const name of Object.keys(stage.sides)) {
      if (name === "*") continue;
      const named = sides.filter((side) => side.name === name);
      if (named.length === 0 || named.some((side) => side.kind === "exposed" || side.kind === "partly"))
        continue;
      const axis = named.every((side) => side.kind === "axis");
      problems.push({
        code: axis ? "condition-on-axis" : "condition-on-interface",
        path: `${path}.${name}`,
        message: axis
          ? `side "${name}" lies on the axis, where there is no surface`
          : `side "${name}" touches another region all along, so it is not exposed`,
        mend: "take the condition out",
      });
    }
  });
  return problems;
}
