import * as api from "#shared/api/settings.ts";
import type { Mount } from "../http/mount.ts";
import { presentSurvey } from "../presenters/survey.ts";
import { archiveSurvey, unarchiveSurvey } from "../services/archive-survey.ts";
import { changeSettings } from "../services/change-settings.ts";
import { copySurvey } from "../services/copy-survey.ts";
import { deleteSurvey } from "../services/delete-survey.ts";
import { readSettings } from "../services/read-settings.ts";
import { readSurvey } from "../services/read-surveys.ts";

export function settingsRoutes(mount: Mount): void {
  mount.survey(api.readSettings, (ctx) => readSettings(ctx.db, ctx.surveyId));

  mount.survey(api.changeSettings, (ctx, { body, expectSeen }) => changeSettings(ctx, body, expectSeen));

  mount.survey(api.archiveSurvey, (ctx) => {
    archiveSurvey(ctx);
    return presentSurvey(readSurvey(ctx.db, ctx.surveyId, ctx.account.id));
  });

  mount.survey(api.unarchiveSurvey, (ctx) => {
    unarchiveSurvey(ctx);
    return presentSurvey(readSurvey(ctx.db, ctx.surveyId, ctx.account.id));
  });

  mount.survey(api.deleteSurvey, (ctx, { body }) => {
    deleteSurvey(ctx, body.name);
    return {};
  });

  mount.survey(api.copySurvey, async (ctx, { body, signal }) => {
    const id = await copySurvey(ctx, body, signal);
    return presentSurvey(readSurvey(ctx.db, id, ctx.account.id));
  });
}
