import { useMutation, useQuery, useQueryClient } from "@tanstack/react-query";
import type * as z from "zod/mini";
import {
  abandonDeclaration,
  declareDraw,
  listDraws,
  makeDraw,
  readDraw,
  readRecipe,
  withdrawDraw,
} from "#shared/api/draw.ts";
import { call } from "../../api/call.ts";
import { foreverKey, surveyKey } from "../../api/keys.ts";

export type NewDeclaration = z.input<typeof declareDraw.body>;

export function useDraws(surveyId: string) {
  return useQuery({
    queryKey: surveyKey(surveyId, "draw"),
    queryFn: ({ signal }) => call(listDraws, { params: { surveyId }, signal }),
  });
}

export function useDraw(surveyId: string, drawId: string) {
  return useQuery({
    queryKey: surveyKey(surveyId, "draw", drawId),
    queryFn: ({ signal }) => call(readDraw, { params: { surveyId, drawId }, signal }),
  });
}

export function useRecipe(surveyId: string, drawId: string, wanted: boolean) {
  return useQuery({
    queryKey: foreverKey(surveyId, "recipe", drawId),
    queryFn: ({ signal }) => call(readRecipe, { params: { surveyId, drawId }, signal }),
    enabled: wanted,
    staleTime: Infinity,
  });
}

/** After any act on draws everything of the survey may look different. */
function useAct<Input, Output>(surveyId: string, act: (input: Input) => Promise<Output>) {
  const queries = useQueryClient();
  return useMutation({
    meta: { keeps: true },
    mutationFn: act,
    onSettled: () => queries.invalidateQueries({ queryKey: surveyKey(surveyId) }),
  });
}

export function useDeclare(surveyId: string) {
  return useAct(surveyId, (body: NewDeclaration) => call(declareDraw, { params: { surveyId }, body }));
}

export interface SeedGiven {
  readonly declarationId: string;
  /** null: the server makes it. */
  readonly seed: string | null;
}

export function useMakeDraw(surveyId: string) {
  return useAct(surveyId, ({ declarationId, seed }: SeedGiven) =>
    call(makeDraw, { params: { surveyId, declarationId }, body: seed === null ? {} : { seed } }),
  );
}

export interface Reasoned {
  readonly id: string;
  readonly reason: string;
}

export function useAbandon(surveyId: string) {
  return useAct(surveyId, ({ id, reason }: Reasoned) =>
    call(abandonDeclaration, { params: { surveyId, declarationId: id }, body: { reason } }),
  );
}

export function useWithdraw(surveyId: string) {
  return useAct(surveyId, ({ id, reason }: Reasoned) =>
    call(withdrawDraw, { params: { surveyId, drawId: id }, body: { reason } }),
  );
}
