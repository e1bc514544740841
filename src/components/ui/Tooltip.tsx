import { Tooltip as Radix } from "radix-ui";
import type { ReactNode } from "react";
import { classes } from "./classes.ts";

interface TooltipProps {
  readonly text: ReactNode;
  /** A focusable element; plain text is made one with a dotted line below it. */
  readonly children: ReactNode;
  readonly side?: "top" | "right" | "bottom" | "left";
  /** Only between phone and desk, where the words themselves are not shown. */
  readonly narrowOnly?: boolean;
}

/** A short explanation on hover and focus; what must be known stands on the page. */
export function Tooltip({ text, children, side = "top", narrowOnly = false }: TooltipProps) {
  return (
    <Radix.Provider delayDuration={250}>
      <Radix.Root>
        <Radix.Trigger asChild>
          {typeof children === "string" ? (
            <button type="button" className="q-tip-word">
              {children}
            </button>
          ) : (
            children
          )}
        </Radix.Trigger>
        <Radix.Portal>
          <Radix.Content
            className={classes("q-tip", narrowOnly && "lg:hidden")}
            side={side}
            sideOffset={4}
            collisionPadding={8}
          >
            {text}
            <Radix.Arrow />
          </Radix.Content>
        </Radix.Portal>
      </Radix.Root>
    </Radix.Provider>
  );
}
