import { render, screen } from "@testing-library/react";
import userEvent from "@testing-library/user-event";
import { describe, expect, it, vi } from "vitest";
import { Banner } from "../../../src/components/ui/Banner.tsx";
import { Button } from "../../../src/components/ui/Button.tsx";
import { Progress } from "../../../src/components/ui/Progress.tsx";

describe("Button", () => {
  it("does nothing while it is busy, says what it does, and keeps the focus", async () => {
    const press = vi.fn();
    const { rerender } = render(<Button onClick={press}>Seal the frame</Button>);
    await userEvent.click(screen.getByRole("button", { name: "Seal the frame" }));
    rerender(
      <Button busy busyLabel="Sealing…" onClick={press}>
        Seal the frame
      </Button>,
    );
    const busy = screen.getByRole("button", { name: "Sealing…" });
    expect(document.activeElement).toBe(busy);
    await userEvent.keyboard("{Enter}");
    await userEvent.click(busy);
    expect(press).toHaveBeenCalledTimes(1);
    expect(busy.getAttribute("aria-busy")).toBe("true");
  });

  it("does not send a form by chance, and never twice", async () => {
    const send = vi.fn((event: { preventDefault: () => void }) => event.preventDefault());
    const form = (busy: boolean) => (
      <form onSubmit={send}>
        <Button>Help</Button>
        <Button type="submit" busy={busy}>
          Save
        </Button>
      </form>
    );
    const { rerender } = render(form(false));
    await userEvent.click(screen.getByRole("button", { name: "Help" }));
    expect(send).not.toHaveBeenCalled();
    await userEvent.click(screen.getByRole("button", { name: "Save" }));
    rerender(form(true));
    await userEvent.click(screen.getByRole("button", { name: "Save" }));
    expect(send).toHaveBeenCalledTimes(1);
  });
});

describe("Banner", () => {
  it("a refusal is announced; information waits to be read", () => {
    render(
      <>
        <Banner tone="refuse" title="The frame was not sealed.">
          Reload and check again.
        </Banner>
        <Banner title="Draw 1 was withdrawn." />
      </>,
    );
    expect(screen.getAllByRole("alert").map((one) => one.textContent)).toEqual([
      "The frame was not sealed. Reload and check again.",
    ]);
  });
});

describe("Progress", () => {
  it("says how far the work is in numbers and words, and can be cancelled", async () => {
    const cancel = vi.fn();
    render(<Progress label="Measuring" value={0.64} detail="640 of 1 000" onCancel={cancel} />);
    const bar = screen.getByRole("progressbar", { name: "Measuring" });
    expect(bar.getAttribute("aria-valuenow")).toBe("64");
    expect(bar.getAttribute("aria-valuetext")).toBe("640 of 1 000");
    await userEvent.click(screen.getByRole("button", { name: "Cancel" }));
    expect(cancel).toHaveBeenCalledTimes(1);
  });

  it("tells no share while nobody knows it", () => {
    render(<Progress label="Reading" value={null} />);
    expect(screen.getByRole("progressbar").getAttribute("aria-valuenow")).toBeNull();
  });
});
