import { Fragment, type ReactNode } from "react";

export interface KeyValue {
  readonly key: string;
  readonly value: ReactNode;
}

/** Names at the left, values at the right, a fine rule below each. */
export function KeyValues({ items }: { readonly items: readonly KeyValue[] }) {
  return (
    <dl className="q-key-values">
      {items.map((item) => (
        <Fragment key={item.key}>
          <dt>{item.key}</dt>
          <dd>{item.value}</dd>
        </Fragment>
      ))}
    </dl>
  );
}
