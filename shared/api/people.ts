import * as z from "zod/mini";
import { account, session } from "#shared/api/accounts.ts";
import { email, id, none, role, sha256Hex, shortText, surveyParams, utc } from "#shared/api/common.ts";
import { contract, json } from "#shared/api/contract.ts";

/** The secret part of a link in a mail. */
export const linkSecret = z.string().check(z.regex(/^[A-Za-z0-9_-]{20,100}$/, "is not the end of such a link"));
/** Its rules (length, common ones) are the server's: shared/access/password-rules.ts tells them. */
export const newPassword = z.string().check(z.maxLength(1000));

export const member = z.object({
  id,
  name: z.string(),
  email: z.string(),
  roles: z.array(role),
  addedAt: utc,
  /** Whether this is the person who asks. */
  isSelf: z.boolean(),
  /** An owner closed the account: the roles stay, and nobody signs in. */
  isClosed: z.boolean(),
});
export type Member = z.infer<typeof member>;

/** An invitation that nobody has accepted. */
export const invitation = z.object({
  id,
  email: z.string(),
  role,
  invitedBy: z.string(),
  createdAt: utc,
  expiresAt: utc,
  expired: z.boolean(),
  /** How its mail stands: without SMTP it is kept for the owner to forward. */
  mail: z.enum(["waiting", "sent", "kept", "failed"]),
});
export type Invitation = z.infer<typeof invitation>;

const people = json(z.object({ members: z.array(member), invitations: z.array(invitation) }));
export type People = z.infer<(typeof people)["schema"]>;

export const listPeople = contract({
  name: "listPeople",
  method: "GET",
  path: "/api/surveys/:surveyId/people",
  guard: "people.see",
  summary: "The people of a survey with their roles, and who is invited",
  params: surveyParams,
  query: none,
  body: none,
  answer: people,
});

export const addPerson = contract({
  name: "addPerson",
  method: "POST",
  path: "/api/surveys/:surveyId/people",
  guard: "people.change",
  summary: "Give somebody a role: at once where the address has an account, by invitation where it has none",
  params: surveyParams,
  query: none,
  body: z.object({ email, role }),
  answer: people,
});

export const setRoles = contract({
  name: "setRoles",
  method: "PUT",
  path: "/api/surveys/:surveyId/people/:memberId",
  guard: "people.change",
  summary: "The roles that somebody holds from now on; none removes them from the survey",
  params: z.object({ surveyId: id, memberId: id }),
  query: none,
  body: z.object({
    roles: z.array(role).check(z.maxLength(4)),
    /** The roles that the sender saw; refused where others are held by now. Left out: whatever they are. */
    seen: z.optional(z.array(role).check(z.maxLength(4))),
  }),
  answer: people,
});

export const leaveSurvey = contract({
  name: "leaveSurvey",
  method: "DELETE",
  path: "/api/surveys/:surveyId/people/self",
  guard: "survey.see",
  summary: "Give up all roles in the survey; its last planner can't",
  params: surveyParams,
  query: none,
  body: none,
  answer: json(none),
});

export const renewInvitation = contract({
  name: "renewInvitation",
  method: "POST",
  path: "/api/surveys/:surveyId/invitations/:invitationId/renew",
  guard: "people.change",
  summary: "Send a new link, with its own time to expire; the old link ends",
  params: z.object({ surveyId: id, invitationId: id }),
  query: none,
  body: none,
  answer: people,
});

export const withdrawInvitation = contract({
  name: "withdrawInvitation",
  method: "DELETE",
  path: "/api/surveys/:surveyId/invitations/:invitationId",
  guard: "people.change",
  summary: "End an invitation that nobody has accepted",
  params: z.object({ surveyId: id, invitationId: id }),
  query: none,
  body: none,
  answer: people,
});

export const readInvitation = contract({
  name: "readInvitation",
  method: "GET",
  path: "/api/invitations/:secret",
  guard: "public",
  summary: "What a link invites to",
  params: z.object({ secret: linkSecret }),
  query: none,
  body: none,
  answer: json(
    z.object({
      email: z.string(),
      /** Null: an invitation to the installation, without a survey. */
      survey: z.nullable(z.string()),
      role: z.nullable(role),
      makesOwner: z.boolean(),
      invitedBy: z.string(),
      expiresAt: utc,
      /** The address has an account by now: its password is asked for, and no name. */
      hasAccount: z.boolean(),
      /** Of the installation's signing key: an auditor keeps it. */
      keyFingerprint: sha256Hex,
    }),
  ),
});
export type InvitationSeen = z.infer<(typeof readInvitation)["answer"]["schema"]>;

export const acceptInvitation = contract({
  name: "acceptInvitation",
  method: "POST",
  path: "/api/invitations/:secret",
  guard: "public",
  summary: "Take the invitation, with a name and password of one's own or the account's password; signs in",
  params: z.object({ secret: linkSecret }),
  query: none,
  body: z.object({ name: z.optional(shortText), password: newPassword }),
  /** And where to go first. */
  answer: json(z.object({ session, surveyId: z.nullable(id) })),
});

export const requestReset = contract({
  name: "requestReset",
  method: "POST",
  path: "/api/password-resets",
  guard: "public",
  summary: "Ask for a link to set a new password; answers alike whether or not the address has an account",
  params: none,
  query: none,
  body: z.object({ email }),
  answer: json(none),
});

export const readReset = contract({
  name: "readReset",
  method: "GET",
  path: "/api/password-resets/:secret",
  guard: "public",
  summary: "Whose password a link sets",
  params: z.object({ secret: linkSecret }),
  query: none,
  body: none,
  answer: json(z.object({ email: z.string(), expiresAt: utc })),
});

export const useReset = contract({
  name: "useReset",
  method: "POST",
  path: "/api/password-resets/:secret",
  guard: "public",
  summary: "Set a new password by a link, end every session of the account, and sign in",
  params: z.object({ secret: linkSecret }),
  query: none,
  body: z.object({ password: newPassword }),
  answer: json(session),
});

export const changeName = contract({
  name: "changeName",
  method: "PUT",
  path: "/api/account",
  guard: "signed-in",
  summary: "Change one's own name; the record of each survey tells it",
  params: none,
  query: none,
  body: z.object({ name: shortText }),
  answer: json(account),
});

export const changePassword = contract({
  name: "changePassword",
  method: "POST",
  path: "/api/account/password",
  guard: "signed-in",
  summary: "Change one's own password; every other session ends",
  params: none,
  query: none,
  body: z.object({ current: z.string().check(z.maxLength(1000)), next: newPassword }),
  answer: json(session),
});

/** Where an account is signed in. */
export const signedInAt = z.object({
  /** Not the session's secret: a name for this list. */
  handle: sha256Hex,
  startedAt: utc,
  lastSeenAt: utc,
  /** As the browser names itself. */
  userAgent: z.string(),
  isThis: z.boolean(),
});
export type SignedInAt = z.infer<typeof signedInAt>;
const sessions = json(z.object({ sessions: z.array(signedInAt) }));

export const listSessions = contract({
  name: "listSessions",
  method: "GET",
  path: "/api/account/sessions",
  guard: "signed-in",
  summary: "Where I am signed in, the latest first",
  params: none,
  query: none,
  body: none,
  answer: sessions,
});

export const endSession = contract({
  name: "endSession",
  method: "DELETE",
  path: "/api/account/sessions/:handle",
  guard: "signed-in",
  summary: "End one of my sessions",
  params: z.object({ handle: sha256Hex }),
  query: none,
  body: none,
  answer: sessions,
});

export const endOtherSessions = contract({
  name: "endOtherSessions",
  method: "DELETE",
  path: "/api/account/sessions",
  guard: "signed-in",
  summary: "End all my sessions but this one",
  params: none,
  query: none,
  body: none,
  answer: sessions,
});
