import { useMutation } from "@tanstack/react-query";
import { useRef, useState } from "react";
import type { ReplayReport } from "#shared/record/replay.ts";
import { type ReplayAt, replayRecord } from "../../workers/replay.ts";

/** What the auditor chose and typed. */
export interface ReplayForm {
  readonly record: File;
  readonly source: File | null;
  readonly hashes: string;
  readonly fingerprint: string;
}

export interface ReplayDone {
  readonly report: ReplayReport;
  readonly fileName: string;
  readonly seconds: number;
}

/** One replay at a time, with its progress and a way to end it. */
export function useReplay() {
  const [at, setAt] = useState<ReplayAt | null>(null);
  const control = useRef<AbortController | null>(null);
  const mutation = useMutation({
    networkMode: "always",
    mutationFn: async (form: ReplayForm): Promise<ReplayDone> => {
      control.current = new AbortController();
      const started = performance.now();
      const report = await replayRecord(
        {
          recordText: await form.record.text(),
          heldHashes: hashesIn(form.hashes),
          fingerprint: form.fingerprint.replace(/\s+/g, "").toLowerCase(),
          sourceFile:
            form.source === null
              ? null
              : { name: form.source.name, bytes: new Uint8Array(await form.source.arrayBuffer()) },
        },
        setAt,
        control.current.signal,
      );
      return { report, fileName: form.record.name, seconds: (performance.now() - started) / 1000 };
    },
    onSettled: () => {
      setAt(null);
    },
  });
  return { ...mutation, at, cancel: () => control.current?.abort() };
}

/** One hash a line; groups of four with spaces between them are one hash. */
export function hashesIn(text: string): string[] {
  return text
    .split(/[\n,;]+/)
    .map((line) => line.replace(/\s+/g, "").toLowerCase())
    .filter((hash) => hash !== "");
}
