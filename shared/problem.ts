/**
 * Every refusal the product can give. A code is a promise to users of the API: add, never rename.
 * Keep them in the order of the layer words.
 */
export const PROBLEMS = {
  // any
  "input-invalid": { status: 400, title: "Some of the input cannot be used" },
  "not-found": { status: 404, title: "There is nothing at this address" },
  "too-large": { status: 413, title: "This is larger than Quillet reads" },
  "changed-meanwhile": { status: 412, title: "Someone else changed this meanwhile" },
  "version-missing": { status: 428, title: "It is not said which version is changed" },
  "too-many-requests": { status: 429, title: "Too many attempts" },
  "cross-origin": { status: 403, title: "The request came from another site" },
  internal: { status: 500, title: "Quillet failed" },
  unreachable: { status: 503, title: "The server cannot be reached" },
  cancelled: { status: 409, title: "The work was cancelled" },
  "already-served": { status: 409, title: "Two servers cannot share one database" },
  "database-missing": { status: 404, title: "There is no database here" },
  "database-newer": { status: 409, title: "This database is newer than this Quillet" },
  "backup-exists": { status: 409, title: "There is a file of this name" },
  "backup-unusable": { status: 422, title: "This backup cannot be used" },
  // accounts
  "not-signed-in": { status: 401, title: "Nobody is signed in" },
  "sign-in-refused": { status: 401, title: "This address and password do not belong together" },
  "not-allowed": { status: 403, title: "Your role does not allow this" },
  "account-exists": { status: 409, title: "There is already an account with this address" },
  "password-too-short": { status: 422, title: "The password is too short" },
  "password-common": { status: 422, title: "This password is one of the first that are tried" },
  "password-wrong": { status: 422, title: "This is not the present password" },
  "link-ended": { status: 410, title: "This link no longer works" },
  "mail-not-sendable": { status: 409, title: "This mail cannot be sent again" },
  "account-closed": { status: 409, title: "This account is closed" },
  "last-owner": { status: 409, title: "An installation needs an owner" },
  // surveys
  "survey-not-found": { status: 404, title: "There is no such survey here" },
  "survey-archived": { status: 409, title: "This survey is archived" },
  "last-planner": { status: 409, title: "A survey needs a planner" },
  "name-differs": { status: 422, title: "The name is not the survey's" },
  "counts-not-whole": { status: 409, title: "Some counts are no whole numbers" },
  "invitation-exists": { status: 409, title: "This person is invited already" },
  "member-exists": { status: 409, title: "This person holds this role already" },
  "account-not-found": { status: 404, title: "There is no account with this address" },
  // area
  "file-empty": { status: 422, title: "This file is empty" },
  "file-unknown": { status: 422, title: "This kind of file is not read" },
  "file-damaged": { status: 422, title: "The file is damaged" },
  "file-unsafe": { status: 422, title: "The file is refused" },
  "area-question": { status: 422, title: "The file leaves something open" },
  "area-none": { status: 422, title: "There is no area in this file" },
  "area-size": { status: 422, title: "The size of this area is hardly right" },
  "area-missing": { status: 422, title: "There is no study area yet" },
  "rings-cross": { status: 422, title: "The boundary crosses itself" },
  "parts-overlap": { status: 422, title: "Parts of the area overlap" },
  "coordinates-swapped": { status: 422, title: "Latitude and longitude look swapped" },
  "crs-unknown": { status: 422, title: "This coordinate reference system is not known" },
  "crs-unsupported": { status: 422, title: "This coordinate reference system cannot be converted exactly" },
  // frame
  "cell-size": { status: 422, title: "This cell size cannot be used" },
  "frame-too-large": { status: 422, title: "The frame would hold too many cells" },
  "frame-empty": { status: 422, title: "The frame has no cells" },
  "frame-changed": { status: 409, title: "The frame changed while you were looking at it" },
  "frame-already-sealed": { status: 409, title: "This frame is sealed and never changes" },
  "frame-not-sealed": { status: 409, title: "The frame is not sealed" },
  "statement-invalid": { status: 422, title: "This is not a frame statement" },
  // draw
  "design-invalid": { status: 422, title: "This design cannot be drawn" },
  "seed-invalid": { status: 422, title: "This seed cannot be used" },
  "declaration-open": { status: 409, title: "A declaration is open" },
  "declaration-closed": { status: 409, title: "This declaration is closed" },
  "declaration-missing": { status: 409, title: "Nothing is declared" },
  "draw-live": { status: 409, title: "A draw is live" },
  "draw-missing": { status: 409, title: "No cells are drawn" },
  "draw-withdrawn": { status: 409, title: "This draw is withdrawn" },
  "reason-needed": { status: 422, title: "A reason is needed" },
  // field
  "cell-not-drawn": { status: 422, title: "This cell is not drawn" },
  "nothing-to-export": { status: 409, title: "There is no cell to export" },
  "names-clash": { status: 422, title: "Waypoint names clash" },
  "pick-not-in-use": { status: 409, title: "This pick is not in use" },
  // counts
  "count-invalid": { status: 422, title: "This count cannot be used" },
  "count-exists": { status: 409, title: "This cell has a count" },
  "count-missing": { status: 409, title: "This cell has no count yet" },
  "table-unreadable": { status: 422, title: "This table cannot be read" },
  "table-changed": { status: 409, title: "The table is not the one that was judged" },
  // estimate
  "estimate-impossible": { status: 409, title: "There is no estimate yet" },
  // record
  "record-invalid": { status: 422, title: "This is not a record file" },
} as const satisfies Record<string, { status: number; title: string }>;

export type ProblemCode = keyof typeof PROBLEMS;

/** A question that an answer in the next request settles; its shape belongs to the word that asks (area/questions.ts). */
export type Question = { readonly kind: string } & Readonly<Record<string, unknown>>;

/** A refusal that is part of normal work: a code, a fact and a next step. Bugs throw plain errors instead. */
export class Problem extends Error {
  readonly code: ProblemCode;
  readonly status: number;
  readonly title: string;
  readonly question: Question | undefined;

  constructor(code: ProblemCode, detail: string, question?: Question) {
    super(detail);
    this.name = "Problem";
    this.code = code;
    this.status = PROBLEMS[code].status;
    this.title = PROBLEMS[code].title;
    this.question = question;
  }
}
