// npm run bench: builds the benchmarks and runs one, or the whole table.
import path from "node:path";
import { pathToFileURL } from "node:url";
import { buildBenchmarks, installPackages, ROOT } from "./prepare.mjs";

const here = process.argv[2] === undefined ? ROOT : (process.env.INIT_CWD ?? process.cwd());
installPackages();
buildBenchmarks();
process.chdir(here);
await import(pathToFileURL(path.join(ROOT, "dist", "bench", "main.js")).href);
