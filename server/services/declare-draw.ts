import { type Declaration, declaration, DECLARATION_FORMAT, declarationSha256 } from "#shared/draw/declaration.ts";
import { checkDesign, type Design } from "#shared/draw/design.ts";
import type { GeneratorName } from "#shared/draw/generator.ts";
import { checkLevel } from "#shared/estimate/level.ts";
import { Problem } from "#shared/problem.ts";
import { canonicalText } from "#shared/record/chain.ts";
import type { Context } from "../context.ts";
import { insertDeclaration, liveDraw, openDeclaration } from "../db/draws.ts";
import { findFrameHead } from "../db/frames.ts";
import { type Reader, writeTx } from "../db/open.ts";
import { currentSeason } from "../db/surveys.ts";
import { actingMember } from "./acting-member.ts";
import { newId } from "./new-id.ts";
import { recordEvent } from "./record-event.ts";
import { redrawReason } from "./redraw-reason.ts";

interface Wanted {
  readonly frameId: string;
  readonly design: Design;
  readonly generator: GeneratorName;
  readonly reserves: number;
  readonly limits: Declaration["limits"];
  readonly level: string;
  readonly seedSource: Declaration["seedSource"]["kind"];
  readonly note: string;
}

/**
 * Says what will be drawn and how, before the seed exists (rule R7): one open declaration a survey and season. Its event
 * is sealed here; the seed comes after. Returns the declaration's id.
 */
export function declareDraw(ctx: Context, wanted: Wanted): string {
  const memberId = actingMember(ctx);
  return writeTx(ctx.db, (tx) => {
    const seasonId = currentSeason(tx, ctx.surveyId).id;
    const frame = sealedFrame(tx, ctx.surveyId, wanted.frameId);
    expectFreeSeason(tx, seasonId);
    if (wanted.note === "") expectNoReasonNeeded(tx, ctx);
    checkDesign(wanted.design, frame.units, wanted.reserves);
    checkLevel(Number(wanted.level));
    const declared = checked({
      format: DECLARATION_FORMAT,
      surveyId: ctx.surveyId,
      seasonId,
      frameSha256: frame.frameSha256,
      design: wanted.design,
      generator: wanted.generator,
      reserves: wanted.reserves,
      limits: wanted.limits,
      level: wanted.level,
      seedSource: { kind: wanted.seedSource },
      note: wanted.note,
    });
    const id = newId(ctx);
    const at = ctx.now().toISOString();
    const sha256 = declarationSha256(declared);
    insertDeclaration(tx, {
      id,
      surveyId: ctx.surveyId,
      seasonId,
      frameVersionId: wanted.frameId,
      text: canonicalText(declared),
      sha256,
      declaredBy: memberId,
      declaredAt: at,
    });
    recordEvent(tx, ctx, {
      surveyId: ctx.surveyId,
      at,
      memberId,
      kind: "draw-declared",
      payload: { version: 1, declarationId: id, declarationSha256: sha256, frameId: wanted.frameId },
    });
    return id;
  });
}

function sealedFrame(reader: Reader, surveyId: string, frameId: string): { units: number; frameSha256: string } {
  const frame = findFrameHead(reader, frameId);
  if (frame?.surveyId !== surveyId) {
    throw new Problem("not-found", "This frame is not in the survey: choose one of its frame versions.");
  }
  const { units, frameSha256 } = frame;
  if (units === null || frameSha256 === null) {
    throw new Problem(
      "frame-not-sealed",
      `Seal frame version ${frame.number} first: cells are drawn from a sealed frame.`,
    );
  }
  return { units, frameSha256 };
}

function expectFreeSeason(reader: Reader, seasonId: string): void {
  const open = openDeclaration(reader, seasonId);
  if (open) {
    const { declaredAt } = open.declaration;
    throw new Problem(
      "declaration-open",
      `One was declared at ${declaredAt}. Draw from it, or abandon it with a reason.`,
    );
  }
  const live = liveDraw(reader, seasonId);
  if (live) {
    throw new Problem("draw-live", `Draw ${live.draw.number} is in use. Withdraw it with a reason before a new one.`);
  }
}

const REASONS_ASKED = {
  "waypoints-exported": "Waypoints of an earlier draw were exported.",
  "third-draw-in-a-day": "Two seeds were given in this survey within the last 24 hours; all draws stay on record.",
} as const;

function expectNoReasonNeeded(reader: Reader, ctx: Context): void {
  const asked = redrawReason(reader, ctx.surveyId, ctx.now());
  if (asked === null) return;
  throw new Problem("reason-needed", `${REASONS_ASKED[asked]} Say in the note why cells are drawn again.`);
}

/** @throws Problem `input-invalid` for what a declaration can't hold. */
function checked(declared: Declaration): Declaration {
  const result = declaration.safeParse(declared);
  if (result.success) return result.data;
  const [issue] = result.error.issues;
  const field = issue?.path.join(".") ?? "declaration";
  throw new Problem("input-invalid", `${field}: ${issue?.message ?? "not valid"}. Correct it and declare again.`);
}
