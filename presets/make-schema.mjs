// Writes presets/case.schema.json from the schema in code: node presets/make-schema.mjs
import { writeFileSync } from "node:fs";
import { fileURLToPath } from "node:url";
import { runnerImport } from "vite";

const here = (file) => fileURLToPath(new URL(file, import.meta.url));
const { module } = await runnerImport(here("../src/case/jsonSchema.ts"), { configFile: false, logLevel: "warn" });
writeFileSync(here("case.schema.json"), module.caseJsonSchemaText());
