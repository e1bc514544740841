import { useMutation } from "@tanstack/react-query";
import { useEffect, useRef, useState } from "react";
import { Problem } from "#shared/problem.ts";
import type { ReplayReport } from "#shared/record/replay.ts";
import { type ReplayAt, replayRecord } from "../../workers/replay.ts";

/** What the auditor chose and typed. */
export interface ReplayChoice {
  readonly record: File | null;
  readonly source: File | null;
  readonly hashes: string;
  readonly fingerprint: string;
}

export interface ReplayDone {
  readonly report: ReplayReport;
  readonly fileName: string;
  readonly seconds: number;
}

/** One replay at a time, with its progress and a way to end it; leaving the page ends it too. */
export function useReplay() {
  const [at, setAt] = useState<ReplayAt | null>(null);
  const control = useRef<AbortController | null>(null);
  useEffect(() => () => control.current?.abort(), []);
  const mutation = useMutation({
    mutationFn: async ({ record, ...held }: ReplayChoice & { readonly record: File }): Promise<ReplayDone> => {
      const own = new AbortController();
      control.current = own;
      const started = performance.now();
      const report = await replayRecord(
        {
          recordName: record.name,
          recordText: await readable(record, () => record.text()),
          heldHashes: hashesIn(held.hashes),
          fingerprint: held.fingerprint.replace(/\s+/g, "").toLowerCase(),
          sourceFile: held.source === null ? null : await bytesOf(held.source),
        },
        setAt,
        own.signal,
      );
      return { report, fileName: record.name, seconds: (performance.now() - started) / 1000 };
    },
    onSettled: () => {
      setAt(null);
    },
  });
  return { ...mutation, at, cancel: () => control.current?.abort() };
}

async function bytesOf(file: File): Promise<{ readonly name: string; readonly bytes: Uint8Array }> {
  return { name: file.name, bytes: new Uint8Array(await readable(file, () => file.arrayBuffer())) };
}

/** Browsers refuse to read a file that was changed, moved or deleted after it was chosen. */
async function readable<T>(file: File, read: () => Promise<T>): Promise<T> {
  try {
    return await read();
  } catch {
    throw new Problem("file-damaged", `“${file.name}” was changed or moved since it was chosen. Choose it again.`);
  }
}

/** One hash a line; groups of four with spaces between them are one hash. */
export function hashesIn(text: string): string[] {
  return text
    .split(/[\n,;]+/)
    .map((line) => line.replace(/\s+/g, "").toLowerCase())
    .filter((hash) => hash !== "");
}
