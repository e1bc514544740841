import { useId, type ComponentProps, type ReactNode } from "react";

type CheckboxProps = Omit<ComponentProps<"input">, "type" | "className"> & {
  readonly label: ReactNode;
  readonly help?: ReactNode;
};

/** Yes or no, with its words to press as well. */
export function Checkbox({ label, help, ...rest }: CheckboxProps) {
  const id = useId();
  return (
    <div>
      <label className="q-choice">
        <input {...rest} type="checkbox" className="q-check" aria-describedby={help === undefined ? undefined : id} />
        <span>{label}</span>
      </label>
      {help !== undefined && (
        <p className="q-help" id={id}>
          {help}
        </p>
      )}
    </div>
  );
}
