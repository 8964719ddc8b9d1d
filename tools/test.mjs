// npm test: installs what is missing, type-checks, lints, runs every test, the real-browser ones included.
import path from "node:path";
import {
  buildCommandLine,
  buildKernels,
  buildPage,
  findChromium,
  installPackages,
  ROOT,
  run,
} from "./prepare.mjs";

const bin = (...parts) => path.join(ROOT, "node_modules", ...parts);
const started = Date.now();
function step(name, work) {
  const from = Date.now();
  console.log(`\n== ${name}`);
  work();
  console.log(`== ${name}: ${((Date.now() - from) / 1000).toFixed(1)} s`);
}

const chromium = findChromium();
step("packages", installPackages);
step("kernels", buildKernels);
step("types", () => {
  for (const project of [".", "src/cli", "workers", "src/app", "tests"])
    run(process.execPath, [bin("typescript", "bin", "tsc"), "-p", project]);
});
step("lint", () => {
  run(process.execPath, [bin("eslint", "bin", "eslint.js"), "."]);
  run(process.execPath, [bin("prettier", "bin", "prettier.cjs"), "--check", "--log-level", "warn", "."]);
});
step("builds", () => {
  buildCommandLine();
  buildPage();
});
step("tests", () => run(process.execPath, [bin("vitest", "vitest.mjs"), "run"]));
step("browser tests", () =>
  run(process.execPath, [bin("@playwright", "test", "cli.js"), "test"], { env: { CHROMIUM: chromium } }),
);
console.log(`\nAll tests passed in ${((Date.now() - started) / 1000).toFixed(0)} s.`);
