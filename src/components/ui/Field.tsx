import { useId, type ReactNode } from "react";
import { FieldContext } from "./field-context.ts";
import { RefusedMark } from "./RefusedMark.tsx";

interface FieldProps {
  readonly label: ReactNode;
  /** One line below the control; an error takes its place. */
  readonly help?: ReactNode;
  /** What is wrong, where, and what would do. Announced when it appears. */
  readonly error?: ReactNode;
  /** Said beside the label in a quiet voice: "may stay empty". */
  readonly aside?: ReactNode;
  readonly children: ReactNode;
}

/** Label above, control, help or error below. The control inside (TextInput, NumberInput, Select …) is tied to them by itself. */
export function Field({ label, help, error, aside, children }: FieldProps) {
  const id = useId();
  const hasError = error !== undefined && error !== null && error !== "" && error !== false;
  const hasHelp = help !== undefined && help !== null && help !== "" && help !== false;
  const describedBy = hasError ? `${id}-error` : hasHelp ? `${id}-help` : undefined;
  return (
    <div className="q-field">
      <label className="q-label" htmlFor={id}>
        {label}
        {aside !== undefined && <span className="q-label-quiet"> {aside}</span>}
      </label>
      <FieldContext value={{ id, describedBy, invalid: hasError }}>{children}</FieldContext>
      {hasHelp && !hasError && (
        <p className="q-help" id={`${id}-help`}>
          {help}
        </p>
      )}
      {hasError && (
        <p className="q-error" id={`${id}-error`} role="alert">
          <RefusedMark size={15} />
          <span>{error}</span>
        </p>
      )}
    </div>
  );
}
