import type { Installation } from "#shared/api/installation.ts";
import { HashBlock } from "../../components/ui/HashBlock.tsx";
import { KeyValues } from "../../components/ui/KeyValues.tsx";
import { Section } from "../../components/ui/Section.tsx";

/** Which Quillet this is, and whose signatures it makes. */
export function AboutSection({ installation }: { readonly installation: Installation }) {
  return (
    <Section title="Version and key">
      <div className="grid gap-5">
        <KeyValues
          items={[
            { key: "Version of Quillet", value: installation.version },
            { key: "Kind", value: installation.demo ? "demo" : "real installation" },
          ]}
        />
        <div>
          <h3>Fingerprint of the key</h3>
          <p className="mb-2">
            Every event of every record is signed with it. Auditors are told it when they are invited; tell it to others
            on a way that is not this installation.
          </p>
          <HashBlock value={installation.keyFingerprint} label="fingerprint of the key" />
        </div>
      </div>
    </Section>
  );
}
