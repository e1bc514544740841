import { queryOptions, useMutation, useQuery, useQueryClient } from "@tanstack/react-query";
import type * as z from "zod/mini";
import { createSurvey, listOtherSurveys, listSurveys, readSurvey } from "#shared/api/surveys.ts";
import { call } from "../../api/call.ts";
import { surveyKey, surveysKey } from "../../api/keys.ts";

export type NewSurvey = z.input<typeof createSurvey.body>;

const surveysQuery = queryOptions({
  queryKey: surveysKey,
  queryFn: ({ signal }) => call(listSurveys, { signal }),
});

export function useSurveys() {
  return useQuery(surveysQuery);
}

/** For an owner of the installation only: to others it is refused. */
export function useOtherSurveys() {
  return useQuery({
    queryKey: [...surveysKey, "others"],
    queryFn: ({ signal }) => call(listOtherSurveys, { signal }),
    select: ({ surveys }) => surveys,
  });
}

export function useSurvey(surveyId: string) {
  return useQuery({
    queryKey: surveyKey(surveyId),
    queryFn: ({ signal }) => call(readSurvey, { params: { surveyId }, signal }),
  });
}

export function useCreateSurvey() {
  const queries = useQueryClient();
  return useMutation({
    mutationFn: (body: NewSurvey) => call(createSurvey, { body }),
    onSuccess: (survey) => {
      queries.setQueryData(surveyKey(survey.id), survey);
      // Not waited for: the new survey opens now.
      void queries.invalidateQueries({ queryKey: surveysKey });
    },
  });
}
