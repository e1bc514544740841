import { useMutation, useQuery, useQueryClient } from "@tanstack/react-query";
import type * as z from "zod/mini";
import { amendCount, enterCounts, importCounts, listEntries, type statement } from "#shared/api/counts.ts";
import { call } from "../../api/call.ts";
import { surveyKey } from "../../api/keys.ts";

/** A number when the cell was counted, a state when it was not. */
export type Said = z.output<typeof statement>;

export interface NewEntry {
  readonly id: string;
  readonly visitId: string;
  readonly targetId: string;
  readonly said: Said;
  readonly note: string;
  readonly madeAt: string;
}

export function useEnterCount(surveyId: string) {
  const queries = useQueryClient();
  return useMutation({
    meta: { keeps: true },
    mutationFn: (entry: NewEntry) => call(enterCounts, { params: { surveyId }, body: { entries: [entry] } }),
    // Not waited for: the page goes on to the next cell now, before the list says that this one is settled.
    onSuccess: () => void queries.invalidateQueries({ queryKey: surveyKey(surveyId) }),
  });
}

export interface Amendment extends NewEntry {
  readonly replaces: string;
  readonly reason: string;
}

export function useAmendCount(surveyId: string) {
  const queries = useQueryClient();
  return useMutation({
    meta: { keeps: true },
    mutationFn: ({ visitId, ...body }: Amendment) => call(amendCount, { params: { surveyId, visitId }, body }),
    // Not waited for: the page goes on to the next cell now, before the list says that this one is settled.
    onSuccess: () => void queries.invalidateQueries({ queryKey: surveyKey(surveyId) }),
  });
}

export function useEntries(surveyId: string, visitId: string) {
  return useQuery({
    queryKey: surveyKey(surveyId, "entries", visitId),
    queryFn: ({ signal }) => call(listEntries, { params: { surveyId, visitId }, signal }),
    select: ({ entries }) => entries,
  });
}

export interface TableToImport {
  readonly file: File;
  readonly body: z.input<typeof importCounts.body>;
}

/** Judges a table, or writes it when the body says so; only writing changes anything. */
export function useImportCounts(surveyId: string) {
  const queries = useQueryClient();
  return useMutation({
    meta: { keeps: true },
    mutationFn: ({ file, body }: TableToImport) => call(importCounts, { params: { surveyId }, body, file }),
    onSuccess: (verdict) =>
      verdict.written ? queries.invalidateQueries({ queryKey: surveyKey(surveyId) }) : undefined,
  });
}
