import { MarginNote } from "../../components/ui/MarginNote.tsx";

/** The usual cautions, and what the planner wrote for this place. They never replace local rules. */
export function Safety({ notes }: { readonly notes: string }) {
  return (
    <MarginNote title="Before anybody goes">
      {notes !== "" && <p className="whitespace-pre-wrap">{notes}</p>}
      <p>
        Leave word where you go and when you call in. Turn back from tides, cliffs, weather and weapons: a cell that is
        unsafe is reported and replaced, nobody has to reach it. Local rules and licensed people have the last word.
      </p>
    </MarginNote>
  );
}
