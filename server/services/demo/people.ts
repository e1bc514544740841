import { randomBytes } from "node:crypto";

/** The people of the demo: one account a role, and the owner of the installation. */
export const DEMO_PEOPLE = [
  { role: "owner", name: "Hedda Quist", email: "owner@example.org" },
  { role: "planner", name: "Mara Venn", email: "planner@example.org" },
  { role: "lead", name: "Tobias Reyl", email: "lead@example.org" },
  { role: "counter", name: "Ayo Benning", email: "counter@example.org" },
  { role: "auditor", name: "Petra Sandoz", email: "auditor@example.org" },
] as const;

export type DemoRole = (typeof DEMO_PEOPLE)[number]["role"];

export interface DemoAccount {
  readonly role: DemoRole;
  readonly name: string;
  readonly email: string;
  readonly password: string;
}

/** The same people with passwords that nobody knows yet. */
export function newDemoAccounts(): DemoAccount[] {
  return DEMO_PEOPLE.map((person) => ({ ...person, password: madePassword() }));
}

/** 80 bits in four groups that are easy to read out: letters and digits without those that look alike. */
export function madePassword(): string {
  const letters = "abcdefghjkmnpqrstuvwxyz23456789-".slice(0, 31);
  const groups: string[] = [];
  while (groups.length < 4) {
    let group = "";
    while (group.length < 4) {
      const byte = randomBytes(1)[0] ?? 255;
      if (byte < 248) group += letters[byte % 31] ?? "";
    }
    groups.push(group);
  }
  return groups.join("-");
}
