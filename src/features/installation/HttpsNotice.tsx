import { Banner } from "../../components/ui/Banner.tsx";
import { needsHttps } from "./needs-https.ts";

/** Over plain HTTP from another computer: which parts stay shut, and what opens them. Nothing elsewhere. */
export function HttpsNotice({ address }: { readonly address: Pick<URL, "protocol" | "hostname" | "host"> }) {
  if (!needsHttps(address)) return null;
  return (
    <Banner tone="ochre" title={`You are here over plain HTTP, at ${address.host}.`}>
      Browsers then keep two parts shut on every device but the server’s own: the field page that works without a
      network, and the position from the phone. Everything else works, but passwords and counts travel unencrypted. Put
      a proxy with a certificate in front of it and start the server with{" "}
      <span className="q-mono">QUILLET_HTTPS=1</span>.
    </Banner>
  );
}
