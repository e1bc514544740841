import { useMutation, useQuery, useQueryClient } from "@tanstack/react-query";
import { importArea, listAreas } from "#shared/api/area.ts";
import type { AreaAnswers } from "#shared/area/questions.ts";
import { call } from "../../api/call.ts";
import { surveyKey } from "../../api/keys.ts";

export interface AreaUpload {
  readonly file: File;
  readonly answers: AreaAnswers;
  readonly signal: AbortSignal;
}

export function useAreas(surveyId: string) {
  return useQuery({
    queryKey: surveyKey(surveyId, "area"),
    queryFn: ({ signal }) => call(listAreas, { params: { surveyId }, signal }),
    select: ({ areas }) => areas,
  });
}

export function useImportArea(surveyId: string) {
  const queries = useQueryClient();
  return useMutation({
    meta: { keeps: true },
    mutationFn: ({ file, answers, signal }: AreaUpload) =>
      call(importArea, { params: { surveyId }, body: { ...answers }, file, signal }),
    // Also when it was cancelled or the answer was lost: the server may have kept the boundary all the same.
    onSettled: () => queries.invalidateQueries({ queryKey: surveyKey(surveyId) }),
  });
}
