import { render, screen } from "@testing-library/react";
import userEvent from "@testing-library/user-event";
import { useState } from "react";
import { MemoryRouter } from "react-router-dom";
import { describe, expect, it, vi } from "vitest";
import { Button } from "../../../src/components/ui/Button.tsx";
import { Dialog } from "../../../src/components/ui/Dialog.tsx";
import { Menu } from "../../../src/components/ui/Menu.tsx";
import { Tabs } from "../../../src/components/ui/Tabs.tsx";

function Withdraw() {
  const [open, setOpen] = useState(false);
  return (
    <>
      <Button onClick={() => setOpen(true)}>Withdraw the draw…</Button>
      <Dialog
        open={open}
        onOpenChange={setOpen}
        title="Withdraw draw 2?"
        lead="Its 60 picks stay in the record."
        actions={<Button onClick={() => setOpen(false)}>Keep the draw</Button>}
      />
    </>
  );
}

describe("what floats", () => {
  it("a dialog is named by its question, described by its consequence, and Escape leads back", async () => {
    render(<Withdraw />);
    const opener = screen.getByRole("button", { name: "Withdraw the draw…" });
    await userEvent.click(opener);
    const dialog = screen.getByRole("dialog", { name: "Withdraw draw 2?" });
    expect(document.getElementById(dialog.getAttribute("aria-describedby") ?? "")?.textContent).toBe(
      "Its 60 picks stay in the record.",
    );
    expect(document.activeElement).toBe(screen.getByRole("button", { name: "Keep the draw" }));
    await userEvent.keyboard("{Escape}");
    expect(screen.queryByRole("dialog")).toBeNull();
    expect(document.activeElement).toBe(opener);
  });

  it("a menu opens by key and acts by key", async () => {
    const out = vi.fn();
    render(
      <MemoryRouter>
        <Menu
          trigger={<Button>Ines Marrow</Button>}
          items={[
            { kind: "link", label: "Account", to: "/account" },
            { kind: "rule" },
            { kind: "act", label: "Sign out", onSelect: out },
          ]}
        />
      </MemoryRouter>,
    );
    screen.getByRole("button").focus();
    await userEvent.keyboard("{Enter}");
    expect(screen.getAllByRole("menuitem").map((item) => item.textContent)).toEqual(["Account", "Sign out"]);
    await userEvent.keyboard("{ArrowDown}{Enter}");
    expect(out).toHaveBeenCalledTimes(1);
  });

  it("arrows move between tabs and show what belongs to each", async () => {
    render(
      <Tabs
        label="The draw"
        tabs={[
          { id: "picks", label: "Picks 60", content: "sixty" },
          { id: "reserves", label: "Reserves 12", content: "twelve" },
        ]}
      />,
    );
    await userEvent.tab();
    expect(document.activeElement).toBe(screen.getByRole("tab", { name: "Picks 60" }));
    await userEvent.keyboard("{ArrowRight}");
    expect(screen.getByRole("tab", { name: "Reserves 12" }).getAttribute("aria-selected")).toBe("true");
    expect(screen.getByRole("tabpanel").textContent).toBe("twelve");
  });
});
