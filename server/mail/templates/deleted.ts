import { asWords, write, type Written } from "../template.ts";

interface DeletedFacts {
  readonly survey: string;
  readonly by: string;
  readonly sequence: number;
  readonly sha256: string;
}

/** What an auditor is told of a survey that was deleted: the last hash of its record, which a saved record file still has to hold. */
export function deletedMail({ survey: name, by, sequence, sha256 }: DeletedFacts): Written {
  const survey = asWords(name);
  return write(`${survey}: the survey was deleted`, [
    `${asWords(by)} deleted the survey “${survey}” with all that belongs to it. Its record ended with event ${sequence} and this hash:`,
    { copy: sha256 },
    "A record file that somebody saved before can still be replayed; the installation keeps the hash.",
  ]);
}
