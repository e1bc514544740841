import * as z from "zod/mini";
import { role, sha256Hex, utc } from "#shared/api/common.ts";

const count = z.int().check(z.nonnegative());

/** What a survey waits for, of one person and in one of their roles. */
export const waitingThing = z.discriminatedUnion("kind", [
  /** Planner: there is no study area. */
  z.object({ kind: z.literal("boundary"), role }),
  /** Planner: the frame is not sealed; null where no cells were chosen yet. */
  z.object({ kind: z.literal("sealing"), role, draft: z.nullable(z.int()) }),
  /** Planner: nothing is declared; the last draw was withdrawn, or null. */
  z.object({ kind: z.literal("declaring"), role, withdrawn: z.nullable(z.int()) }),
  /** Planner: declared, and not drawn. */
  z.object({ kind: z.literal("drawing"), role, declaredAt: utc, seedGiven: z.boolean() }),
  /** Planner: people who have not accepted; `expired` of them can't any more. */
  z.object({ kind: z.literal("invitations"), role, open: count, expired: count }),
  /** Planner, and lead: counts were written down after the newest estimate was kept. */
  z.object({ kind: z.literal("estimate-older"), role, keptAt: utc }),
  /** Lead: cells in nobody's list, of so many that are to be visited. */
  z.object({ kind: z.literal("not-shared-out"), role, cells: count, of: count }),
  /** Lead: somebody reported cells that can't be counted; closing them opens reserves. */
  z.object({ kind: z.literal("closing"), role, cells: count }),
  /** Lead: every cell in use has a count, and no estimate is kept. */
  z.object({ kind: z.literal("all-counted"), role, cells: count }),
  /** Counter: their own cells, and on which days; a day is what the lead wrote, "" where they wrote none. */
  z.object({
    kind: z.literal("own-cells"),
    role,
    cells: count,
    of: count,
    days: z.array(z.object({ day: z.string(), cells: count })),
  }),
  /** Auditor: the newest hash of the record, to be kept elsewhere; since something was sealed, drawn, withdrawn or estimated. */
  z.object({
    kind: z.literal("newest-hash"),
    role,
    because: z.enum(["sealed", "declared", "drawn", "withdrawn", "estimated"]),
    at: utc,
    sequence: count,
    sha256: sha256Hex,
  }),
]);
export type WaitingThing = z.infer<typeof waitingThing>;

/** What an installation waits for of its owners. */
export const ownersWaiting = z.object({
  mailsFailed: count,
  /** Kept because no SMTP server is configured, to be read and forwarded. */
  mailsKept: count,
  publicAddressMissing: z.boolean(),
  /** What the newest automatic copy failed of, or null. */
  backupError: z.nullable(z.string()),
});
export type OwnersWaiting = z.infer<typeof ownersWaiting>;
