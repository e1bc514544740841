import { useEffect, useState } from "react";
import { Problem } from "#shared/problem.ts";
import { focusMain } from "../../components/ui/focus-main.ts";
import { MarginNote } from "../../components/ui/MarginNote.tsx";
import { Progress } from "../../components/ui/Progress.tsx";
import { ReadingPage } from "../../components/ui/ReadingPage.tsx";
import { Refusal } from "../../components/ui/Refusal.tsx";
import { ReplayForm } from "./ReplayForm.tsx";
import { ReplayResult } from "./ReplayResult.tsx";
import { type ReplayChoice, useReplay } from "./use-replay.ts";

const NOTHING: ReplayChoice = { record: null, source: null, hashes: "", fingerprint: "" };

/** The public page on which anybody checks a record in their own browser; nothing is sent anywhere. */
export function ReplayStage() {
  const replay = useReplay();
  const [choice, setChoice] = useState(NOTHING);
  const { record } = choice;
  // The button that was pressed goes away with the form: whoever works by key or by ear goes on from what came instead.
  useEffect(() => {
    if (replay.status !== "idle") focusMain();
  }, [replay.status]);
  if (replay.isSuccess) return <ReplayResult done={replay.data} onAnother={replay.reset} />;
  return (
    <ReadingPage
      title="Replay a record"
      lead="From the record file alone this rebuilds the frame, repeats every draw from its seed and computes the estimates again. It runs in this browser: the file is not sent anywhere."
      margin={
        <MarginNote title="What it compares">
          <p>
            The chain of events and its signatures, the frame from its rings, the order of sealing, declaring, seed and
            draw, every pick, the reserves, each count with its amendments, each kept estimate. The first difference is
            named.
          </p>
        </MarginNote>
      }
    >
      {replay.isError && !isCancelled(replay.error) && <Refusal error={replay.error} />}
      {/* Hidden rather than taken away while it runs, so that it comes back as it was. */}
      <div hidden={replay.isPending}>
        <ReplayForm
          choice={choice}
          onChange={(part) => setChoice((before) => ({ ...before, ...part }))}
          onReplay={() => {
            if (record !== null && !replay.isPending) replay.mutate({ ...choice, record });
          }}
        />
      </div>
      {replay.isPending && (
        <Progress
          label="Replaying the record"
          value={replay.at?.share ?? null}
          detail={replay.at?.what}
          onCancel={replay.cancel}
        />
      )}
    </ReadingPage>
  );
}

function isCancelled(error: unknown): boolean {
  return error instanceof Problem && error.code === "cancelled";
}
