/**
 * Compiles the AssemblyScript kernels and writes them as a TypeScript module, so that neither bundler nor Node has to
 * fetch a binary. Does nothing when the sources have not changed since.
 *
 *   node src/linalg/kernels/build.mjs
 */
import { Buffer } from "node:buffer";
import { createHash } from "node:crypto";
import { existsSync, mkdirSync, readdirSync, readFileSync, renameSync, writeFileSync } from "node:fs";
import { dirname, join } from "node:path";
import process from "node:process";
import { fileURLToPath } from "node:url";

const here = dirname(fileURLToPath(import.meta.url));
const sources = join(here, "assembly");
const target = join(here, "generated", "kernels.ts");
const flags = [
  "--outFile",
  "kernels.wasm",
  "-O3",
  "--noAssert",
  "--runtime",
  "stub",
  "--importMemory",
  "--enable",
  "simd",
  "--enable",
  "bulk-memory",
];

const names = readdirSync(sources)
  .filter((name) => name.endsWith(".ts"))
  .sort();
const texts = Object.fromEntries(names.map((name) => [name, readFileSync(join(sources, name), "utf8")]));
const digest = createHash("sha256")
  .update(JSON.stringify([flags, texts, readFileSync(fileURLToPath(import.meta.url), "utf8")]))
  .digest("hex");
const firstLine = `// Built by src/linalg/kernels/build.mjs from sources ${digest}; do not edit.`;

if (!existsSync(target) || !readFileSync(target, "utf8").startsWith(firstLine)) {
  const { default: asc } = await import("assemblyscript/asc");
  let binary;
  const { error, stderr } = await asc.main(["index.ts", ...flags], {
    readFile: (name) => texts[name] ?? null,
    listFiles: () => [],
    writeFile: (_, contents) => {
      binary = contents;
    },
  });
  if (error) {
    process.stderr.write(stderr.toString());
    throw error;
  }
  mkdirSync(dirname(target), { recursive: true });
  // Written aside and renamed, so that a reader never meets half a file.
  const aside = `${target}.${process.pid}`;
  const text = Buffer.from(binary).toString("base64");
  writeFileSync(aside, `${firstLine}\nexport const KERNELS = "${text}";\n`);
  renameSync(aside, target);
}
