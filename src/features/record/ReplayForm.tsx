import { useState } from "react";
import { Button } from "../../components/ui/Button.tsx";
import { Field } from "../../components/ui/Field.tsx";
import { FileDrop } from "../../components/ui/FileDrop.tsx";
import { Fold } from "../../components/ui/Fold.tsx";
import { formatBytes } from "../../components/ui/format.ts";
import { TextArea } from "../../components/ui/TextArea.tsx";
import { TextInput } from "../../components/ui/TextInput.tsx";
import type { ReplayChoice } from "./use-replay.ts";

interface ReplayFormProps {
  readonly choice: ReplayChoice;
  readonly onChange: (part: Partial<ReplayChoice>) => void;
  readonly onReplay: () => void;
}

/** The record file, and what the auditor holds beside it. */
export function ReplayForm({ choice, onChange, onReplay }: ReplayFormProps) {
  const { record, source, hashes, fingerprint } = choice;
  const [holdsSomething] = useState(source !== null || hashes !== "" || fingerprint !== "");
  return (
    <form
      className="grid max-w-160 gap-6"
      onSubmit={(event) => {
        event.preventDefault();
        onReplay();
      }}
    >
      <FileDrop
        label="Drop the record file here"
        help={record === null ? "A file that Quillet saved, ending in .json" : chosenText(record)}
        accept=".json,application/json"
        buttonLabel={record === null ? "Choose a record file" : "Choose another"}
        primary={record === null}
        onFile={(file) => onChange({ record: file })}
      />
      <Fold quiet title="What you hold makes it stronger" aside="may stay empty" open={holdsSomething}>
        <div className="grid gap-4 py-3">
          <Field label="Hashes that you were given" help="From mails, sheets and exports, one a line.">
            <TextArea value={hashes} onChange={(event) => onChange({ hashes: event.target.value })} />
          </Field>
          <Field label="Fingerprint of the signing key" help="As it came with your invitation.">
            <TextInput mono value={fingerprint} onChange={(event) => onChange({ fingerprint: event.target.value })} />
          </Field>
          <FileDrop
            label="Drop the boundary file here"
            help={source === null ? "The rings of the frame are held against it." : chosenText(source)}
            buttonLabel={source === null ? "Choose a boundary file" : "Choose another"}
            onFile={(file) => onChange({ source: file })}
          />
        </div>
      </Fold>
      {record !== null && (
        <div>
          <Button type="submit" variant="primary">
            Replay this record
          </Button>
        </div>
      )}
    </form>
  );
}

function chosenText(file: File): string {
  return `${file.name}, ${formatBytes(file.size)}`;
}
