import { useQuery } from "@tanstack/react-query";
import { listVisits } from "#shared/api/field.ts";
import { call } from "./call.ts";
import { surveyKey } from "./keys.ts";

/** The cells to visit, with what is known of each: Field and Counts both stand on them. */
export function useVisits(surveyId: string) {
  return useQuery({
    queryKey: surveyKey(surveyId, "visits"),
    queryFn: ({ signal }) => call(listVisits, { params: { surveyId }, signal }),
  });
}
