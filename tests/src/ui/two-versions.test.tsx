import { render, screen, within } from "@testing-library/react";
import userEvent from "@testing-library/user-event";
import { expect, test, vi } from "vitest";
import { TwoVersions } from "../../../src/components/ui/TwoVersions.tsx";
import { type ComparedField, differencesOf, mergedBy } from "../../../src/components/ui/two-versions.ts";

interface Note {
  readonly name: string;
  readonly day: string;
  readonly rule: string;
  readonly hidden: number;
}
const fields: ComparedField<Note>[] = [
  { key: "name", label: "Name", text: ({ name }) => name },
  { key: "day", label: "Day", text: ({ day }) => day },
  { key: "rule", label: "Rule", text: ({ rule }) => rule },
];
const seen: Note = { name: "a", day: "1", rule: "r", hidden: 1 };

// name: both changed it, differently; day: only they did; rule: only I did.
const mine: Note = { name: "mine", day: "1", rule: "my rule", hidden: 1 };
const theirs: Note = { name: "theirs", day: "2", rule: "r", hidden: 2 };

test("what only one of the two changed is theirs to keep, what both changed has to be said", () => {
  expect(differencesOf(fields, { seen, mine, theirs })).toEqual([
    { key: "name", label: "Name", theirs: "theirs", mine: "mine", obvious: null },
    { key: "day", label: "Day", theirs: "2", mine: "1", obvious: "theirs" },
    { key: "rule", label: "Rule", theirs: "r", mine: "my rule", obvious: "mine" },
  ]);
});

test("what both changed alike is no difference", () => {
  expect(differencesOf(fields, { seen, mine: theirs, theirs })).toEqual([]);
});

test("the merged version is theirs but for the fields in which mine was kept", () => {
  expect(mergedBy(fields, { mine, theirs }, { name: "mine", day: "theirs" })).toEqual({ ...theirs, name: "mine" });
});

test("both versions are shown, and nothing is decided before each open field is said", async () => {
  const decide = vi.fn();
  render(
    <TwoVersions
      fields={fields}
      what="These notes"
      action="Keep these notes"
      {...{ seen, mine, theirs }}
      onDecide={decide}
    />,
  );
  expect(document.activeElement).toBe(screen.getByRole("heading", { name: "Both versions" }));
  const button = screen.getByRole("button", { name: "Keep these notes" });
  expect(button.hasAttribute("disabled")).toBe(true);
  screen.getByText("Still to be said: name.");
  const name = within(screen.getByRole("group", { name: "Name" }));
  await userEvent.click(name.getByRole("radio", { name: /^Keep mine/ }));
  const rule = within(screen.getByRole("group", { name: "Rule" }));
  await userEvent.click(rule.getByRole("radio", { name: /^Take theirs/ }));
  await userEvent.click(button);
  expect(decide).toHaveBeenCalledExactlyOnceWith({ ...theirs, name: "mine" });
});
