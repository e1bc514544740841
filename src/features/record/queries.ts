import { useInfiniteQuery } from "@tanstack/react-query";
import { listEvents } from "#shared/api/record.ts";
import { call } from "../../api/call.ts";
import { surveyKey } from "../../api/keys.ts";

/** Events newest first, a page at a time. */
export function useEvents(surveyId: string) {
  return useInfiniteQuery({
    queryKey: surveyKey(surveyId, "record"),
    queryFn: ({ pageParam, signal }) =>
      call(listEvents, {
        params: { surveyId },
        query: pageParam === null ? {} : { before: String(pageParam) },
        signal,
      }),
    initialPageParam: null as number | null,
    getNextPageParam: (page) => (page.more ? (page.events.at(-1)?.sequence ?? null) : null),
  });
}
