/**
 * Random outlines, each meshed and held to every promise. 500 in the ordinary run; more with
 *
 *   MESH_OUTLINES=20000 npx vitest run tests/property/mesh.test.ts
 *
 * and MESH_SEED to start elsewhere. A failure names its seeds; `randomCase(seed)` gives the outline again.
 */
import { describe, expect, it } from "vitest";
import { auditRows, auditSeed, auditSpoilt } from "../helpers/meshAudit.ts";

const COUNT = Number(process.env["MESH_OUTLINES"] ?? 500);
const FIRST = Number(process.env["MESH_SEED"] ?? 0);
const BLOCK = Math.max(50, Math.ceil(COUNT / 20));
/**
 * Neither repair nor the count of nodes has a proof. Of seeds 0 to 19,999 two missed a promise, both thin walls a
 * hair over 15 % off the nodes asked for (3028, 18193); none of the 500 of the ordinary run does.
 */
const EXCEPTIONS = Math.floor(COUNT / 5000);

function complaints(first: number, count: number, audit: (seed: number) => string[]): string[] {
  const found: string[] = [];
  for (let seed = first; seed < first + count; seed++) {
    try {
      for (const what of audit(seed)) found.push(`seed ${seed}: ${what}`);
    } catch (error) {
      found.push(`seed ${seed}: threw ${error instanceof Error ? error.message : String(error)}`);
    }
  }
  return found;
}

/** Complaints about figures, which may be few; all others must not be at all. */
const isAboutFigures = (what: string) => /smallest angle 30|nodes for/.test(what);

describe(`${COUNT} random outlines from seed ${FIRST}`, { timeout: 3_600_000 }, () => {
  const allowed: string[] = [];
  for (let first = FIRST; first < FIRST + COUNT; first += BLOCK) {
    const count = Math.min(BLOCK, FIRST + COUNT - first);
    it(`seeds ${first} to ${first + count - 1}: sound, good, near the nodes asked for`, () => {
      const found = complaints(first, count, auditSeed);
      expect(found.filter((what) => !isAboutFigures(what))).toEqual([]);
      allowed.push(...found);
      expect(allowed.length, allowed.join("\n")).toBeLessThanOrEqual(EXCEPTIONS);
    });
  }

  it("one in five of them with rows on all sides: sound", () => {
    expect(complaints(FIRST, Math.ceil(COUNT / 5), auditRows)).toEqual([]);
  });

  it("as many spoilt: meshed soundly, or the fault is named, and the mesher ends with words", () => {
    expect(complaints(FIRST, COUNT, auditSpoilt)).toEqual([]);
  });
});
