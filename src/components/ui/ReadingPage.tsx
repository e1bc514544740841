import type { ReactNode } from "react";
import { classes } from "./classes.ts";

interface ReadingPageProps {
  /** What the page has to say, as a sentence where there is one. <em> inside an answer is its green part. */
  readonly title: ReactNode;
  /** The estimate's sentence: larger, lighter; one a page. */
  readonly answer?: boolean;
  readonly lead?: ReactNode;
  /** Buttons at the right of the title; at a phone's width they lie at the foot. */
  readonly actions?: ReactNode;
  /** Across page and margin, under the title: a Ledger, Facts, a Banner. */
  readonly band?: ReactNode;
  readonly children: ReactNode;
  /** Notes beside the text as in a book: elements with an h3 each. */
  readonly margin?: ReactNode;
}

/** A reading stage: the sentence first, then the figures, then how they came about; notes in a margin column. */
export function ReadingPage({ title, answer = false, lead, actions, band, children, margin }: ReadingPageProps) {
  const body = <div className="q-reading-body">{children}</div>;
  return (
    <div className="q-reading">
      <div className="q-reading-top">
        <div>
          <h1 className={classes("q-reading-title", answer && "q-reading-answer")}>{title}</h1>
          {lead !== undefined && <p className="q-reading-lead">{lead}</p>}
        </div>
        {actions !== undefined && <div className="q-reading-acts">{actions}</div>}
      </div>
      {band !== undefined && <div className="q-reading-band">{band}</div>}
      {margin === undefined ? (
        body
      ) : (
        <div className="q-reading-columns">
          {body}
          <aside className="q-margin" aria-label="Notes">
            {margin}
          </aside>
        </div>
      )}
    </div>
  );
}
