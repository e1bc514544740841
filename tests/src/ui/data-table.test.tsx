import { render, screen, waitFor, within } from "@testing-library/react";
import userEvent from "@testing-library/user-event";
import { useState } from "react";
import { describe, expect, it } from "vitest";
import type { DataColumn } from "../../../src/components/ui/data-column.ts";
import { DataTable } from "../../../src/components/ui/DataTable.tsx";

interface Row {
  readonly label: string;
  readonly order: number;
  readonly count: number | null;
}

const ROWS: readonly Row[] = [
  { label: "B2", order: 1, count: 5 },
  { label: "A10", order: 2, count: null },
  { label: "A9", order: 3, count: 0 },
];

const COLUMNS: readonly DataColumn<Row>[] = [
  { id: "order", head: "Order", numeric: true, sortBy: (row) => row.order, cell: (row) => row.order },
  { id: "label", head: "Cell", sortBy: (row) => row.label, cell: (row) => row.label },
  { id: "count", head: "Count", numeric: true, sortBy: (row) => row.count, cell: (row) => row.count ?? "none yet" },
  { id: "note", head: "Note", cell: () => "" },
];

function labels(): (string | null | undefined)[] {
  return screen
    .getAllByRole("row")
    .slice(1)
    .map((row) => row.querySelectorAll("td")[1]?.textContent);
}

function Chooser({ rows }: { readonly rows: readonly Row[] }) {
  const [chosen, setChosen] = useState<string | null>(null);
  return (
    <DataTable
      caption="Picks"
      columns={COLUMNS}
      rows={rows}
      rowId={(row) => row.label}
      chosen={chosen}
      onChoose={setChosen}
    />
  );
}

describe("DataTable", () => {
  it("keeps the order given until a head is pressed", () => {
    render(<DataTable caption="Picks" columns={COLUMNS} rows={ROWS} rowId={(row) => row.label} />);
    expect(labels()).toEqual(["B2", "A10", "A9"]);
    expect(screen.getByRole("columnheader", { name: "Order" }).getAttribute("aria-sort")).toBe("none");
  });

  it("sorts by press, up and then down, and says so; labels sort as numbers where they hold some", async () => {
    render(<DataTable caption="Picks" columns={COLUMNS} rows={ROWS} rowId={(row) => row.label} />);
    const head = screen.getByRole("columnheader", { name: "Cell" });
    await userEvent.click(within(head).getByRole("button"));
    expect(labels()).toEqual(["A9", "A10", "B2"]);
    expect(head.getAttribute("aria-sort")).toBe("ascending");
    await userEvent.click(within(head).getByRole("button"));
    expect(labels()).toEqual(["B2", "A10", "A9"]);
    expect(head.getAttribute("aria-sort")).toBe("descending");
  });

  it("a missing count is no number: it comes last whichever way the counts are sorted", async () => {
    render(<DataTable caption="Picks" columns={COLUMNS} rows={ROWS} rowId={(row) => row.label} />);
    const button = within(screen.getByRole("columnheader", { name: "Count" })).getByRole("button");
    await userEvent.click(button);
    expect(labels()).toEqual(["A9", "B2", "A10"]);
    await userEvent.click(button);
    expect(labels()).toEqual(["B2", "A9", "A10"]);
  });

  it("sorts by keyboard alone; a column without an order has no button", async () => {
    render(<DataTable caption="Picks" columns={COLUMNS} rows={ROWS} rowId={(row) => row.label} />);
    await userEvent.tab();
    await userEvent.tab();
    await userEvent.keyboard("{Enter}");
    expect(labels()).toEqual(["A9", "A10", "B2"]);
    expect(within(screen.getByRole("columnheader", { name: "Note" })).queryByRole("button")).toBeNull();
  });

  it("rows are chosen by press, or reached by arrows and chosen by Enter", async () => {
    render(<Chooser rows={ROWS} />);
    await userEvent.click(screen.getByText("A10"));
    expect(screen.getByRole("row", { selected: true }).textContent).toContain("A10");
    screen.getByRole("row", { selected: true }).focus();
    await userEvent.keyboard("{ArrowDown}");
    await waitFor(() => expect(document.activeElement?.textContent).toContain("A9"));
    await userEvent.keyboard("{Enter}");
    expect(screen.getByRole("row", { selected: true }).textContent).toContain("A9");
  });

  it("shows what is open below a row", () => {
    render(
      <DataTable
        caption="Picks"
        columns={COLUMNS}
        rows={ROWS}
        rowId={(row) => row.label}
        detail={(row) => row.label === "A10" && "form of A10"}
      />,
    );
    expect(screen.getAllByRole("row").map((row) => row.textContent)).toEqual([
      "OrderCellCountNote",
      "1B25",
      "2A10none yet",
      "form of A10",
      "3A90",
    ]);
  });

  // 560 px of frame, 33 px a row, 12 rows more on either side: about 30 of 5 000.
  it("a list of 5 000 rows keeps only those in sight in the page, and says how many there are", () => {
    const many = Array.from({ length: 5000 }, (_, index) => ({ label: `A${index + 1}`, order: index + 1, count: 0 }));
    render(<Chooser rows={many} />);
    expect(screen.getByRole("grid").getAttribute("aria-rowcount")).toBe("5001");
    const shown = document.querySelectorAll("tr[data-row]").length;
    expect(shown).toBeGreaterThan(10);
    expect(shown).toBeLessThan(60);
  });

  it("says what it was told to say where there is nothing", () => {
    render(<DataTable caption="Picks" columns={COLUMNS} rows={[]} rowId={(row) => row.label} empty="No picks yet." />);
    expect(screen.getByText("No picks yet.")).toBeTruthy();
  });
});
