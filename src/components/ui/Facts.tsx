import type { KeyValue } from "./KeyValues.tsx";

/** A few facts in one line between fine rules, each with its small title: seed, origin, design, frame. */
export function Facts({ items }: { readonly items: readonly KeyValue[] }) {
  return (
    <dl className="q-facts">
      {items.map((item) => (
        <div key={item.key}>
          <dt>{item.key}</dt>
          <dd>{item.value}</dd>
        </div>
      ))}
    </dl>
  );
}
