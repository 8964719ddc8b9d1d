/** The section as a PNG: the field painted anew at print fineness, the drawing over it with its styles written out. */

import fontUrl from "@fontsource-variable/sofia-sans-semi-condensed/files/sofia-sans-semi-condensed-latin-wght-normal.woff2?url";

/** Pixels per CSS pixel: enough for a page at 200 dots an inch. */
export const PICTURE_RATIO = 2;

/** Style properties the drawing takes from the page's sheets; a picture of its own has to carry them. */
const CARRIED = [
  "fill",
  "fill-opacity",
  "stroke",
  "stroke-width",
  "stroke-dasharray",
  "stroke-linejoin",
  "stroke-linecap",
  "opacity",
  "paint-order",
  // the shorthand is empty as soon as one longhand cannot be told in it
  "font-family",
  "font-size",
  "font-weight",
  "font-feature-settings",
  "letter-spacing",
  "text-anchor",
  "dominant-baseline",
  "visibility",
  "display",
] as const;

/**
 * @param field   the painted field; null where there is none
 * @param drawing the SVG over it
 * @param ground  CSS colour of the sheet
 */
export async function sectionPicture(
  field: HTMLCanvasElement | null,
  drawing: SVGSVGElement,
  ground: string,
): Promise<Blob> {
  const { width, height } = drawing.getBoundingClientRect();
  const canvas = document.createElement("canvas");
  canvas.width = Math.round(width * PICTURE_RATIO);
  canvas.height = Math.round(height * PICTURE_RATIO);
  const pen = canvas.getContext("2d");
  if (!pen) throw new Error("this browser gives no canvas to draw on");
  pen.fillStyle = ground;
  pen.fillRect(0, 0, canvas.width, canvas.height);
  if (field) pen.drawImage(field, 0, 0, canvas.width, canvas.height);
  const image = await imageOf(drawing, width, height);
  pen.drawImage(image, 0, 0, canvas.width, canvas.height);
  return new Promise((resolve, reject) => {
    canvas.toBlob(
      (blob) => (blob ? resolve(blob) : reject(new Error("the picture could not be packed"))),
      "image/png",
    );
  });
}

async function imageOf(drawing: SVGSVGElement, width: number, height: number): Promise<HTMLImageElement> {
  const copy = drawing.cloneNode(true) as SVGSVGElement;
  copy.setAttribute("xmlns", "http://www.w3.org/2000/svg");
  copy.setAttribute("width", String(width));
  copy.setAttribute("height", String(height));
  carryStyles(drawing, copy);
  copy.prepend(await fontStyle());
  const image = new Image();
  image.src = `data:image/svg+xml;charset=utf-8,${encodeURIComponent(new XMLSerializer().serializeToString(copy))}`;
  await image.decode();
  return image;
}

/** A picture knows no fonts of the page: it carries its own. */
async function fontStyle(): Promise<SVGStyleElement> {
  const bytes = new Uint8Array(await (await fetch(fontUrl)).arrayBuffer());
  const text = btoa(Array.from(bytes, (byte) => String.fromCharCode(byte)).join(""));
  const style = document.createElementNS("http://www.w3.org/2000/svg", "style");
  style.textContent = `@font-face { font-family: "Sofia Sans Semi Condensed Variable"; font-weight: 1 1000; src: url("data:font/woff2;base64,${text}") format("woff2"); }`;
  return style;
}

function carryStyles(from: Element, to: Element): void {
  const style = getComputedStyle(from);
  to.setAttribute("style", CARRIED.map((name) => `${name}:${style.getPropertyValue(name)}`).join(";"));
  for (let i = 0; i < from.children.length; i++) carryStyles(from.children[i]!, to.children[i]!);
}
