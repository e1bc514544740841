import { queryOptions, useMutation, useQuery, useQueryClient } from "@tanstack/react-query";
import type * as z from "zod/mini";
import {
  archiveSurvey,
  changeSettings,
  copySurvey,
  deleteSurvey,
  readSettings,
  type SurveySettings,
  unarchiveSurvey,
} from "#shared/api/settings.ts";
import { call, callVersioned } from "../../api/call.ts";
import { surveyKey, surveysKey } from "../../api/keys.ts";

function settingsQuery(surveyId: string) {
  return queryOptions({
    queryKey: surveyKey(surveyId, "settings"),
    queryFn: ({ signal }) => callVersioned(readSettings, { params: { surveyId }, signal }),
  });
}

export function useSettings(surveyId: string) {
  return useQuery(settingsQuery(surveyId));
}

interface Change {
  readonly settings: SurveySettings;
  /** The version that was seen when the writing began. */
  readonly version: string;
}

export function useChangeSettings(surveyId: string) {
  const queries = useQueryClient();
  return useMutation({
    meta: { keeps: true },
    mutationFn: ({ settings, version }: Change) =>
      callVersioned(changeSettings, { params: { surveyId }, body: settings, version }),
    onSuccess: (kept) => {
      queries.setQueryData(settingsQuery(surveyId).queryKey, kept);
      void queries.invalidateQueries({ queryKey: surveyKey(surveyId) });
      void queries.invalidateQueries({ queryKey: surveysKey });
    },
  });
}

/** Into the archive (true) or out of it. */
export function useArchive(surveyId: string) {
  const queries = useQueryClient();
  return useMutation({
    meta: { keeps: true },
    mutationFn: (archive: boolean) => call(archive ? archiveSurvey : unarchiveSurvey, { params: { surveyId } }),
    onSuccess: async () => {
      void queries.invalidateQueries({ queryKey: surveysKey });
      await queries.invalidateQueries({ queryKey: surveyKey(surveyId) });
    },
  });
}

export function useCopySurvey(surveyId: string) {
  const queries = useQueryClient();
  return useMutation({
    mutationFn: (body: z.input<typeof copySurvey.body>) => call(copySurvey, { params: { surveyId }, body }),
    onSuccess: (made) => {
      queries.setQueryData(surveyKey(made.id), made);
      void queries.invalidateQueries({ queryKey: surveysKey });
    },
  });
}

export function useDeleteSurvey(surveyId: string) {
  const queries = useQueryClient();
  return useMutation({
    mutationFn: (name: string) => call(deleteSurvey, { params: { surveyId }, body: { name } }),
    onSuccess: () => queries.invalidateQueries({ queryKey: surveysKey }),
  });
}
