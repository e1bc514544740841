import * as z from "zod/mini";
import { id, none, reason, surveyParams, utc, uuid } from "#shared/api/common.ts";
import { contract, json, stream } from "#shared/api/contract.ts";

export const visitState = z.enum(["counted", "not-in-population", "refused", "unsafe", "not-reached", "lost"]);
export const closingState = z.enum(["refused", "unsafe", "not-reached", "lost"]);

/** The count in force for one target at one cell: never a number without its state. */
export const currentCount = z.discriminatedUnion("state", [
  z.object({ state: z.literal("not-visited") }),
  z.object({
    state: z.literal("counted"),
    value: z.number(),
    entryId: uuid,
    by: z.string(),
    at: utc,
    note: z.string(),
    amended: z.boolean(),
  }),
  z.object({
    state: z.enum(["not-in-population", "refused", "unsafe", "not-reached", "lost"]),
    entryId: uuid,
    by: z.string(),
    at: utc,
    note: z.string(),
    amended: z.boolean(),
  }),
]);
export type CurrentCount = z.infer<typeof currentCount>;

/** One cell to visit in the season, however often it was picked. */
export const visit = z.object({
  id,
  unit: z.int(),
  column: z.int(),
  row: z.int(),
  label: z.string(),
  shareBillionths: z.int(),
  /** Positions in the draw that hold this cell and are in use or closed, in draw order; more than one is a repeat. */
  orders: z.array(z.int()),
  /** Picks in use / closed by a lead. */
  state: z.enum(["in-use", "closed"]),
  openedFor: z.nullable(z.int()),
  /** Plane metres and WGS 84 degrees of the centre. */
  centre: z.object({ eastM: z.number(), northM: z.number(), lng: z.number(), lat: z.number() }),
  assignedTo: z.nullable(z.object({ memberId: id, name: z.string(), day: z.string() })),
  count: currentCount,
});
export type Visit = z.infer<typeof visit>;

export const listVisits = contract({
  name: "listVisits",
  method: "GET",
  path: "/api/surveys/:surveyId/visits",
  guard: "survey.see",
  summary: "The cells to visit, in draw order; a counter sees their own",
  params: surveyParams,
  query: none,
  body: none,
  answer: json(
    z.object({
      drawId: z.nullable(id),
      frameId: z.nullable(id),
      targetId: id,
      visits: z.array(visit),
      picks: z.int(),
      reservesLeft: z.int(),
      /** The longest run of picks from the first that is settled: counted or closed. */
      completePrefix: z.int(),
    }),
  ),
});

/** Who has a cell, as somebody saw it. */
export const seenAssignment = z.object({ visitId: id, memberId: id, day: z.string() });

/** What a refusal "changed-meanwhile" of sharing out holds as `current`: the cells that are not as they were seen. */
export const assignmentsNow = z.array(
  z.object({
    visitId: id,
    label: z.string(),
    assignedTo: z.nullable(z.object({ memberId: id, name: z.string(), day: z.string() })),
  }),
);
export type AssignmentsNow = z.infer<typeof assignmentsNow>;

export const assignVisits = contract({
  name: "assignVisits",
  method: "POST",
  path: "/api/surveys/:surveyId/assignments",
  guard: "field.assign",
  summary: "Give cells to a member for a day, or take them back; refused where another has them than was seen",
  params: surveyParams,
  query: none,
  body: z.object({
    visitIds: z.array(id).check(z.minLength(1), z.maxLength(5000)),
    memberId: z.nullable(id),
    day: z.string().check(z.trim(), z.maxLength(60)),
    /** Who had these cells when they were chosen; a cell that is not named here was seen with nobody. */
    seen: z._default(z.array(seenAssignment).check(z.maxLength(5000)), []),
  }),
  answer: json(z.object({ assigned: z.int() })),
});

export const closePick = contract({
  name: "closePick",
  method: "POST",
  path: "/api/surveys/:surveyId/visits/:visitId/close",
  guard: "field.close",
  summary: "Say why a cell can't be counted; opens the next reserve for each pick of the cell",
  params: z.object({ surveyId: id, visitId: id }),
  query: none,
  body: z.object({ id: uuid, state: closingState, reason }),
  answer: json(
    z.object({
      closed: z.array(z.int()),
      opened: z.array(z.object({ position: z.int(), label: z.string(), repeatsCountedCell: z.boolean() })),
      passedOver: z.array(z.int()),
      reservesLeft: z.int(),
      /** Picks that found no reserve left. */
      unreplaced: z.int(),
    }),
  ),
});

export const exportWaypoints = contract({
  name: "exportWaypoints",
  method: "POST",
  path: "/api/surveys/:surveyId/waypoint-exports",
  guard: "field.export",
  summary: "Waypoints of the cells to visit, one a cell, as GPX 1.1 or CSV",
  params: surveyParams,
  query: none,
  body: z.object({
    format: z.enum(["gpx", "csv"]),
    nameLength: z.int().check(z.minimum(4), z.maximum(30)),
    /** What a waypoint is named by; the cell's label where nothing is said. */
    scheme: z.optional(z.enum(["label", "unit", "order"])),
    prefix: z.string().check(z.trim(), z.maxLength(8), z.regex(/^[A-Za-z0-9]*$/, "holds letters and digits only")),
    /** Only the cells of this member, or null for all. */
    memberId: z.nullable(id),
  }),
  answer: stream("application/gpx+xml", "text/csv"),
});
