/** The command line as a script sees it: exit codes, messages, files. Runs the built program (npm test builds it). */
import { spawn, spawnSync } from "node:child_process";
import { existsSync, mkdtempSync, readFileSync, readdirSync, rmSync, writeFileSync } from "node:fs";
import os from "node:os";
import path from "node:path";
import { fileURLToPath } from "node:url";
import { afterAll, beforeAll, describe, expect, it } from "vitest";
import type { CaseDocument } from "../../src/case/types.ts";
import { problemLine } from "../../src/cli/terminal.ts";
import { cylinder, refused, simpleCase } from "../helpers/solve.ts";

const ROOT = fileURLToPath(new URL("../..", import.meta.url));
const PROGRAM = path.join(ROOT, "tools", "corelag.mjs");
let folder: string;

beforeAll(() => {
  folder = mkdtempSync(path.join(os.tmpdir(), "corelag-"));
});
afterAll(() => rmSync(folder, { recursive: true, force: true }));

const sound = (): CaseDocument =>
  simpleCase({
    outline: cylinder(0.03, 0.05),
    start: 500,
    ambient: 20,
    lasts: 1500,
    sides: { "*": { film: 100 } },
    probes: [{ name: "core", at: [0, 0.025] }],
    questions: [{ ask: "when", where: "every-point", reaches: 60 }],
  });

function save(name: string, content: unknown): string {
  const file = path.join(folder, name);
  writeFileSync(file, typeof content === "string" ? content : JSON.stringify(content));
  return file;
}

function corelag(...args: string[]): { code: number | null; out: string; err: string } {
  const done = spawnSync(process.execPath, [PROGRAM, ...args], {
    encoding: "utf8",
    cwd: folder,
    env: { ...process.env, INIT_CWD: folder },
  });
  return { code: done.status, out: done.stdout, err: done.stderr };
}

describe("solve", () => {
  it("prints a summary, exits 0, and writes what was asked for", () => {
    const out = path.join(folder, "solved");
    const done = corelag(
      "solve",
      save("sound.json", sound()),
      "--out",
      out,
      "--at",
      "100, 5 min",
      "--snapshots",
      "vtu,csv",
      "--nodes",
      "300",
    );
    expect(done.code, done.err).toBe(0);
    expect(done.out).toContain("When has every point reached");
    const answers = JSON.parse(readFileSync(path.join(out, "answers.json"), "utf8"));
    expect(answers.history.time).toEqual(expect.arrayContaining([100, 300]));
    expect(Math.abs(answers.mesh.nodes / 300 - 1)).toBeLessThan(0.15);
    expect(answers.answers[0].numericalUncertainty).toBeNull();
    expect(readdirSync(out).sort()).toEqual(
      [
        "answers.json",
        "curves.csv",
        "field-0000.vtu",
        "field-0001.vtu",
        "field.pvd",
        "nodes.csv",
        "triangles.csv",
      ].sort(),
    );
    expect(readFileSync(path.join(out, "field.pvd"), "utf8")).toContain('timestep="300"');
  });

  it("reads a case from standard input", () => {
    const done = spawnSync(process.execPath, [PROGRAM, "solve", "-", "--nodes", "100"], {
      input: JSON.stringify(sound()),
      encoding: "utf8",
    });
    expect(done.status).toBe(0);
    expect(done.stdout).toContain("every point");
  });

  it("lets element and scheme be forced, and both agree", () => {
    const values = [
      ["--element", "6", "--scheme", "krylov"],
      ["--element", "3", "--scheme", "implicit-euler", "--accuracy", "0.005", "--nodes", "1500"],
    ].map((flags, i) => {
      const out = path.join(folder, `forced-${i}`);
      expect(corelag("solve", save("forced.json", sound()), "--out", out, ...flags).code).toBe(0);
      const { run, answers } = JSON.parse(readFileSync(path.join(out, "answers.json"), "utf8"));
      expect([String(run.element), run.scheme]).toEqual([flags[1], flags[3]]);
      return answers[0].value as number;
    });
    expect(Math.abs(values[1]! / values[0]! - 1)).toBeLessThan(0.01);
  });

  it("keeps what was reached when it is interrupted, and exits 130", async () => {
    const slow = sound();
    const out = path.join(folder, "interrupted");
    const child = spawn(
      process.execPath,
      [
        PROGRAM,
        "solve",
        save("slow.json", slow),
        "--out",
        out,
        "--scheme",
        "implicit-euler",
        "--element",
        "3",
        "--nodes",
        "4000",
        "--accuracy",
        "0.000002",
      ],
      { cwd: folder, stdio: ["ignore", "pipe", "pipe"] },
    );
    let err = "";
    const underWay = new Promise<void>((resolve) =>
      child.stderr.on("data", (text: Buffer) => {
        err += text.toString();
        if (/stage: \d+ %/.test(err)) resolve();
      }),
    );
    const ended = new Promise<number | null>((resolve) => child.on("close", resolve));
    await underWay;
    child.kill("SIGINT");
    expect(await ended).toBe(130);
    expect(err).toContain("interrupted");
    const { stages } = JSON.parse(readFileSync(path.join(out, "answers.json"), "utf8"));
    expect(stages[0].ended).toBeGreaterThan(0);
    expect(stages[0].ended).toBeLessThan(1500);
  });
});

describe("bad input ends with exit 2 and one line a fault, with its path and its mend", () => {
  const spoiled = (spoil: (document: Record<string, never> & CaseDocument) => void): CaseDocument => {
    const document = structuredClone(sound());
    spoil(document as Record<string, never> & CaseDocument);
    return document;
  };
  const outlineOf = (document: CaseDocument): CaseDocument["part"]["regions"][number]["outline"] =>
    document.part.regions[0]!.outline;

  const BAD: [string, unknown, RegExp][] = [
    [
      "crossing outline",
      spoiled((d) =>
        outlineOf(d).splice(1, 2, { at: [0.03, 0.05], side: "wall" }, { at: [0.03, 0], side: "top" }),
      ),
      /part\.regions\[0\].*cross/i,
    ],
    [
      "zero-length side",
      spoiled((d) => outlineOf(d).splice(1, 0, { at: [0, 0], side: "again" })),
      /part\.regions\[0\]\.outline/,
    ],
    ["r below 0", spoiled((d) => (outlineOf(d)[1]!.at = [-0.03, 0])), /part\.regions\[0\]\.outline.*axis|r/],
    ["probe outside", spoiled((d) => (d.probes![0]!.at = [0.2, 0.02])), /probes\[0\]/],
    [
      "material missing",
      spoiled((d) => (d.part.regions[0]!.material = "unobtainium")),
      /part\.regions\[0\]\.material.*unobtainium/,
    ],
    ["not a number", spoiled((d) => (d.start = "hot")), /start.*hot/],
    ["wrong dimension", spoiled((d) => (d.stages[0]!.lasts = "20 mm")), /stages\[0\]\.lasts.*mm/],
    ["newer version", spoiled((d) => ((d as { corelag: number }).corelag = 2)), /corelag.*newer/i],
    ["unknown field", spoiled((d) => ((d as unknown as Record<string, unknown>)["furnace"] = 1)), /furnace/],
    [
      "side without a condition",
      spoiled((d) => (d.stages[0]!.sides = { wall: { film: 3 } })),
      /stages\[0\]\.sides.*base/,
    ],
    [
      "not solved yet",
      spoiled(
        (d) =>
          (d.materials = {
            stuff: {
              density: 1,
              conductivity: [
                [20, 1],
                [100, 2],
              ],
              heatCapacity: 1,
            },
          }),
      ),
      /materials\.stuff\.conductivity.*not solve.*mean/,
    ],
    ["broken JSON", '{ "corelag": 1, ', /line 1/i],
    ["a huge file", " ".repeat(25e6), /million/],
  ];
  it.each(BAD)("%s", async (name, document, expected) => {
    // the program itself prints exactly these lines; starting it for each would only cost time
    const lines = (await refused(document)).map(problemLine);
    expect(lines.join("\n"), name).toMatch(expected);
    for (const line of lines) expect(line).toMatch(/^[^:\n]+: .+; .+$/);
  });

  it("several faults are told at once", () => {
    const done = corelag(
      "solve",
      save(
        "many.json",
        spoiled((d) => {
          d.start = "hot";
          d.part.regions[0]!.material = "unobtainium";
          d.stages[0]!.lasts = "20 mm";
        }),
      ),
    );
    expect(done.code).toBe(2);
    expect(done.out).toBe("");
    const lines = done.err.trimEnd().split("\n");
    expect(lines.length).toBe(3);
    for (const line of lines) expect(line).toMatch(/^[^:]+: .+; .+$/);
  });

  it.each([
    [["solve", "nowhere.json"], /nowhere\.json.*cannot be read/],
    [["solve", "x.json", "--nodes", "many"], /whole number/],
    [["solve", "x.json", "--scheme", "magic"], /implicit-euler/],
    [["melt"], /unknown command|melt/],
  ])("%s is explained", (args, expected) => {
    const done = corelag(...args);
    expect(done.code).toBe(2);
    expect(done.err).toMatch(expected);
  });

  it("times that are no times, and snapshots without a folder", () => {
    const file = save("sound.json", sound());
    expect(corelag("solve", file, "--at", "soon").code).toBe(2);
    const done = corelag("solve", file, "--snapshots", "vtu");
    expect([done.code, done.err]).toEqual([2, expect.stringContaining("--out")]);
  });
});

describe("system", () => {
  it("writes Matrix Market files that describe the same part", () => {
    const out = path.join(folder, "system");
    const done = corelag("system", save("sound.json", sound()), "--nodes", "400", "--out", out);
    expect(done.code, done.err).toBe(0);
    const read = (name: string): number[][] =>
      readFileSync(path.join(out, name), "utf8")
        .split("\n")
        .filter((line) => line !== "" && !line.startsWith("%"))
        .map((line) => line.split(" ").map(Number));
    const [size, , entries] = read("capacity.mtx")[0]!;
    expect(Math.abs(size! / 400 - 1)).toBeLessThan(0.15);
    const capacity = read("capacity.mtx").slice(1);
    expect(capacity.length).toBe(entries);
    // lumped capacity: its sum is rho c V
    const stored = capacity.reduce((sum, [, , value]) => sum + value!, 0);
    expect(stored / (7850 * 600 * Math.PI * 0.03 ** 2 * 0.05)).toBeCloseTo(1, 6);
    // conduction has zero row sums, so what is left is film times area; so is the load at 20 C over 20
    const conduction = read("conduction.mtx")
      .slice(1)
      .reduce((sum, [i, j, value]) => sum + (i === j ? 1 : 2) * value!, 0);
    const load = read("load.mtx")
      .slice(1)
      .reduce((sum, [value]) => sum + value!, 0);
    const area = 2 * Math.PI * 0.03 ** 2 + 2 * Math.PI * 0.03 * 0.05;
    expect(conduction / (100 * area)).toBeCloseTo(1, 6);
    expect(load / (20 * 100 * area)).toBeCloseTo(1, 6);
    expect(
      read("start.mtx")
        .slice(1)
        .every(([value]) => value === 500),
    ).toBe(true);
    expect(read("nodes.mtx").slice(1).length).toBe(2 * size!);
    expect(existsSync(path.join(out, "load.mtx"))).toBe(true);
  });
});
