import { keepPreviousData, useQuery } from "@tanstack/react-query";
import type { FrameVersion } from "#shared/api/frame.ts";
import { useFrames } from "../api/frames.ts";
import { foreverKey } from "../api/keys.ts";
import { loadPlane, loadSealedCells } from "../workers/frame-preview.ts";
import type { LoadedPlane, PlaneReference } from "../workers/frame-preview-work.ts";

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

export function useSealedCells(surveyId: string, frameId: string | null) {
  return useQuery({
    queryKey: foreverKey(surveyId, "cells", frameId ?? ""),
    queryFn: () => {
      if (frameId === null) throw new RangeError("no frame to load");
      return loadSealedCells(surveyId, frameId);
    },
    enabled: frameId !== null,
    staleTime: Infinity,
    structuralSharing: false,
  });
}

/** What a map of drawn cells stands on: a sealed frame version, its plane and its cells, as far as they have come. */
export function useFrameGround(surveyId: string, frameId: string | null) {
  const frames = useFrames(surveyId);
  const frame: FrameVersion | null = frames.data?.find(({ id }) => id === frameId) ?? null;
  const plane = usePlane(
    frame === null ? null : { surveyId, areaId: frame.spec.areaId, epsg: frame.spec.epsg, mayMake: false },
  );
  const cells = useSealedCells(surveyId, frame === null ? null : frame.id);
  const shown = plane.data !== undefined && !plane.isPlaceholderData ? plane.data : null;
  return { frame, plane: shown, cells: cells.data ?? null, error: frames.error ?? plane.error ?? cells.error };
}
