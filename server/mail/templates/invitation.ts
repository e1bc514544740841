import type { Role } from "#shared/access/table.ts";
import { asWords, type Block, linkLine, write, type Written } from "../template.ts";

export interface InvitationFacts {
  readonly invitedBy: string;
  /** Null: to the installation. */
  readonly to: { readonly survey: string; readonly role: Role } | null;
  readonly makesOwner: boolean;
  readonly link: string;
  readonly expires: string;
  readonly keyFingerprint: string;
}

/** What somebody without an account is sent: to what they are invited, by whom, and what to press. */
export function invitationMail(facts: InvitationFacts): Written {
  const by = asWords(facts.invitedBy);
  const survey = asWords(facts.to?.survey ?? "");
  const subject = facts.to ? `${survey}: you are invited as ${facts.to.role}` : "You are invited to Quillet";
  return write(subject, [
    facts.to
      ? `${by} invites you to the survey “${survey}” as its ${facts.to.role}. Press this link to choose a name and a password:`
      : `${by} invites you to this installation of Quillet${facts.makesOwner ? " as one of its owners" : ""}. Press this link to choose a name and a password:`,
    linkLine(facts.link),
    `It works once, until ${facts.expires}. If you do not want to take part, leave this mail alone: nothing happens then.`,
    ...forAuditors(facts.to?.role, facts.keyFingerprint),
  ]);
}

/** An auditor keeps the fingerprint of the key from the first day on (rule R8). */
export function forAuditors(role: Role | undefined, keyFingerprint: string): Block[] {
  if (role !== "auditor") return [];
  return [
    "As auditor, please keep this mail. This is the fingerprint of the key that signs the survey's record; a replay of the record asks for it:",
    { copy: keyFingerprint },
  ];
}
