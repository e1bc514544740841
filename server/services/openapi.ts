import * as z from "zod/mini";
import { ALL_CONTRACTS } from "#shared/api/all.ts";
import type { Contract } from "#shared/api/contract.ts";
import { PROBLEMS } from "#shared/problem.ts";

type Json = Record<string, unknown>;

/** This interface as OpenAPI 3.1, made from the contracts: nothing is written down twice. */
export function openApi(version: string): string {
  const paths: Record<string, Json> = {};
  for (const contract of ALL_CONTRACTS) {
    const path = contract.path.replace(/:(\w+)/g, "{$1}");
    paths[path] = { ...paths[path], [contract.method.toLowerCase()]: operation(contract) };
  }
  return JSON.stringify(
    {
      openapi: "3.1.0",
      info: { title: "Quillet", version, description: "Refusals are RFC 9457 problem details with a stable code." },
      paths,
      components: { schemas: { Problem: PROBLEM } },
    },
    null,
    2,
  );
}

const PROBLEM = {
  type: "object",
  required: ["type", "title", "status", "detail", "code"],
  properties: {
    type: { type: "string" },
    title: { type: "string" },
    status: { type: "integer" },
    detail: { type: "string", description: "A fact and a next step" },
    code: { enum: Object.keys(PROBLEMS) },
    question: { type: "object", description: "A question that an answer in the next request settles" },
  },
};

function operation(contract: Contract): Json {
  const parameters = [...parametersOf(contract.params, "path"), ...parametersOf(contract.query, "query")];
  return {
    operationId: contract.name,
    summary: contract.summary,
    "x-guard": contract.guard,
    ...(parameters.length > 0 ? { parameters } : {}),
    ...(contract.method === "GET" ? {} : { requestBody: requestBody(contract) }),
    responses: {
      "200": { description: "As asked", content: answerContent(contract) },
      default: {
        description: "Refused",
        content: { "application/problem+json": { schema: { $ref: "#/components/schemas/Problem" } } },
      },
    },
  };
}

/** JSON Schema of one part, whole where it is used. */
function schemaOf(schema: z.core.$ZodType, io: "input" | "output"): Json {
  const whole = z.toJSONSchema(schema, { io, unrepresentable: "any" });
  return Object.fromEntries(Object.entries(whole).filter(([key]) => key !== "$schema"));
}

function parametersOf(schema: z.core.$ZodType, place: "path" | "query"): Json[] {
  const { properties = {}, required = [] } = schemaOf(schema, "input") as {
    properties?: Record<string, Json>;
    required?: string[];
  };
  return Object.entries(properties).map(([name, of]) => ({
    name,
    in: place,
    required: place === "path" || required.includes(name),
    schema: of,
  }));
}

function requestBody(contract: Contract): Json {
  const body = schemaOf(contract.body, "input");
  if (!contract.upload) return { content: { "application/json": { schema: body } } };
  const properties = { body, [contract.upload.field]: { type: "string", format: "binary" } };
  return {
    content: {
      "multipart/form-data": {
        schema: { type: "object", properties, required: [contract.upload.field] },
        encoding: { body: { contentType: "application/json" } },
      },
    },
  };
}

function answerContent({ answer }: Contract): Json {
  if (answer.kind === "json") return { "application/json": { schema: schemaOf(answer.schema, "output") } };
  return Object.fromEntries(answer.types.map((type) => [type, {}]));
}
