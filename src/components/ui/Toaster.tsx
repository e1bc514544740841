import { Toaster as Sonner } from "sonner";

/** Where short good news appears; mounted once. Errors never live here alone. */
export function Toaster() {
  return <Sonner position="bottom-right" duration={6000} toastOptions={{ unstyled: true }} />;
}
