import { useState } from "react";
import { type CountTexts, EMPTY_TEXTS } from "./count-form.ts";

/** What somebody has typed for one cell and not saved. Its id goes out with it, so that one entry sent twice is kept once. */
export interface CountDraft {
  readonly id: string;
  readonly texts: CountTexts;
  /** Why it is amended. */
  readonly reason: string;
}

export interface Drafts {
  of(visitId: string): CountDraft;
  put(visitId: string, draft: CountDraft): void;
  drop(visitId: string): void;
}

const begin = (): CountDraft => ({ id: crypto.randomUUID(), texts: EMPTY_TEXTS, reason: "" });

/** Drafts by cell: a form that is folded away, scrolled out of sight or refused keeps what was typed. */
export function useDrafts(): Drafts {
  const [drafts, setDrafts] = useState<ReadonlyMap<string, CountDraft>>(new Map());
  const [blank, setBlank] = useState(begin);
  return {
    of: (visitId) => drafts.get(visitId) ?? blank,
    put(visitId, draft) {
      setDrafts((before) => new Map(before).set(visitId, draft));
      if (draft.id === blank.id) setBlank(begin());
    },
    drop(visitId) {
      setDrafts((before) => new Map([...before].filter(([id]) => id !== visitId)));
    },
  };
}
