import { useMutation, useQuery, useQueryClient } from "@tanstack/react-query";
import type * as z from "zod/mini";
import { keepEstimate, listKeptEstimates, readEstimate } from "#shared/api/estimate.ts";
import { Problem } from "#shared/problem.ts";
import { call } from "../../api/call.ts";
import { surveyKey } from "../../api/keys.ts";

export type Estimate = z.output<(typeof readEstimate)["answer"]["schema"]>;

export function useEstimate(surveyId: string) {
  return useQuery({
    queryKey: surveyKey(surveyId, "estimate"),
    queryFn: ({ signal }) => call(readEstimate, { params: { surveyId }, signal }),
    // That there is nothing to estimate yet is an answer, not a failure to try again.
    retry: (count, error) => !(error instanceof Problem) && count < 2,
  });
}

export function useKeptEstimates(surveyId: string) {
  return useQuery({
    queryKey: surveyKey(surveyId, "kept-estimates"),
    queryFn: ({ signal }) => call(listKeptEstimates, { params: { surveyId }, signal }),
    select: ({ estimates }) => estimates,
  });
}

export function useKeepEstimate(surveyId: string) {
  const queries = useQueryClient();
  return useMutation({
    meta: { keeps: true },
    mutationFn: (resultSha256: string) => call(keepEstimate, { params: { surveyId }, body: { resultSha256 } }),
    onSettled: () => queries.invalidateQueries({ queryKey: surveyKey(surveyId) }),
  });
}
