import { classes } from "./classes.ts";

export interface ButtonLook {
  /** primary: the one green thing to press; quiet: outlined; danger: brick-red outline; link: underlined text. */
  readonly variant?: "primary" | "quiet" | "danger" | "link" | undefined;
  /** wide: the whole width of its column; small: inside a dense row. */
  readonly size?: "normal" | "wide" | "small" | undefined;
}

export function buttonClasses({ variant = "quiet", size = "normal" }: ButtonLook): string {
  return classes("q-button", `q-button-${variant}`, size !== "normal" && `q-button-${size}`);
}
