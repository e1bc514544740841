import type { CountState } from "./count.ts";

const WORDS: Readonly<Record<string, CountState>> = {
  counted: "counted",
  done: "counted",
  ok: "counted",
  zero: "counted",
  "not in the population": "not-in-population",
  "not in population": "not-in-population",
  "outside the population": "not-in-population",
  "out of population": "not-in-population",
  refused: "refused",
  refusal: "refused",
  "no permission": "refused",
  "access refused": "refused",
  unsafe: "unsafe",
  dangerous: "unsafe",
  "not safe": "unsafe",
  "not reached": "not-reached",
  "not reachable": "not-reached",
  unreachable: "not-reached",
  unreached: "not-reached",
  lost: "lost",
  "sheet lost": "lost",
  "count lost": "lost",
  "not visited yet": "not-visited",
  "not visited": "not-visited",
  "not counted": "not-visited",
  "not counted yet": "not-visited",
  "not yet counted": "not-visited",
  unvisited: "not-visited",
};

/** Lower case, single spaces; hyphens and underscores count as spaces. */
export function plainWords(text: string): string {
  return text
    .normalize("NFKC")
    .toLowerCase()
    .replaceAll(/[\s_\-\u2010\u2011]+/g, " ")
    .trim();
}

/** The state that a word stands for: one of ours, in any case and with hyphens or spaces, or a plain way to say it. */
export function readStateText(text: string): CountState | "unknown" {
  const words = plainWords(text);
  return Object.hasOwn(WORDS, words) ? (WORDS[words] ?? "unknown") : "unknown";
}
