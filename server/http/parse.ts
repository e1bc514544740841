import * as z from "zod/mini";
import { Problem } from "#shared/problem.ts";

/** A value by its schema, or a refusal that names the field and what is wrong with it. */
export function parse<S extends z.core.$ZodType>(schema: S, value: unknown, where: string): z.output<S> {
  const result = z.safeParse(schema, value);
  if (result.success) return result.data;
  const first = result.error.issues[0];
  const field = [where, ...(first?.path ?? [])].join(".");
  throw new Problem("input-invalid", `${field}: ${first?.message ?? "not valid"}`);
}
