import { STATE_MEANINGS, STATE_WORDS } from "#shared/counts/count.ts";
import { Field } from "../../components/ui/Field.tsx";
import { NumberInput } from "../../components/ui/NumberInput.tsx";
import { Select } from "../../components/ui/Select.tsx";
import { TextInput } from "../../components/ui/TextInput.tsx";
import { type CountTexts, type Reason, REASONS } from "./count-form.ts";

interface CountFieldsProps {
  readonly plural: string;
  readonly texts: CountTexts;
  readonly onTexts: (texts: CountTexts) => void;
  readonly error: string | undefined;
  /** The number takes the focus: the form was opened to be filled in. */
  readonly focused?: boolean;
}

/** A number, or one of the reasons why there is none; and a note. */
export function CountFields({ plural, texts, onTexts, error, focused = false }: CountFieldsProps) {
  return (
    <div className="grid gap-3 md:grid-cols-2">
      <Field
        label="Count"
        error={error}
        help={texts.reason === null ? "Empty means not visited yet, never zero." : "No number belongs to this reason."}
      >
        <NumberInput
          unit={plural}
          value={texts.number}
          disabled={texts.reason !== null}
          autoFocus={focused}
          onChange={(event) => onTexts({ ...texts, number: event.target.value })}
        />
      </Field>
      <Field label="Or no count, because" help={reasonHelp(texts.reason)}>
        <Select
          value={texts.reason ?? ""}
          onChange={(event) =>
            onTexts({ ...texts, reason: event.target.value === "" ? null : (event.target.value as Reason) })
          }
          options={[
            { value: "", label: "it was counted" },
            ...REASONS.map((reason) => ({ value: reason, label: STATE_WORDS[reason] })),
          ]}
        />
      </Field>
      <div className="md:col-span-2">
        <Field label="Note" aside="may stay empty">
          <TextInput value={texts.note} onChange={(event) => onTexts({ ...texts, note: event.target.value })} />
        </Field>
      </div>
    </div>
  );
}

function reasonHelp(reason: Reason | null): string {
  if (reason === null) return "Only where no number can be given.";
  if (reason === "not-in-population") return STATE_MEANINGS[reason];
  return "A lead closes the pick afterwards, and the next reserve opens.";
}
