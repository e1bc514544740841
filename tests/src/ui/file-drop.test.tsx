import { fireEvent, render, screen } from "@testing-library/react";
import userEvent from "@testing-library/user-event";
import { describe, expect, it, vi } from "vitest";
import { FileDrop } from "../../../src/components/ui/FileDrop.tsx";

const FILE = new File(["{}"], "fen.geojson");

describe("FileDrop", () => {
  it("the keyboard reaches one button, which opens the picker", async () => {
    render(<FileDrop label="Drop the boundary file here" help="GeoJSON or KML." onFile={() => undefined} />);
    const input = screen.getByLabelText<HTMLInputElement>("Drop the boundary file here", { selector: "input" });
    const opened = vi.spyOn(input, "click").mockImplementation(() => undefined);
    await userEvent.tab();
    expect(document.activeElement).toBe(screen.getByRole("button", { name: "Choose a file" }));
    await userEvent.keyboard("{Enter}");
    expect(opened).toHaveBeenCalledTimes(1);
    await userEvent.tab();
    expect(document.activeElement).toBe(document.body);
  });

  it("hands over what was picked, and the same file again when it is picked again", async () => {
    const took = vi.fn();
    render(<FileDrop label="Boundary" onFile={took} />);
    const input = screen.getByLabelText<HTMLInputElement>("Boundary", { selector: "input" });
    await userEvent.upload(input, FILE);
    await userEvent.upload(input, FILE);
    expect(took).toHaveBeenCalledTimes(2);
    expect(took).toHaveBeenCalledWith(FILE);
  });

  it("hands over what is dropped, but not while it is busy", () => {
    const took = vi.fn();
    const { rerender } = render(<FileDrop label="Boundary" onFile={took} />);
    const place = screen.getByRole("group", { name: "Boundary" });
    fireEvent.drop(place, { dataTransfer: { files: [FILE] } });
    expect(took).toHaveBeenCalledWith(FILE);
    rerender(<FileDrop label="Boundary" onFile={took} busy />);
    fireEvent.drop(place, { dataTransfer: { files: [FILE] } });
    expect(took).toHaveBeenCalledTimes(1);
  });
});
