// What every command needs first: packages, kernels, builds, a browser. Only Node's own modules are imported at the
// top, because this runs before anything is installed.
import { execFileSync, spawnSync } from "node:child_process";
import { createHash } from "node:crypto";
import {
  existsSync,
  mkdirSync,
  readdirSync,
  readFileSync,
  renameSync,
  rmSync,
  statSync,
  writeFileSync,
} from "node:fs";
import path from "node:path";
import { fileURLToPath } from "node:url";

export const ROOT = path.resolve(path.dirname(fileURLToPath(import.meta.url)), "..");
const at = (...parts) => path.join(ROOT, ...parts);

/** Ends the command with a plain sentence: what is missing and how to mend it. */
export function stop(message) {
  console.error(message);
  process.exit(1);
}

/** Runs a command in the checkout; its output goes to the given stream. Ends with its exit code when it fails. */
export function run(command, args, { quiet = false, env = {} } = {}) {
  const done = spawnSync(command, args, {
    cwd: ROOT,
    stdio: quiet ? ["ignore", "pipe", "pipe"] : "inherit",
    env: { ...process.env, ...env },
    encoding: "utf8",
  });
  if (done.status === 0) return;
  if (quiet) process.stderr.write(`${done.stdout ?? ""}${done.stderr ?? ""}`);
  if (done.error) stop(`${command} could not be started: ${done.error.message}`);
  process.exit(done.status ?? 1);
}

/** Installs the locked packages when they are missing or the lock has changed since. */
export function installPackages() {
  const [major, minor] = process.versions.node.split(".").map(Number);
  if (major < 20 || (major === 20 && minor < 19))
    stop(`Corelag needs Node 20.19 or newer; this is ${process.versions.node}.`);
  const lock = createHash("sha256")
    .update(readFileSync(at("package-lock.json")))
    .digest("hex");
  const mark = at("node_modules", ".corelag-lock");
  if (existsSync(mark) && readFileSync(mark, "utf8") === lock) return;
  console.error("Installing packages (once) ...");
  run("npm", ["ci", "--include=dev", "--no-audit", "--no-fund", "--loglevel=error"], { quiet: true });
  writeFileSync(mark, lock);
}

/** Compiles the numerical kernels; quick when they are up to date. */
export function buildKernels() {
  run(process.execPath, [at("src", "linalg", "kernels", "build.mjs")], { quiet: true });
}

function newest(entry) {
  const facts = statSync(entry);
  if (!facts.isDirectory()) return facts.mtimeMs;
  return Math.max(facts.mtimeMs, ...readdirSync(entry).map((name) => newest(path.join(entry, name))));
}

const SOURCES = [
  "src",
  "mesh",
  "tests/bench",
  "workers",
  "presets",
  "package-lock.json",
  "vite.config.ts",
  "index.html",
];

/** Builds into a folder of its own, then puts it in place, so that two commands at once do not meet half a build. */
function buildWhenStale(folder, args, before = () => undefined) {
  const made = at("dist", folder, ".made");
  const sources = Math.max(
    ...SOURCES.filter((entry) => existsSync(at(entry))).map((entry) => newest(at(entry))),
  );
  if (existsSync(made) && statSync(made).mtimeMs > sources) return;
  before();
  const fresh = at("dist", `${folder}-${process.pid}`);
  run(
    process.execPath,
    [at("node_modules", "vite", "bin", "vite.js"), "build", "--logLevel", "warn", "--outDir", fresh, ...args],
    {
      quiet: true,
    },
  );
  mkdirSync(fresh, { recursive: true });
  writeFileSync(path.join(fresh, ".made"), "");
  rmSync(at("dist", folder), { recursive: true, force: true });
  renameSync(fresh, at("dist", folder));
}

/** The page in dist/page. */
export const buildPage = () => buildWhenStale("page", [], buildKernels);
/** The command line in dist/cli. */
export const buildCommandLine = () => buildWhenStale("cli", ["--ssr", "src/cli/main.ts"], buildKernels);
/** The benchmarks in dist/bench. */
export const buildBenchmarks = () => buildWhenStale("bench", ["--ssr", "tests/bench/main.ts"], buildKernels);

/** Path of a Chromium for the browser tests: CHROMIUM, Debian's, or one installed through apt when root. */
export function findChromium() {
  const asked = process.env.CHROMIUM;
  if (asked) return existsSync(asked) ? asked : stop(`CHROMIUM names ${asked}, which is not there.`);
  const known = ["/usr/bin/chromium", "/usr/bin/chromium-browser"].find((entry) => existsSync(entry));
  if (known) return known;
  if (process.getuid?.() !== 0 || !existsSync("/usr/bin/apt-get"))
    stop(
      "The browser tests need Chromium, and none was found.\n" +
        "Install it (on Debian, as root: apt-get install chromium) or set CHROMIUM to the path of one.",
    );
  console.error("Installing Chromium (once) ...");
  const env = { DEBIAN_FRONTEND: "noninteractive" };
  const install = ["install", "-y", "--no-install-recommends", "chromium"];
  try {
    execFileSync("apt-get", install, { stdio: "pipe", env: { ...process.env, ...env } });
  } catch {
    run("apt-get", ["update"], { quiet: true, env });
    run("apt-get", install, { quiet: true, env });
  }
  return "/usr/bin/chromium";
}
