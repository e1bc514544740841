import type { Role } from "#shared/access/table.ts";
import { asWords, linkLine, write, type Written } from "../template.ts";
import { forAuditors } from "./invitation.ts";

interface RoleFacts {
  readonly survey: string;
  readonly role: Role;
  /** Who did it. */
  readonly by: string;
}

/** What somebody with an account is told who was given a role. */
export function addedMail(facts: RoleFacts & { readonly link: string; readonly keyFingerprint: string }): Written {
  const survey = asWords(facts.survey);
  return write(`${survey}: you are its ${facts.role} now`, [
    `${asWords(facts.by)} made you ${facts.role} of the survey “${survey}”. Sign in as you always do:`,
    linkLine(facts.link),
    "You can leave the survey on its People page.",
    ...forAuditors(facts.role, facts.keyFingerprint),
  ]);
}

/** What somebody is told whose role was ended by somebody else. */
export function roleEndedMail({ survey: name, role, by, last }: RoleFacts & { readonly last: boolean }): Written {
  const survey = asWords(name);
  return write(`${survey}: you are no longer its ${role}`, [
    `${asWords(by)} ended your role as ${role} of the survey “${survey}”.`,
    last
      ? "You hold no other role there: the survey is no longer on your list, and you are signed out. What you did stays on its record under your name."
      : "Your other roles there stay as they are.",
    "There is nothing to press. If this is a mistake, ask a planner of the survey.",
  ]);
}
