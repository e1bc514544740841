import type { ComponentProps, ReactNode } from "react";
import { classes } from "./classes.ts";
import { useFieldAttributes } from "./field-context.ts";

type TextInputProps = Omit<ComponentProps<"input">, "className" | "size"> & {
  /** Shown inside on the right: "m", "%". */
  readonly unit?: string;
  /** For seeds, hashes, coordinates, file names. */
  readonly mono?: boolean;
  /** A small button or link inside on the right: "Show". */
  readonly end?: ReactNode;
};

/** One line of text; takes `value`/`onChange` or what a form library registers (name, ref, onChange, onBlur). */
export function TextInput({ unit, mono = false, end, type = "text", ...rest }: TextInputProps) {
  const field = useFieldAttributes();
  return (
    <span className="q-input-box">
      <input {...field} {...rest} type={type} className={classes("q-input", mono && "q-input-mono")} />
      {unit !== undefined && <span className="q-unit">{unit}</span>}
      {end !== undefined && <span className="q-unit">{end}</span>}
    </span>
  );
}
