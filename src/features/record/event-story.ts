import type { RecordEvent } from "#shared/api/record.ts";
import { STATE_WORDS } from "#shared/counts/count.ts";
import {
  EVENT_PAYLOADS,
  type EventKind,
  type EventPayload,
  isEventKind,
  type SettingsPayload,
} from "#shared/record/events.ts";
import { formatAsIs, formatCount, formatHash, formatArea, formatList, formatSeed } from "../../components/ui/format.ts";
import type { TimelineMark } from "../../components/ui/TimelineEntry.tsx";

/** What an event says to a reader: one sentence, what stands below it, and its mark on the line. */
export interface EventStory {
  readonly title: string;
  readonly text: string;
  readonly mark: TimelineMark;
}

type Tellers = { readonly [K in EventKind]: (payload: EventPayload<K>, by: string) => EventStory };

const story = (title: string, text: string, mark: TimelineMark = "plain"): EventStory => ({ title, text, mark });

const ROLE_SAID: Readonly<Record<string, string>> = {
  planner: "a planner",
  lead: "a field lead",
  counter: "a counter",
  auditor: "an auditor",
};

function said(payload: EventPayload<"count-entered">): string {
  return payload.value === null ? STATE_WORDS[payload.state] : formatAsIs(payload.value);
}

function quoted(text: string): string {
  return text === "" ? "" : `“${text}”`;
}

function sentences(...parts: readonly string[]): string {
  return parts.filter((part) => part !== "").join(" ");
}

const SETTING_WORDS = {
  name: "name",
  timeZone: "time zone",
  level: "confidence level",
  sensitivity: "sensitivity",
  safetyNotes: "safety notes",
  targets: "what is counted",
  season: "season",
} as const;

type Setting = keyof typeof SETTING_WORDS;

function settingsChanged(before: SettingsPayload, after: SettingsPayload): string[] {
  const names = Object.keys(SETTING_WORDS) as Setting[];
  return names
    .filter((name) => JSON.stringify(before[name]) !== JSON.stringify(after[name]))
    .map((name) => SETTING_WORDS[name]);
}

/** Old and new of what can be said in a line. */
function wordsChanged(before: SettingsPayload, after: SettingsPayload): string[] {
  const short = ["name", "timeZone", "level", "sensitivity"] as const;
  return short
    .filter((name) => before[name] !== after[name])
    .map((name) => `${quoted(before[name])} became ${quoted(after[name])}.`);
}

const TELLERS: Tellers = {
  "survey-created": (p, by) =>
    story(
      `The survey was started: ${p.name}`,
      `${by} counts ${p.target.plural}, season ${p.season.name}. ${sentences(quoted(p.target.countingRule))}`.trim(),
    ),
  "member-added": (p, by) => story(`${p.name} joined as ${ROLE_SAID[p.role] ?? p.role}`, `Added by ${by}.`),
  "role-ended": (p, by) => story(`${p.name} is no longer ${ROLE_SAID[p.role] ?? p.role}`, `By ${by}.`, "withdrawn"),
  "member-renamed": (p) => story(`${p.before} is now called ${p.after}`, ""),
  "settings-changed": (p, by) =>
    story(
      `The settings were changed: ${formatList(settingsChanged(p.before, p.after))}`,
      sentences(...wordsChanged(p.before, p.after), `By ${by}.`),
      "amended",
    ),
  "survey-archived": (_, by) => story("The survey was archived", `By ${by}. It takes nothing new.`),
  "survey-unarchived": (_, by) => story("The survey was taken out of the archive", `By ${by}.`),
  "survey-copied": (p, by) =>
    story(
      "It was begun as a copy of another survey",
      `By ${by}, from one whose record ended with ${formatHash(p.newestSha256)}.`,
    ),
  "area-imported": (p, by) =>
    story(
      `The study area was kept: ${formatArea(p.geodesicAreaM2)}`,
      sentences(`From ${p.fileName}, version ${p.number}, by ${by}.`, p.mended.join(" ")),
    ),
  "frame-sealed": (p, by) =>
    story(
      `Frame version ${p.number} was sealed: ${formatCount(p.units, "cell")}`,
      `Frame ${formatHash(p.frameSha256)}, by ${by}. It never changes.`,
      "sealed",
    ),
  "draw-declared": (p, by) =>
    story("A draw was declared", `Before its seed existed, by ${by}. Declaration ${formatHash(p.declarationSha256)}.`),
  "declaration-abandoned": (p, by) =>
    story("A declaration was abandoned", sentences(quoted(p.reason), `${by}.`), "withdrawn"),
  "seed-given": (p, by) =>
    story(
      p.source === "made-here" ? "The seed was made" : "The seed was typed",
      p.source === "made-here"
        ? formatSeed(p.seed)
        : `${formatSeed(p.seed)} The seed was chosen by ${by}; nothing shows that only one was tried.`,
    ),
  "draw-made": (p, by) =>
    story(
      `Draw ${p.number}: ${formatCount(p.picks, "pick")}`,
      `${p.reserves === 0 ? "No reserves." : `With ${formatCount(p.reserves, "reserve")} behind them.`} By ${by}.`,
      "drawn",
    ),
  "list-lengthened": (p) =>
    story(
      `The draw’s list was lengthened to ${formatCount(p.to, "entry", "entries")}`,
      `${formatCount(p.to - p.from, "entry", "entries")} more from the same stream, since its reserves were used up.`,
      "drawn",
    ),
  "draw-withdrawn": (p, by) =>
    story("A draw was withdrawn", sentences(quoted(p.reason), `${by}. Its picks stay on record.`), "withdrawn"),
  "cells-assigned": (p, by) =>
    story(
      p.member === null
        ? `${formatCount(p.units.length, "cell")} taken back`
        : `${formatCount(p.units.length, "cell")} shared out`,
      sentences(p.day === "" ? "" : `For ${p.day}.`, `By ${by}.`),
    ),
  "waypoints-exported": (p, by) =>
    story(
      `Waypoints were exported: ${formatCount(p.cells, "cell")}`,
      `As ${p.format.toUpperCase()}, by ${by}. A new draw needs a reason from here on.`,
    ),
  "pick-closed": (p, by) =>
    story(
      `Unit ${p.unit} was closed: ${STATE_WORDS[p.state]}`,
      sentences(
        quoted(p.reason),
        `${by}.`,
        p.opened.length === 0 ? "No reserve was left to open." : `Opened ${picks(p.opened)} in its place.`,
        p.passedOver.length === 0 ? "" : `Passed over ${picks(p.passedOver)}, on closed cells.`,
      ),
    ),
  "count-entered": (p, by) => story(`Unit ${p.unit}: ${said(p)}`, sentences(`${by}.`, quoted(p.note))),
  "count-amended": (p, by) =>
    story(
      `Unit ${p.unit} was amended to ${said(p)}`,
      sentences(quoted(p.reason), `${by}. The old entry stays.`),
      "amended",
    ),
  "counts-imported": (p, by) =>
    story(`A table was read in: ${formatCount(p.written, "count")}`, `${p.fileName}, by ${by}.`),
  "estimate-kept": (p, by) =>
    story("An estimate was kept", `By ${by}. Result ${formatHash(p.resultSha256)}.`, "sealed"),
};

function picks(positions: readonly number[]): string {
  return `pick${positions.length === 1 ? "" : "s"} ${formatList(positions.map(String))}`;
}

/** The sentence of any event; one of a kind that this version does not know is told by its name. */
export function eventStory(event: Pick<RecordEvent, "kind" | "payload" | "by">): EventStory {
  const { kind, payload, by } = event;
  if (!isEventKind(kind)) return story(kind, "An event of a later version.");
  const parsed = EVENT_PAYLOADS[kind].safeParse(payload);
  if (!parsed.success) return story(kind, "An event whose content was left out.");
  const tell = TELLERS[kind] as (payload: unknown, by: string) => EventStory;
  return tell(parsed.data, by);
}

/** What is told in one line. */
export interface StoryLine {
  readonly events: readonly RecordEvent[];
}

/** The lines of one day: counts by one person, one after another, are told in one; everything else has a line of its own. */
export function storyLines(events: readonly RecordEvent[]): StoryLine[] {
  const lines: RecordEvent[][] = [];
  for (const event of events) {
    const last = lines.at(-1);
    const before = last?.at(-1);
    const joins =
      before !== undefined &&
      event.kind === "count-entered" &&
      before.kind === "count-entered" &&
      event.memberId === before.memberId;
    if (last !== undefined && joins) last.push(event);
    else lines.push([event]);
  }
  return lines.map((line) => ({ events: line }));
}
