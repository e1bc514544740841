import { expect, test } from "vitest";
import { isFound } from "../../../src/features/surveys/find-surveys.ts";

const fen = { name: "Péllimere Fen", target: "marsh-orchid spikes", season: "2031", roles: ["planner" as const] };

test("every word has to stand in name, target, season or role, in any order, whatever its accents and letters", () => {
  expect(isFound(fen, "")).toBe(true);
  expect(isFound(fen, "  pellimere ")).toBe(true);
  expect(isFound(fen, "2031 ORCHID")).toBe(true);
  expect(isFound(fen, "planner fen")).toBe(true);
  expect(isFound(fen, "fen 2030")).toBe(false);
});
