import type { ReactNode } from "react";

/** plain: an open ring; sealed: filled green; drawn: a pink square; withdrawn: an open pink square with a stroke; amended: an ochre ring. */
export type TimelineMark = "plain" | "sealed" | "drawn" | "withdrawn" | "amended";

interface TimelineEntryProps {
  readonly when: ReactNode;
  readonly mark?: TimelineMark;
  readonly title: ReactNode;
  readonly children?: ReactNode;
  /** Small facts in one line: event number, hash. */
  readonly meta?: ReactNode;
}

function station(mark: TimelineMark) {
  switch (mark) {
    case "plain":
      return <circle cx="8" cy="8" r="4.6" fill="var(--color-paper)" stroke="var(--color-ink)" strokeWidth="1.75" />;
    case "sealed":
      return <circle cx="8" cy="8" r="7.5" fill="var(--color-act)" />;
    case "drawn":
      return <rect x="0.5" y="0.5" width="15" height="15" fill="var(--color-flag)" />;
    case "withdrawn":
      return (
        <>
          <rect
            x="2"
            y="2"
            width="12"
            height="12"
            fill="var(--color-paper)"
            stroke="var(--color-flag)"
            strokeWidth="1.75"
          />
          <path d="M2 14 14 2" stroke="var(--color-flag)" strokeWidth="1.75" />
        </>
      );
    case "amended":
      return <circle cx="8" cy="8" r="5.4" fill="var(--color-paper)" stroke="var(--color-ochre)" strokeWidth="2.25" />;
  }
}

/** One act on the line: when, mark, what, and the small facts that prove it. */
export function TimelineEntry({ when, mark = "plain", title, children, meta }: TimelineEntryProps) {
  return (
    <li data-mark={mark}>
      <div className="q-timeline-when">{when}</div>
      <svg className="q-timeline-station" width="16" height="16" viewBox="0 0 16 16" aria-hidden="true">
        {station(mark)}
      </svg>
      <div className="min-w-0">
        <div className="q-timeline-title">{title}</div>
        {children !== undefined && <div className="q-timeline-text">{children}</div>}
        {meta !== undefined && <div className="q-timeline-meta">{meta}</div>}
      </div>
    </li>
  );
}
