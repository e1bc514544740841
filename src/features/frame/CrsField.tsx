import { useState } from "react";
import type { CrsChoice } from "#shared/api/area.ts";
import { CrsSearch } from "../../components/crs/CrsSearch.tsx";
import { Button } from "../../components/ui/Button.tsx";
import { Dialog } from "../../components/ui/Dialog.tsx";
import { Field } from "../../components/ui/Field.tsx";
import { Select } from "../../components/ui/Select.tsx";

interface CrsFieldProps {
  readonly suggested: readonly CrsChoice[];
  readonly epsg: number | null;
  /** The name of the chosen system, once its plane is there. */
  readonly name: string | null;
  readonly help: string;
  readonly error: string | null;
  readonly onChange: (epsg: number) => void;
}

const ANOTHER = "another";

/** The frame's projected system: those suggested for the place first, any other by its code or name. */
export function CrsField({ suggested, epsg, name, help, error, onChange }: CrsFieldProps) {
  const [searching, setSearching] = useState(false);
  const listed = suggested.some((choice) => choice.epsg === epsg);
  const options = [
    ...(epsg === null ? [{ value: "", label: "Choose a system", disabled: true }] : []),
    ...(epsg === null || listed ? [] : [{ value: String(epsg), label: `${name ?? "System"}, EPSG:${epsg}` }]),
    ...suggested.map((choice) => ({ value: String(choice.epsg), label: `${choice.name}, EPSG:${choice.epsg}` })),
    { value: ANOTHER, label: "Another system…" },
  ];
  return (
    <>
      <Field label="Projected CRS" help={help} error={error}>
        <Select
          value={epsg === null ? "" : String(epsg)}
          options={options}
          onChange={(event) => {
            if (event.target.value === ANOTHER) setSearching(true);
            else onChange(Number(event.target.value));
          }}
        />
      </Field>
      <Dialog
        open={searching}
        onOpenChange={setSearching}
        title="Which projected system?"
        lead="A frame is measured in metres, so only projected systems in metres are found here."
        actions={<Button onClick={() => setSearching(false)}>Keep the one that is chosen</Button>}
      >
        <CrsSearch
          projectedOnly
          suggestions={suggested}
          chosen={epsg}
          onChoose={(choice) => {
            setSearching(false);
            onChange(choice.epsg);
          }}
        />
      </Dialog>
    </>
  );
}
