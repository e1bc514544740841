import type { ComponentProps, ReactNode } from "react";
import { buttonClasses, type ButtonLook } from "./button-look.ts";

type ButtonProps = Omit<ComponentProps<"button">, "className"> &
  ButtonLook & {
    /** Work is under way: the button keeps its width and its place in the tab order, and does nothing when pressed. */
    readonly busy?: boolean;
    /** What a busy button says, with an ellipsis: "Sealing…". */
    readonly busyLabel?: ReactNode;
  };

/** A verb and its object. One primary a screen; danger is never filled; whoever disables one says why beside it. */
export function Button({
  variant,
  size,
  busy = false,
  busyLabel,
  children,
  type = "button",
  onClick,
  ...rest
}: ButtonProps) {
  return (
    <button
      {...rest}
      type={busy ? "button" : type}
      className={buttonClasses({ variant, size })}
      aria-busy={busy || undefined}
      aria-disabled={busy || undefined}
      onClick={busy ? undefined : onClick}
    >
      <span className="q-button-label" data-hidden={busy ? "" : undefined} aria-hidden={busy || undefined}>
        {children}
      </span>
      {busy && (
        <span className="q-button-label">
          <span className="q-turning" aria-hidden="true" />
          {busyLabel ?? children}
        </span>
      )}
    </button>
  );
}
