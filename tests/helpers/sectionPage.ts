/** Finds places of the part on the screen, and colours of the painted field: for browser tests of the section. */
import type { Locator, Page } from "@playwright/test";
import { middleOf } from "./quickPage.ts";

interface Section extends HTMLElement {
  readonly view: { readonly lying: boolean; readonly scale: number; readonly x: number; readonly y: number };
  readonly scene: {
    readonly range: { readonly from: number; readonly to: number };
    readonly mesh: { readonly nodes: Float64Array };
    readonly values: Float32Array;
  } | null;
}

export const pointName = (page: Page, number: number): Locator =>
  page.getByRole("button", { name: new RegExp(`^Point ${number},`) });

/** Middle of a point's square, once the view stands still. */
export async function middleOfPoint(page: Page, number: number): Promise<{ x: number; y: number }> {
  return middleOf(pointName(page, number).locator(".box"));
}

/** Where r, z [m] stands on the screen. */
export async function spotOf(page: Page, r: number, z: number): Promise<{ x: number; y: number }> {
  return page.locator("corelag-section").evaluate(
    (element, [r, z]) => {
      const { view } = element as Section;
      const box = element.shadowRoot!.querySelector(".board")!.getBoundingClientRect();
      const [right, up] = view.lying ? [z!, r!] : [r!, z!];
      return { x: box.left + view.x + right * view.scale, y: box.top + view.y - up * view.scale };
    },
    [r, z],
  );
}

/** Colour of the painted field at r, z, and the colour that the map has for the temperature of the nearest node. */
export async function fieldColour(
  page: Page,
  r: number,
  z: number,
): Promise<{ painted: number[]; expected: number[] }> {
  return page.locator("corelag-section").evaluate(
    (element, [r, z]) => {
      const section = element as Section;
      const { view, scene } = section;
      if (!scene) throw new Error("no field is shown");
      let best = 0;
      const { nodes } = scene.mesh;
      const away = (i: number): number => Math.hypot(nodes[2 * i]! - r!, nodes[2 * i + 1]! - z!);
      for (let i = 0; i < scene.values.length; i++) if (away(i) < away(best)) best = i;
      const [nodeR, nodeZ] = [nodes[2 * best]!, nodes[2 * best + 1]!];
      const [right, up] = view.lying ? [nodeZ, nodeR] : [nodeR, nodeZ];
      const field = element.shadowRoot!.querySelector<HTMLCanvasElement>("canvas.field")!;
      const copy = document.createElement("canvas");
      [copy.width, copy.height] = [field.width, field.height];
      const context = copy.getContext("2d")!;
      context.drawImage(field, 0, 0);
      const ratio = field.width / field.clientWidth;
      const pixel = context.getImageData(
        Math.round((view.x + right * view.scale) * ratio),
        Math.round((view.y - up * view.scale) * ratio),
        1,
        1,
      );
      const style = getComputedStyle(document.documentElement);
      const stops = Array.from({ length: 17 }, (_, i) =>
        style.getPropertyValue(`--map-${String(i).padStart(2, "0")}`).trim(),
      );
      const at = (16 * (scene.values[best]! - scene.range.from)) / (scene.range.to - scene.range.from);
      const below = Math.min(15, Math.floor(at));
      const expected = [1, 3, 5].map((k) => {
        const [a, b] = [stops[below]!, stops[below + 1]!].map((hex) =>
          Number.parseInt(hex.slice(k, k + 2), 16),
        );
        return a! + (at - below) * (b! - a!);
      });
      return { painted: [...pixel.data].slice(0, 3), expected };
    },
    [r, z],
  );
}
