import { useMutation, useMutationState, useQuery, useQueryClient } from "@tanstack/react-query";
import { useState } from "react";
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
import { Problem } from "#shared/problem.ts";
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

const actKey = (surveyId: string) => ["draw-act", surveyId];

/** After any act on draws, refused ones too, everything of the survey may look different. */
function useAct<Input, Output>(surveyId: string, act: (input: Input) => Promise<Output>) {
  const queries = useQueryClient();
  return useMutation({
    mutationKey: actKey(surveyId),
    meta: { keeps: true },
    mutationFn: act,
    onSettled: () => queries.invalidateQueries({ queryKey: surveyKey(surveyId) }),
  });
}

/**
 * The refusal of the last act since the page was opened, where somebody else had acted meanwhile: what was to be acted on is then
 * gone from the page, and so is whatever would have shown the refusal.
 */
export function useOvertaken(surveyId: string): Problem | null {
  const [since] = useState(() => Date.now());
  const acts = useMutationState({
    filters: { mutationKey: actKey(surveyId) },
    select: ({ state }) => ({ error: state.error, at: state.submittedAt }),
  });
  const last = acts.at(-1);
  return last?.error instanceof Problem && last.error.status === 409 && last.at >= since ? last.error : null;
}

export function useDeclare(surveyId: string, onDeclared: () => void) {
  return useAct(surveyId, async (body: NewDeclaration) => {
    const declaration = await call(declareDraw, { params: { surveyId }, body });
    onDeclared();
    return declaration;
  });
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
