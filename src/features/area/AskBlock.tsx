import type { ReactNode } from "react";
import { AttentionMark } from "../../components/ui/AttentionMark.tsx";

/** Something that the file leaves open, and what can be answered. */
export function AskBlock({
  question,
  why,
  children,
}: {
  readonly question: string;
  readonly why: ReactNode;
  readonly children?: ReactNode;
}) {
  return (
    <section className="q-ask" role="group" aria-label={question}>
      <h2>
        <AttentionMark size={16} />
        <span>{question}</span>
      </h2>
      <p role="alert">{why}</p>
      {children}
    </section>
  );
}
