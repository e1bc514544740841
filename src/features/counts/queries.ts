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
    // Not waited for: the page goes on to the next cell now, before the list says that this one is settled. After a refusal
    // too: it may be that somebody else gave the cell a count meanwhile.
    onSettled: () => void queries.invalidateQueries({ queryKey: surveyKey(surveyId) }),
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
    // After a refusal too: it may be that somebody else amended the count meanwhile.
    onSettled: () => void queries.invalidateQueries({ queryKey: surveyKey(surveyId) }),
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
  readonly body: Omit<z.input<typeof importCounts.body>, "write">;
}

/** Says how each row of a table is read, and keeps nothing. */
export function useJudgeTable(surveyId: string) {
  return useMutation({
    mutationFn: ({ file, body }: TableToImport) =>
      call(importCounts, { params: { surveyId }, body: { ...body, write: null }, file }),
  });
}

/** Writes what was judged, all or nothing. */
export function useWriteTable(surveyId: string) {
  const queries = useQueryClient();
  return useMutation({
    meta: { keeps: true },
    mutationFn: ({ file, body, judged }: TableToImport & { readonly judged: string }) =>
      call(importCounts, { params: { surveyId }, body: { ...body, write: judged }, file }),
    onSettled: () => queries.invalidateQueries({ queryKey: surveyKey(surveyId) }),
  });
}
