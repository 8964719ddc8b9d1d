/** The mesh as it was solved, in hairlines over the field, with a ring at its worst corner. Drawn on demand only. */
import type { CaseResult } from "../../run/result.ts";
import { toScreen } from "./view.ts";
import type { View } from "./view.ts";

export interface OverlayLook {
  readonly view: View;
  /** CSS px */
  readonly width: number;
  readonly height: number;
  readonly line: string;
  readonly mark: string;
}

const HAIRLINE = 0.6;
const RING = 9;

/** Each edge of the elements once: pairs of node numbers. */
export function elementEdges(elements: Uint32Array): Uint32Array {
  const seen = new Set<number>();
  const edges: number[] = [];
  for (let t = 0; t < elements.length; t += 3)
    for (let c = 0; c < 3; c++) {
      const a = elements[t + c]!;
      const b = elements[t + ((c + 1) % 3)]!;
      const key = Math.min(a, b) * 2 ** 26 + Math.max(a, b);
      if (seen.has(key)) continue;
      seen.add(key);
      edges.push(a, b);
    }
  return Uint32Array.from(edges);
}

export class MeshOverlay {
  readonly canvas = document.createElement("canvas");
  #elements: Uint32Array | null = null;
  #edges: Uint32Array = new Uint32Array(0);

  constructor() {
    this.canvas.className = "field mesh";
    this.canvas.setAttribute("aria-hidden", "true");
  }

  draw(result: CaseResult, { view, width, height, line, mark }: OverlayLook): void {
    const ratio = Math.min(2, window.devicePixelRatio || 1);
    this.canvas.width = Math.round(width * ratio);
    this.canvas.height = Math.round(height * ratio);
    const pen = this.canvas.getContext("2d");
    if (!pen) return;
    const { nodes, elements } = result.section;
    if (elements !== this.#elements) {
      this.#elements = elements;
      this.#edges = elementEdges(elements);
    }
    pen.scale(ratio, ratio);
    pen.strokeStyle = line;
    pen.lineWidth = HAIRLINE;
    pen.beginPath();
    for (let e = 0; e < this.#edges.length; e += 2) {
      const [a, b] = [2 * this.#edges[e]!, 2 * this.#edges[e + 1]!];
      pen.moveTo(...toScreen(view, nodes[a]!, nodes[a + 1]!));
      pen.lineTo(...toScreen(view, nodes[b]!, nodes[b + 1]!));
    }
    pen.stroke();
    const [x, y] = toScreen(view, ...result.mesh.worstPlace);
    pen.strokeStyle = mark;
    pen.lineWidth = 2;
    pen.beginPath();
    pen.arc(x, y, RING, 0, 2 * Math.PI);
    pen.stroke();
  }
}
