import type { ComponentProps } from "react";
import { useFieldAttributes } from "./field-context.ts";

/** Several lines of text: reasons, notes. */
export function TextArea({ rows = 3, ...rest }: Omit<ComponentProps<"textarea">, "className">) {
  const field = useFieldAttributes();
  return (
    <span className="q-input-box">
      <textarea {...field} {...rest} rows={rows} className="q-input" />
    </span>
  );
}
