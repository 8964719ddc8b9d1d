/**
 * npm run bench: one JSON line per benchmark, or the whole table.
 *
 *   bench mesh CASE.json --nodes N      bench solve CASE.json --nodes N
 *   bench march DIR --dt S --steps N    bench schemes DIR        (DIR as "corelag system" writes it)
 */
import { parseArgs } from "node:util";
import { benchMesh, benchSolve } from "./caseBench.ts";
import { benchMarch } from "./march.ts";
import { benchSchemes } from "./schemes.ts";

const { positionals, values } = parseArgs({
  allowPositionals: true,
  options: { nodes: { type: "string" }, dt: { type: "string" }, steps: { type: "string" } },
});
const [what, target] = positionals;

function number(name: "nodes" | "dt" | "steps"): number {
  const value = Number(values[name]);
  if (!(value > 0)) {
    process.stderr.write(`bench ${what}: --${name} wants a number above 0\n`);
    process.exit(2);
  }
  return value;
}

const print = (record: object): void => {
  process.stdout.write(`${JSON.stringify(record)}\n`);
};

const TABLE_CASES = ["stepped-roll", "tapered-ingot", "bottle-shell"].map((id) => `presets/cases/${id}.json`);

async function table(): Promise<void> {
  for (const file of TABLE_CASES)
    for (const nodes of [2000, 20_000, 60_000])
      print({ bench: "mesh", case: file, ...(await benchMesh(file, nodes)) });
  for (const file of TABLE_CASES)
    for (const nodes of [2000, 5000, 20_000])
      print({ bench: "solve", case: file, ...(await benchSolve(file, nodes)) });
}

if (what === undefined) await table();
else if (what === "mesh" && target) print(await benchMesh(target, number("nodes")));
else if (what === "solve" && target) print(await benchSolve(target, number("nodes")));
else if (what === "march" && target)
  print(await benchMarch(target, { dt: number("dt"), steps: number("steps") }));
else if (what === "schemes" && target) for (const record of benchSchemes(target)) print(record);
else {
  process.stderr.write(
    "bench [mesh CASE.json --nodes N | solve CASE.json --nodes N | march DIR --dt S --steps N | schemes DIR]\n",
  );
  process.exitCode = 2;
}
