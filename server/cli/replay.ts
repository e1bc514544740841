import { basename } from "node:path";
import { Problem } from "#shared/problem.ts";
import { replay, type ReplayReport } from "#shared/record/replay.ts";
import { readBytes, readText } from "./files.ts";
import { options, UsageError } from "./usage.ts";

const KNOWN = {
  hash: { type: "string", multiple: true },
  fingerprint: { type: "string" },
  area: { type: "string" },
} as const;

const OUTCOMES = { passed: "passed     ", failed: "FAILED     ", "not-checked": "not checked" } as const;

/** `quillet replay RECORD.json`: one line a check; status 1 if any fails. */
export async function replayRecord(args: readonly string[]): Promise<number> {
  const { values, positionals } = options(args, KNOWN, 1);
  const [path] = positionals;
  if (path === undefined) throw new UsageError("Name the record file: quillet replay RECORD.json");
  const { epsgLookup } = await import("../jobs/epsg.ts");
  const report = replay(jsonOf(readText(path)), {
    heldHashes: values.hash,
    fingerprint: values.fingerprint,
    sourceFile: values.area === undefined ? undefined : { name: basename(values.area), bytes: readBytes(values.area) },
    epsg: epsgLookup,
    geoPackage: (await import("../jobs/read-geopackage.ts")).readGeoPackage,
  });
  process.stdout.write(linesOf(report));
  return report.summary.failed > 0 ? 1 : 0;
}

function jsonOf(text: string): unknown {
  try {
    return JSON.parse(text.replace(/^\uFEFF/, ""));
  } catch (error) {
    throw new Problem("record-invalid", `The file is not JSON: ${(error as Error).message}. Save the record again.`);
  }
}

function linesOf({ checks, cannotShow, summary }: ReplayReport): string {
  return [
    ...checks.map(({ outcome, title, detail }) => `${OUTCOMES[outcome]}  ${title}: ${detail.replace(/\s+/g, " ")}`),
    "",
    `${summary.headline} ${summary.meaning}`,
    ...(cannotShow.length === 0 ? [] : ["What no record can show:", ...cannotShow.map((sentence) => `- ${sentence}`)]),
    "",
  ].join("\n");
}
