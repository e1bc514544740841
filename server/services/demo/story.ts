import { createHash } from "node:crypto";
import type { Role } from "#shared/access/table.ts";
import type { Context, Platform, Visitor } from "../../context.ts";
import { findAccountByEmail } from "../../db/accounts.ts";
import { standingOf } from "../../db/members.ts";
import { DEMO_PEOPLE, type DemoRole } from "./people.ts";

const DAY = 86_400_000;

/** How long the story of the demo takes, in days; its end is the moment in which it is made. */
const DAYS = 14;

/**
 * The stage on which the demo is played: a clock that is set to each act, and a source of random bytes that gives the same
 * bytes every time, so that everybody's demo has the same draw with the same repeats.
 */
export class Story {
  readonly platform: Platform;
  readonly #start: number;
  #now: number;
  #bytes = 0;

  constructor(platform: Platform) {
    this.#start = Math.floor(platform.now().getTime() / DAY) * DAY - DAYS * DAY;
    this.#now = this.#start;
    this.platform = {
      ...platform,
      now: () => new Date(this.#now),
      random: (length) => this.#random(length),
    };
  }

  /** Sets the clock to a time of a day of the story (the first is day 1), UTC. */
  at(day: number, time: string): void {
    const [hours = 0, minutes = 0] = time.split(":").map(Number);
    const next = this.#start + (day - 1) * DAY + (hours * 60 + minutes) * 60_000;
    if (next < this.#now) throw new RangeError(`day ${day}, ${time} is before what was told last`);
    this.#now = next;
  }

  /** Lets a few minutes pass. */
  later(minutes: number): void {
    this.#now += Math.round(minutes * 60_000);
  }

  iso(): string {
    return new Date(this.#now).toISOString();
  }

  visitor(role: DemoRole): Visitor {
    const email = DEMO_PEOPLE.find((person) => person.role === role)?.email ?? "";
    const account = findAccountByEmail(this.platform.db, email);
    if (!account) throw new Error(`the demo has no ${role}`);
    return { ...this.platform, account };
  }

  /** Somebody acting in the survey, as they would over the network. */
  context(role: Role, surveyId: string): Context {
    const visitor = this.visitor(role);
    const standing = standingOf(this.platform.db, surveyId, visitor.account.id);
    return { ...visitor, surveyId, ...standing, reach: role === "counter" ? "own" : "all" };
  }

  uuid(): string {
    const hex = Buffer.from(this.#random(16)).toString("hex");
    return `${hex.slice(0, 8)}-${hex.slice(8, 12)}-4${hex.slice(13, 16)}-8${hex.slice(17, 20)}-${hex.slice(20, 32)}`;
  }

  #random(length: number): Uint8Array {
    const bytes = new Uint8Array(length);
    for (let at = 0; at < length; at += 32) {
      const block = createHash("sha256").update(`quillet demo ${this.#bytes}`).digest();
      this.#bytes += 1;
      bytes.set(block.subarray(0, Math.min(32, length - at)), at);
    }
    return bytes;
  }
}
