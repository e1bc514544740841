import { useId, type ReactNode } from "react";

interface SectionProps {
  readonly title: ReactNode;
  readonly lead?: ReactNode;
  /** At the right of the title: a link, a note. */
  readonly aside?: ReactNode;
  readonly children: ReactNode;
}

/** A part of a reading page under its own heading; never broken across printed pages. */
export function Section({ title, lead, aside, children }: SectionProps) {
  const id = useId();
  return (
    <section className="q-section min-w-0" aria-labelledby={id}>
      <div className="q-section-head">
        <h2 id={id}>{title}</h2>
        {aside}
      </div>
      {lead !== undefined && <p className="q-section-lead">{lead}</p>}
      {children}
    </section>
  );
}
