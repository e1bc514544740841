import * as api from "#shared/api/surveys.ts";
import type { Mount } from "../http/mount.ts";
import { presentListedSurvey, presentOtherSurvey, presentSurvey } from "../presenters/survey.ts";
import { createSurvey } from "../services/create-survey.ts";
import { listOtherSurveys, listSurveys, readSurvey } from "../services/read-surveys.ts";

export function surveyRoutes(mount: Mount): void {
  mount.signedIn(api.listSurveys, (ctx) => {
    const { surveys, installation } = listSurveys(ctx);
    return { surveys: surveys.map(presentListedSurvey), installation };
  });

  mount.signedIn(api.listOtherSurveys, (ctx) => ({
    surveys: listOtherSurveys(ctx.db, ctx.account.id).map(presentOtherSurvey),
  }));

  mount.signedIn(api.createSurvey, (ctx, { body }) =>
    presentSurvey(readSurvey(ctx.db, createSurvey(ctx, body), ctx.account.id)),
  );

  mount.survey(api.readSurvey, (ctx) => presentSurvey(readSurvey(ctx.db, ctx.surveyId, ctx.account.id)));
}
