import type { AssignmentsNow } from "#shared/api/field.ts";
import { Banner } from "../../components/ui/Banner.tsx";
import { Button } from "../../components/ui/Button.tsx";
import { formatCount } from "../../components/ui/format.ts";

interface AssignedMeanwhileProps {
  /** The cells that are not as they were seen, as they are now. */
  readonly now: AssignmentsNow;
  /** What giving them anyway is called: "Give them to Tove Lind". */
  readonly anyway: string;
  readonly busy: boolean;
  readonly onAnyway: () => void;
  /** Leaves these cells as they are; the others stay selected. */
  readonly onLeave: () => void;
}

/** Somebody else has shared out the same cells meanwhile: who has each now, and what is to stand. */
export function AssignedMeanwhile({ now, anyway, busy, onAnyway, onLeave }: AssignedMeanwhileProps) {
  return (
    <Banner
      tone="ochre"
      title={`${formatCount(now.length, "cell was", "cells were")} shared out by somebody else meanwhile.`}
      next={
        <>
          <Button busy={busy} onClick={onAnyway}>
            {anyway}
          </Button>
          <Button onClick={onLeave}>Leave {now.length === 1 ? "it as it is" : "them as they are"}</Button>
        </>
      }
    >
      <ul>
        {now.map(({ visitId, label, assignedTo }) => (
          <li key={visitId}>{`${label}: ${whoText(assignedTo)}`}</li>
        ))}
      </ul>
    </Banner>
  );
}

function whoText(assignedTo: AssignmentsNow[number]["assignedTo"]): string {
  if (assignedTo === null) return "nobody any more";
  return assignedTo.day === "" ? assignedTo.name : `${assignedTo.name}, ${assignedTo.day}`;
}
