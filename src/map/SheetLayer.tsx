import type { ReactNode } from "react";
import { createPortal } from "react-dom";
import { useSheet, type SheetSlot } from "./sheet-context.ts";

/** Puts what is drawn into one slot of the sheet, in px from the view's anchor. */
export function SheetLayer({ slot, children }: { readonly slot: SheetSlot; readonly children: ReactNode }) {
  const group = useSheet().slot(slot);
  return group === null ? null : createPortal(children, group);
}
