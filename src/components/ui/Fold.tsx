import type { ReactNode } from "react";
import { classes } from "./classes.ts";

interface FoldProps {
  readonly title: ReactNode;
  /** Said at the right of the title: "values filled in from draw 2". */
  readonly aside?: ReactNode;
  readonly open?: boolean;
  /** Finer rules and sans title, for a fold inside a section. */
  readonly quiet?: boolean;
  readonly children: ReactNode;
}

/** One fold away: the title is read without opening. */
export function Fold({ title, aside, open = false, quiet = false, children }: FoldProps) {
  return (
    <details className={classes("q-fold", quiet && "q-fold-quiet")} open={open}>
      <summary>
        <span>{title}</span>
        {aside !== undefined && <span>{aside}</span>}
      </summary>
      {children}
    </details>
  );
}
