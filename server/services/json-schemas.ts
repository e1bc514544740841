import * as z from "zod/mini";
import { frameStatement } from "#shared/frame/statement.ts";
import { recordFile } from "#shared/record/record-file.ts";

const FORMATS = {
  "quillet-frame-1": { title: "Frame statement, quillet-frame/1", schema: frameStatement },
  "quillet-record-1": { title: "Record file, quillet-record/1", schema: recordFile },
} as const;

/** JSON Schema (2020-12) of a stored format, from the schema that reads it. */
export function jsonSchemaOf(name: keyof typeof FORMATS): string {
  const { title, schema } = FORMATS[name];
  return JSON.stringify({ ...z.toJSONSchema(schema, { io: "input" }), title }, null, 2);
}
