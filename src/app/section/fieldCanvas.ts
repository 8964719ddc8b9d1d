/**
 * The field without WebGL: every triangle is filled pixel by pixel into one picture, the value linear over it, the
 * colour looked up in the same map. The mirrored half is painted from the same triangles.
 */
import { mapTable } from "../colours.ts";
import type { Range, Rgb } from "../colours.ts";
import { freshCanvas, veils } from "./fieldLayer.ts";
import type { FieldLayer, FieldPicture } from "./fieldLayer.ts";
import { toScreen } from "./view.ts";

const TABLE = 1024;

export interface Raster {
  readonly data: Uint8ClampedArray;
  readonly width: number;
  readonly height: number;
}

export class CanvasField implements FieldLayer {
  readonly kind = "canvas";
  readonly canvas = freshCanvas();

  draw(picture: FieldPicture): void {
    this.canvas.width = Math.round(picture.width * picture.pixelRatio);
    this.canvas.height = Math.round(picture.height * picture.pixelRatio);
    const context = this.canvas.getContext("2d");
    if (!context || this.canvas.width === 0 || this.canvas.height === 0) return;
    const image = context.createImageData(this.canvas.width, this.canvas.height);
    paintField(picture, image);
    context.putImageData(image, 0, 0);
  }

  clear(): void {
    this.canvas.getContext("2d")?.clearRect(0, 0, this.canvas.width, this.canvas.height);
  }

  dispose(): void {
    this.canvas.remove();
  }
}

/** Paints both halves into `out`, whose pixels are `pixelRatio` to a CSS px. */
export function paintField(picture: FieldPicture, out: Raster): void {
  const { mesh, values, view, pixelRatio } = picture;
  const spots = new Float64Array(mesh.nodes.length);
  const [edited, mirrored] = veils(picture);
  for (const [sign, veil] of [
    [1, edited],
    [-1, mirrored],
  ] as const) {
    for (let i = 0; i < spots.length; i += 2) {
      const [x, y] = toScreen(view, sign * mesh.nodes[i]!, mesh.nodes[i + 1]!);
      spots[i] = x * pixelRatio - 0.5; // pixel centres at whole numbers
      spots[i + 1] = y * pixelRatio - 0.5;
    }
    const table = tintedTable(picture, veil);
    for (let t = 0; t < mesh.triangles.length; t += 3)
      fillTriangle(spots, values, mesh.triangles, t, picture.range, table, out);
  }
}

function tintedTable({ stops, sheet, ghost }: FieldPicture, veil: number): Uint8Array {
  const table = mapTable(stops, TABLE);
  for (let i = 0; i < table.length; i += 4) {
    const grey = 0.3 * table[i]! + 0.59 * table[i + 1]! + 0.11 * table[i + 2]!;
    for (let k = 0; k < 3; k++) {
      const own = ghost ? grey : table[i + k]!;
      table[i + k] = Math.round(own + veil * ((sheet as Rgb)[k as 0]! - own));
    }
  }
  return table;
}

function fillTriangle(
  spots: Float64Array,
  values: Float32Array,
  triangles: Uint32Array,
  at: number,
  range: Range,
  table: Uint8Array,
  out: Raster,
): void {
  const [a, b, c] = [triangles[at]!, triangles[at + 1]!, triangles[at + 2]!];
  const [ax, ay] = [spots[2 * a]!, spots[2 * a + 1]!];
  const [bx, by] = [spots[2 * b]! - ax, spots[2 * b + 1]! - ay];
  const [cx, cy] = [spots[2 * c]! - ax, spots[2 * c + 1]! - ay];
  const area = bx * cy - by * cx;
  const toIndex = (TABLE - 1) / (range.to - range.from);
  const base = (values[a]! - range.from) * toIndex;
  const [db, dc] = [(values[b]! - values[a]!) * toIndex, (values[c]! - values[a]!) * toIndex];
  if (area === 0 || Number.isNaN(base + db + dc)) return;
  const edge = 1e-9; // pixels on a shared edge belong to both triangles: no gaps
  const yFrom = Math.max(0, Math.ceil(ay + Math.min(0, by, cy)));
  const yTo = Math.min(out.height - 1, Math.floor(ay + Math.max(0, by, cy)));
  const xFrom = Math.max(0, Math.ceil(ax + Math.min(0, bx, cx)));
  const xTo = Math.min(out.width - 1, Math.floor(ax + Math.max(0, bx, cx)));
  for (let y = yFrom; y <= yTo; y++)
    for (let x = xFrom; x <= xTo; x++) {
      const u = ((x - ax) * cy - (y - ay) * cx) / area;
      const v = (bx * (y - ay) - by * (x - ax)) / area;
      if (u < -edge || v < -edge || u + v > 1 + edge) continue;
      const index = 4 * Math.max(0, Math.min(TABLE - 1, Math.round(base + u * db + v * dc)));
      const pixel = 4 * (y * out.width + x);
      out.data[pixel] = table[index]!;
      out.data[pixel + 1] = table[index + 1]!;
      out.data[pixel + 2] = table[index + 2]!;
      out.data[pixel + 3] = 255;
    }
}
