import { useState, type ReactNode } from "react";
import { Field } from "../../components/ui/Field.tsx";
import { TextInput } from "../../components/ui/TextInput.tsx";

interface PasswordFieldProps {
  readonly label: string;
  readonly value: string;
  readonly onChange: (value: string) => void;
  readonly help?: ReactNode;
  readonly error?: ReactNode;
  /** For password managers: the one that is kept already, or one that is made now. */
  readonly kind: "current" | "new";
}

/** A password that can be shown while it is typed. */
export function PasswordField({ label, value, onChange, help, error, kind }: PasswordFieldProps) {
  const [shown, setShown] = useState(false);
  const what = label.toLowerCase();
  return (
    <Field label={label} help={help} error={error}>
      <TextInput
        name={kind === "new" ? "new-password" : "password"}
        type={shown ? "text" : "password"}
        autoComplete={`${kind}-password`}
        autoCapitalize="none"
        value={value}
        onChange={(event) => onChange(event.target.value)}
        end={
          <button
            type="button"
            className="q-input-act"
            aria-pressed={shown}
            aria-label={shown ? `Hide the ${what}` : `Show the ${what}`}
            onClick={() => setShown(!shown)}
          >
            {shown ? "Hide" : "Show"}
          </button>
        }
      />
    </Field>
  );
}
