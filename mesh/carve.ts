/** Tells regions apart by flooding from the sides, and throws away what belongs to none. */
import { packTriangles } from "./editTriangles.ts";
import type { Outline } from "./outline.ts";
import type { SideNodes } from "./sideNodes.ts";
import type { Triangulation } from "./triangulation.ts";

const UNSEEN = -2;

export function carveRegions(mesh: Triangulation, sides: SideNodes, outline: Outline): void {
  const { region, twin } = mesh;
  region.fill(UNSEEN);
  const flood: number[] = [];
  const start = (e: number, r: number) => {
    if (e < 0) return;
    const t = (e / 3) | 0;
    if (region[t] !== UNSEEN) return;
    region[t] = r;
    flood.push(t);
  };
  for (let c = 0; c < sides.from.length; c++) {
    if (sides.piece[c]! < 0) continue;
    const piece = outline.pieces[sides.piece[c]!]!;
    const e = mesh.edge(sides.from[c]!, sides.to[c]!);
    if (e < 0) continue;
    start(e, piece.left);
    start(twin[e]!, piece.right);
  }
  floodRegions(mesh, flood);
  refuseOutside(mesh);
  packTriangles(mesh);
}

/** The far points belong to no region, else some side has its region on the wrong hand. */
function refuseOutside({ corner, region, nodes, used }: Triangulation): void {
  for (let e = 0; e < used; e++) {
    if (corner[e]! >= nodes && region[(e / 3) | 0]! >= 0) {
      throw new Error("a region is not enclosed by its sides: some are crossed or covered by others");
    }
  }
}

/** Row edges are locked too, but the flood passes them: only sides part regions. */
function floodRegions({ lock, twin, region }: Triangulation, flood: number[]): void {
  for (let t = flood.pop(); t !== undefined; t = flood.pop()) {
    for (let e = 3 * t; e < 3 * t + 3; e++) {
      if (isSideLock(lock[e]!) || twin[e]! < 0) continue;
      const u = (twin[e]! / 3) | 0;
      if (region[u] !== UNSEEN) continue;
      region[u] = region[t]!;
      flood.push(u);
    }
  }
}

/** Lock values: 1 + the piece's number on sides, this on edges of rows. */
export const ROW_LOCK = 1 << 30;

export function isSideLock(lock: number): boolean {
  return lock > 0 && lock < ROW_LOCK;
}
