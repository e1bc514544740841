import type { ComponentProps } from "react";
import { TextInput } from "./TextInput.tsx";
import { readNumber } from "./read-number.ts";

type NumberInputProps = Omit<ComponentProps<typeof TextInput>, "type" | "inputMode"> & {
  /** The number in the text, or null while the text holds none; called beside onChange. */
  readonly onNumber?: (value: number | null) => void;
};

/** A number as text: what was typed stays as typed (leading zeros, a comma, a slip), and the number read from it comes beside. */
export function NumberInput({ onNumber, onChange, ...rest }: NumberInputProps) {
  return (
    <TextInput
      autoComplete="off"
      {...rest}
      inputMode="decimal"
      onChange={(event) => {
        onChange?.(event);
        onNumber?.(readNumber(event.target.value));
      }}
    />
  );
}
