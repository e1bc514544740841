import { screen } from "@testing-library/react";
import { afterEach, expect, test, vi } from "vitest";
import { listVisits } from "#shared/api/field.ts";
import { renderApp } from "../app/render-app.tsx";
import { visitList } from "../field/field-fixtures.ts";
import { address, open } from "./counts-fixtures.ts";

afterEach(() => {
  vi.unstubAllGlobals();
});

test("before a draw the planner is led to it, and a lead is told who draws", async () => {
  open(["planner"], [])
    .api.on(listVisits, () => visitList([], { drawId: null }))
    .install();
  renderApp(address);
  await screen.findByRole("heading", { name: "No cells to count yet" });
  expect(screen.getByRole("link", { name: "To the draw" }).getAttribute("href")).toBe("/surveys/s1/draw");
});

test("a counter without cells is told that the lead gives them, and is led nowhere", async () => {
  open(["counter"], []).api.install();
  renderApp(address);
  await screen.findByRole("heading", { name: "No cell is given to you yet" });
  expect(screen.queryByRole("link", { name: "To the draw" })).toBeNull();
});
