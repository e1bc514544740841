import type { SurveySettings } from "#shared/api/settings.ts";
import { checkLevel } from "#shared/estimate/level.ts";
import { Problem } from "#shared/problem.ts";
import { canonicalText } from "#shared/record/chain.ts";
import type { Context } from "../context.ts";
import { type Reader, writeTx } from "../db/open.ts";
import { fractionsInForce, updateSettings } from "../db/settings.ts";
import { actingMember } from "./acting-member.ts";
import { isTimeZone } from "./local-day.ts";
import { readSettings } from "./read-settings.ts";
import { recordEvent } from "./record-event.ts";

/**
 * Sets what a planner has set; the record tells what stood before and what stands now. Where nothing differs, nothing is
 * written. `expectSeen` refuses when these are not the settings that the planner saw.
 * @throws Problem `input-invalid` for a time zone nobody knows, a season that ends before it starts, a level that no limits
 *   can be computed for, a target or season that is not the survey's; `counts-not-whole`
 */
export function changeSettings(
  ctx: Context,
  wanted: SurveySettings,
  expectSeen: (current: SurveySettings) => void,
): SurveySettings {
  checkAlone(wanted);
  const memberId = actingMember(ctx);
  return writeTx(ctx.db, (tx) => {
    const before = readSettings(tx, ctx.surveyId);
    expectSeen(before);
    checkAgainst(tx, before, wanted);
    if (canonicalText(before) === canonicalText(wanted)) return before;
    updateSettings(tx, ctx.surveyId, wanted);
    recordEvent(tx, ctx, {
      surveyId: ctx.surveyId,
      at: ctx.now().toISOString(),
      memberId,
      kind: "settings-changed",
      payload: { version: 1, before, after: wanted },
    });
    return readSettings(tx, ctx.surveyId);
  });
}

function checkAlone({ timeZone, level, season }: SurveySettings): void {
  if (!isTimeZone(timeZone)) {
    throw new Problem("input-invalid", `“${timeZone}” is no time zone. Give one such as Europe/London.`);
  }
  checkLevel(Number(level));
  const { startsOn, endsOn } = season;
  if (startsOn !== null && endsOn !== null && endsOn < startsOn) {
    throw new Problem("input-invalid", `The season ends on ${endsOn}, before it starts on ${startsOn}.`);
  }
}

function checkAgainst(reader: Reader, before: SurveySettings, wanted: SurveySettings): void {
  if (wanted.season.id !== before.season.id) {
    throw new Problem("input-invalid", "This season is not the survey's season in work. Reload the settings.");
  }
  const ids = ({ targets }: SurveySettings) => targets.map((target) => target.id).join(" ");
  if (ids(wanted) !== ids(before)) {
    throw new Problem("input-invalid", "The targets are not those of the survey, in their order. Reload the settings.");
  }
  wanted.targets.forEach((target, place) => {
    if (!target.wholeNumbers || before.targets[place]?.wholeNumbers !== false) return;
    const fractions = fractionsInForce(reader, target.id);
    if (fractions === 0) return;
    const counts = fractions === 1 ? "One count has" : `${fractions} counts have`;
    throw new Problem(
      "counts-not-whole",
      `${counts} decimals. Amend ${fractions === 1 ? "it" : "them"} first, or leave the ${target.plural} measured.`,
    );
  });
}
