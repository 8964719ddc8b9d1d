/**
 * Shapes to start from: an outline with named sides from a few numbers. Sizes are data, so that a page can show them
 * as blanks and a test can walk over them all. Each outline stands on z = 0 and runs counter-clockwise.
 */
import type { Place } from "./shapeParts.ts";
import { arcAround, at, capArc, vertex } from "./shapeParts.ts";
import type { VertexDocument } from "./types.ts";

export type ShapeKind =
  "ingot" | "stepped-shaft" | "ring" | "sphere" | "plain-round" | "tube" | "cone" | "bottle-shell";

export interface ShapeSize {
  readonly name: string;
  readonly label: string;
  /** m */
  readonly standard: number;
  /** may be zero */
  readonly mayVanish?: true;
}

/** Sizes by name [m]. */
export type Sizes = Readonly<Record<string, number>>;

export interface ShapeFault {
  /** the size to look at */
  readonly size: string;
  readonly message: string;
  readonly mend: string;
}

export interface Shape {
  readonly kind: ShapeKind;
  readonly label: string;
  readonly sizes: readonly ShapeSize[];
  /** conditions between sizes: [smaller, larger, words] with the smaller or larger as a function of the sizes */
  readonly order: readonly Order[];
  readonly outline: (sizes: Sizes) => VertexDocument[];
}
interface Order {
  readonly size: string;
  readonly holds: (sizes: Sizes) => boolean;
  readonly message: string;
  readonly mend: string;
}

const size = (name: string, label: string, millimetres: number): ShapeSize => ({
  name,
  label,
  standard: millimetres / 1000,
});
const order = (name: string, holds: (sizes: Sizes) => boolean, message: string, mend: string): Order => ({
  size: name,
  holds,
  message,
  mend,
});

export const SHAPES: readonly Shape[] = [
  {
    kind: "ingot",
    label: "Tapered ingot",
    sizes: [
      size("base", "Base diameter", 400),
      size("shoulder", "Shoulder diameter", 320),
      size("height", "Height to the shoulder", 900),
      { ...size("crown", "Height of the crown", 40), mayVanish: true },
    ],
    order: [
      order(
        "crown",
        (s) => s["crown"]! <= s["shoulder"]! / 2,
        "The crown is higher than half the shoulder's diameter.",
        "Give it half the shoulder's diameter or less.",
      ),
    ],
    outline: (s) => {
      const [shoulder, height, crown] = [s["shoulder"]! / 2, s["height"]!, s["crown"]!];
      const top: Place = [0, height + crown];
      return [
        vertex("base", 0, 0),
        vertex("wall", s["base"]! / 2, 0),
        {
          ...vertex("crown", shoulder, height),
          ...(crown > 0 ? { through: capArc(shoulder, height, crown) } : {}),
        },
        vertex("axis", ...top),
      ];
    },
  },
  {
    kind: "stepped-shaft",
    label: "Stepped shaft",
    sizes: [
      size("barrel", "Barrel diameter", 400),
      size("barrelLength", "Barrel length", 600),
      size("neck", "Neck diameter", 220),
      size("neckLength", "Length of each neck", 300),
    ],
    order: [
      order(
        "neck",
        (s) => s["neck"]! < s["barrel"]!,
        "The neck is not narrower than the barrel.",
        "Make the neck narrower, or start from a plain round.",
      ),
    ],
    outline: (s) => {
      const [barrel, neck] = [s["barrel"]! / 2, s["neck"]! / 2];
      const low = s["neckLength"]!;
      const high = low + s["barrelLength"]!;
      return [
        vertex("lower end", 0, 0),
        vertex("lower neck", neck, 0),
        vertex("lower shoulder", neck, low),
        vertex("barrel", barrel, low),
        vertex("upper shoulder", barrel, high),
        vertex("upper neck", neck, high),
        vertex("upper end", neck, high + low),
        vertex("axis", 0, high + low),
      ];
    },
  },
  {
    kind: "ring",
    label: "Ring",
    sizes: [size("bore", "Bore", 180), size("outside", "Outside diameter", 300), size("width", "Width", 70)],
    order: [
      order(
        "bore",
        (s) => s["bore"]! < s["outside"]!,
        "The bore is not smaller than the outside diameter.",
        "Make the bore smaller.",
      ),
    ],
    outline: (s) => hollow(s["bore"]! / 2, s["outside"]! / 2, s["width"]!, "lower face", "upper face"),
  },
  {
    kind: "sphere",
    label: "Sphere",
    sizes: [size("diameter", "Diameter", 80)],
    order: [],
    outline: (s) => [
      { ...vertex("skin", 0, 0), through: at([s["diameter"]! / 2, s["diameter"]! / 2]) },
      vertex("axis", 0, s["diameter"]!),
    ],
  },
  {
    kind: "plain-round",
    label: "Plain round",
    sizes: [size("diameter", "Diameter", 50), size("length", "Length", 200)],
    order: [],
    outline: (s) => [
      vertex("lower end", 0, 0),
      vertex("wall", s["diameter"]! / 2, 0),
      vertex("upper end", s["diameter"]! / 2, s["length"]!),
      vertex("axis", 0, s["length"]!),
    ],
  },
  {
    kind: "tube",
    label: "Tube",
    sizes: [
      size("outside", "Outside diameter", 270),
      size("wall", "Wall", 25),
      size("length", "Length", 600),
    ],
    order: [
      order(
        "wall",
        (s) => s["wall"]! < s["outside"]! / 2,
        "The wall is not thinner than half the outside diameter.",
        "Make the wall thinner, or start from a plain round.",
      ),
    ],
    outline: (s) => {
      const outside = s["outside"]! / 2;
      return hollow(outside - s["wall"]!, outside, s["length"]!, "lower end", "upper end");
    },
  },
  {
    kind: "cone",
    label: "Cone",
    sizes: [
      size("base", "Base diameter", 120),
      { ...size("top", "Top diameter", 40), mayVanish: true },
      size("height", "Height", 150),
    ],
    order: [],
    outline: (s) => {
      const top = s["top"]! / 2;
      const upper = top > 0 ? [vertex("top", top, s["height"]!)] : [];
      return [
        vertex("base", 0, 0),
        vertex("mantle", s["base"]! / 2, 0),
        ...upper,
        vertex("axis", 0, s["height"]!),
      ];
    },
  },
  {
    kind: "bottle-shell",
    label: "Bottle-like shell",
    sizes: [
      size("body", "Body diameter", 76),
      size("bodyHeight", "Height to the shoulder", 120),
      size("neck", "Neck diameter", 28),
      size("neckHeight", "Height of the neck", 60),
      size("heel", "Radius of the heel", 10),
      size("wall", "Wall", 4),
    ],
    order: [
      order(
        "neck",
        (s) => s["neck"]! > 2 * s["wall"]!,
        "The neck is closed by its wall.",
        "Make the neck wider or the wall thinner.",
      ),
      order(
        "wall",
        (s) => s["body"]! - s["neck"]! > 6 * s["wall"]!,
        "The shoulder is too narrow for the wall.",
        "Make the wall thinner, the neck narrower or the body wider.",
      ),
      order(
        "heel",
        (s) => s["heel"]! > s["wall"]!,
        "The heel's radius is not larger than the wall.",
        "Give the heel a larger radius.",
      ),
      order(
        "heel",
        (s) => s["heel"]! < s["body"]! / 2 && s["heel"]! < s["bodyHeight"]!,
        "The heel does not fit into the body.",
        "Give the heel a smaller radius.",
      ),
    ],
    outline: bottle,
  },
];

function hollow(inner: number, outer: number, height: number, low: string, high: string): VertexDocument[] {
  return [
    vertex(low, inner, 0),
    vertex("outside", outer, 0),
    vertex(high, outer, height),
    vertex("bore", inner, height),
  ];
}

/** A shell of even wall: heel and shoulder are quarter circles, the inside follows at the distance of the wall. */
function bottle(s: Sizes): VertexDocument[] {
  const [body, neck, heel, wall, shoulderZ] = [
    s["body"]! / 2,
    s["neck"]! / 2,
    s["heel"]!,
    s["wall"]!,
    s["bodyHeight"]!,
  ];
  const dome = body - neck;
  const mouthZ = shoulderZ + dome + s["neckHeight"]!;
  const domeCentre: Place = [neck, shoulderZ];
  const heelCentre: Place = [body - heel, heel];
  const insideNeckZ = shoulderZ + Math.sqrt((dome - wall) ** 2 - wall ** 2);
  const insideTurn = Math.atan2(insideNeckZ - shoulderZ, -wall);
  return [
    vertex("base", 0, 0),
    { ...vertex("heel", body - heel, 0), through: arcAround(heelCentre, heel, -Math.PI / 4) },
    vertex("wall", body, heel),
    { ...vertex("shoulder", body, shoulderZ), through: arcAround(domeCentre, dome, Math.PI / 4) },
    vertex("neck", neck, shoulderZ + dome),
    vertex("mouth", neck, mouthZ),
    vertex("inside neck", neck - wall, mouthZ),
    {
      ...vertex("inside shoulder", neck - wall, insideNeckZ),
      through: arcAround(domeCentre, dome - wall, insideTurn / 2),
    },
    vertex("inside wall", body - wall, shoulderZ),
    {
      ...vertex("inside heel", body - wall, heel),
      through: arcAround(heelCentre, heel - wall, -Math.PI / 4),
    },
    vertex("inside base", body - heel, wall),
    vertex("axis", 0, wall),
  ];
}

export function shapeOf(kind: ShapeKind): Shape {
  const shape = SHAPES.find((one) => one.kind === kind);
  if (!shape) throw new Error(`There is no shape "${kind}".`);
  return shape;
}

/** The standard sizes of a shape [m]. */
export function standardSizes(kind: ShapeKind): Record<string, number> {
  return Object.fromEntries(shapeOf(kind).sizes.map(({ name, standard }) => [name, standard]));
}

/**
 * The outline of a shape.
 *
 * @param given sizes [m]; those left out have their standard value
 * @returns the outline, or every fault of the sizes
 */
export function shapeOutline(
  kind: ShapeKind,
  given: Sizes = {},
): { readonly outline: VertexDocument[] } | { readonly faults: ShapeFault[] } {
  const shape = shapeOf(kind);
  const sizes = { ...standardSizes(kind), ...given };
  const small = shape.sizes.filter(
    ({ name, mayVanish }) => !(mayVanish ? sizes[name]! >= 0 : sizes[name]! > 0),
  );
  const faults: ShapeFault[] = small.map(({ name, label }) => ({
    size: name,
    message: `${label} is ${sizes[name]! * 1000} mm.`,
    mend: "Give a size above zero.",
  }));
  if (faults.length === 0) {
    for (const { size: name, holds, message, mend } of shape.order) {
      if (!holds(sizes)) faults.push({ size: name, message, mend });
    }
  }
  return faults.length > 0 ? { faults } : { outline: shape.outline(sizes) };
}
