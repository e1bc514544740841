import { useId, type ReactNode } from "react";

export interface Segment<Value extends string> {
  readonly value: Value;
  readonly label: ReactNode;
  readonly disabled?: boolean;
}

interface SegmentedControlProps<Value extends string> {
  readonly legend: ReactNode;
  readonly hideLegend?: boolean;
  readonly value: Value | null;
  readonly onChange: (value: Value) => void;
  readonly options: readonly Segment<Value>[];
  readonly help?: ReactNode;
}

/** Two to five short choices in one ruled line. */
export function SegmentedControl<Value extends string>({
  legend,
  hideLegend = false,
  value,
  onChange,
  options,
  help,
}: SegmentedControlProps<Value>) {
  const name = useId();
  return (
    <fieldset className="q-fieldset" aria-describedby={help === undefined ? undefined : `${name}-help`}>
      <legend className={hideLegend ? "sr-only" : "q-label"}>{legend}</legend>
      <div className="q-segments">
        {options.map((option) => (
          <label key={option.value} className="q-segment">
            <input
              type="radio"
              name={name}
              value={option.value}
              checked={option.value === value}
              disabled={option.disabled}
              onChange={() => onChange(option.value)}
            />
            {option.label}
          </label>
        ))}
      </div>
      {help !== undefined && (
        <p className="q-help" id={`${name}-help`}>
          {help}
        </p>
      )}
    </fieldset>
  );
}
