import type { ReactNode } from "react";
import { classes } from "./classes.ts";

interface TableProps {
  /** What the table holds, for screen readers (shown with showCaption). */
  readonly caption: ReactNode;
  readonly showCaption?: boolean;
  /** 13 px and close rows. */
  readonly dense?: boolean;
  /** Four columns or more: at a phone's width the first column stays and the rest scrolls. */
  readonly sticky?: boolean;
  /** <thead> and <tbody>. Rows take data-tone="chosen | attention | refused | strong"; numeric cells className="q-num". */
  readonly children: ReactNode;
}

/** A ruled table. A wide one scrolls sideways inside its own frame and can be scrolled by key. */
export function Table({ caption, showCaption = false, dense = false, sticky = false, children }: TableProps) {
  return (
    <div
      className={classes("q-table-scroll", sticky && "q-table-sticky q-table-named")}
      role="group"
      tabIndex={sticky ? 0 : undefined}
      aria-label={sticky && typeof caption === "string" ? caption : undefined}
    >
      <table className={classes("q-table", dense && "q-table-dense")}>
        <caption className={showCaption ? undefined : "sr-only"}>{caption}</caption>
        {children}
      </table>
    </div>
  );
}
