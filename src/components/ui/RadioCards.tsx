import { useId, type ReactNode } from "react";
import { classes } from "./classes.ts";

export interface RadioCard<Value extends string> {
  readonly value: Value;
  readonly title: ReactNode;
  readonly text?: ReactNode;
  /** A small drawing, 42 px square. */
  readonly picture?: ReactNode;
  /** What this choice comes to, at the right: "741". */
  readonly figure?: ReactNode;
  readonly figureUnit?: ReactNode;
  readonly disabled?: boolean;
}

interface RadioCardsProps<Value extends string> {
  readonly legend: ReactNode;
  /** Keeps the legend for screen readers only. */
  readonly hideLegend?: boolean;
  readonly value: Value | null;
  readonly onChange: (value: Value) => void;
  readonly options: readonly RadioCard<Value>[];
  readonly error?: ReactNode;
}

/** Choices side by side with what each comes to, so that nobody has to pick one to see it. */
export function RadioCards<Value extends string>({
  legend,
  hideLegend = false,
  value,
  onChange,
  options,
  error,
}: RadioCardsProps<Value>) {
  const name = useId();
  return (
    <fieldset className="q-fieldset" aria-describedby={error === undefined ? undefined : `${name}-error`}>
      <legend className={hideLegend ? "sr-only" : "q-label"}>{legend}</legend>
      <div className="q-cards">
        {options.map((option) => (
          <label key={option.value} className={classes("q-card", option.picture === undefined && "q-card-plain")}>
            <input
              type="radio"
              className="q-radio"
              name={name}
              value={option.value}
              checked={option.value === value}
              disabled={option.disabled}
              onChange={() => onChange(option.value)}
            />
            {option.picture}
            <span>
              <span className="q-card-title">{option.title}</span>
              {option.text}
            </span>
            {option.figure !== undefined && (
              <span className="q-card-figure">
                <b>{option.figure}</b>
                {option.figureUnit}
              </span>
            )}
          </label>
        ))}
      </div>
      {error !== undefined && (
        <p className="q-error" id={`${name}-error`} role="alert">
          {error}
        </p>
      )}
    </fieldset>
  );
}
