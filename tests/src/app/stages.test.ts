import { expect, test } from "vitest";
import { stagesFor, stageThatMatters, stations } from "../../../src/app/stages.ts";
import { stages } from "./fixtures.ts";

test("a counter's stages are Field and Counts; everybody else sees all eight", () => {
  expect(stagesFor(["counter"])).toEqual(["field", "counts"]);
  expect(stagesFor(["auditor"])).toHaveLength(8);
  expect(stagesFor(["counter", "lead"])).toHaveLength(8);
  expect(stagesFor([])).toEqual([]);
});

test("attention comes before work in progress, and that before what is not begun", () => {
  const done = { state: "done", note: "1 area" } as const;
  const all = stages({
    area: done,
    frame: { state: "attention", note: "the boundary changed" },
    draw: { state: "in-work", note: "declared" },
    record: { state: "in-work", note: "7 events" },
  });
  expect(stageThatMatters(["planner"], all)?.stage).toBe("frame");
  const working = all.map((one) => (one.stage === "frame" ? { ...one, state: "done" as const } : one));
  expect(stageThatMatters(["planner"], working)?.stage).toBe("draw");
});

// The plan can be left out: with area and frame done the draw is next.
test("the stage that matters skips the plan", () => {
  const done = { state: "done", note: "" } as const;
  const all = stages({ area: done, frame: done, record: { state: "in-work", note: "3 events" } });
  expect(stageThatMatters(["planner"], all)?.stage).toBe("draw");
});

test("a survey where all is done leads to its record", () => {
  const all = stages().map((one) => ({ ...one, state: "done" as const }));
  expect(stageThatMatters(["auditor"], all)?.stage).toBe("record");
});

test("stations carry the note of their stage and the address of its page", () => {
  const [area] = stations("s1", ["planner"], stages({ area: { state: "done", note: "1 area, 1 hole" } }));
  expect(area).toMatchObject({ name: "Area", state: "done", note: "1 area, 1 hole", to: "/surveys/s1/area" });
});
