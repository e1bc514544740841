import { render, screen } from "@testing-library/react";
import userEvent from "@testing-library/user-event";
import { MemoryRouter } from "react-router-dom";
import { describe, expect, it } from "vitest";
import { AppShell } from "../../../src/components/ui/AppShell.tsx";
import { StageLine } from "../../../src/components/ui/StageLine.tsx";
import { StageRail } from "../../../src/components/ui/StageRail.tsx";
import { reachedIndex, type Stage, type StageState } from "../../../src/components/ui/stage-state.ts";

function stage(id: string, state: StageState, note?: string): Stage {
  return { id, name: id, state, note, to: `/${id}` };
}

const STAGES = [
  stage("Area", "done", "1 area, 1 hole"),
  stage("Frame", "attention", "version 2"),
  stage("Plan", "not-started"),
  stage("Record", "in-work", "7 events"),
];

describe("stages", () => {
  it("every station says its state in words, also where a note stands in their place", () => {
    render(
      <MemoryRouter>
        <StageRail stages={STAGES} current="Frame" />
      </MemoryRouter>,
    );
    expect(screen.getAllByRole("link").map((link) => link.textContent)).toEqual([
      "Area1 area, 1 hole, done",
      "Frameversion 2, needs attention",
      "Plannot started",
      "Record7 events, in work",
    ]);
    expect(screen.getByRole("link", { current: "page" }).getAttribute("href")).toBe("/Frame");
  });

  it("the line is solid up to where work has reached, and the record, which is always open, does not stretch it", () => {
    expect(reachedIndex(STAGES)).toBe(1);
    expect(reachedIndex(STAGES.map((one) => ({ ...one, state: "done" as const })))).toBe(3);
    render(
      <MemoryRouter>
        <StageRail stages={STAGES} current={null} />
      </MemoryRouter>,
    );
    expect(screen.getAllByRole("listitem").map((item) => item.getAttribute("data-line"))).toEqual([
      "behind",
      "ahead",
      "ahead",
      "ahead",
    ]);
  });

  it("the row of stations reads as a sentence", () => {
    render(<StageLine stages={STAGES} note="Frame: check the cells" attention />);
    expect(
      screen.getByRole("img", { name: "Area done, Frame needs attention, Plan not started, Record in work" }),
    ).toBeTruthy();
  });

  it("on a phone the stage's name opens all stages as a page; Escape brings the focus back", async () => {
    render(
      <MemoryRouter>
        <AppShell home="/" here="Pellimere Fen" stages={STAGES} currentStage="Frame">
          page
        </AppShell>
      </MemoryRouter>,
    );
    const opener = screen.getByRole("button", { name: "Frame, stage 2 of 4: show all stages" });
    await userEvent.click(opener);
    expect(screen.getByRole("dialog", { name: "Pellimere Fen" })).toBeTruthy();
    await userEvent.keyboard("{Escape}");
    expect(screen.queryByRole("dialog")).toBeNull();
    expect(document.activeElement).toBe(opener);
  });

  it("the first stop of the Tab key leads past the header", async () => {
    render(
      <MemoryRouter>
        <AppShell home="/">page</AppShell>
      </MemoryRouter>,
    );
    await userEvent.tab();
    expect(document.activeElement?.getAttribute("href")).toBe("#main");
    expect(screen.getByRole("main").id).toBe("main");
  });
});
