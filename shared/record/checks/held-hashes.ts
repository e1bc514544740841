import { type Check, counted, failed, notChecked, passed, type ReplayRun, shortHash } from "./check.ts";

const TITLE = "The hashes that you hold are in this chain";

/**
 * A hash from a mail, a printed sheet or an export is a witness outside the database: a chain that was written anew
 * does not hold it.
 */
export function checkHeldHashes(run: ReplayRun): Check[] {
  const held = (run.given.heldHashes ?? [])
    .map((text) => text.replace(/\s+/g, "").toLowerCase())
    .filter((text) => text !== "");
  if (held.length === 0) {
    return [
      notChecked(
        "held-hashes",
        TITLE,
        "None given. A hash from a mail, a printed sheet or an export makes this stronger.",
      ),
    ];
  }
  const sequences = new Map(run.record.events.map((event) => [event.sha256, event.envelope.sequence]));
  const strange = held.find((hash) => !sequences.has(hash));
  if (strange !== undefined) {
    const isHash = /^[0-9a-f]{64}$/.test(strange);
    const next = isHash
      ? "This record is another one, was cut off before that event, or its chain was written anew."
      : "That is not 64 hexadecimal digits: type the whole hash.";
    return [
      failed(
        "held-hashes",
        TITLE,
        { where: "the newest events", found: "not in this chain", expected: isHash ? strange : `"${strange}"` },
        next,
      ),
    ];
  }
  const places = held.map((hash) => `${shortHash(hash)} is event ${sequences.get(hash) ?? 0}`);
  return [
    passed("held-hashes", TITLE, `${counted(held.length, "hash", "hashes")} in this chain: ${places.join(", ")}`),
  ];
}
