/** The validator that every test runs: what is wrong with a mesh, in words; nothing when it is sound. */
import { edgeTable, halfEdgesOfSides, nextCorner, type EdgeTable } from "./edges.ts";
import { curveOf, extentOf, loopArea, numberedSides, type NumberedSide } from "./outline.ts";
import { curveLength, distanceToCurve, shareOnCurve, type Curve } from "./plane.ts";
import { triangleArea } from "./quality.ts";
import type { MeshRequest, TriangleMesh } from "./types.ts";

/** Side nodes lie on their side to this share of the part's size: the joining tolerance and rounding. */
const ON_SIDE = 3e-8;
/** Areas agree to this share of the part's size squared. */
const AREA = 1e-7;
/** Messages of one kind beyond this are left out. */
const MOST_OF_A_KIND = 5;

/**
 * Checks that the mesh conforms and belongs to the request: triangles counter-clockwise, each edge shared by two
 * triangles or tagged as exposed, no hanging nodes, regions parted by tagged edges only, side nodes on their line or
 * arc, every side covered from end to end, areas of the regions right, requested points present.
 *
 * @returns one sentence per fault, empty when the mesh is sound
 */
export function checkMesh(mesh: TriangleMesh, request: MeshRequest): string[] {
  const report = new Report();
  checkArrays(mesh, report);
  if (report.faults.length > 0) return report.faults;
  const table = edgeTable(mesh);
  const size = extentOf(request.regions).size;
  checkNodesUsed(mesh, report);
  checkTriangles(mesh, report);
  checkEdges(mesh, table, report);
  checkHangingNodes(mesh, table, size, report);
  checkSides(mesh, request, size, report);
  checkAreas(mesh, request, size, report);
  checkPoints(mesh, request, size, report);
  return report.faults;
}

class Report {
  readonly faults: string[] = [];
  private readonly counts = new Map<string, number>();

  add(kind: string, detail: string): void {
    const n = (this.counts.get(kind) ?? 0) + 1;
    this.counts.set(kind, n);
    if (n <= MOST_OF_A_KIND) this.faults.push(`${kind}: ${detail}`);
    else if (n === MOST_OF_A_KIND + 1) this.faults.push(`${kind}: more of these`);
  }
}

function checkArrays(mesh: TriangleMesh, report: Report): void {
  const nodes = mesh.nodes.length / 2;
  const edges = mesh.edges.length / 2;
  if (mesh.triangles.length === 0) report.add("no triangles", "the mesh is empty");
  if (mesh.triangles.length !== 3 * mesh.triangleRegion.length) report.add("array length", "triangleRegion");
  if (mesh.edgeSides.length !== 2 * edges) report.add("array length", "edgeSides");
  if (mesh.edgeArc.length !== edges) report.add("array length", "edgeArc");
  if (mesh.nodes.some((v) => !Number.isFinite(v))) report.add("number", "a node's place is not a number");
  if (mesh.triangles.some((v) => v >= nodes)) report.add("node number", "a triangle's corner does not exist");
  if (mesh.edges.some((v) => v >= nodes)) report.add("node number", "a side edge's end does not exist");
}

function checkNodesUsed(mesh: TriangleMesh, report: Report): void {
  const used = new Uint8Array(mesh.nodes.length / 2);
  for (const v of mesh.triangles) used[v] = 1;
  used.forEach((u, v) => {
    if (!u) report.add("unused node", `${v}`);
  });
}

function checkTriangles(mesh: TriangleMesh, report: Report): void {
  for (let t = 0; t < mesh.triangleRegion.length; t++) {
    if (!(triangleArea(mesh, t) > 0)) report.add("turned triangle", `${t} has area ${triangleArea(mesh, t)}`);
  }
}

/** Untagged edges have two triangles of one region; tagged ones separate what their tags say. */
function checkEdges(mesh: TriangleMesh, { twin, doubled }: EdgeTable, report: Report): void {
  if (doubled > 0)
    report.add("overlapping triangles", `${doubled} edges have more than one triangle on a hand`);
  const tagged = new Uint8Array(mesh.triangles.length);
  halfEdgesOfSides(mesh).forEach((e, k) => {
    if (e < 0) {
      report.add("side edge without a triangle on its left", `${k}`);
      return;
    }
    if (tagged[e]) report.add("side edge twice", `${k}`);
    tagged[e] = 1;
    if (twin[e]! >= 0) tagged[twin[e]!] = 1;
    if (mesh.edgeSides[2 * k + 1]! >= 0 !== twin[e]! >= 0) report.add("side edge's right hand", `${k}`);
  });
  for (let e = 0; e < twin.length; e++) {
    if (tagged[e]) continue;
    if (twin[e]! < 0) report.add("open edge", `half-edge ${e}`);
    else if (regionOf(mesh, e) !== regionOf(mesh, twin[e]!))
      report.add("untagged interface", `half-edge ${e}`);
  }
}

function regionOf(mesh: TriangleMesh, e: number): number {
  return mesh.triangleRegion[Math.floor(e / 3)]!;
}

/** A node in the middle of another triangle's hull edge: the hull would touch itself there. */
function checkHangingNodes(mesh: TriangleMesh, { twin }: EdgeTable, size: number, report: Report): void {
  const { nodes, triangles } = mesh;
  const hull: number[] = [];
  for (let e = 0; e < twin.length; e++) if (twin[e]! < 0) hull.push(e);
  const byHeight = hull
    .map((e) => ({ v: triangles[e]!, z: nodes[2 * triangles[e]! + 1]! }))
    .sort((p, q) => p.z - q.z);
  for (const e of hull) {
    const a = 2 * triangles[e]!;
    const b = 2 * triangles[nextCorner(e)]!;
    const curve = { ax: nodes[a]!, ay: nodes[a + 1]!, bx: nodes[b]!, by: nodes[b + 1]!, arc: null };
    const low = Math.min(curve.ay, curve.by) - 1e-9 * size;
    const high = Math.max(curve.ay, curve.by) + 1e-9 * size;
    for (let i = lowerBound(byHeight, low); i < byHeight.length && byHeight[i]!.z <= high; i++) {
      const v = 2 * byHeight[i]!.v;
      if (v === a || v === b) continue;
      const t = shareOnCurve(curve, nodes[v]!, nodes[v + 1]!, 1e-10 * size);
      if (t > 1e-6 && t < 1 - 1e-6) report.add("hanging node", `${v / 2} at ${nodes[v]}, ${nodes[v + 1]}`);
    }
  }
}

function lowerBound(list: readonly { z: number }[], z: number): number {
  let [low, high] = [0, list.length];
  while (low < high) {
    const middle = (low + high) >> 1;
    if (list[middle]!.z < z) low = middle + 1;
    else high = middle;
  }
  return low;
}

/** Every side is covered once by side edges whose ends lie on it and whose region is the side's own. */
function checkSides(mesh: TriangleMesh, request: MeshRequest, size: number, report: Report): void {
  const sides = numberedSides(request.regions);
  const curves = sides.map(({ side }) => curveOf(side));
  const covered = new Float64Array(sides.length);
  const half = halfEdgesOfSides(mesh);
  for (let k = 0; k < half.length; k++) {
    for (const hand of [0, 1]) {
      const s = mesh.edgeSides[2 * k + hand]!;
      if (s < 0 && hand === 1) continue;
      if (!sides[s]) {
        report.add("side tag", `edge ${k} names side ${s}`);
        continue;
      }
      covered[s]! += edgeOnSide(mesh, k, curves[s]!, size, report);
      checkRegion(mesh, half[k]!, hand, sides[s]!, report);
    }
  }
  sides.forEach(({ number }, s) => {
    const length = curveLength(curves[s]!);
    if (length < ON_SIDE * size) return;
    if (Math.abs(covered[s]! - length) > 10 * ON_SIDE * size + 1e-6 * length) {
      report.add("side not covered", `side ${number}: ${covered[s]} m of ${length} m`);
    }
  });
}

function checkRegion(mesh: TriangleMesh, e: number, hand: number, side: NumberedSide, report: Report): void {
  if (hand === 0 && e >= 0 && regionOf(mesh, e) !== side.region) {
    report.add("side of another region", `side ${side.number} of region ${side.region} on half-edge ${e}`);
  }
}

/** Length of the side between the edge's ends [m]. */
function edgeOnSide(mesh: TriangleMesh, k: number, curve: Curve, size: number, report: Report): number {
  const { nodes, edges } = mesh;
  const [a, b] = [2 * edges[2 * k]!, 2 * edges[2 * k + 1]!];
  for (const v of [a, b]) {
    const off = distanceToCurve(curve, nodes[v]!, nodes[v + 1]!);
    if (off > ON_SIDE * size) report.add("node beside its side", `node ${v / 2} by ${off} m`);
  }
  const chord = Math.hypot(nodes[a]! - nodes[b]!, nodes[a + 1]! - nodes[b + 1]!);
  if (!curve.arc) return chord;
  const { radius } = curve.arc;
  return 2 * radius * Math.asin(Math.min(1, chord / (2 * radius)));
}

/** Area of each region: triangles and the segments between chords and arcs add up to the outline's own. */
function checkAreas(mesh: TriangleMesh, request: MeshRequest, size: number, report: Report): void {
  const area = new Float64Array(request.regions.length);
  mesh.triangleRegion.forEach((r, t) => {
    area[r]! += triangleArea(mesh, t);
  });
  addSegments(mesh, request, area);
  request.regions.forEach((region, r) => {
    const exact = region.loops.reduce(
      (sum, loop, l) => sum + (l === 0 ? 1 : -1) * Math.abs(loopArea(loop)),
      0,
    );
    if (!(Math.abs(area[r]! - exact) <= AREA * size * size)) {
      report.add("area", `region ${r}: ${area[r]} m2 against ${exact} m2`);
    }
  });
}

function addSegments(mesh: TriangleMesh, request: MeshRequest, area: Float64Array): void {
  const { nodes, edges, edgeSides, edgeArc, arcs } = mesh;
  const sides = numberedSides(request.regions);
  for (let k = 0; k < edgeArc.length; k++) {
    const arc = 3 * edgeArc[k]!;
    if (arc < 0) continue;
    const [a, b] = [2 * edges[2 * k]!, 2 * edges[2 * k + 1]!];
    const [ux, uy] = [nodes[a]! - arcs[arc]!, nodes[a + 1]! - arcs[arc + 1]!];
    const [vx, vy] = [nodes[b]! - arcs[arc]!, nodes[b + 1]! - arcs[arc + 1]!];
    // Positive when the arc bulges to the right of a-b, away from the region on the left.
    const turn = Math.atan2(ux * vy - uy * vx, ux * vx + uy * vy);
    const segment = (arcs[arc + 2]! ** 2 * (turn - Math.sin(turn))) / 2;
    const [left, right] = [edgeSides[2 * k]!, edgeSides[2 * k + 1]!];
    area[sides[left]!.region]! += segment;
    if (right >= 0) area[sides[right]!.region]! -= segment;
  }
}

function checkPoints(mesh: TriangleMesh, request: MeshRequest, size: number, report: Report): void {
  const points = request.points ?? [];
  if (mesh.pointNodes.length !== points.length) report.add("requested points", "their number differs");
  points.forEach(([r, z], k) => {
    const v = 2 * mesh.pointNodes[k]!;
    const off = Math.hypot(mesh.nodes[v]! - r, mesh.nodes[v + 1]! - z);
    if (!(off <= ON_SIDE * size)) report.add("requested point", `${k} lies ${off} m beside its node`);
  });
}
