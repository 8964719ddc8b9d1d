#!/usr/bin/env node
// The command line from a checkout: builds it when the sources are newer, then hands over.
import { pathToFileURL } from "node:url";
import path from "node:path";
import { buildCommandLine, installPackages, ROOT } from "./prepare.mjs";

// npm runs scripts from the package folder; paths a person types are meant from where they stand.
const here = process.env.INIT_CWD ?? process.cwd();
installPackages();
buildCommandLine();
process.chdir(here);
await import(pathToFileURL(path.join(ROOT, "dist", "cli", "main.js")).href);
