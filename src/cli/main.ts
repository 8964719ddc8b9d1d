/** The command line: corelag solve CASE.json, corelag system CASE.json. Everything it knows comes from solveCase. */
import { readFileSync } from "node:fs";
import { Command, CommanderError, InvalidArgumentError, Option } from "commander";
import packageFacts from "../../package.json";
import { solve } from "./solve.ts";
import { writeSystem } from "./system.ts";
import { EXIT } from "./exit.ts";
import { isPipeClosed, tell } from "./terminal.ts";

const program = new Command("corelag")
  .description(
    "How long a solid revolved part takes to heat or cool, where it is slowest, and whether the quick estimate will do.",
  )
  .version(packageFacts.version)
  .exitOverride()
  .showHelpAfterError("(corelag --help lists commands and options)");

program
  .command("solve")
  .description("solve a case and print its answers")
  .argument("<case>", "case file (JSON), or - for standard input")
  .option("--out <dir>", "write answers.json and what else was asked for into this folder")
  .option("--at <times>", "exact output times, comma separated [s, or with units: 30 min]", times)
  .option("--nodes <n>", "fix the mesh near that many unknowns; no automatic refinement", wholeNumber)
  .option("--accuracy <share>", "aim for temperatures, as a share of the run's temperature span", share)
  .addOption(
    new Option("--scheme <name>", "force the time scheme").choices(["implicit-euler", "tr-bdf2", "krylov"]),
  )
  .addOption(
    new Option("--element <nodes>", "force triangles with 3 or 6 nodes")
      .choices(["3", "6"])
      .argParser(elementOrder),
  )
  .option("--snapshots <kinds>", "with --out: field snapshots, vtu and/or csv, comma separated", kinds)
  .action(async (file: string, options) => {
    process.exitCode = await solve(readInput(file), options);
  });

program
  .command("system")
  .description("write the assembled semi-discrete system at the start state as Matrix Market files")
  .argument("<case>", "case file (JSON), or - for standard input")
  .requiredOption("--nodes <n>", "number of unknowns aimed at", wholeNumber)
  .requiredOption("--out <dir>", "folder to write into")
  .addOption(
    new Option("--element <nodes>", "triangles with 3 or 6 nodes")
      .choices(["3", "6"])
      .argParser(elementOrder),
  )
  .action((file: string, options) => {
    process.exitCode = writeSystem(readInput(file), options);
  });

function readInput(file: string): string {
  try {
    return readFileSync(file === "-" ? 0 : file, "utf8");
  } catch (error) {
    tell(
      `${file}: cannot be read (${(error as NodeJS.ErrnoException).code ?? String(error)}). Check the name and the folder.`,
    );
    throw new CommanderError(EXIT.wrong, "corelag.unreadable", "");
  }
}

function wholeNumber(text: string): number {
  const value = Number(text);
  if (!Number.isInteger(value) || value < 12 || value > 2_000_000)
    throw new InvalidArgumentError(`Found "${text}"; give a whole number from 12 to 2000000.`);
  return value;
}

function share(text: string): number {
  const value = Number(text);
  if (!(value > 0 && value <= 0.1))
    throw new InvalidArgumentError(`Found "${text}"; give a number above 0, at most 0.1.`);
  return value;
}

function elementOrder(text: string): 3 | 6 {
  if (text !== "3" && text !== "6") throw new InvalidArgumentError(`Found "${text}"; give 3 or 6.`);
  return text === "3" ? 3 : 6;
}

function times(text: string): string[] {
  return text.split(",").map((part) => part.trim());
}

function kinds(text: string): string[] {
  const asked = text.split(",").map((part) => part.trim());
  const unknown = asked.find((kind) => kind !== "vtu" && kind !== "csv");
  if (unknown !== undefined) throw new InvalidArgumentError(`Found "${unknown}"; give vtu, csv or both.`);
  return asked;
}

process.stdout.on("error", (error: NodeJS.ErrnoException) => {
  if (!isPipeClosed(error)) throw error;
});

try {
  await program.parseAsync();
} catch (error) {
  if (!(error instanceof CommanderError)) throw error;
  // commander has printed its own message; asking for help or the version is no fault
  process.exitCode = error.exitCode === 0 ? 0 : EXIT.wrong;
}
