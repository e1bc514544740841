import { keyFingerprint, signatureHolds } from "#shared/record/sign.ts";
import { type Check, counted, failed, passed, type ReplayRun, shortHash } from "./check.ts";

const TITLE = "Every event is signed with the installation's key";

/**
 * Ed25519 over each envelope's hash (rule R8), by the key in the record; and that key is the one whose fingerprint the
 * auditor holds. An event whose hash is not its own is left to the check of the chain.
 */
export function checkSignatures(run: ReplayRun): Check[] {
  const { record, given } = run;
  const fingerprint = keyFingerprint(record.publicKey);
  const held = given.fingerprint?.replace(/\s+/g, "").toLowerCase() ?? "";
  if (held !== "" && held !== fingerprint) {
    return [
      failed(
        "signatures",
        TITLE,
        { where: "fingerprint of the key", found: fingerprint, expected: `${held}, which you hold` },
        "The record was signed with another key than the one you were told of.",
      ),
    ];
  }
  const broken = new Set(run.events.broken.filter(({ part }) => part === "envelope").map(({ place }) => place));
  for (const [place, event] of record.events.entries()) {
    run.tell();
    if (broken.has(place) || signatureHolds(event.sha256, event.signature, record.publicKey)) continue;
    return [
      failed("signatures", TITLE, {
        where: `event ${event.envelope.sequence}`,
        found: "a signature that does not hold",
        expected: `one by the key ${shortHash(fingerprint)} over ${shortHash(event.sha256)}`,
      }),
    ];
  }
  const known = held === "" ? "compare it with the one you were given at invitation" : "the one that you hold";
  return [
    passed(
      "signatures",
      TITLE,
      `${counted(record.events.length - broken.size, "signature")} by the Ed25519 key with the fingerprint ${fingerprint}: ${known}`,
    ),
  ];
}
