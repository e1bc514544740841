import fc from "fast-check";
import { describe, expect, test } from "vitest";
import { drawEntries, type Entry } from "#shared/draw/draw.ts";
import { entriesInUse, type FieldAct } from "#shared/field/in-use.ts";
import { Problem } from "#shared/problem.ts";

/** A list of units in draw order; the first `picks` are picks. */
function listOf(units: readonly number[], picks: number): Entry[] {
  return units.map((unit, i) => {
    const first = units.indexOf(unit);
    return { position: i + 1, unit, repeatOf: first === i ? null : first + 1, reserve: i >= picks };
  });
}
const positions = (entries: readonly { readonly position: number }[]) => entries.map((entry) => entry.position);
const close = (unit: number): FieldAct => ({ kind: "close", unit });

describe("reserves open strictly in draw order", () => {
  test("before anything happens the picks are in use and no reserve is", () => {
    const state = entriesInUse(listOf([7, 3, 9, 5, 2], 3), 3, []);
    expect(positions(state.inUse)).toEqual([1, 2, 3]);
    expect(state).toMatchObject({ closed: [], passedOver: [], opened: [], openedTo: 3, reservesLeft: 2, unfilled: 0 });
  });

  // Picks 7 3 9, reserves 5 2. Closing 3 opens position 4 (unit 5); closing 5 in turn opens position 5 (unit 2).
  test("closing a pick opens the next entry, and closing that one the one after", () => {
    const state = entriesInUse(listOf([7, 3, 9, 5, 2], 3), 3, [close(3), close(5)]);
    expect(positions(state.inUse)).toEqual([1, 3, 5]);
    expect(positions(state.closed)).toEqual([2, 4]);
    expect(state.opened).toEqual([
      { position: 4, because: 2 },
      { position: 5, because: 4 },
    ]);
    expect(state.reservesLeft).toBe(0);
  });

  // Unit 7 stands at positions 1 and 3: two entries open, 4 for pick 1 and 5 for pick 3.
  test("a cell picked twice opens two when it is closed", () => {
    const state = entriesInUse(listOf([7, 3, 7, 5, 2, 8], 3), 3, [close(7)]);
    expect(positions(state.closed)).toEqual([1, 3]);
    expect(positions(state.inUse)).toEqual([2, 4, 5]);
    expect(state.opened).toEqual([
      { position: 4, because: 1 },
      { position: 5, because: 3 },
    ]);
  });

  // Position 4 repeats unit 9, which stays in use: 9 is then in use twice and its count enters twice.
  test("an opened entry may repeat a cell that is in use", () => {
    const state = entriesInUse(listOf([7, 3, 9, 9, 2], 3), 3, [close(3)]);
    expect(state.inUse.map((entry) => entry.unit)).toEqual([7, 9, 9]);
    // Closing 9 now closes positions 3 and 4, and two are needed where one is left.
    const next = entriesInUse(listOf([7, 3, 9, 9, 2], 3), 3, [close(3), close(9)]);
    expect(positions(next.closed)).toEqual([2, 3, 4]);
    expect(positions(next.inUse)).toEqual([1, 5]);
    expect(next.unfilled).toBe(1);
  });

  // Reserves: 3 (closed itself), 3 again, 5. Both are passed over, on record, and position 6 opens.
  test("an entry that falls on a closed cell is passed over and the next opens", () => {
    const state = entriesInUse(listOf([7, 3, 9, 3, 3, 5], 3), 3, [close(3)]);
    expect(state.passedOver).toEqual([
      { position: 4, unit: 3, because: 2 },
      { position: 5, unit: 3, because: 2 },
    ]);
    expect(state.opened).toEqual([{ position: 6, because: 2 }]);
    expect(positions(state.closed)).toEqual([2]);
    expect(positions(state.inUse)).toEqual([1, 3, 6]);
  });

  test("a closed cell closed again, for another reason, opens nothing more", () => {
    const list = listOf([7, 3, 9, 5, 2], 3);
    expect(entriesInUse(list, 3, [close(3), close(3)])).toEqual(entriesInUse(list, 3, [close(3)]));
  });

  test("a cell that is not to be visited cannot be closed", () => {
    const list = listOf([7, 3, 9, 5, 2], 3);
    expect(() => entriesInUse(list, 3, [close(5)])).toThrow(Problem);
    expect(() => entriesInUse(list, 3, [close(5)])).toThrow("No pick in use is of unit 5");
  });

  test("more picks than entries is a bug and is told", () => {
    expect(() => entriesInUse(listOf([1, 2], 2), 3, [])).toThrow("3 picks of a list of 2");
    expect(() => entriesInUse(listOf([1, 2], 2), 1, [{ kind: "add", count: 0 }])).toThrow("cannot add 0 picks");
  });
});

describe("added, amended and reopened picks", () => {
  // Added picks open the next entries, closed cells passed over, so that as many as wanted are in use.
  test("adding picks opens so many further entries", () => {
    const state = entriesInUse(listOf([7, 3, 9, 3, 5, 2, 8], 3), 3, [close(3), { kind: "add", count: 2 }]);
    expect(state.opened).toEqual([
      { position: 5, because: 2 },
      { position: 6, because: null },
      { position: 7, because: null },
    ]);
    expect(positions(state.inUse)).toEqual([1, 3, 5, 6, 7]);
  });

  test("a counted cell amended to a closed state opens no reserve", () => {
    const state = entriesInUse(listOf([7, 3, 9, 5], 3), 3, [{ kind: "close-counted", unit: 3 }]);
    expect(positions(state.inUse)).toEqual([1, 3]);
    expect(positions(state.closed)).toEqual([2]);
    expect(state).toMatchObject({ opened: [], openedTo: 3, reservesLeft: 1 });
  });

  // Position 4 stands for pick 2 already; closing 3 a second time needs no further one.
  test("a cell reopened and closed again opens its reserve once", () => {
    const list = listOf([7, 3, 9, 5, 2], 3);
    const reopened = entriesInUse(list, 3, [close(3), { kind: "reopen", unit: 3 }]);
    expect(positions(reopened.inUse)).toEqual([1, 2, 3, 4]);
    expect(reopened.closed).toEqual([]);
    const again = entriesInUse(list, 3, [close(3), { kind: "reopen", unit: 3 }, close(3)]);
    expect(positions(again.inUse)).toEqual([1, 3, 4]);
    expect(again.opened).toEqual([{ position: 4, because: 2 }]);
  });

  // An amendment opened nothing, so that a real closing later still has to.
  test("a cell amended, reopened and then closed opens its reserve", () => {
    const acts: FieldAct[] = [{ kind: "close-counted", unit: 3 }, { kind: "reopen", unit: 3 }, close(3)];
    expect(entriesInUse(listOf([7, 3, 9, 5], 3), 3, acts).opened).toEqual([{ position: 4, because: 2 }]);
  });

  test("an entry passed over is in use when its cell is reopened", () => {
    const state = entriesInUse(listOf([7, 3, 9, 3, 5], 3), 3, [close(3), { kind: "reopen", unit: 3 }]);
    expect(positions(state.inUse)).toEqual([1, 2, 3, 4, 5]);
    expect(state.passedOver).toEqual([]);
  });

  // Position 4 fell on unit 3 and 5 opened in its place: when 3 closes again nothing is missing.
  test("an entry passed over, reopened and closed again opens nothing", () => {
    const acts: FieldAct[] = [close(3), { kind: "reopen", unit: 3 }, close(3)];
    const state = entriesInUse(listOf([7, 3, 9, 3, 5, 2], 3), 3, acts);
    expect(state.opened).toEqual([{ position: 5, because: 2 }]);
    expect(positions(state.inUse)).toEqual([1, 3, 5]);
  });

  // The amendment opened no reserve; saying later "unsafe" instead of "refused" opens none either.
  test("an amended cell closed again for another reason opens no reserve", () => {
    const acts: FieldAct[] = [{ kind: "close-counted", unit: 3 }, close(3)];
    expect(entriesInUse(listOf([7, 3, 9, 5], 3), 3, acts)).toMatchObject({ opened: [], openedTo: 3 });
  });

  test("a list at its end says how many openings it lacks, and a longer list fills them alike", () => {
    const frame = { sha256: "a".repeat(64), units: 30 };
    const list = (reserves: number) =>
      drawEntries(frame, { kind: "srs-wor", n: 5 }, "42", "sha256-counter", reserves)[0]?.entries ?? [];
    const acts = list(0)
      .slice(0, 3)
      .map((entry) => close(entry.unit));
    const short = entriesInUse(list(1), 5, acts);
    expect(short).toMatchObject({ unfilled: 2, reservesLeft: 0, openedTo: 6 });
    const long = entriesInUse(list(4), 5, acts);
    expect(long).toMatchObject({ unfilled: 0, reservesLeft: 1, openedTo: 8 });
    expect(long.opened.slice(0, 1)).toEqual(short.opened);
  });
});

describe("what holds whatever happens", { timeout: 60_000 }, () => {
  const story = fc.record({
    units: fc.integer({ min: 3, max: 25 }),
    kind: fc.constantFrom("srs-wr" as const, "srs-wor" as const),
    n: fc.integer({ min: 1, max: 12 }),
    seed: fc.stringMatching(/^[0-9]{1,8}$/),
    steps: fc.array(fc.tuple(fc.constantFrom("close", "close", "close-counted", "reopen", "add"), fc.nat(20)), {
      maxLength: 12,
    }),
  });

  /** Plays random acts, each on a cell for which it is possible. */
  function play({ units, kind, n, seed, steps }: typeof story extends fc.Arbitrary<infer T> ? T : never) {
    const picks = Math.min(n, units);
    const reserves = kind === "srs-wor" ? units - picks : 40;
    const entries =
      drawEntries({ sha256: "b".repeat(64), units }, { kind, n: picks }, seed, "sha256-counter", reserves)[0]
        ?.entries ?? [];
    const acts: FieldAct[] = [];
    for (const [what, where] of steps) {
      const now = entriesInUse(entries, picks, acts);
      const from = what === "reopen" ? now.closed : now.inUse;
      const chosen = from[where % Math.max(1, from.length)];
      if (what === "add") acts.push({ kind: "add", count: 1 + (where % 3) });
      else if (chosen !== undefined) acts.push({ kind: what, unit: chosen.unit });
    }
    return { entries, picks, acts, state: entriesInUse(entries, picks, acts) };
  }

  test("what is in use is a prefix less what is closed, in draw order", () => {
    fc.assert(
      fc.property(story, (told) => {
        const { entries, state } = play(told);
        const out = new Set([...positions(state.closed), ...positions(state.passedOver)]);
        expect(state.inUse).toEqual(entries.slice(0, state.openedTo).filter((entry) => !out.has(entry.position)));
        const closedUnits = new Set([...state.closed, ...state.passedOver].map((entry) => entry.unit));
        expect(state.inUse.some((entry) => closedUnits.has(entry.unit))).toBe(false);
        expect(state.inUse.length + state.closed.length + state.passedOver.length).toBe(state.openedTo);
        expect(state.openedTo + state.reservesLeft).toBe(entries.length);
      }),
      { numRuns: 300 },
    );
  });

  test("closing alone leaves as many picks in use as were drawn, as long as the list lasts", () => {
    fc.assert(
      fc.property(story, (told) => {
        const { picks, state } = play({ ...told, steps: told.steps.filter(([what]) => what === "close") });
        expect(state.inUse.length + state.unfilled).toBe(picks);
        expect(state.opened.length + state.unfilled).toBe(state.closed.length);
      }),
    );
  });

  test("an act never takes an opened reserve back", () => {
    fc.assert(
      fc.property(story, (told) => {
        const { entries, picks, acts } = play(told);
        for (let i = 1; i <= acts.length; i += 1) {
          const before = entriesInUse(entries, picks, acts.slice(0, i - 1));
          const after = entriesInUse(entries, picks, acts.slice(0, i));
          expect(after.opened.slice(0, before.opened.length)).toEqual(before.opened);
          expect(after.openedTo).toBeGreaterThanOrEqual(before.openedTo);
        }
      }),
    );
  });
});
