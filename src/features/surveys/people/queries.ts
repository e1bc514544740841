import { useMutation, useQuery, useQueryClient } from "@tanstack/react-query";
import type { Role } from "#shared/access/table.ts";
import {
  addPerson,
  leaveSurvey,
  listPeople,
  renewInvitation,
  setRoles,
  withdrawInvitation,
  type Member,
  type People,
} from "#shared/api/people.ts";
import { call } from "../../../api/call.ts";
import { surveyKey, surveysKey } from "../../../api/keys.ts";

export function usePeople(surveyId: string) {
  return useQuery({
    queryKey: surveyKey(surveyId, "people"),
    queryFn: ({ signal }) => call(listPeople, { params: { surveyId }, signal }),
  });
}

/** An act that is answered with the people as they are now. */
function usePeopleAct<Input>(surveyId: string, act: (input: Input) => Promise<People>) {
  const queries = useQueryClient();
  return useMutation({
    meta: { keeps: true },
    mutationFn: act,
    onSuccess: (answer) => {
      queries.setQueryData(surveyKey(surveyId, "people"), answer);
      // Not waited for: the form empties now, not while the next person is being typed.
      void queries.invalidateQueries({ queryKey: surveyKey(surveyId) });
      void queries.invalidateQueries({ queryKey: surveysKey });
    },
    // Changed meanwhile by somebody else: the lists say how they are now.
    onError: () => void queries.invalidateQueries({ queryKey: surveyKey(surveyId, "people") }),
  });
}

export function useAddPerson(surveyId: string) {
  return usePeopleAct(surveyId, (body: { email: string; role: Role }) =>
    call(addPerson, { params: { surveyId }, body }),
  );
}

/** No role removes the person from the survey. */
export function useSetRoles(surveyId: string, { id: memberId, roles: seen }: Member) {
  return usePeopleAct(surveyId, (roles: Role[]) =>
    call(setRoles, { params: { surveyId, memberId }, body: { roles, seen } }),
  );
}

export function useRenewInvitation(surveyId: string) {
  return usePeopleAct(surveyId, (invitationId: string) =>
    call(renewInvitation, { params: { surveyId, invitationId } }),
  );
}

export function useWithdrawInvitation(surveyId: string) {
  return usePeopleAct(surveyId, (invitationId: string) =>
    call(withdrawInvitation, { params: { surveyId, invitationId } }),
  );
}

export function useLeaveSurvey(surveyId: string) {
  const queries = useQueryClient();
  return useMutation({
    meta: { keeps: true },
    mutationFn: () => call(leaveSurvey, { params: { surveyId } }),
    onSuccess: () => void queries.invalidateQueries({ queryKey: surveysKey }),
  });
}
