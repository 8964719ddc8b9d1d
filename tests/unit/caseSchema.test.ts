import { readFileSync } from "node:fs";
import { expect, test } from "vitest";
import { z } from "zod";
import { CASES } from "../../presets/cases/index.ts";
import { caseJsonSchema, caseJsonSchemaText } from "../../src/case/jsonSchema.ts";
import { plain } from "../helpers/plainCase.ts";

test("presets/case.schema.json is current (else: node presets/make-schema.mjs)", () => {
  const kept = readFileSync(new URL("../../presets/case.schema.json", import.meta.url), "utf8");
  expect(kept).toBe(caseJsonSchemaText());
});

test("every field of the JSON Schema is described", () => {
  const bare: string[] = [];
  const walk = (schema: unknown, path: string): void => {
    if (typeof schema !== "object" || schema === null) return;
    const { properties, ...rest } = schema as {
      properties?: Record<string, { description?: string; const?: string }>;
    };
    for (const [name, field] of Object.entries(properties ?? {})) {
      const isTag = name === "ask" || name === "points" || name === "over";
      if (!field.description && !isTag) bare.push(`${path}.${name}`);
      walk(field, `${path}.${name}`);
    }
    for (const [key, inner] of Object.entries(rest)) walk(inner, `${path}/${key}`);
  };
  walk(caseJsonSchema(), "");
  expect(bare).toEqual([]);
});

test("the JSON Schema takes the presets and refuses what has another form", () => {
  const validator = z.fromJSONSchema(caseJsonSchema() as Parameters<typeof z.fromJSONSchema>[0]);
  for (const { id, document } of CASES) expect(validator.safeParse(document).success, id).toBe(true);
  expect(validator.safeParse(plain()).success).toBe(true);
  expect(validator.safeParse({ ...plain(), colour: "red" }).success).toBe(false);
  expect(validator.safeParse({ ...plain(), corelag: 2 }).success).toBe(false);
  expect(validator.safeParse({ ...plain(), start: [20] }).success).toBe(false);
});
