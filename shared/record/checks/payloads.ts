import { type Check, counted, failed, notChecked, passed, type ReplayRun, shown } from "./check.ts";

const TITLE = "What each event says is what was hashed";

/** Each payload with its salt gives the hash in its envelope, and has the members of its kind. */
export function checkPayloads(run: ReplayRun): Check[] {
  const wrong = run.events.broken.find(({ part }) => part === "payload" || part === "shape");
  if (wrong !== undefined) {
    const { event, part, expected } = wrong;
    const where = `event ${event.envelope.sequence}, ${event.envelope.kind}`;
    return [
      part === "payload"
        ? failed(
            "payloads",
            TITLE,
            {
              where: `${where}, hash of its payload`,
              found: shown(event.envelope.payloadSha256),
              expected: shown(expected),
            },
            "Its payload or salt was changed after it was hashed.",
          )
        : failed("payloads", TITLE, { where, found: "other members", expected }),
    ];
  }
  const unknown = run.events.broken.find(({ part }) => part === "kind");
  if (unknown !== undefined) {
    const { sequence, kind } = unknown.event.envelope;
    return [
      notChecked("payloads", TITLE, `Event ${sequence} is of the kind "${kind}", which this version does not know.`),
    ];
  }
  return [passed("payloads", TITLE, `${counted(run.record.events.length, "payload")}, each with its own salt`)];
}
