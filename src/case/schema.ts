/**
 * The schema of the case document, version 1: shapes, units and ranges. Its input is `CaseDocument` (what a person
 * wrote), its output the same with every quantity in SI. What holds between fields is checked in `checkDocument.ts`.
 * The descriptions are the documentation of the format; the JSON Schema is made from them.
 */
import { z } from "zod";
import { COARSEST_ACCURACY, FINEST_ACCURACY } from "./defaults.ts";
import { ABSOLUTE_ZERO } from "./dimensions.ts";
import { curve, quantity } from "./quantitySchema.ts";
import type { CaseDocument } from "./types.ts";

/** Newest version of the format that this program reads. */
export const FORMAT_VERSION = 1;

const name = (what: string) => z.string().min(1).describe(what);
const temperature = (what: string) => quantity("temperature", what, { atLeast: ABSOLUTE_ZERO });
const temperatureCurve = (what: string) =>
  curve("temperature", what, { over: ["time"], rule: { atLeast: ABSOLUTE_ZERO } });
const emissivity = (what: string) => quantity("share", what, { atLeast: 0, atMost: 1 });
const going = z
  .enum(["up", "down"])
  .optional()
  .describe("Which way the temperature passes; left out: whichever way it passes first.");
const where = name(
  "A probe's name, or every-point (the last point to get there), any-point (the first), mean (volume mean), surface-mean, coldest, hottest.",
);
const point = (what: string) =>
  z.tuple([quantity("length", "r, from the axis"), quantity("length", "z, along the axis")]).describe(what);

const vertex = z
  .strictObject({
    at: point("Where this side starts: [r, z]; bare numbers are metres."),
    side: name(
      'Name of the side from this point to the next; several sides may share one. Left out: "side 1" and so on.',
    ).optional(),
    through: point(
      "A third place on the way to the next point: makes the side a circular arc through it.",
    ).optional(),
  })
  .describe("A point of the outline, and the side that starts there.");

const loop = z
  .array(vertex)
  .min(2)
  .describe(
    "A closed loop in the half plane r >= 0: each point starts a side, the last side returns to the first point. A side on r = 0 is the axis and takes no condition.",
  );

const region = z
  .strictObject({
    name: name("Name of the region, used once."),
    material: name('A name from "materials".'),
    outline: loop,
    holes: z.array(loop).optional().describe("Further closed loops: enclosed voids."),
    start: temperature("Temperature of this region at the start; left out: that of the case.").optional(),
    source: curve("heatSource", "Heat released in the region; a table is over the time of the stage.", {
      over: ["time", "temperature"],
    }).optional(),
  })
  .describe("One piece of the part, of one material.");

const contact = z
  .strictObject({
    between: z.tuple([name("A region."), name("Another region.")]).describe("The two regions that touch."),
    conductance: curve("filmCoefficient", "Contact conductance of the joint; a table is over temperature.", {
      over: ["temperature", "time"],
      rule: { above: 0 },
    }),
  })
  .describe("A joint that resists heat. Regions that touch and are not listed touch perfectly.");

const part = z
  .strictObject({
    regions: z.array(region).min(1).describe("The pieces of the part."),
    contacts: z.array(contact).optional().describe("Joints between regions that resist heat."),
  })
  .describe("The half profile that is revolved about r = 0.");

const latent = z
  .strictObject({
    heat: quantity("latentHeat", "Latent heat of melting", { above: 0 }),
    solidus: temperature("Where melting begins"),
    liquidus: temperature("Where melting ends"),
  })
  .superRefine((given, context) => {
    if (given.liquidus >= given.solidus) return;
    context.addIssue({
      code: "custom",
      path: ["liquidus"],
      message: `The liquidus ${given.liquidus} °C lies below the solidus ${given.solidus} °C.`,
      params: { code: "order", mend: "Give the solidus first; the liquidus is the higher one." },
    });
  })
  .describe("Latent heat between solidus and liquidus.");

const libraryMaterial = z
  .strictObject({ library: name("Name of the material in the library.") })
  .describe("A material from the library.");
const ownMaterial = z
  .strictObject({
    density: quantity("density", "Density", { above: 0 }),
    conductivity: curve("conductivity", "Heat conductivity; a table is over temperature.", {
      over: ["temperature"],
      rule: { above: 0 },
    }),
    heatCapacity: curve("heatCapacity", "Specific heat capacity; a table is over temperature.", {
      over: ["temperature"],
      rule: { above: 0 },
    }),
    emissivity: emissivity(
      'Emissivity of the surface: used by a condition that gives "surroundings" and no emissivity of its own.',
    ).optional(),
    latent: latent.optional(),
    source: z.string().optional().describe("Where the values come from, for the report."),
  })
  .describe("A material by its values.");
const material = z
  .union([libraryMaterial, ownMaterial], {
    error: 'A material is either { "library": name } or values: density, conductivity and heatCapacity.',
  })
  .describe("What a region is made of.");

const film = z
  .strictObject({
    film: curve("filmCoefficient", "Film coefficient; a table is over the surface temperature.", {
      over: ["temperature", "time"],
      rule: { atLeast: 0 },
    }),
    ambient: temperatureCurve(
      "Temperature of the air, bath or gas; left out: the stage's. A table is over the time of the stage.",
    ).optional(),
    emissivity: emissivity(
      'Emissivity of the side: it radiates to "surroundings", else to the ambient. Left out, and no "surroundings": no radiation.',
    ).optional(),
    surroundings: temperatureCurve(
      "Temperature that the side radiates to; left out: the ambient. A table is over the time of the stage.",
    ).optional(),
  })
  .describe("A film to an ambient, and radiation.");
const flux = z
  .strictObject({
    flux: curve("heatFlux", "Heat flux, positive into the part; a table is over the time of the stage.", {
      over: ["time", "temperature"],
    }),
  })
  .describe("A given heat flux.");
const held = z
  .strictObject({
    held: temperatureCurve("Temperature at which the side is held; a table is over the time of the stage."),
  })
  .describe("A held temperature.");
const condition = z
  .union([z.literal("insulated").describe("No heat passes."), film, flux, held], {
    error: 'A condition is one of { "film": h }, { "flux": q }, { "held": T } or "insulated", and one only.',
  })
  .describe("What is done to a side.");

const until = z
  .strictObject({ where, reaches: temperature("The temperature that ends the stage"), going })
  .describe("The stage ends when this temperature is reached.");

const stage = z
  .strictObject({
    name: name('Name of the stage; left out: "stage 1" and so on.').optional(),
    lasts: quantity("time", "Duration of the stage", { above: 0 }).optional(),
    until: until.optional(),
    atMost: quantity("time", 'Longest duration of a stage that has "until"', { above: 0 }).optional(),
    ambient: temperatureCurve(
      "Temperature of the air, bath or gas for every film that gives none; a table is over the time of the stage.",
    ).optional(),
    sides: z
      .record(z.string(), condition)
      .describe('The condition of each side, by its name; "*" is every exposed side that is not named.'),
  })
  .describe("One step of the treatment; it starts from the field before.");

const probe = z
  .strictObject({ name: name("Name of the probe, used once."), at: point("Where: [r, z].") })
  .describe("A place whose temperature is followed.");

const question = z
  .discriminatedUnion(
    "ask",
    [
      z
        .strictObject({
          ask: z.literal("when"),
          where,
          reaches: temperature("The temperature asked for"),
          going,
        })
        .describe("Time from the start of the case until a temperature is reached."),
      z
        .strictObject({
          ask: z.literal("reading"),
          where,
          at: quantity("time", "Time from the start of the case", { atLeast: 0 }),
        })
        .describe("Temperature at a time."),
      z
        .strictObject({ ask: z.literal("spread"), stage: name("A stage's name; left out: all.").optional() })
        .describe("Largest difference between the hottest and the coldest place, and when."),
      z
        .strictObject({
          ask: z.literal("passage"),
          where,
          from: temperature("Passed first"),
          to: temperature("Passed then"),
        })
        .describe("Time from passing one temperature to passing another."),
      z
        .strictObject({ ask: z.literal("rate"), where, at: temperature("The temperature passed") })
        .describe("Rate when passing a temperature."),
      z
        .strictObject({
          ask: z.enum(["held-above", "held-below"]),
          where,
          level: temperature("The temperature"),
        })
        .describe("Total time above or below a temperature."),
      z
        .strictObject({
          ask: z.literal("dose"),
          where,
          reference: temperature("Reference temperature"),
          z: quantity("temperatureDifference", "Difference that makes the rate tenfold", { above: 0 }),
        })
        .describe("Equivalent minutes at the reference temperature."),
      z
        .strictObject({
          ask: z.literal("heat"),
          until: quantity("time", "Time from the start of the case; left out: the end", {
            atLeast: 0,
          }).optional(),
        })
        .describe("Heat taken up by the part; negative: given off."),
    ],
    {
      error: '"ask" is one of when, reading, spread, passage, rate, held-above, held-below, dose, heat.',
    },
  )
  .describe("A question to answer.");

export const caseSchema = z
  .strictObject({
    corelag: z.literal(FORMAT_VERSION).describe("Version of this format."),
    title: z.string().optional().describe("What the case is about."),
    notes: z.string().optional().describe("Anything a reader should know."),
    part,
    materials: z.record(z.string(), material).describe("Materials by the names that the regions use."),
    start: temperature("Temperature of the part at the start"),
    stages: z.array(stage).min(1).describe("The treatment, step by step."),
    probes: z.array(probe).optional().describe("Places whose temperatures are followed."),
    questions: z.array(question).optional().describe("What is asked."),
    accuracy: z
      .number()
      .min(FINEST_ACCURACY)
      .max(COARSEST_ACCURACY)
      .optional()
      .describe("Aim for temperatures, as a share of the run's temperature span; left out: 0.0005."),
  })
  .describe(
    "A case: a revolved part, what it is made of, what is done to it and what is asked. A bare number is SI with temperatures in degC; a text carries its unit.",
  );

/** The document with every quantity in SI; names and defaults are not filled in yet. */
export type ParsedCase = z.output<typeof caseSchema>;
export type ParsedMaterial = ParsedCase["materials"][string];
export type ParsedStage = ParsedCase["stages"][number];
export type ParsedCondition = ParsedStage["sides"][string];

/** Compile-time proof that the schema takes exactly what `CaseDocument` says. */
type Same<A, B> = [A] extends [B] ? ([B] extends [A] ? true : false) : false;
export const SCHEMA_TAKES_CASE_DOCUMENT: Same<z.input<typeof caseSchema>, CaseDocument> = true;
