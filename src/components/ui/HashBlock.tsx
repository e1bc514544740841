import { CopyText } from "./CopyText.tsx";

/** All 64 characters in groups of four, as they are read aloud and compared. */
export function HashBlock({ value, label = "hash" }: { readonly value: string; readonly label?: string }) {
  const groups = value.match(/.{1,4}/g) ?? [];
  return (
    <div>
      <div className="q-hash-block">
        {groups.map((group, index) => (
          <span key={index}>{group}</span>
        ))}
      </div>
      <CopyText text={value} label={label}>
        Copy all {value.length}
      </CopyText>
    </div>
  );
}
