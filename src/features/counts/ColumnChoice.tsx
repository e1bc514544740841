import type { ImportVerdict } from "#shared/api/counts.ts";
import { Field } from "../../components/ui/Field.tsx";
import { Select } from "../../components/ui/Select.tsx";
import { Table } from "../../components/ui/Table.tsx";
import type { Columns } from "./import-choice.ts";

const NAMES = [
  { column: "unit", label: "Unit number" },
  { column: "label", label: "Cell label" },
  { column: "count", label: "Count" },
  { column: "state", label: "State" },
  { column: "date", label: "Date" },
  { column: "observer", label: "Counted by" },
  { column: "note", label: "Note" },
] as const satisfies readonly { column: keyof Columns; label: string }[];

interface ColumnChoiceProps {
  readonly verdict: ImportVerdict;
  /** As they are chosen now, which may be ahead of the verdict. */
  readonly columns: Columns;
  readonly onColumns: (columns: Columns) => void;
}

/** Which column of the table holds what, beside its first rows. */
export function ColumnChoice({ verdict, columns, onColumns }: ColumnChoiceProps) {
  const { header, firstRows } = verdict;
  const options = [
    { value: "-1", label: "not in this table" },
    ...header.map((name, index) => ({ value: String(index), label: name === "" ? `column ${index + 1}` : name })),
  ];
  return (
    <>
      <div className="grid gap-3 sm:grid-cols-2 md:grid-cols-4">
        {NAMES.map(({ column, label }) => (
          <Field key={column} label={label}>
            <Select
              value={String(columns[column])}
              onChange={(event) => onColumns({ ...columns, [column]: Number(event.target.value) })}
              options={options}
            />
          </Field>
        ))}
      </div>
      <Table dense sticky caption="First rows of the table">
        <thead>
          <tr>
            {header.map((name, index) => (
              <th key={index} scope="col">
                {name}
              </th>
            ))}
          </tr>
        </thead>
        <tbody>
          {firstRows.map((row, index) => (
            <tr key={index}>
              {row.map((text, place) => (
                <td key={place}>{text}</td>
              ))}
            </tr>
          ))}
        </tbody>
      </Table>
    </>
  );
}
