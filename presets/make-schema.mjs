// Writes presets/case.schema.json from the schema in code: node presets/make-schema.mjs
import { writeFileSync } from "node:fs";
import path from "node:path";
import { runnerImport } from "vite";

const here = (file) => path.join(import.meta.dirname, file);
const { module } = await runnerImport(here("../src/case/jsonSchema.ts"), {
  configFile: false,
  logLevel: "warn",
});
writeFileSync(here("case.schema.json"), module.caseJsonSchemaText());
