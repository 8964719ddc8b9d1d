// npm start: installs what is missing, solves the bundled case in the terminal, then serves the page on loopback.
import { buildCommandLine, buildPage, installPackages, ROOT, run, stop } from "./prepare.mjs";
import path from "node:path";

const BUNDLED = path.join("presets", "cases", "tapered-ingot.json");

const flag = process.argv.indexOf("--port");
const port = flag > 0 ? Number(process.argv[flag + 1]) : 4180;
if (!Number.isInteger(port) || port < 1 || port > 65535) stop("--port wants a number from 1 to 65535.");

installPackages();
buildCommandLine();
buildPage();
process.chdir(ROOT);
run(process.execPath, [path.join("dist", "cli", "main.js"), "solve", BUNDLED]);

const { preview } = await import("vite");
const server = await preview({
  root: ROOT,
  build: { outDir: "dist/page" },
  preview: { port, host: "127.0.0.1", strictPort: flag > 0 },
  logLevel: "warn",
});
const address = server.resolvedUrls?.local[0];
console.log(
  `\nThe page is at ${address}\nAll sums are done on this machine; nothing is sent anywhere. Ctrl+C ends it.`,
);
