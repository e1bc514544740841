import type { ListedSurvey, Stage } from "#shared/api/surveys.ts";
import type { OwnersWaiting, WaitingThing } from "#shared/api/waiting.ts";
import { formatCount, formatList, formatNumber, timesIn } from "../components/ui/format.ts";
import type { StageState } from "../components/ui/stage-state.ts";
import type { Waiting } from "../features/surveys/WaitingList.tsx";
import { paths } from "./paths.ts";

/** What somebody reads of one thing: how urgent it is, the fact, what comes next, and the words of the link. */
interface Words {
  readonly state: StageState;
  readonly fact: string;
  readonly next: string;
  readonly link: string;
  readonly page: Stage | "people";
}

const NUMBERS = [
  "Nothing",
  "One",
  "Two",
  "Three",
  "Four",
  "Five",
  "Six",
  "Seven",
  "Eight",
  "Nine",
  "Ten",
  "Eleven",
  "Twelve",
];

/** A number that begins a sentence, with its noun: "Three cells". */
function countOf(count: number, one: string, many = `${one}s`): string {
  return `${NUMBERS[count] ?? formatNumber(count)} ${count === 1 ? one : many}`;
}

// The list is about several places: times are told in UTC.
const times = timesIn("UTC");

const BECAUSE = {
  sealed: "A frame was sealed",
  declared: "A draw was declared",
  drawn: "Cells were drawn",
  withdrawn: "A draw was withdrawn",
  estimated: "An estimate was kept",
} as const;

function wordsOfPlan(thing: Extract<WaitingThing, { kind: "boundary" | "sealing" | "declaring" | "drawing" }>): Words {
  switch (thing.kind) {
    case "boundary":
      return {
        state: "not-started",
        fact: "There is no study area yet.",
        next: "Import the boundary file: everything else rests on it.",
        link: "Import the boundary",
        page: "area",
      };
    case "sealing":
      return {
        state: thing.draft === null ? "not-started" : "in-work",
        fact: thing.draft === null ? "The cells are not chosen yet." : `Frame version ${thing.draft} is not sealed.`,
        next: "Choose size and edge rule, look at what the estimate will speak for, then seal the frame.",
        link: thing.draft === null ? "Choose the cells" : "Seal the frame",
        page: "frame",
      };
    case "declaring":
      return {
        state: thing.withdrawn === null ? "not-started" : "attention",
        fact:
          thing.withdrawn === null
            ? "No cells are drawn yet."
            : `Draw ${thing.withdrawn} is withdrawn, and nothing was declared since.`,
        next: "Say how many picks and how the seed will be made, then draw.",
        link: "Declare the draw",
        page: "draw",
      };
    case "drawing":
      return {
        state: "attention",
        fact: thing.seedGiven
          ? "The seed is given, and the cells are not drawn."
          : "A draw is declared, and its seed is not drawn.",
        next: `Declared on ${times.time(thing.declaredAt)}. Until it is drawn or given up, nothing else can be declared.`,
        link: "Draw the cells",
        page: "draw",
      };
  }
}

function wordsOfInvitations({ open, expired }: Extract<WaitingThing, { kind: "invitations" }>): Words {
  if (expired === 0) {
    return {
      state: "in-work",
      fact: `${countOf(open, "person is", "people are")} invited and not here yet.`,
      next: `${open === 1 ? "The link works" : "Their links work"} still. The page of people says how each mail went.`,
      link: "See who is invited",
      page: "people",
    };
  }
  return {
    state: "attention",
    fact: `${countOf(expired, "invitation has", "invitations have")} expired.`,
    next: `Send a new link, or withdraw it.${open === 0 ? "" : ` ${countOf(open, "more is", "more are")} open.`}`,
    link: "Send it again",
    page: "people",
  };
}

function dayWords(days: readonly { readonly day: string; readonly cells: number }[]): string {
  const words = days.map(({ day, cells }) => `${formatNumber(cells)} ${day === "" ? "without a day" : `for ${day}`}`);
  return `${formatList(words)}. Zero is a count; a cell that nobody reached is not.`;
}

function ownCellsFact({ cells, of }: Extract<WaitingThing, { kind: "own-cells" }>): string {
  if (of === 1) return "Your one cell is not visited yet.";
  if (cells === of) return `None of your ${formatNumber(of)} cells is visited yet.`;
  return `${formatNumber(cells)} of your ${formatNumber(of)} cells ${cells === 1 ? "is" : "are"} not visited yet.`;
}

function wordsOf(thing: WaitingThing): Words {
  switch (thing.kind) {
    case "invitations":
      return wordsOfInvitations(thing);
    case "estimate-older":
      return {
        state: "attention",
        fact: "Counts came in after the estimate was kept.",
        next: `Kept on ${times.time(thing.keptAt)}. Read it again, and keep what the counts say now.`,
        link: "Read the estimate",
        page: "estimate",
      };
    case "not-shared-out":
      return {
        state: thing.cells === thing.of ? "not-started" : "in-work",
        fact: `${formatNumber(thing.cells)} of ${formatCount(thing.of, "cell")} ${thing.cells === 1 ? "is" : "are"} in nobody’s list.`,
        next: "Share them out and take the waypoints along.",
        link: "Share them out",
        page: "field",
      };
    case "closing":
      return {
        state: "attention",
        fact: `${countOf(thing.cells, "cell was", "cells were")} reported and not counted.`,
        next: "Close a cell and a reserve opens, or ask whether somebody can go again.",
        link: thing.cells === 1 ? "Decide on it" : "Decide on them",
        page: "field",
      };
    case "all-counted":
      return {
        state: "in-work",
        fact: thing.cells === 1 ? "The one cell is counted." : `All ${formatNumber(thing.cells)} cells are counted.`,
        next: "Read the estimate, and keep it: then it is on record.",
        link: "Read the estimate",
        page: "estimate",
      };
    case "own-cells":
      return {
        state: thing.cells === thing.of ? "not-started" : "in-work",
        fact: ownCellsFact(thing),
        next: dayWords(thing.days),
        link: "Enter counts",
        page: "counts",
      };
    case "newest-hash":
      return {
        state: "in-work",
        fact: `${BECAUSE[thing.because]} on ${times.day(thing.at)}: keep the newest hash.`,
        next: `Of event ${formatNumber(thing.sequence)}. Kept outside of here, it shows later that nothing before it was changed.`,
        link: "Read the record",
        page: "record",
      };
    case "boundary":
    case "sealing":
    case "declaring":
    case "drawing":
      return wordsOfPlan(thing);
  }
}

/** What waits for this person in their surveys; what needs attention comes first. */
export function waitingIn(surveys: readonly ListedSurvey[]): Waiting[] {
  const items = surveys.flatMap((survey) =>
    survey.waiting.map((thing) => {
      const { page, ...words } = wordsOf(thing);
      return {
        ...words,
        key: `${survey.id}/${thing.kind}`,
        role: thing.role,
        survey: survey.name,
        to: page === "people" ? paths.people(survey.id) : paths.stage(survey.id, page),
        ...(thing.kind === "newest-hash" && { hash: thing.sha256 }),
      };
    }),
  );
  return urgentFirst(items);
}

/** What the installation waits for of its owners. */
export function waitingForOwners(things: OwnersWaiting | null): Waiting[] {
  if (things === null) return [];
  const { mailsFailed, mailsKept, publicAddressMissing, backupError } = things;
  const of = (part: string, state: StageState, fact: string, next: string, link: string): Waiting => ({
    key: `installation/${part}`,
    role: "owner",
    survey: "This installation",
    state,
    fact,
    next,
    link,
    to: `${paths.installation}#${part}`,
  });
  const items: Waiting[] = [];
  if (backupError !== null) {
    items.push(of("storage", "attention", "The last daily copy was not made.", backupError, "Look at the copies"));
  }
  if (mailsFailed > 0) {
    const fact = `${countOf(mailsFailed, "mail")} could not be sent.`;
    items.push(of("mails", "attention", fact, "Read why, then try again or forward it yourself.", "Look at the mails"));
  } else if (mailsKept > 0) {
    const fact = `${countOf(mailsKept, "mail is", "mails are")} kept here.`;
    const next = "No mail server is set up: read and forward them, for links in them expire.";
    items.push(of("mails", "in-work", fact, next, "Look at the mails"));
  }
  if (publicAddressMissing) {
    const next = "Links in mails begin with it, so that they work for people elsewhere.";
    items.push(of("address", "not-started", "No public address is set.", next, "Set the address"));
  }
  return items;
}

export function urgentFirst(items: readonly Waiting[]): Waiting[] {
  return items.toSorted((a, b) => Number(b.state === "attention") - Number(a.state === "attention"));
}

/** "Three things wait for you." */
export function waitingTitle(count: number): string {
  if (count === 0) return "Nothing waits for you.";
  return `${countOf(count, "thing waits", "things wait")} for you.`;
}

/** Below it: what comes first. */
export function waitingLead(items: readonly Waiting[]): string {
  if (items.length === 0) return "Your surveys are below, open to read.";
  const urgent = items.filter((item) => item.state === "attention").length;
  if (urgent === items.length) return urgent === 1 ? "It needs attention." : "All of them need attention.";
  if (urgent > 0)
    return `${countOf(urgent, "needs", "need")} attention and ${urgent === 1 ? "stands" : "stand"} first.`;
  return items.length === 1
    ? "It is the next step of something in which you have a part."
    : "Each of them is the next step of something in which you have a part.";
}
