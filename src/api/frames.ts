import { queryOptions, useQuery } from "@tanstack/react-query";
import { listFrames } from "#shared/api/frame.ts";
import { call } from "./call.ts";
import { surveyKey } from "./keys.ts";

/** The frame versions of a survey, newest first: several stages stand on them. */
export function framesQuery(surveyId: string) {
  return queryOptions({
    queryKey: surveyKey(surveyId, "frame"),
    queryFn: ({ signal }) => call(listFrames, { params: { surveyId }, signal }),
    select: ({ frames }) => frames,
  });
}

export function useFrames(surveyId: string) {
  return useQuery(framesQuery(surveyId));
}
