import { useMutation, useQuery, useQueryClient } from "@tanstack/react-query";
import * as z from "zod/mini";
import {
  type AssignmentsNow,
  assignmentsNow,
  assignVisits,
  closePick,
  exportWaypoints,
  type Visit,
} from "#shared/api/field.ts";
import { listPeople, type Member } from "#shared/api/people.ts";
import { call } from "../../api/call.ts";
import { surveyKey } from "../../api/keys.ts";
import { problemOf } from "../../api/problem-of.ts";
import { saveFile } from "../../api/save-file.ts";

/** People who can be given cells: those with a role in the field. */
export function useFieldMembers(surveyId: string) {
  return useQuery({
    queryKey: surveyKey(surveyId, "people"),
    queryFn: ({ signal }) => call(listPeople, { params: { surveyId }, signal }),
    select: ({ members }): Member[] =>
      members.filter(({ roles, isClosed }) => !isClosed && roles.some((role) => role !== "auditor")),
  });
}

export interface Sharing {
  /** As they were seen when they were chosen. */
  readonly visits: readonly Pick<Visit, "id" | "assignedTo">[];
  /** null takes the cells back. */
  readonly memberId: string | null;
  readonly day: string;
}

export function useAssign(surveyId: string) {
  const queries = useQueryClient();
  return useMutation({
    meta: { keeps: true },
    mutationFn: ({ visits, memberId, day }: Sharing) => {
      const visitIds = visits.map(({ id }) => id);
      const seen = visits.flatMap(({ id: visitId, assignedTo }) =>
        assignedTo === null ? [] : { visitId, memberId: assignedTo.memberId, day: assignedTo.day },
      );
      return call(assignVisits, { params: { surveyId }, body: { visitIds, memberId, day, seen } });
    },
    onSuccess: () => queries.invalidateQueries({ queryKey: surveyKey(surveyId) }),
    onError: (error) => {
      // Who has them now is to be seen in the list too.
      if (assignedMeanwhile(error) !== null) void queries.invalidateQueries({ queryKey: surveyKey(surveyId) });
    },
  });
}

/** Who has the cells now, where somebody else has shared out the same ones meanwhile; null for any other failure. */
export function assignedMeanwhile(error: Error | null): AssignmentsNow | null {
  const problem = error === null ? null : problemOf(error);
  if (problem?.code !== "changed-meanwhile") return null;
  return z.safeParse(assignmentsNow, problem.question?.["current"]).data ?? null;
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
