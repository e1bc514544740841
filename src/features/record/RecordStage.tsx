import { Link } from "react-router-dom";
import { readRecordFile, type RecordEvent } from "#shared/api/record.ts";
import { addressOf } from "../../api/call.ts";
import { Button } from "../../components/ui/Button.tsx";
import { ButtonLink } from "../../components/ui/ButtonLink.tsx";
import { formatCount, type Times } from "../../components/ui/format.ts";
import { Hash } from "../../components/ui/Hash.tsx";
import { HashBlock } from "../../components/ui/HashBlock.tsx";
import { MarginNote } from "../../components/ui/MarginNote.tsx";
import { ReadingPage } from "../../components/ui/ReadingPage.tsx";
import { Refusal } from "../../components/ui/Refusal.tsx";
import { RuledLoading } from "../../components/ui/RuledLoading.tsx";
import { Timeline } from "../../components/ui/Timeline.tsx";
import { TimelineDay } from "../../components/ui/TimelineDay.tsx";
import { useTimes } from "../../components/ui/use-times.ts";
import { EventLine } from "./EventLine.tsx";
import { storyLines } from "./event-story.ts";
import { useEvents } from "./queries.ts";

interface RecordStageProps {
  readonly surveyId: string;
  readonly replayTo: string;
}

/** The story of the record, newest first, and what proves it: newest hash, key, record file, the way to replay. */
export function RecordStage({ surveyId, replayTo }: RecordStageProps) {
  const times = useTimes();
  const events = useEvents(surveyId);
  if (events.isPending) {
    return (
      <div className="p-8">
        <RuledLoading label="Loading the record" />
      </div>
    );
  }
  const [head] = events.data?.pages ?? [];
  if (head === undefined) {
    return (
      <div className="p-8">
        <Refusal error={events.error} next={<Button onClick={() => void events.refetch()}>Try again</Button>} />
      </div>
    );
  }
  const shown = events.data?.pages.flatMap((page) => page.events) ?? [];
  return (
    <ReadingPage
      title={`${formatCount(head.newest.sequence, "event")} in one unbroken chain.`}
      lead={`Each event holds the hash of the one before and is signed. What was withdrawn, closed or amended stays readable. Times in ${times.zone}.`}
      margin={<RecordMargin surveyId={surveyId} replayTo={replayTo} head={head} />}
    >
      <Timeline label="Events, newest first">
        {daysOf(shown, times).map(({ day, events: ofDay }) => (
          <Day key={day} day={day} events={ofDay} />
        ))}
      </Timeline>
      {events.isFetchNextPageError && <Refusal error={events.error} />}
      {events.hasNextPage && (
        <Button busy={events.isFetchingNextPage} busyLabel="Loading…" onClick={() => void events.fetchNextPage()}>
          Earlier events
        </Button>
      )}
    </ReadingPage>
  );
}

interface MarginProps extends RecordStageProps {
  readonly head: {
    readonly newest: { readonly sequence: number; readonly sha256: string };
    readonly keyFingerprint: string;
    readonly elsewhere: { readonly sameSource: number; readonly sameFrame: number };
  };
}

function RecordMargin({ surveyId, replayTo, head }: MarginProps) {
  return (
    <>
      <MarginNote title="Newest hash">
        <HashBlock value={head.newest.sha256} label="newest hash" />
        <p>{`Event ${head.newest.sequence}, signed. Keep it outside of Quillet: a record that was changed can't hold it.`}</p>
      </MarginNote>
      <MarginNote title="The record file">
        <div className="q-screen-only mb-2">
          <ButtonLink variant="primary" href={addressOf(readRecordFile, { params: { surveyId } })} download="">
            Save the record file
          </ButtonLink>
        </div>
        <p>One file with all that a replay needs: frame, declarations, draws, counts with amendments, events.</p>
      </MarginNote>
      <MarginNote title="Check it yourself">
        <p>Replay rebuilds the frame, repeats the draws and computes the estimate again, in your own browser.</p>
        <Link to={replayTo}>Open replay</Link>
      </MarginNote>
      <MarginNote title="Signing key">
        <p>
          Ed25519, fingerprint <Hash value={head.keyFingerprint} label="key fingerprint" />.
        </p>
      </MarginNote>
      {head.elsewhere.sameSource > 0 && (
        <MarginNote title="The same boundary elsewhere">
          <p>{elsewhereText(head.elsewhere)}</p>
        </MarginNote>
      )}
      <MarginNote title="What no record shows">
        <p>That a cell was truly visited, or that this server’s clock was right.</p>
      </MarginNote>
    </>
  );
}

function elsewhereText({ sameSource, sameFrame }: MarginProps["head"]["elsewhere"]): string {
  const frames =
    sameFrame === 0
      ? "none with the same frame"
      : `${formatCount(sameFrame, "of them", "of them")} with the same frame`;
  return `${formatCount(sameSource, "other survey")} of this installation began with this boundary file, ${frames}. Their draws are in their own records.`;
}

function Day({ day, events }: { readonly day: string; readonly events: readonly RecordEvent[] }) {
  return (
    <>
      <TimelineDay day={day} />
      {storyLines(events).map((line) => (
        <EventLine key={line.events[0]?.sequence} events={line.events} />
      ))}
    </>
  );
}

function daysOf(events: readonly RecordEvent[], times: Times): { day: string; events: RecordEvent[] }[] {
  const days: { day: string; events: RecordEvent[] }[] = [];
  for (const event of events) {
    const day = times.day(event.at);
    const last = days.at(-1);
    if (last?.day === day) last.events.push(event);
    else days.push({ day, events: [event] });
  }
  return days;
}
