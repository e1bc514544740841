import type { Platform } from "../context.ts";
import { openHolders } from "../db/members.ts";
import { type EventStep, eventStepsSince } from "../db/events.ts";
import { newestMailAt } from "../db/mails.ts";
import { writeTx } from "../db/open.ts";
import { allSurveys, type SurveyRow } from "../db/surveys.ts";
import { WITNESS_DAY } from "../mail/templates/witness.ts";
import { localDay } from "./local-day.ts";
import { type Happening, tellAuditors, type Telling } from "./tell-auditors.ts";

type Place = Telling & Pick<Platform, "db">;

/** No day is longer, whatever the clocks are put back by. */
const LONGEST_DAY_MS = 26 * 3600_000;

/**
 * Tells the auditors of each survey of each day with counts, once that day is over on the survey's clock, with the hash that
 * the record ended the day with. Told are those who were auditors before the day was over; each once.
 */
export function tellCountDays(platform: Place): void {
  for (const survey of allSurveys(platform.db)) tellDaysOf(platform, survey);
}

function tellDaysOf(platform: Place, { id: surveyId, timeZone }: SurveyRow): void {
  const since = firstToLookAt(platform, surveyId);
  if (since === null) return;
  const today = localDay(platform.now().toISOString(), timeZone);
  const over = [...byDay(eventStepsSince(platform.db, surveyId, since), timeZone)].filter(([day]) => day < today);
  // All days in one transaction: the next round only looks at what came after the newest of these mails.
  writeTx(platform.db, (tx) => {
    for (const [day, steps] of over) {
      const counts = steps.filter(({ kind }) => kind === "count-entered" || kind === "count-amended").length;
      const last = steps.at(-1);
      if (counts === 0 || !last) continue;
      tellAuditors(tx, platform, { surveyId, ...last }, happening(day, counts, timeZone), {
        only: (auditor) => localDay(auditor.since, timeZone) <= day,
        about: `counts of ${day} in ${surveyId}`,
      });
    }
  });
}

/** Before it every day was told, or there was no auditor; null while there is none. */
function firstToLookAt({ db }: Place, surveyId: string): string | null {
  const first = openHolders(db, surveyId, "auditor")[0];
  if (!first) return null;
  const told = newestMailAt(db, surveyId, WITNESS_DAY);
  const from = told !== null && told > first.since ? told : first.since;
  return new Date(Date.parse(from) - LONGEST_DAY_MS).toISOString();
}

function byDay(steps: readonly EventStep[], timeZone: string): Map<string, EventStep[]> {
  const dayOf = rememberedByQuarterHour((at) => localDay(at, timeZone));
  const days = new Map<string, EventStep[]>();
  for (const step of steps) {
    const day = dayOf(step.at);
    const there = days.get(day);
    if (there) there.push(step);
    else days.set(day, [step]);
  }
  return days;
}

/** Clocks of all zones differ from UTC by whole quarters of an hour, and asking a zone takes a while. */
function rememberedByQuarterHour(dayOf: (at: string) => string): (at: string) => string {
  const known = new Map<string, string>();
  return (at) => {
    const quarter = `${at.slice(0, 14)}${Math.floor(Number(at.slice(14, 16)) / 15)}`;
    const day = known.get(quarter) ?? dayOf(at);
    known.set(quarter, day);
    return day;
  };
}

function happening(day: string, counts: number, timeZone: string): Happening {
  const number = counts === 1 ? "one count was" : `${counts} counts were`;
  return { inBrief: `counts of ${day}`, happened: `${number} entered or amended on ${day} (${timeZone})` };
}
