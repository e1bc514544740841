import { useMutation, useQuery, useQueryClient } from "@tanstack/react-query";
import type * as z from "zod/mini";
import { assignVisits, closePick, exportWaypoints } from "#shared/api/field.ts";
import { listPeople, type Member } from "#shared/api/people.ts";
import { call } from "../../api/call.ts";
import { surveyKey } from "../../api/keys.ts";
import { saveFile } from "../../api/save-file.ts";

/** People who can be given cells: those with a role in the field. */
export function useFieldMembers(surveyId: string) {
  return useQuery({
    queryKey: surveyKey(surveyId, "people"),
    queryFn: ({ signal }) => call(listPeople, { params: { surveyId }, signal }),
    select: ({ members }): Member[] => members.filter(({ roles }) => roles.some((role) => role !== "auditor")),
  });
}

export function useAssign(surveyId: string) {
  const queries = useQueryClient();
  return useMutation({
    meta: { keeps: true },
    mutationFn: (body: z.input<typeof assignVisits.body>) => call(assignVisits, { params: { surveyId }, body }),
    onSuccess: () => queries.invalidateQueries({ queryKey: surveyKey(surveyId) }),
  });
}

export type Closing = z.input<typeof closePick.body> & { readonly visitId: string };
export type Closed = z.output<(typeof closePick)["answer"]["schema"]>;

export function useClosePick(surveyId: string) {
  const queries = useQueryClient();
  return useMutation({
    meta: { keeps: true },
    mutationFn: ({ visitId, ...body }: Closing) => call(closePick, { params: { surveyId, visitId }, body }),
    onSuccess: () => queries.invalidateQueries({ queryKey: surveyKey(surveyId) }),
  });
}

export interface WaypointsWanted {
  readonly body: z.input<typeof exportWaypoints.body>;
  readonly fileName: string;
}

/** Makes the file on the server, which writes the act down, and offers it for saving. */
export function useExportWaypoints(surveyId: string) {
  const queries = useQueryClient();
  return useMutation({
    meta: { keeps: true },
    mutationFn: async ({ body, fileName }: WaypointsWanted) => {
      saveFile(await call(exportWaypoints, { params: { surveyId }, body }), fileName);
    },
    onSuccess: () => queries.invalidateQueries({ queryKey: surveyKey(surveyId) }),
  });
}
