import type { ReactNode } from "react";
import type { KeyValue } from "./KeyValues.tsx";

/** The figures of a page in one line under a strong rule, with room for the page's one button at the right. */
export function Ledger({ items, action }: { readonly items: readonly KeyValue[]; readonly action?: ReactNode }) {
  return (
    <div className="q-ledger">
      <dl className="contents">
        {items.map((item) => (
          <div key={item.key}>
            <dt>{item.key}</dt>
            <dd>{item.value}</dd>
          </div>
        ))}
      </dl>
      {action !== undefined && <div className="q-ledger-act">{action}</div>}
    </div>
  );
}
