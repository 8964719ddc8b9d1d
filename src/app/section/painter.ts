/**
 * Holds the field layer of the board: a plain canvas paints at once, Three.js takes over when it has been loaded, and
 * the canvas takes over again where WebGL is missing, slow or lost.
 */
import { CanvasField } from "./fieldCanvas.ts";
import type { FieldLayer, FieldPicture } from "./fieldLayer.ts";

/** Why the plain canvas paints; "" while Three.js does or may still come. */
export type PlainReason = "" | "missing" | "lost";

export const PLAIN_WORDS: Readonly<Record<PlainReason, string>> = {
  "": "",
  missing: "Drawn without 3-D graphics: this browser has none.",
  lost: "Drawn without 3-D graphics: the browser took them back.",
};

/** Whether the browser gives a drawing context, asked before Three.js is fetched. */
function hasWebGl(): boolean {
  const context = document.createElement("canvas").getContext("webgl2");
  context?.getExtension("WEBGL_lose_context")?.loseContext();
  return context !== null;
}

export class Painter {
  reason: PlainReason = "";
  #layer: FieldLayer = new CanvasField();
  #picture: FieldPicture | null = null;
  #closed = false;

  /**
   * @param board   where the canvas goes, as the first child
   * @param changed called when the layer has changed, so that its words are drawn again
   */
  constructor(
    private readonly board: HTMLElement,
    private readonly changed: () => void,
  ) {
    board.prepend(this.#layer.canvas);
  }

  get kind(): FieldLayer["kind"] {
    return this.#layer.kind;
  }

  /** Tries to put Three.js in the place of the plain canvas. */
  async useThree(): Promise<void> {
    if (!hasWebGl()) return this.#fallBack("missing");
    try {
      const { GlField } = await import("./fieldGl.ts");
      if (this.#closed) return;
      this.#swap(new GlField(() => this.#fallBack("lost")));
      this.changed();
    } catch {
      this.#fallBack("missing");
    }
  }

  #fallBack(reason: PlainReason): void {
    if (this.#closed) return;
    this.reason = reason;
    if (this.#layer.kind !== "canvas") this.#swap(new CanvasField());
    this.changed();
  }

  #swap(layer: FieldLayer): void {
    this.#layer.dispose();
    this.#layer = layer;
    this.board.prepend(layer.canvas);
    if (this.#picture) this.draw(this.#picture);
  }

  draw(picture: FieldPicture): void {
    this.#picture = picture;
    this.#layer.draw(picture);
  }

  /** What is painted now, anew on a plain canvas of its own; null when nothing is. */
  copy(pixelRatio: number): HTMLCanvasElement | null {
    if (!this.#picture) return null;
    const field = new CanvasField();
    field.draw({ ...this.#picture, pixelRatio });
    return field.canvas;
  }

  clear(): void {
    this.#picture = null;
    this.#layer.clear();
  }

  close(): void {
    this.#closed = true;
    this.#layer.dispose();
  }
}
