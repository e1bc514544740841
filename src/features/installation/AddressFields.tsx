import { Field } from "../../components/ui/Field.tsx";
import { Section } from "../../components/ui/Section.tsx";
import { TextInput } from "../../components/ui/TextInput.tsx";
import type { LacksOfSettings, TypedSettings } from "./settings-form.ts";

interface AddressFieldsProps {
  readonly typed: TypedSettings;
  readonly lacks: LacksOfSettings;
  readonly onChange: (part: Partial<TypedSettings>) => void;
}

/** The address that links in mails begin with. */
export function AddressFields({ typed, lacks, onChange }: AddressFieldsProps) {
  const here = globalThis.location.origin;
  return (
    <div id="address" className="min-w-0">
      <Section
        title="Address"
        lead="Links in mails begin with it, so it has to be one that people reach from elsewhere."
      >
        <div className="max-w-140">
          <Field
            label="Public address"
            aside="may stay empty"
            error={lacks.publicAddress}
            help={`You are here as ${here}. While it is empty, links begin with the address that the server gives itself.`}
          >
            <TextInput
              name="publicAddress"
              type="url"
              inputMode="url"
              autoComplete="off"
              autoCapitalize="none"
              mono
              placeholder="https://surveys.example.org"
              value={typed.publicAddress}
              onChange={(event) => onChange({ publicAddress: event.target.value })}
            />
          </Field>
        </div>
      </Section>
    </div>
  );
}
