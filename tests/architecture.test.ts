/** The import law: which folder may read from which. The table is the law; DEVELOPERS.md prints it. */
import { readdirSync, readFileSync } from "node:fs";
import path from "node:path";
import { fileURLToPath } from "node:url";
import { describe, expect, it } from "vitest";

const ROOT = path.resolve(path.dirname(fileURLToPath(import.meta.url)), "..");

/** Left may import right, and itself; nothing else of ours. "types:x" allows `import type` from x only. */
const PIPELINE = ["case", "profile", "heat", "mesh", "linalg", "fem", "march", "analytic", "compare"];
const LAW: Record<string, readonly string[]> = {
  case: [],
  mesh: [],
  linalg: [],
  profile: ["case"],
  heat: ["case"],
  fem: ["types:mesh", "linalg"],
  march: ["linalg"],
  analytic: ["heat", "types:case"],
  compare: ["analytic", "heat", "case", "march", "types:mesh"],
  run: PIPELINE,
  solveCase: [...PIPELINE, "run"],
  report: ["case", "profile", "compare", "types:run", "types:march", "types:mesh", "types:linalg"],
  editor: ["case", "profile"],
  workers: ["solveCase", "types:run", "case", "presets"],
  cli: ["solveCase", "case", "compare", "report", "presets", "types:run", "types:mesh"],
  app: [
    "editor",
    "report",
    "case",
    "profile",
    "presets",
    "types:compare",
    "types:workers",
    "types:mesh",
    "types:run",
  ],
  presets: ["types:case"],
};

/** Packages that a folder may use; all others are refused, so that the core stays free of the browser. */
const PACKAGES: Record<string, readonly RegExp[]> = {
  mesh: [/^delaunator$/, /^robust-predicates$/],
  case: [/^zod$/],
  analytic: [/^@stdlib\//],
  compare: [/^@stdlib\//],
  editor: [/^immer$/],
  report: [/^fflate$/],
  workers: [/^comlink$/],
  cli: [/^commander$/, /^node:/],
  app: [
    /^(lit|three|comlink|idb|fflate|tinykeys|immer|d3-scale|d3-shape)(\/|$)/,
    /^@preact\/signals-core$/,
    /^@fontsource/,
  ],
};

interface Import {
  readonly file: string;
  readonly from: string;
  readonly to: string;
  readonly typeOnly: boolean;
}

function folderOf(file: string): string {
  const parts = path.relative(ROOT, file).split(path.sep);
  if (parts[0] !== "src") return parts[0]!;
  return parts.length === 2 ? parts[1]!.replace(/\.ts$/, "") : parts[1]!;
}

function sourceFiles(): string[] {
  return ["src", "mesh", "workers", "presets"].flatMap((top) =>
    readdirSync(path.join(ROOT, top), { recursive: true, withFileTypes: true })
      .filter((entry) => entry.isFile() && entry.name.endsWith(".ts"))
      .map((entry) => path.join(entry.parentPath, entry.name))
      .filter(
        (file) =>
          !file.includes(`${path.sep}assembly${path.sep}`) &&
          !file.includes(`${path.sep}generated${path.sep}`),
      ),
  );
}

const STATEMENT =
  /(?:^|\n)\s*(import|export)\s+(type\s+)?(?:[^;"']*?\sfrom\s+)?["']([^"']+)["']|import\(\s*["']([^"']+)["']\s*\)/g;

function importsOf(file: string): Import[] {
  const text = readFileSync(file, "utf8");
  return [...text.matchAll(STATEMENT)].map((match) => {
    const target = (match[3] ?? match[4])!;
    const to = target.startsWith(".") ? folderOf(path.resolve(path.dirname(file), target)) : target;
    return { file: path.relative(ROOT, file), from: folderOf(file), to, typeOnly: match[2] !== undefined };
  });
}

const all = sourceFiles().flatMap(importsOf);
const ours = new Set([...Object.keys(LAW)]);
/** The version stands in package.json, which is in no folder. */
const allowed = ({ from, to, typeOnly }: Import): boolean =>
  from === to || LAW[from]!.includes(to) || (typeOnly && LAW[from]!.includes(`types:${to}`));

describe("import law", () => {
  it("finds imports to judge, and every folder stands in the table", () => {
    expect(all.length).toBeGreaterThan(100);
    expect([...new Set(all.map((entry) => entry.from))].filter((folder) => !ours.has(folder))).toEqual([]);
  });

  it("lets no folder import what the table does not give it", () => {
    const broken = all.filter((entry) => ours.has(entry.to) && !allowed(entry));
    expect(broken.map((entry) => `${entry.file}: ${entry.from} may not import ${entry.to}`)).toEqual([]);
  });

  it("lets no folder use a package that the table does not give it", () => {
    const broken = all.filter(
      (entry) =>
        !ours.has(entry.to) &&
        entry.to !== "package.json" &&
        !PACKAGES[entry.from]?.some((pattern) => pattern.test(entry.to)),
    );
    expect(broken.map((entry) => `${entry.file}: ${entry.from} may not use ${entry.to}`)).toEqual([]);
  });

  it("refuses a forbidden pair when it sees one", () => {
    expect(allowed({ file: "", from: "fem", to: "heat", typeOnly: false })).toBe(false);
    expect(allowed({ file: "", from: "fem", to: "mesh", typeOnly: false })).toBe(false);
    expect(allowed({ file: "", from: "fem", to: "mesh", typeOnly: true })).toBe(true);
    expect(allowed({ file: "", from: "app", to: "march", typeOnly: true })).toBe(false);
  });
});
