import { screen, waitFor, within } from "@testing-library/react";
import userEvent from "@testing-library/user-event";
import { afterEach, expect, test, vi } from "vitest";
import { importCounts } from "#shared/api/counts.ts";
import { Problem } from "#shared/problem.ts";
import { renderApp } from "../app/render-app.tsx";
import { visit } from "../field/field-fixtures.ts";
import { address, open, rowOf, tableOf } from "./counts-fixtures.ts";

afterEach(() => {
  vi.unstubAllGlobals();
});

const cells = [visit(1), visit(2), visit(3), visit(4)];

/** The stage with a table of these lines chosen. */
async function choose(lines: readonly string[], changes: { refuse?: (call: number) => Problem | null } = {}) {
  const { api } = open(["lead"], cells);
  const { file, verdictFor } = tableOf(lines, cells);
  let calls = 0;
  api
    .on(importCounts, ({ body }) => {
      calls += 1;
      const refused = changes.refuse?.(calls) ?? null;
      if (refused !== null) throw refused;
      return verdictFor(body);
    })
    .install();
  renderApp(address);
  await userEvent.upload(await screen.findByLabelText("Drop the table of counts here", { selector: "input" }), file);
  return { api, bodies: () => api.named("importCounts").map(({ body }) => body) };
}

const verdicts = () => within(screen.getByRole("list", { name: "Rows by verdict" }));
const writeButton = (text: string) => screen.findByRole("button", { name: text });

test("each row is shown as it is read, and written only when somebody says so", async () => {
  const { bodies } = await choose(["unit,spikes", "1,7", "2,0", "3,>5", "9,4"]);
  const button = await writeButton("Write 2 counts");
  expect(
    verdicts()
      .getAllByRole("listitem")
      .map((item) => item.textContent),
  ).toEqual(["2 will be written", "1 not drawn, not used", "1 not taken"]);
  screen.getByText(/1 drawn cell is not in the table: not yet counted, not zero\. A4/);
  await userEvent.click(button);
  await screen.findByText("2 counts are written.");
  expect(verdicts().getAllByRole("listitem")[0]?.textContent).toBe("2 written");
  expect(screen.queryByText("Would be written: 7.")).toBeNull();
  expect(screen.queryByRole("button", { name: /^Write/ })).toBeNull();
  expect(bodies()).toMatchObject([{ write: null }, { write: expect.stringMatching(/^[0-9a-f]{64}$/) as string }]);
});

test("another column is judged again, and nothing on the page goes away meanwhile", async () => {
  const { bodies } = await choose(["unit,spikes,again,who,day", "1,7,8,Tove Lind,2031-06-03"]);
  await writeButton("Write 1 count");
  const count = screen.getByLabelText("Count");
  expect(screen.getByLabelText<HTMLSelectElement>("Counted by").selectedOptions[0]?.text).toBe("who");
  expect(screen.getByLabelText<HTMLSelectElement>("Date").selectedOptions[0]?.text).toBe("day");
  await userEvent.selectOptions(count, "again");
  await screen.findByText("Would be written: 8.");
  expect(screen.getByLabelText("Count")).toBe(count);
  const row = within(screen.getByRole("table", { name: "Rows of the table and how they are read" }));
  row.getByText("2031-06-03");
  row.getByText("Tove Lind");
  expect(bodies()[1]).toMatchObject({ columns: { unit: 0, count: 2, observer: 3, date: 4 } });
});

test("dates that can be read two ways are asked once, and written by the answer", async () => {
  const { bodies } = await choose(["unit,spikes,date", "1,7,03/06/31", "2,4,04/06/31", "3,5,2031-06-03"]);
  await writeButton("Write 1 count");
  screen.getByText(/^All or none\. .* 2 rows wait for an answer and stay aside\.$/);
  const asked = within(screen.getByRole("group", { name: "What the table leaves open" }));
  asked.getByText("Which comes first in dates such as 03/06/31?");
  await userEvent.click(asked.getByRole("radio", { name: "day first: 3 June 2031" }));
  await userEvent.click(await writeButton("Write 3 counts"));
  await screen.findByText("3 counts are written.");
  expect(bodies().map((body) => (body as { dateOrder?: string }).dateOrder)).toEqual([
    undefined,
    "day-first",
    "day-first",
  ]);
});

test("an answer can be changed until the table is written", async () => {
  await choose(["unit,spikes,date", "1,7,03/06/31"]);
  await userEvent.click(await screen.findByRole("radio", { name: "month first: 6 March 2031" }));
  await screen.findByText(/Dated 6 March 2031, before the cell was drawn or opened/);
  await userEvent.click(screen.getByRole("radio", { name: "day first: 3 June 2031" }));
  await waitFor(() => {
    expect(screen.queryByText(/Dated 6 March/)).toBeNull();
  });
  screen.getByText("Answered; it can be changed until it is written");
});

test("a name that differs from a member's by case or spaces is merged after a yes only", async () => {
  const { bodies } = await choose(["unit,spikes,observer", "1,7,tove lind", "2,4,Tove Lind", "3,1,R. Holt"]);
  await writeButton("Write 2 counts");
  screen.getByText("No member of the survey has this name, so it stays in the notes: R. Holt.");
  const asked = within(screen.getByRole("group", { name: "Is “tove lind” “Tove Lind”?" }));
  await userEvent.click(asked.getByRole("radio", { name: "Yes, Tove Lind" }));
  await userEvent.click(await writeButton("Write 3 counts"));
  await screen.findByText("3 counts are written.");
  expect(bodies().at(-1)).toMatchObject({ observers: [{ written: "tove lind", member: "m2" }] });
});

test("a no keeps the name in the notes as it is written", async () => {
  const { bodies } = await choose(["unit,spikes,observer", "1,7,r. holt", "2,4,R. Holt", "3,1,R. Holt"]);
  const asked = within(await screen.findByRole("group", { name: "Is “r. holt” “R. Holt”?" }));
  await userEvent.click(asked.getByRole("radio", { name: "No, somebody else" }));
  await writeButton("Write 3 counts");
  expect(bodies().at(-1)).toMatchObject({ observers: [{ written: "r. holt", name: "r. holt" }] });
});

test("a word that may be a zero is asked, and a state without its number is not offered as one", async () => {
  const { bodies } = await choose(["unit,spikes,state", "1,nil,", "2,,counted"]);
  await userEvent.click(await screen.findByRole("checkbox", { name: "“nil” means 0 (1 row)" }));
  expect(screen.getAllByRole("checkbox")).toHaveLength(1);
  await writeButton("Write 1 count");
  expect(bodies().at(-1)).toMatchObject({ zeroWords: ["nil"] });
});

test("a refusal to write keeps table, columns and answers, and offers to read it again", async () => {
  const { bodies } = await choose(["unit,spikes,date", "1,7,03/06/31"], {
    refuse: (call) =>
      call === 3
        ? new Problem("changed-meanwhile", "Nothing was written: cell A1 was given a count meanwhile, 3.")
        : null,
  });
  await userEvent.click(await screen.findByRole("radio", { name: "day first: 3 June 2031" }));
  await userEvent.click(await writeButton("Write 1 count"));
  expect((await screen.findByRole("alert")).textContent).toContain("cell A1 was given a count meanwhile, 3.");
  expect(screen.getByRole<HTMLInputElement>("radio", { name: "day first: 3 June 2031" }).checked).toBe(true);
  await userEvent.click(screen.getByRole("button", { name: "Read it again" }));
  await waitFor(() => {
    expect(bodies()).toHaveLength(4);
  });
  expect(bodies()[3]).toMatchObject({ write: null, dateOrder: "day-first" });
});

test("what could not be judged again cannot be written", async () => {
  await choose(["unit,spikes,date", "1,7,2031-06-03", "2,4,03/06/31"], {
    refuse: (call) => (call === 2 ? new Problem("unreachable", "Check the network.") : null),
  });
  await writeButton("Write 1 count");
  await userEvent.click(screen.getByRole("radio", { name: "day first: 3 June 2031" }));
  expect((await screen.findByRole("alert")).textContent).toContain("Check the network.");
  expect(screen.queryByRole("button", { name: /^Write/ })).toBeNull();
  await userEvent.click(screen.getByRole("button", { name: "Read it again" }));
  await writeButton("Write 2 counts");
});

test("while a table is ready to be written, its button is the one filled green", async () => {
  await choose(["unit,spikes", "1,7"]);
  const write = await writeButton("Write 1 count");
  await userEvent.click(await rowOf("A2"));
  const save = within(await screen.findByRole("form", { name: "Count of A2" })).getByRole("button", { name: "Save" });
  expect(write.className).toContain("q-button-primary");
  expect(save.className).not.toContain("q-button-primary");
});
