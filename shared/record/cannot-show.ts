import type { RecordFile } from "./record-file.ts";

/** What a record cannot show, however whole it is (rule R9): each a sentence. Made to fit what this record holds. */
export function cannotShow(record: RecordFile): string[] {
  const sources = new Set(record.declarations.flatMap(({ seed }) => (seed === null ? [] : [seed.source])));
  return [
    ...(sources.has("typed") ? ["That only one seed was tried before it was typed."] : []),
    ...(sources.has("made-here")
      ? ["That the server's random source made a seed once, and nobody saw it before."]
      : []),
    ...(sources.has("dice") ? ["That the dice fell so."] : []),
    "That a cell was visited, and that what was counted there was there.",
    "That the server's clock was right: the order of events is proven, their times are not.",
    "That this is the only record of the survey: a hash that somebody outside holds is the witness for that.",
    "That all who were told of the hashes are different people with different mailboxes.",
  ];
}
