/** A whole case around a shape, to start from: everything in it is meant to be changed. */
import { shapeOf, shapeOutline } from "./shapes.ts";
import type { ShapeFault, ShapeKind, Sizes } from "./shapes.ts";
import type { CaseDocument, VertexDocument } from "./types.ts";

/** A start that shows something at once: hot steel in moving air, until little of the heat is left. */
const START = 500;
const AMBIENT = 25;
const FILM = 25;
const REACHES = 60;
const STEEL = { density: 7800, conductivity: 35, heatCapacity: 550 };
/** One-temperature time constants that the stage lasts: the slowest point then comes within 0.3 % of the ambient. */
const TIME_CONSTANTS = 6;

/** The case, or what is wrong with the sizes. */
export function startCase(
  kind: ShapeKind,
  sizes: Sizes = {},
): { readonly document: CaseDocument } | { readonly faults: ShapeFault[] } {
  const shaped = shapeOutline(kind, sizes);
  if ("faults" in shaped) return shaped;
  const { label } = shapeOf(kind);
  const name = label.toLowerCase();
  return {
    document: {
      corelag: 1,
      title: `${label} cooling in air`,
      notes: "Started from a shape; material, film and temperatures are invented.",
      part: { regions: [{ name, material: "steel", outline: shaped.outline }] },
      materials: { steel: { ...STEEL, source: "invented, of the size of a carbon steel" } },
      start: START,
      stages: [
        {
          name: "air cooling",
          lasts: lasting(shaped.outline),
          ambient: AMBIENT,
          sides: { "*": { film: FILM } },
        },
      ],
      probes: [],
      questions: [{ ask: "when", where: "every-point", reaches: REACHES }, { ask: "spread" }],
    },
  };
}

/** Several time constants of the part taken as one temperature, to two figures [s]. */
function lasting(outline: readonly VertexDocument[]): number {
  const seconds = (TIME_CONSTANTS * STEEL.density * STEEL.heatCapacity * roughLength(outline)) / FILM;
  return Number(Math.max(60, seconds).toPrecision(2));
}

/** V/A of an outline, its arcs taken as two chords [m]: good enough for a duration. */
function roughLength(outline: readonly VertexDocument[]): number {
  const places = outline.flatMap(({ at, through }) => (through ? [at, through] : [at])) as [number, number][];
  let [volume, skin] = [0, 0];
  places.forEach(([r, z], i) => {
    const [nextR, nextZ] = places[(i + 1) % places.length]!;
    volume += (Math.PI / 3) * (r * r + r * nextR + nextR * nextR) * (nextZ - z);
    skin += Math.PI * (r + nextR) * Math.hypot(nextR - r, nextZ - z);
  });
  return Math.abs(volume) / skin;
}
