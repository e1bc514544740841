import { keepPreviousData, useMutation, useQuery, useQueryClient } from "@tanstack/react-query";
import * as z from "zod/mini";
import { draftNow, saveDraftFrame, sealFrame, type FrameSpec } from "#shared/api/frame.ts";
import type { CellSpec } from "#shared/frame/cell-spec.ts";
import { call } from "../../api/call.ts";
import { surveyKey } from "../../api/keys.ts";
import { problemOf } from "../../api/problem-of.ts";
import { previewCells } from "../../workers/frame-preview.ts";
import type { FramePreviewResult, PlaneReference } from "../../workers/frame-preview-work.ts";

/** Figures and cells with the size and plane that they are of. */
export interface ShownPreview extends FramePreviewResult {
  readonly spec: CellSpec;
  readonly areaId: string;
  readonly epsg: number;
}

/** What a size and origin come to under each preset; the figures before stay until the new ones are there. */
export function useFramePreview(reference: PlaneReference | null, spec: CellSpec | null) {
  return useQuery({
    queryKey: ["forever", reference?.surveyId, "preview", reference, spec],
    queryFn: async (): Promise<ShownPreview> => {
      if (spec === null || reference === null) throw new RangeError("no cells to preview");
      const { areaId, epsg } = reference;
      return { ...(await previewCells(reference, spec)), spec, areaId, epsg };
    },
    enabled: spec !== null && reference !== null,
    staleTime: Infinity,
    gcTime: 10_000,
    placeholderData: keepPreviousData,
    structuralSharing: false,
  });
}

/** Drafts and sealing reach the server one after another: an earlier draft never arrives last. */
const inTurn = (surveyId: string) => ({ id: `frame of ${surveyId}` });

/** The draft that the settings on the page began with, by its hash; it moves on with each draft that is kept. */
export interface SeenDraft {
  current: string | null;
}

async function keep(surveyId: string, spec: FrameSpec, seen: SeenDraft, signal?: AbortSignal) {
  const body = { spec, seen: seen.current };
  const kept = await call(saveDraftFrame, { params: { surveyId }, body, signal });
  seen.current = kept.draftSha256;
  return kept;
}

export type DraftNow = NonNullable<z.infer<typeof draftNow>>;

/** What is kept now, where another planner has changed the draft meanwhile: null where it was sealed; undefined for any other failure. */
export function draftMeanwhile(...errors: readonly unknown[]): DraftNow | null | undefined {
  const told = errors.map((error) => (error === null ? null : problemOf(error)));
  const problem = told.find((one) => one?.code === "changed-meanwhile");
  return problem ? z.safeParse(draftNow, problem.question?.["current"]).data : undefined;
}

export function useSaveDraft(surveyId: string, seen: SeenDraft) {
  const queries = useQueryClient();
  return useMutation({
    scope: inTurn(surveyId),
    meta: { keeps: true },
    mutationFn: (spec: FrameSpec) => keep(surveyId, spec, seen),
    onSuccess: () => queries.invalidateQueries({ queryKey: surveyKey(surveyId) }),
  });
}

export interface SealRequest {
  readonly spec: FrameSpec;
  /** What the planner sees on the page. */
  readonly cells: number;
  readonly signal: AbortSignal;
}

/** Keeps the draft as it is on the page, then seals exactly that. */
export function useSealFrame(surveyId: string, seen: SeenDraft) {
  const queries = useQueryClient();
  return useMutation({
    scope: inTurn(surveyId),
    meta: { keeps: true },
    mutationFn: async ({ spec, cells, signal }: SealRequest) => {
      const kept = await keep(surveyId, spec, seen, signal);
      const params = { surveyId, frameId: kept.id };
      return call(sealFrame, { params, body: { draftSha256: kept.draftSha256, cells }, signal });
    },
    onSettled: () => queries.invalidateQueries({ queryKey: surveyKey(surveyId) }),
  });
}
