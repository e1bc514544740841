import { useState } from "react";
import { Button } from "../../../components/ui/Button.tsx";
import { Dialog } from "../../../components/ui/Dialog.tsx";
import { Refusal } from "../../../components/ui/Refusal.tsx";
import { showToast } from "../../../components/ui/show-toast.tsx";
import { useLeaveSurvey } from "./queries.ts";

interface LeaveSurveyProps {
  readonly surveyId: string;
  readonly survey: string;
  /** The last planner can't leave. */
  readonly isNeeded: boolean;
  readonly onLeft: () => void;
}

/** Gives up all one's roles in a survey. */
export function LeaveSurvey({ surveyId, survey, isNeeded, onLeft }: LeaveSurveyProps) {
  const [open, setOpen] = useState(false);
  const leave = useLeaveSurvey(surveyId);
  const confirm = () =>
    leave.mutate(undefined, {
      onSuccess: () => {
        showToast(`You have left ${survey}.`);
        onLeft();
      },
    });
  return (
    <div>
      <Button variant="danger" disabled={isNeeded} onClick={() => setOpen(true)}>
        Leave the survey…
      </Button>
      <p className="q-help">
        {isNeeded
          ? "You are its last planner: make somebody else a planner first."
          : "You give up all your roles in it. What you did stays on record."}
      </p>
      <Dialog
        open={open}
        onOpenChange={setOpen}
        title={`Leave ${survey}?`}
        lead="You can’t open it any more from then on, unless a planner brings you in again. What you did stays on record under your name; cells in your list stay there until somebody shares them out anew."
        actions={
          <>
            <Button onClick={() => setOpen(false)}>Stay</Button>
            <Button variant="danger" busy={leave.isPending} busyLabel="Leaving…" onClick={confirm}>
              Leave the survey
            </Button>
          </>
        }
      >
        {leave.isError && <Refusal error={leave.error} />}
      </Dialog>
    </div>
  );
}
