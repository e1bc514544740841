import type { ReactNode } from "react";

interface MapPageProps {
  readonly map: ReactNode;
  readonly title: string;
  /** At the right of the title: "version 2, not sealed". */
  readonly titleNote?: ReactNode;
  readonly children: ReactNode;
  /** The one filled button, wide; stays in sight. */
  readonly action?: ReactNode;
  /** What pressing it means. */
  readonly actionNote?: ReactNode;
}

/** A map stage: sheet at the left, panel at the right that scrolls while its action stays; below each other when narrow. */
export function MapPage({ map, title, titleNote, children, action, actionNote }: MapPageProps) {
  return (
    <div className="q-map-page">
      <div className="q-map-page-map">{map}</div>
      <section className="q-panel" aria-label={title}>
        <div className="q-panel-scroll">
          <div className="q-panel-head">
            <h1 className="text-h2">{title}</h1>
            {titleNote !== undefined && <span>{titleNote}</span>}
          </div>
          {children}
        </div>
        {action !== undefined && (
          <div className="q-action">
            {action}
            {actionNote !== undefined && <p>{actionNote}</p>}
          </div>
        )}
      </section>
    </div>
  );
}
