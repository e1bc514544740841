/** A seed between straight quotes, every character as it is: leading zeros and inner spaces are part of it. */
export function Seed({ value }: { readonly value: string }) {
  return <span className="q-mono whitespace-pre-wrap">&quot;{value}&quot;</span>;
}
