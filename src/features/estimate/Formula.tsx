import type { ReactNode } from "react";
import { formulaLines } from "#shared/estimate/formula.ts";
import type { EstimateResult } from "#shared/estimate/result.ts";

/** Every number of the page as a formula with its own values. */
export function Formulas({ result }: { readonly result: EstimateResult }) {
  return (
    <dl className="q-formulas">
      {formulaLines(result).map((line) => (
        <div key={line.key}>
          <dt>
            <Typeset text={`${line.symbol} = ${line.formula}`} />
          </dt>
          <dd>
            = <Typeset text={line.substituted} />
          </dd>
          <dd className="q-formula-result">{line.result}</dd>
        </div>
      ))}
    </dl>
  );
}

/** A formula as text: what stands in √(…) gets a root drawn over it, since the fonts hold no root. */
function Typeset({ text }: { readonly text: string }): ReactNode {
  const start = text.indexOf("√(");
  if (start < 0) return text;
  const end = closing(text, start + 1);
  return (
    <>
      {text.slice(0, start)}
      <span className="q-root">
        <span className="sr-only">root of </span>
        <svg width="10" height="18" viewBox="0 0 10 18" aria-hidden="true">
          <path d="M0.5 10.5 3 9l3 7.5L9.5 0.75" fill="none" stroke="currentColor" strokeWidth="1.2" />
        </svg>
        <span className="q-root-of">
          <Typeset text={text.slice(start + 2, end)} />
        </span>
      </span>
      <Typeset text={text.slice(end + 1)} />
    </>
  );
}

/** Place of the bracket that closes the one at `open`. */
function closing(text: string, open: number): number {
  let depth = 0;
  for (let place = open; place < text.length; place += 1) {
    if (text[place] === "(") depth += 1;
    if (text[place] === ")") depth -= 1;
    if (depth === 0) return place;
  }
  return text.length;
}
