/** Faults of an outline, found by the mesher as plain data, in words: which side of which region, where, how to mend. */
import type { Case, CaseProblem } from "../case/types.ts";
import { formatNumber } from "../case/units.ts";
import { axisGaps } from "./axisGaps.ts";
import { millimetres, sideWords, spokenPlace, vertexPath } from "./sideWords.ts";
import type { SidePlace } from "./sideWords.ts";
import type { Place } from "./types.ts";

/** What the mesher's search for faults hands over; `places` and `sizes` mean what its table of codes says. */
export interface OutlineFinding {
  readonly code: string;
  /** said, but no reason to refuse the outline */
  readonly isRemark: boolean;
  readonly at: SidePlace;
  readonly other?: SidePlace;
  /** number of the probe */
  readonly point?: number;
  readonly places: readonly Place[];
  readonly sizes: readonly number[];
}

/** Everything that keeps an outline from being meshed, gaps to the axis included. */
export function outlineProblems(findings: readonly OutlineFinding[], given: Case): CaseProblem[] {
  const faults = findings.filter((finding) => !finding.isRemark);
  return [...axisGaps(given, false), ...faults.map((finding) => problemOf(finding, given))];
}

/** What is worth saying about an outline that can be meshed all the same: hints. */
export function outlineHints(findings: readonly OutlineFinding[], given: Case): CaseProblem[] {
  const remarks = findings.filter((finding) => finding.isRemark);
  return [...axisGaps(given, true), ...remarks.map((finding) => problemOf(finding, given))];
}

function problemOf(finding: OutlineFinding, given: Case): CaseProblem {
  const words = WORDS[finding.code];
  if (!words) throw new Error(`Outline fault "${finding.code}" has no words.`);
  const { message, mend } = words(new Spoken(finding, given));
  return {
    code:
      finding.point === undefined
        ? `outline-${finding.code}`
        : `probe-${PROBE_CODES[finding.code] ?? finding.code}`,
    path: pathOf(finding, given),
    message,
    mend,
    places: finding.places,
  };
}

const PROBE_CODES: Readonly<Record<string, string>> = { "point-outside": "outside" };

/** Path of the vertex at which the side concerned starts, or of the probe. */
function pathOf({ at, point }: OutlineFinding, given: Case): string {
  if (point !== undefined) return `probes[${point}].at`;
  return vertexPath(given.regions[at.region], at);
}

/** A finding with the names and numbers of its case, ready for a sentence. */
class Spoken {
  private readonly finding: OutlineFinding;
  private readonly given: Case;

  constructor(finding: OutlineFinding, given: Case) {
    this.finding = finding;
    this.given = given;
  }

  get code(): string {
    return this.finding.code;
  }
  /** 'Side "wall" of "ingot"' */
  get side(): string {
    return capital(sideWords(this.given, this.finding.at));
  }
  get other(): string {
    return this.finding.other ? sideWords(this.given, this.finding.other) : "another side";
  }
  /** 'The outline of "ingot"', 'Hole 1 of "ingot"' */
  get loop(): string {
    const { region, loop } = this.finding.at;
    const name = this.given.regions[region]?.name ?? String(region + 1);
    return loop > 0 ? `Hole ${loop} of "${name}"` : `The outline of "${name}"`;
  }
  get region(): string {
    return `"${this.given.regions[this.finding.at.region]?.name ?? this.finding.at.region + 1}"`;
  }
  get otherRegion(): string {
    const number = this.finding.other?.region ?? -1;
    return `"${this.given.regions[number]?.name ?? number + 1}"`;
  }
  get probe(): string {
    const { point = 0 } = this.finding;
    return `Probe "${this.given.probes[point]?.name ?? point + 1}"`;
  }
  /** "at r 120, z 300 mm" */
  place(which = 0): string {
    return `at ${spokenPlace(this.finding.places[which] ?? [0, 0])}`;
  }
  get places(): string {
    return this.finding.places.map((_, i) => this.place(i).slice(3)).join("; ");
  }
  mm(which: number): string {
    return millimetres(this.finding.sizes[which] ?? 0);
  }
  size(which: number): number {
    return this.finding.sizes[which] ?? 0;
  }
}

type Words = (spoken: Spoken) => { message: string; mend: string };

const WORDS: Readonly<Record<string, Words>> = {
  "not-a-number": (s) => ({
    message: `${s.side} starts at a place that is no number.`,
    mend: "Give r and z as numbers, or text with a unit.",
  }),
  "few-sides": (s) => ({
    message: `${s.loop} has ${s.size(0)} ${s.size(0) === 1 ? "side" : "sides"}; that encloses nothing.`,
    mend: "Give three corners or more; two will do when one side is an arc.",
  }),
  "no-area": (s) => ({
    message: `${s.loop} encloses no area: its corners lie on one line.`,
    mend: "Move a corner off the line.",
  }),
  gap: (s) => ({
    message: `${s.loop} is open: from ${s.place(0).slice(3)} to ${s.place(1).slice(3)} a gap of ${s.mm(0)} is left.`,
    mend: "Let one side end where the next one starts.",
  }),
  "zero-length": (s) => ({
    message: `${s.side} has no length: it starts and ends ${s.place()}.`,
    mend: "Take out one of the two points.",
  }),
  duplicate: (s) => ({
    message: `${s.side} and ${s.other} lie on each other over ${s.mm(0)}, from ${s.place(0).slice(3)} to ${s.place(1).slice(3)}.`,
    mend: "Move one of them: the part must have a thickness there.",
  }),
  crossing: (s) => ({
    message: `${s.side} crosses ${s.other} ${s.place()}.`,
    mend: "Move a point so that the outline does not cross itself.",
  }),
  "thin-wall": (s) => ({
    message:
      s.size(0) > 0
        ? `${s.side} comes within ${s.mm(0)} of ${s.other} ${s.place()}; the least that can be reckoned with is ${s.mm(1)}.`
        : `${s.side} touches ${s.other} ${s.place()}.`,
    mend: "Leave a wall between them, or let them part.",
  }),
  "in-pieces": (s) => ({
    message: `${s.side} touches ${s.other} ${s.place()}, so that ${s.region} falls apart there.`,
    mend: "Leave a wall, or draw the pieces as regions of their own.",
  }),
  "void-outside": (s) => ({
    message: `${s.loop} does not lie inside its outline (it starts ${s.place()}).`,
    mend: "Move the hole inside, or take it out.",
  }),
  overlap: (s) => ({
    message: `The regions ${s.region} and ${s.otherRegion} overlap near ${s.places}.`,
    mend: "Let them share a side, or give one of them a hole for the other.",
  }),
  "negative-radius": (s) => ({
    message: `${s.side} crosses the axis: it reaches r ${formatNumber(s.size(0) * 1000)} mm ${s.place()}.`,
    mend: "Keep r at 0 or above: only the half to the right of the axis is drawn.",
  }),
  "arc-in-line": (s) => ({
    message: `${s.side} is to be an arc, but its three points lie in one line; it is taken as straight.`,
    mend: 'Move the "through" point off the line, or take it out.',
  }),
  "stands-apart": (s) => ({
    message: `The region ${s.region} touches no other region: no heat passes between them.`,
    mend: "Let the regions share a side if they touch.",
  }),
  "point-outside": (s) => ({
    message: `${s.probe} lies outside the part, ${s.mm(0)} from its nearest side, ${s.place()}.`,
    mend: "Move the probe onto or into the part.",
  }),
};

function capital(words: string): string {
  return `${words[0]?.toUpperCase() ?? ""}${words.slice(1)}`;
}
