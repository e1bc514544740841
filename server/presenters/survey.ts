import type { Role } from "#shared/access/table.ts";
import type { ListedSurvey, OtherSurvey, StageState, Survey, SurveySummary } from "#shared/api/surveys.ts";
import type { WaitingThing } from "#shared/api/waiting.ts";
import type { EventRow } from "../db/events.ts";
import type { SeasonRow, SurveyRow, TargetRow } from "../db/surveys.ts";

interface SurveyParts {
  readonly survey: SurveyRow;
  readonly seasons: readonly SeasonRow[];
  readonly targets: readonly TargetRow[];
  readonly roles: readonly Role[];
  readonly stages: readonly StageState[];
  readonly outline: SurveySummary["outline"];
  readonly memberId: string | null;
}

interface ListedSurveyParts extends SurveyParts {
  readonly newestEvent: EventRow | undefined;
  readonly waiting: readonly WaitingThing[];
}

function presentSurveySummary({ survey, seasons, targets, roles, stages, outline }: SurveyParts): SurveySummary {
  return {
    id: survey.id,
    name: survey.name,
    target: targets.map((target) => target.plural).join(", "),
    season: seasons.at(-1)?.name ?? "",
    roles: [...roles],
    stages: [...stages],
    outline,
    createdAt: survey.createdAt,
    archivedAt: survey.archivedAt,
  };
}

export function presentListedSurvey(parts: ListedSurveyParts): ListedSurvey {
  const { newestEvent, waiting } = parts;
  return {
    ...presentSurveySummary(parts),
    newestEvent: newestEvent ? { sequence: newestEvent.sequence, at: newestEvent.at } : null,
    waiting: [...waiting],
  };
}

export function presentSurvey(parts: SurveyParts): Survey {
  const { survey } = parts;
  return {
    ...presentSurveySummary(parts),
    timeZone: survey.timeZone,
    level: survey.level,
    safetyNotes: survey.safetyNotes,
    seasons: parts.seasons.map(({ id, name, position }) => ({ id, name, position })),
    targets: parts.targets.map(({ id, singular, plural, countingRule, wholeNumbers }) => ({
      id,
      singular,
      plural,
      countingRule,
      wholeNumbers,
    })),
    memberId: parts.memberId,
  };
}

/** What an owner without a role is told of a survey: enough to find it. */
export function presentOtherSurvey({ id, name, createdAt }: SurveyRow): OtherSurvey {
  return { id, name, createdAt };
}
