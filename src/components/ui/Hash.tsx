import { CopyText } from "./CopyText.tsx";
import { formatHash } from "./format.ts";

/** A hash as its first 8 and last 6 characters; a click copies all. */
export function Hash({ value, label = "hash" }: { readonly value: string; readonly label?: string }) {
  return (
    <CopyText text={value} label={label}>
      <span className="q-mono">{formatHash(value)}</span>
    </CopyText>
  );
}
