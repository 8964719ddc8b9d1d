/** What to say when a field was forgotten: how to mend it, by the name of the field and of what holds it. */

/** Mends by field name. */
const MENDS: Readonly<Record<string, string>> = {
  part: 'Give "part": { "regions": [ ... ] } with at least one region.',
  regions: 'Give "regions": a list with at least one { name, material, outline }.',
  materials: 'Give "materials": for example { "steel": { "library": "carbon-steel" } }.',
  start: 'Give "start": the temperature of the part at the beginning, in °C, for example 20 or "70 degF".',
  stages: 'Give "stages": a list with at least one { lasts, ambient, sides }.',
  sides: 'Give "sides": for example { "*": { "film": 12 } } for every exposed side.',
  name: 'Give "name": a short word of your own.',
  material: 'Give "material": one of the names under "materials".',
  outline: 'Give "outline": the corners in order, for example [{ "at": [0, 0] }, { "at": [0.1, 0] }, ...].',
  at: 'Give "at".',
  density: 'Give "density" in kg/m3, for example 7850, or take the material from the library.',
  conductivity: 'Give "conductivity" in W/(m K), a number or a table over temperature, for example 45.',
  heatCapacity: 'Give "heatCapacity" in J/(kg K), a number or a table over temperature, for example 480.',
  between: 'Give "between": the names of the two regions.',
  conductance: 'Give "conductance" in W/(m2 K), for example 1200.',
  heat: 'Give "heat" in J/kg, for example "270 kJ/kg".',
  solidus: 'Give "solidus": where melting begins, in °C.',
  liquidus: 'Give "liquidus": where melting ends, in °C.',
  where:
    'Give "where": a probe\'s name or one of every-point, any-point, mean, surface-mean, coldest, hottest.',
  reaches: 'Give "reaches": the temperature asked for, in °C.',
  ask: 'Give "ask": one of when, reading, spread, passage, rate, held-above, held-below, dose, heat.',
  from: 'Give "from": the temperature passed first, in °C.',
  to: 'Give "to": the temperature passed then, in °C.',
  level: 'Give "level": the temperature, in °C.',
  reference: 'Give "reference": the reference temperature, in °C.',
  z: 'Give "z": the difference in K that makes the rate tenfold, for example 10.',
  points: 'Give "points": a table [[x, y], ...].',
  over: 'Give "over": "time" or "temperature".',
  film: 'Give "film" in W/(m2 K), for example 12.',
  flux: 'Give "flux" in W/m2, positive into the part.',
  held: 'Give "held": the temperature of the side, in °C.',
};

/** What a field is called in a sentence, where its own name would read oddly. */
const SPOKEN: Readonly<Record<string, string>> = {
  start: "start temperature",
  heatCapacity: "heat capacity",
  sides: "conditions for its sides",
  at: "place",
  where: 'place to look at ("where")',
  reaches: 'temperature to reach ("reaches")',
  ask: 'kind ("ask")',
  heat: "latent heat",
};

/** Message and mend for a field that is not there. `place` is what should hold it, in words. */
export function missingField(place: string, field: string, owner: string): { message: string; mend: string } {
  const spoken = SPOKEN[field] ?? field;
  return {
    message: `${place} has no ${spoken}.`,
    mend: field === "at" ? mendAt(owner) : (MENDS[field] ?? `Give "${field}".`),
  };
}

function mendAt(owner: string): string {
  if (owner === "questions")
    return 'Give "at": a time for a reading (s, "2 h"), a temperature for a rate (°C).';
  return 'Give "at": [r, z], for example [0.1, 0.25] in m or ["100 mm", "250 mm"].';
}
