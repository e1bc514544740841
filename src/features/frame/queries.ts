import { keepPreviousData, useMutation, useQuery, useQueryClient } from "@tanstack/react-query";
import { listFrames, saveDraftFrame, sealFrame, type FrameSpec } from "#shared/api/frame.ts";
import type { CellSpec } from "#shared/frame/cell-spec.ts";
import { call } from "../../api/call.ts";
import { foreverKey, surveyKey } from "../../api/keys.ts";
import { loadPlane, loadSealedCells, previewCells } from "../../workers/frame-preview.ts";
import type { FramePreviewResult, LoadedPlane, PlaneReference } from "../../workers/frame-preview-work.ts";

export function useFrames(surveyId: string) {
  return useQuery({
    queryKey: surveyKey(surveyId, "frame"),
    queryFn: ({ signal }) => call(listFrames, { params: { surveyId }, signal }),
    select: ({ frames }) => frames,
  });
}

/** A plane with what it is of, so that what is drawn on it can be told apart while another is on its way. */
export interface ShownPlane extends LoadedPlane {
  readonly areaId: string;
  readonly epsg: number;
}

/** The study area on a plane; asked of the worker, which keeps the rings. Nothing is asked while no system is chosen. */
export function usePlane(reference: PlaneReference | null) {
  return useQuery({
    queryKey: ["forever", reference?.surveyId, "plane", reference],
    queryFn: async (): Promise<ShownPlane> => {
      if (reference === null) throw new RangeError("no plane to load");
      const { areaId, epsg } = reference;
      return { ...(await loadPlane(reference)), areaId, epsg };
    },
    enabled: reference !== null,
    staleTime: Infinity,
    placeholderData: keepPreviousData,
  });
}

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

export function useSealedCells(surveyId: string, frameId: string) {
  return useQuery({
    queryKey: foreverKey(surveyId, "cells", frameId),
    queryFn: () => loadSealedCells(surveyId, frameId),
    staleTime: Infinity,
    structuralSharing: false,
  });
}

export function useSaveDraft(surveyId: string) {
  const queries = useQueryClient();
  return useMutation({
    meta: { keeps: true },
    mutationFn: (spec: FrameSpec) => call(saveDraftFrame, { params: { surveyId }, body: spec }),
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
export function useSealFrame(surveyId: string) {
  const queries = useQueryClient();
  return useMutation({
    meta: { keeps: true },
    mutationFn: async ({ spec, cells, signal }: SealRequest) => {
      const kept = await call(saveDraftFrame, { params: { surveyId }, body: spec, signal });
      const params = { surveyId, frameId: kept.id };
      return call(sealFrame, { params, body: { draftSha256: kept.draftSha256, cells }, signal });
    },
    onSettled: () => queries.invalidateQueries({ queryKey: surveyKey(surveyId) }),
  });
}
