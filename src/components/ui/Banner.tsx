import type { ReactNode } from "react";
import { AttentionMark } from "./AttentionMark.tsx";
import { classes } from "./classes.ts";
import { InfoMark } from "./InfoMark.tsx";
import { RefusedMark } from "./RefusedMark.tsx";

interface BannerProps {
  /** info: for the record; ochre: look here; refuse: it did not happen. */
  readonly tone?: "info" | "ochre" | "refuse";
  /** The fact, in bold: "Two of 60 picks have no count." */
  readonly title: ReactNode;
  /** What it means and what to do. */
  readonly children?: ReactNode;
  /** The next step as a button or link. */
  readonly next?: ReactNode;
}

/** A flag on the margin: what, where, what next. A refusal is announced at once; the others are read in their place. */
export function Banner({ tone = "info", title, children, next }: BannerProps) {
  return (
    <div
      className={classes("q-banner", tone !== "info" && `q-banner-${tone}`)}
      role={tone === "refuse" ? "alert" : undefined}
    >
      {tone === "info" ? <InfoMark /> : tone === "ochre" ? <AttentionMark /> : <RefusedMark />}
      <div>
        <b>{title}</b> {children}
        {next !== undefined && <div className="q-banner-next">{next}</div>}
      </div>
    </div>
  );
}
