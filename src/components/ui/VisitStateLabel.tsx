import { VisitMark } from "./VisitMark.tsx";
import { VISIT_STATE_WORDS, type VisitMarkState } from "./visit-states.ts";

/** The mark of a visit's state and its word. */
export function VisitStateLabel({ state, word }: { readonly state: VisitMarkState; readonly word?: string }) {
  return (
    <span className="q-state">
      <VisitMark state={state} />
      {word ?? VISIT_STATE_WORDS[state]}
    </span>
  );
}
