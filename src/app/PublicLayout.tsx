import { Outlet } from "react-router-dom";
import { PlainShell } from "./PlainShell.tsx";

/** Pages that need no account. */
export function PublicLayout() {
  return (
    <PlainShell here="Replay">
      <Outlet />
    </PlainShell>
  );
}
