import type { ComponentProps, ReactNode } from "react";
import { classes } from "./classes.ts";
import { useFieldAttributes } from "./field-context.ts";

export interface SelectOption {
  readonly value: string;
  readonly label: string;
  readonly disabled?: boolean;
}

type SelectProps = Omit<ComponentProps<"select">, "className"> & {
  readonly options?: readonly SelectOption[];
  /** Own <option>/<optgroup> elements in place of `options`. */
  readonly children?: ReactNode;
};

/** One of several from a list: the browser's own, so that it works by key, by touch and by ear. */
export function Select({ options, children, ...rest }: SelectProps) {
  const field = useFieldAttributes();
  return (
    <span className={classes("q-input-box", "q-select-box")}>
      <select {...field} {...rest} className="q-input">
        {options?.map((option) => (
          <option key={option.value} value={option.value} disabled={option.disabled}>
            {option.label}
          </option>
        ))}
        {children}
      </select>
    </span>
  );
}
