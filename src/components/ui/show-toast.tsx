import type { ReactNode } from "react";
import { toast } from "sonner";
import { DoneMark } from "./DoneMark.tsx";

/** Says that something was done: "Frame version 2 is sealed." What went wrong belongs into a Banner or beside its field, never here alone. */
export function showToast(message: ReactNode): void {
  toast.custom(() => (
    <div className="q-toast">
      <DoneMark size={18} />
      <span>{message}</span>
    </div>
  ));
}
