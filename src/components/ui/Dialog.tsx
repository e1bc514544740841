import { Dialog as Radix } from "radix-ui";
import { useRef, type ReactNode } from "react";
import { classes } from "./classes.ts";
import { focusMain } from "./focus-main.ts";

interface DialogProps {
  readonly open: boolean;
  readonly onOpenChange: (open: boolean) => void;
  /** A question or a name: "Withdraw draw 2?" */
  readonly title: string;
  /** What follows from it. */
  readonly lead?: ReactNode;
  readonly children?: ReactNode;
  /** The buttons: first the way back, last the act. */
  readonly actions?: ReactNode;
  readonly wide?: boolean;
}

/** A question that needs an answer before the page goes on. Escape and the scrim leave it; the focus returns to where it was, or to the page. */
export function Dialog({ open, onOpenChange, title, lead, children, actions, wide = false }: DialogProps) {
  const opener = useRef<Element | null>(null);
  return (
    <Radix.Root open={open} onOpenChange={onOpenChange}>
      <Radix.Portal>
        <Radix.Overlay className="q-scrim" />
        <Radix.Content
          className={classes("q-dialog", wide && "q-dialog-wide")}
          onOpenAutoFocus={() => {
            opener.current = document.activeElement;
          }}
          onCloseAutoFocus={(event) => {
            event.preventDefault();
            if (opener.current instanceof HTMLElement) opener.current.focus();
            focusMain();
          }}
          {...(lead === undefined && { "aria-describedby": undefined })}
        >
          <Radix.Title asChild>
            <h2>{title}</h2>
          </Radix.Title>
          {lead !== undefined && (
            <Radix.Description asChild>
              <p className="q-dialog-lead">{lead}</p>
            </Radix.Description>
          )}
          {children}
          {actions !== undefined && <div className="q-dialog-acts">{actions}</div>}
        </Radix.Content>
      </Radix.Portal>
    </Radix.Root>
  );
}
