/** The JSON Schema of the case document, for editors that complete and check a case file. */
import { z } from "zod";
import { caseSchema, FORMAT_VERSION } from "./schema.ts";

/**
 * Made from the schema's input side: what a person may write. What holds between fields (names that exist, stages
 * that end) and the units in texts cannot be said in it; reading the case checks those.
 */
export function caseJsonSchema(): Record<string, unknown> {
  const made = z.toJSONSchema(caseSchema, { io: "input", reused: "inline" }) as Record<string, unknown>;
  const { $schema, ...rest } = made;
  return { $schema, title: `Corelag case, version ${FORMAT_VERSION}`, ...rest };
}

/** Its text as it is kept in presets/case.schema.json. */
export function caseJsonSchemaText(): string {
  return `${JSON.stringify(caseJsonSchema(), null, 2)}\n`;
}
