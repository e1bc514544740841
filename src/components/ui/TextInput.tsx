import type { ComponentProps } from "react";
import { classes } from "./classes.ts";
import { useFieldAttributes } from "./field-context.ts";

type TextInputProps = Omit<ComponentProps<"input">, "className" | "size"> & {
  /** Shown inside on the right: "m", "%". */
  readonly unit?: string;
  /** For seeds, hashes, coordinates, file names. */
  readonly mono?: boolean;
};

/** One line of text; takes `value`/`onChange` or what a form library registers (name, ref, onChange, onBlur). */
export function TextInput({ unit, mono = false, type = "text", ...rest }: TextInputProps) {
  const field = useFieldAttributes();
  return (
    <span className="q-input-box">
      <input {...field} {...rest} type={type} className={classes("q-input", mono && "q-input-mono")} />
      {unit !== undefined && <span className="q-unit">{unit}</span>}
    </span>
  );
}
