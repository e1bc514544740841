import { asWords, linkLine, type Written, write } from "../template.ts";

/** The kinds of these mails, of an act and of a day with counts: they are never pruned. */
export const WITNESS = "witness";
export const WITNESS_DAY = "witness-day";

export interface WitnessFacts {
  readonly survey: string;
  /** In a few words, for the subject: "cells were drawn". */
  readonly inBrief: string;
  /** A clause that follows "In the survey …": "cells were drawn at 2031-05-02 08:00 UTC". */
  readonly happened: string;
  readonly sequence: number;
  readonly sha256: string;
  readonly keyFingerprint: string;
  /** Address of the page that replays a record. */
  readonly replay: string;
}

/**
 * What an auditor is told when something is done that must not be undone unseen (rule R8): the newest hash of the record,
 * which from then on stands outside the database.
 */
export function witnessMail(facts: WitnessFacts): Written {
  const survey = asWords(facts.survey);
  return write(`${survey}: ${facts.inBrief}`, [
    `In the survey “${survey}” ${facts.happened}. You are told because you are its auditor; there is nothing to press. Please keep this mail.`,
    `The record then ended with event ${facts.sequence}, and this is its newest hash:`,
    { copy: facts.sha256 },
    "Fingerprint of the key that signs the record:",
    { copy: facts.keyFingerprint },
    "A record that is written anew cannot hold this hash. To check a record file, open the page below: replay asks for the hashes from your mails, one a line, and for the fingerprint.",
    linkLine(facts.replay),
  ]);
}
