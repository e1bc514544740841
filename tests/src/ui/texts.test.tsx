import { render, screen } from "@testing-library/react";
import userEvent from "@testing-library/user-event";
import { describe, expect, it } from "vitest";
import { Figure } from "../../../src/components/ui/Figure.tsx";
import { Hash } from "../../../src/components/ui/Hash.tsx";
import { KeyValues } from "../../../src/components/ui/KeyValues.tsx";
import { Seed } from "../../../src/components/ui/Seed.tsx";
import { VisitStateLabel } from "../../../src/components/ui/VisitStateLabel.tsx";
import { VISIT_STATE_WORDS, type VisitMarkState } from "../../../src/components/ui/visit-states.ts";

const HASH = "17f6c777" + "ab".repeat(25) + "c3d9a4";

describe("texts that are proof", () => {
  it("a seed stands between straight quotes with its leading zeros and its inner spaces", () => {
    const { container } = render(<Seed value="007  31 x" />);
    expect(container.textContent).toBe('"007  31 x"');
  });

  it("a hash shows 8 and 6 of its characters; a press copies all 64 and says so", async () => {
    const user = userEvent.setup();
    render(<Hash value={HASH} label="frame hash" />);
    const button = screen.getByRole("button", { name: `Copy frame hash: ${HASH}` });
    expect(button.textContent).toBe("17f6c777…c3d9a4");
    await user.click(button);
    expect(await navigator.clipboard.readText()).toBe(HASH);
    expect(HASH.length).toBe(64);
    expect(screen.getByRole("status").textContent).toBe("copied");
  });

  it("decimals of a column stand in a box of one width, whole numbers beside an empty one", () => {
    const { container } = render(
      <>
        <Figure decimals={3}>2 926</Figure>
        <Figure decimals={3}>111.5</Figure>
      </>,
    );
    const boxes = [...container.querySelectorAll<HTMLElement>(".q-fraction")];
    expect(boxes.map((box) => [box.textContent, box.style.width])).toEqual([
      ["", "4ch"],
      [".5", "4ch"],
    ]);
  });

  it("keys and values are a list of definitions", () => {
    render(<KeyValues items={[{ key: "Cells, N", value: "741" }]} />);
    expect(screen.getByRole("term").textContent).toBe("Cells, N");
    expect(screen.getByRole("definition").textContent).toBe("741");
  });

  it("every state of a visit has a word of its own beside its mark, and a shape of its own", () => {
    const states = Object.keys(VISIT_STATE_WORDS) as VisitMarkState[];
    const drawn = states.map((state) => {
      const { container } = render(<VisitStateLabel state={state} />);
      return { word: container.textContent, shape: container.querySelector("svg")?.innerHTML };
    });
    expect(drawn.map((one) => one.word)).toEqual(Object.values(VISIT_STATE_WORDS));
    expect(new Set(drawn.map((one) => one.word)).size).toBe(8);
    expect(new Set(drawn.map((one) => one.shape)).size).toBe(8);
  });
});
