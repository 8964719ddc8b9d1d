/** What paints the field under the drawing: Three.js where WebGL is to be had, else a plain 2-D canvas. */
import type { SectionMesh } from "../../run/result.ts";
import type { Range, Rgb } from "../colours.ts";
import type { View } from "./view.ts";

/** One picture of the field. Values that are not a number are left unpainted (sheet shows through). */
export interface FieldPicture {
  readonly mesh: SectionMesh;
  /** one per node of the mesh */
  readonly values: Float32Array;
  readonly range: Range;
  readonly stops: readonly Rgb[];
  readonly view: View;
  /** ground behind the mirrored half, and how much of it is laid over that half, 0 to 1 */
  readonly sheet: Rgb;
  readonly veil: number;
  /** the field of an outline that no longer stands: without colour, faint */
  readonly ghost: boolean;
  /** CSS px */
  readonly width: number;
  readonly height: number;
  readonly pixelRatio: number;
}

export interface FieldLayer {
  readonly kind: "webgl" | "canvas";
  readonly canvas: HTMLCanvasElement;
  draw(picture: FieldPicture): void;
  clear(): void;
  dispose(): void;
}

/** Shares of sheet laid over a field without colour: edited half, mirrored half. */
export const GHOST_VEIL = [0.66, 0.78] as const;

/** Share of sheet laid over the edited and over the mirrored half. */
export function veils(picture: FieldPicture): readonly [edited: number, mirrored: number] {
  return picture.ghost ? GHOST_VEIL : [0, picture.veil];
}

export function freshCanvas(): HTMLCanvasElement {
  const canvas = document.createElement("canvas");
  canvas.className = "field";
  canvas.setAttribute("aria-hidden", "true");
  return canvas;
}
