import { screen } from "@testing-library/react";
import type * as z from "zod/mini";
import type { Role } from "#shared/access/table.ts";
import { readSession } from "#shared/api/accounts.ts";
import type { enterCounts, importCounts } from "#shared/api/counts.ts";
import { type ImportVerdict } from "#shared/api/counts.ts";
import { listVisits, type Visit } from "#shared/api/field.ts";
import { readSurvey } from "#shared/api/surveys.ts";
import { Problem } from "#shared/problem.ts";
import { judgeCountsTask } from "#server/jobs/judge-counts.ts";
import { presentImport } from "#server/presenters/counts.ts";
import { FakeApi } from "../app/fake-api.ts";
import { session, survey } from "../app/fixtures.ts";
import { counted, people, visitList } from "../field/field-fixtures.ts";

export const address = "/surveys/s1/counts";

/** The Counts stage over cells that the server changes between two answers. */
export function open(roles: Role[], visits: Visit[]) {
  const state = { visits };
  const api = new FakeApi()
    .on(readSession, () => session())
    .on(readSurvey, () => survey(roles))
    .on(listVisits, () => visitList(state.visits));
  return { api, state };
}

export const gridOf = async () => screen.findByRole("grid", { name: "Cells and their counts" });

/** The row of a cell, not what is open below it. */
export async function rowOf(label: string): Promise<HTMLElement> {
  const rows = (await gridOf()).querySelectorAll<HTMLElement>("tr[data-row]");
  const row = [...rows].find((one) => one.querySelector("b")?.textContent === label);
  if (!row) throw new Error(`no row of ${label}`);
  return row;
}

type Counted = Extract<Visit["count"], { state: "counted" }>;

/** A number in force, by Tove Lind on 5 June 2031 at 11:00 in Paris. */
export function inForce(value: number, part: Partial<Counted> = {}): Counted {
  const count = counted(value);
  if (count.state !== "counted") throw new Error(count.state);
  return { ...count, ...part };
}

/** Keeps what is entered, as the server would. */
export function keeping(state: { visits: Visit[] }) {
  return ({ body }: { body: z.output<typeof enterCounts.body> }) => {
    for (const { visitId, said, id, note, madeAt } of body.entries) {
      const told = { entryId: id, by: "Ines Marrow", at: madeAt, note, amended: false };
      state.visits = state.visits.map((one) => (one.id === visitId ? { ...one, count: { ...said, ...told } } : one));
    }
    return { visits: state.visits };
  };
}

type ImportBody = z.output<typeof importCounts.body>;

/** A table of these lines, and the server's own verdict on it, read on 20 June 2031. */
export function tableOf(lines: readonly string[], visits: readonly Visit[]) {
  const text = `${lines.join("\n")}\n`;
  const verdictFor = (body: ImportBody): ImportVerdict => {
    const judged = judgeCountsTask({
      bytes: new TextEncoder().encode(text),
      columns: Object.fromEntries(Object.entries(body.columns ?? {})),
      cells: visits.map(({ unit, label, orders }) => ({ unit, label, orders, openedAt: "2031-05-02T08:00:00Z" })),
      existing: new Map(),
      rules: { wholeNumbers: true, zeroWords: body.zeroWords },
      targetWords: ["spikes", "spike"],
      dates: {
        timeZone: "Europe/Paris",
        now: "2031-06-20T12:00:00Z",
        seasonStartsOn: null,
        seasonEndsOn: null,
        order: body.dateOrder,
      },
      members: people,
      observers: body.observers ?? [],
    });
    if (body.write !== null && body.write !== judged.fileSha256) throw new Problem("table-changed", "Judge it first.");
    return presentImport({ judged, written: body.write !== null && judged.toWrite.length > 0, importedBefore: null });
  };
  return { file: new File([text], "counts.csv", { type: "text/csv" }), verdictFor };
}
