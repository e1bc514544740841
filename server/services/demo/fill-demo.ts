import type { CrsChoice } from "#shared/api/area.ts";
import { EDGE_PRESETS } from "#shared/frame/cell-spec.ts";
import { measureCells } from "#shared/frame/measure.ts";
import { summarise } from "#shared/frame/summary.ts";
import { ringsFromJson } from "#shared/geometry/rings.ts";
import { WHOLE_CELL } from "#shared/units/metric.ts";
import type { Context, Platform } from "../../context.ts";
import type { PlaneRow } from "../../db/areas.ts";
import { addPerson } from "../add-person.ts";
import { amendCount } from "../amend-count.ts";
import { assignVisits } from "../assign-visits.ts";
import { closePick } from "../close-pick.ts";
import { createAccount } from "../create-account.ts";
import { createSurvey } from "../create-survey.ts";
import { declareDraw } from "../declare-draw.ts";
import { enterCounts } from "../enter-counts.ts";
import { firstTarget } from "../first-target.ts";
import { exportWaypoints } from "../export-waypoints.ts";
import { importArea } from "../import-area.ts";
import { makeDraw } from "../make-draw.ts";
import { makePlane } from "../make-plane.ts";
import { listVisits, type VisitView } from "../read-visits.ts";
import { saveDraftFrame } from "../save-draft-frame.ts";
import { sealFrame } from "../seal-frame.ts";
import { heathFile } from "./heath.ts";
import { moundsAt } from "./mounds.ts";
import type { DemoAccount } from "./people.ts";
import { Story } from "./story.ts";

const PICKS = 40;
const RESERVES = 8;
/** Cells that are counted when somebody opens the demo; the rest is left for them. */
const COUNTED = 20;
const CELL_MM = 20_000;

const never = new AbortController().signal;

/**
 * Plays a survey of a made-up heath through the services that people use, over the fortnight before now: boundary, sealed
 * frame, draw with repeats, cells shared out, half of them counted, one closed as unsafe and its reserve opened.
 */
export async function fillDemo(platform: Platform, accounts: readonly DemoAccount[]): Promise<void> {
  const story = new Story(platform);
  story.at(1, "08:05");
  for (const { name, email, password, role } of accounts) {
    await createAccount(story.platform, { name, email, password, isOwner: role === "owner" });
  }
  const surveyId = beginSurvey(story);
  const plane = await bringBoundary(story, surveyId);
  const frameId = await sealGrid(story, surveyId, plane);
  await drawCells(story, surveyId, frameId);
  await shareOut(story, surveyId);
  countHalf(story, surveyId);
}

function beginSurvey(story: Story): string {
  story.at(1, "08:40");
  const surveyId = createSurvey(story.visitor("planner"), {
    name: "Brannet Heath",
    targetSingular: "ant mound",
    targetPlural: "ant mounds",
    countingRule:
      "Every mound of the yellow meadow ant that is at least 10 cm high and whose middle lies inside the cell and inside the boundary.",
    wholeNumbers: true,
    seasonName: story.iso().slice(0, 4),
    timeZone: "Europe/London",
    safetyNotes:
      "The north bank of the pond is undercut: keep two metres away. Adders in the bracken in warm weather. Nobody works alone after sunset; tell the lead when you leave the heath.",
  });
  for (const role of ["lead", "counter", "auditor"] as const) {
    story.later(3);
    addPerson(story.context("planner", surveyId), { email: story.visitor(role).account.email, role });
  }
  return surveyId;
}

async function bringBoundary(story: Story, surveyId: string): Promise<PlaneRow> {
  story.at(1, "09:30");
  const area = await importArea(story.context("planner", surveyId), heathFile(), {}, never);
  const [best] = area.suggestedCrs as CrsChoice[];
  if (!best) throw new Error("no projected system was suggested for the heath");
  return makePlane(story.context("planner", surveyId), area.id, best.epsg, never);
}

async function sealGrid(story: Story, surveyId: string, plane: PlaneRow): Promise<string> {
  story.at(2, "14:20");
  const planner = story.context("planner", surveyId);
  const cells = {
    shape: "rectangle",
    widthMm: CELL_MM,
    heightMm: CELL_MM,
    originEastMm: 0,
    originNorthMm: 0,
    rotationMicroDegrees: 0,
  } as const;
  const { membership, countIn } = EDGE_PRESETS.clip;
  const spec = { areaId: plane.areaVersionId, epsg: plane.epsg, cells, membership, countIn, leftOut: [] };
  const draft = saveDraftFrame(planner, spec, null);
  story.later(25);
  const measured = measureCells(ringsFromJson(JSON.parse(plane.rings)), cells);
  const seen = { draftSha256: draft.draftSha256, cells: summarise(measured, membership, countIn).cells };
  const sealed = await sealFrame(story.context("planner", surveyId), draft.id, seen, never);
  return sealed.id;
}

async function drawCells(story: Story, surveyId: string, frameId: string): Promise<void> {
  story.at(3, "10:10");
  const declarationId = declareDraw(story.context("planner", surveyId), {
    frameId,
    design: { kind: "srs-wr", n: PICKS },
    generator: "sha256-counter",
    reserves: RESERVES,
    limits: "log-normal",
    level: "0.95",
    seedSource: "made-here",
    note: "",
  });
  story.later(2);
  await makeDraw(story.context("planner", surveyId), declarationId, undefined, never);
}

/** The first half of the cells in draw order goes to the counter, the rest to the lead; then waypoints for both. */
async function shareOut(story: Story, surveyId: string): Promise<void> {
  story.at(4, "09:00");
  const lead = story.context("lead", surveyId);
  const ids = listVisits(lead).visits.map(({ visit }) => visit.id);
  const half = Math.ceil(ids.length / 2);
  const counter = story.context("counter", surveyId).memberId;
  assignVisits(lead, { visitIds: ids.slice(0, half), memberId: counter, day: "First week", seen: [] });
  story.later(2);
  assignVisits(lead, { visitIds: ids.slice(half), memberId: lead.memberId, day: "Second week", seen: [] });
  story.later(20);
  const wanted = { format: "gpx", nameLength: 8, prefix: "", memberId: null } as const;
  await exportWaypoints(story.context("lead", surveyId), wanted, never);
}

function countHalf(story: Story, surveyId: string): void {
  const cells = listVisits(story.context("counter", surveyId)).visits;
  const [unsafe] = cells.slice(6, 7);
  let counted = 0;
  for (const [place, cell] of cells.entries()) {
    if (place % 5 === 0) story.at(6 + Math.floor(place / 5), "08:20");
    story.later(11 + (place % 3) * 4);
    if (cell === unsafe) closeAsUnsafe(story, surveyId, cell);
    else if (counted < COUNTED) {
      enterOne(story, surveyId, cell);
      counted += 1;
    }
  }
  amendOne(story, surveyId, cells);
}

function enterOne(story: Story, surveyId: string, { visit, centre, shareBillionths }: VisitView): void {
  const ctx = story.context("counter", surveyId);
  const mounds = moundsAt(visit.unit, centre, shareBillionths / WHOLE_CELL);
  enterCounts(ctx, [
    {
      id: story.uuid(),
      visitId: visit.id,
      targetId: targetOf(ctx),
      said: { state: "counted", value: mounds },
      note: mounds > 8 ? "Many close together; counted in four strips." : "",
      madeAt: story.iso(),
    },
  ]);
}

function closeAsUnsafe(story: Story, surveyId: string, { visit }: VisitView): void {
  closePick(story.context("lead", surveyId), visit.id, {
    id: story.uuid(),
    state: "unsafe",
    reason: "Wasps' nest in the bracken; the cell cannot be walked until it is gone.",
  });
}

/** One count is put right on the twelfth day; the old number stays. */
function amendOne(story: Story, surveyId: string, cells: readonly VisitView[]): void {
  story.at(12, "16:45");
  const lead = story.context("lead", surveyId);
  const known = new Map(listVisits(lead).visits.map((view) => [view.visit.id, view.count]));
  const found = cells.find(({ visit }) => (known.get(visit.id)?.value ?? 0) >= 3);
  const count = found && known.get(found.visit.id);
  if (!found || count?.value == null) throw new Error("no cell of the demo holds three mounds");
  amendCount(lead, found.visit.id, {
    id: story.uuid(),
    targetId: count.targetId,
    replaces: count.id,
    said: { state: "counted", value: count.value - 1 },
    note: "",
    reason: "One mound was counted twice; seen on the photo.",
    madeAt: story.iso(),
  });
}

function targetOf(ctx: Context): string {
  return firstTarget(ctx.db, ctx.surveyId).id;
}
