import { render, screen } from "@testing-library/react";
import userEvent from "@testing-library/user-event";
import { useState } from "react";
import { describe, expect, it, vi } from "vitest";
import { Checkbox } from "../../../src/components/ui/Checkbox.tsx";
import { Field } from "../../../src/components/ui/Field.tsx";
import { NumberInput } from "../../../src/components/ui/NumberInput.tsx";
import { RadioCards } from "../../../src/components/ui/RadioCards.tsx";
import { SegmentedControl } from "../../../src/components/ui/SegmentedControl.tsx";
import { Select } from "../../../src/components/ui/Select.tsx";

describe("Field", () => {
  it("names its control and describes it by the help", () => {
    render(
      <Field label="Side of a cell" help="At least three times the position error.">
        <NumberInput unit="m" defaultValue="20" />
      </Field>,
    );
    const input = screen.getByRole("textbox", { name: "Side of a cell" });
    expect(document.getElementById(input.getAttribute("aria-describedby") ?? "")?.textContent).toBe(
      "At least three times the position error.",
    );
    expect(input.getAttribute("aria-invalid")).toBeNull();
  });

  it("announces an error, marks the control, and puts the error in the place of the help", () => {
    render(
      <Field label="Side" help="Metres." error="Use 1.7 m or more.">
        <NumberInput defaultValue="0.5" />
      </Field>,
    );
    const input = screen.getByRole("textbox", { name: "Side" });
    const alert = screen.getByRole("alert");
    expect(alert.textContent).toBe("Use 1.7 m or more.");
    expect(input.getAttribute("aria-invalid")).toBe("true");
    expect(input.getAttribute("aria-describedby")).toBe(alert.id);
    expect(screen.queryByText("Metres.")).toBeNull();
  });

  it("keeps what was typed as it was typed, and tells the number beside it", async () => {
    const told = vi.fn();
    render(
      <Field label="Side">
        <NumberInput onNumber={told} />
      </Field>,
    );
    const input = screen.getByRole<HTMLInputElement>("textbox", { name: "Side" });
    await userEvent.type(input, "007,5x");
    expect(input.value).toBe("007,5x");
    expect(told.mock.calls.map(([value]) => value as number | null)).toEqual([0, 0, 7, 7, 7.5, null]);
  });

  it("ties a list to its label", async () => {
    render(
      <Field label="Projected CRS">
        <Select
          options={[
            { value: "25831", label: "Zone 31" },
            { value: "25832", label: "Zone 32" },
          ]}
        />
      </Field>,
    );
    const select = screen.getByRole<HTMLSelectElement>("combobox", { name: "Projected CRS" });
    await userEvent.selectOptions(select, "25832");
    expect(select.value).toBe("25832");
  });
});

describe("choices", () => {
  function Rules() {
    const [rule, setRule] = useState<"clip" | "centre">("clip");
    return (
      <RadioCards
        legend="Edge rule"
        value={rule}
        onChange={setRule}
        options={[
          { value: "clip", title: "Clip", text: "Every cell that touches.", figure: "741", figureUnit: "cells" },
          { value: "centre", title: "Centre", text: "Centre in.", figure: "657", figureUnit: "cells" },
        ]}
      />
    );
  }

  it("cards are one group of radio buttons whose names hold the figure, and arrows move the choice", async () => {
    render(<Rules />);
    expect(screen.getByRole("group", { name: "Edge rule" })).toBeTruthy();
    const clip = screen.getByRole<HTMLInputElement>("radio", { name: /Clip.*741.*cells/ });
    await userEvent.tab();
    expect(document.activeElement).toBe(clip);
    await userEvent.keyboard("{ArrowDown}");
    expect(screen.getByRole<HTMLInputElement>("radio", { name: /Centre.*657/ }).checked).toBe(true);
    expect(clip.checked).toBe(false);
  });

  it("a segment is chosen by press", async () => {
    const onChange = vi.fn();
    render(
      <SegmentedControl
        legend="Cell shape"
        value="square"
        onChange={onChange}
        options={[
          { value: "square", label: "Square" },
          { value: "strip", label: "Strip" },
        ]}
      />,
    );
    await userEvent.click(screen.getByRole("radio", { name: "Strip" }));
    expect(onChange).toHaveBeenCalledWith("strip");
  });

  it("the words of a check box press it", async () => {
    render(<Checkbox label="Stay signed in here" />);
    await userEvent.click(screen.getByText("Stay signed in here"));
    expect(screen.getByRole<HTMLInputElement>("checkbox").checked).toBe(true);
  });
});
