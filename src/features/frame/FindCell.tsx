import { useState } from "react";
import type { CellAddress } from "#shared/frame/cell-spec.ts";
import type { FrameCells } from "#shared/frame/cells.ts";
import { Field } from "../../components/ui/Field.tsx";
import { formatCount } from "../../components/ui/format.ts";
import { TextInput } from "../../components/ui/TextInput.tsx";
import { cellWords, findCell, labelRange } from "./cell-words.ts";

interface FindCellProps {
  readonly cells: FrameCells;
  readonly chosen: CellAddress | null;
  readonly onChoose: (cell: CellAddress | null) => void;
}

/** A cell by its label or unit number: what the sheet tells on a press, for the keyboard and for the ear. */
export function FindCell({ cells, chosen, onChoose }: FindCellProps) {
  const [typed, setTyped] = useState("");
  const words = chosen === null ? null : cellWords(cells, chosen);
  const [left, setLeft] = useState(false);
  // A label is typed letters first: nothing is wrong with them until the field is left.
  const unfinished = !left && /^[a-z]*$/i.test(typed.trim());
  const missing = typed.trim() !== "" && !unfinished && findCell(cells, typed) === null;
  return (
    <div className="mt-3">
      <Field
        label="Look up a cell"
        help={`Labels run from ${labelRange(cells)}: ${formatCount(cells.columns, "column")}, ${formatCount(cells.rows, "row")}.`}
        error={missing && `“${typed.trim()}” is no cell of this frame.`}
      >
        <TextInput
          autoComplete="off"
          autoCapitalize="characters"
          placeholder="label or unit"
          value={typed}
          onBlur={() => setLeft(true)}
          onChange={(event) => {
            setLeft(false);
            setTyped(event.target.value);
            const found = findCell(cells, event.target.value);
            if (found !== null) onChoose(found);
          }}
        />
      </Field>
      <p className="q-help" role="status">
        {words === null ? "" : `${words.title}, ${words.note}, ${words.text}.`}
      </p>
    </div>
  );
}
