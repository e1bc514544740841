import type { RecordEvent } from "#shared/api/record.ts";
import { Fold } from "../../components/ui/Fold.tsx";
import { formatCount } from "../../components/ui/format.ts";
import { Hash } from "../../components/ui/Hash.tsx";
import { TimelineEntry } from "../../components/ui/TimelineEntry.tsx";
import { useTimes } from "../../components/ui/use-times.ts";
import { eventStory, type StoryLine } from "./event-story.ts";

/** One line of the story: an event, or a day's counts by one person with each of them under a fold. */
export function EventLine({ events }: StoryLine) {
  const times = useTimes();
  const [newest] = events;
  const oldest = events.at(-1);
  if (newest === undefined || oldest === undefined) return null;
  if (events.length === 1) {
    const { title, text, mark } = eventStory(newest);
    return (
      <TimelineEntry
        when={
          <time dateTime={newest.at} title={`${newest.at}, as in the record`}>
            {times.timeOfDay(newest.at)}
          </time>
        }
        mark={mark}
        title={title}
        meta={<EventProof event={newest} />}
      >
        {text === "" ? undefined : text}
      </TimelineEntry>
    );
  }
  return (
    <TimelineEntry
      when={`${times.timeOfDay(oldest.at)} to ${times.timeOfDay(newest.at)}`}
      title={`${formatCount(events.length, "cell")} written down`}
      meta={<span>{`events ${oldest.sequence} to ${newest.sequence}`}</span>}
    >
      {`${newest.by}.`}
      <Fold quiet title="Each of them">
        <ul className="grid gap-1 py-2">
          {events.map((event) => (
            <li key={event.sequence} className="flex flex-wrap gap-x-4">
              <span>{eventStory(event).title}</span>
              <span className="text-ink-3">
                <EventProof event={event} />
              </span>
            </li>
          ))}
        </ul>
      </Fold>
    </TimelineEntry>
  );
}

function EventProof({ event }: { readonly event: RecordEvent }) {
  return (
    <>
      <span>{`event ${event.sequence}`}</span> <Hash value={event.sha256} label={`hash of event ${event.sequence}`} />
    </>
  );
}
