import type { ReactNode } from "react";
import { problemOf } from "../../api/problem-of.ts";
import { Banner } from "./Banner.tsx";

interface RefusalProps {
  /** Any failure; what is no refusal of the server is shown as our own fault. */
  readonly error: unknown;
  /** The next step as a button or link. */
  readonly next?: ReactNode;
}

/** What was refused: its title, the fact with the next step, and where there is one a button for it. */
export function Refusal({ error, next }: RefusalProps) {
  const problem = problemOf(error);
  return (
    <Banner tone="refuse" title={`${problem.title}.`} next={next}>
      {problem.message}
    </Banner>
  );
}
