import { createHash } from "node:crypto";
import { afterEach, describe, expect, test } from "vitest";
import { abandonDeclaration, declareDraw, makeDraw, withdrawDraw } from "#shared/api/draw.ts";
import { keepEstimate, readEstimate } from "#shared/api/estimate.ts";
import { sealFrame } from "#shared/api/frame.ts";
import { addPerson } from "#shared/api/people.ts";
import { readRecordFile } from "#shared/api/record.ts";
import { envelopeSha256 } from "#shared/record/chain.ts";
import { parseRecordFile, type RecordFile } from "#shared/record/record-file.ts";
import { replay } from "#shared/record/replay.ts";
import { keyFingerprint, publicKeyOf } from "#shared/record/sign.ts";
import { openHolders } from "#server/db/members.ts";
import type { MailRow } from "#server/db/mails.ts";
import { tellCountDays } from "#server/services/tell-count-days.ts";
import { surveyEachTest } from "../fixtures/each-survey.ts";
import { countCells } from "../fixtures/count-cells.ts";
import { mailsTo } from "../fixtures/mails.ts";
import { anotherSurvey, declaring, drawCells, putSealedFrame } from "../fixtures/sealed-frame.ts";

// Rule R8: at declaration, sealing, draw, withdrawal, first count, each day with counts and each kept estimate. Hashes are
// held against the record file, which is read by the way that auditors have.
const survey = surveyEachTest();
const here = () => survey.here();

afterEach(() => survey.server.setNow("2031-05-02T08:00:00.000Z"));

const witnessMails = (address: string): MailRow[] =>
  mailsTo(survey.server, address)
    .filter(({ surveyId, kind }) => surveyId === here().surveyId && kind.startsWith("witness"))
    .toReversed();

/** What each mail to the auditor says, oldest first. */
const told = (address = "auditor@example.org") =>
  witnessMails(address).map(({ subject, text }) => ({
    subject,
    sequence: Number(/event (\d+)/.exec(text)?.[1]),
    hashes: text.split("\n").filter((line) => /^[0-9a-f]{64}$/.test(line)),
  }));

async function recordNow(): Promise<RecordFile> {
  const reply = await survey.team.auditor.call(readRecordFile, { params: here() });
  return parseRecordFile(new TextDecoder().decode(reply.bytes));
}

const FINGERPRINT = () => keyFingerprint(publicKeyOf(survey.server.platform.signingKey));

async function expectTold(kinds: readonly (readonly [subject: string, kind: string])[]): Promise<void> {
  const { events } = await recordNow();
  const seen = told().map(({ subject, sequence, hashes }) => {
    const event = events[sequence - 1];
    if (!event) throw new Error(`there is no event ${sequence}`);
    expect(hashes).toEqual([envelopeSha256(event.envelope), FINGERPRINT()]);
    return [subject, event.envelope.kind];
  });
  expect(seen).toEqual(kinds.map(([subject, kind]) => [`Hallow Moss: ${subject}`, kind]));
}

const drawn = () => drawCells(survey.team, declaring(survey.frame.frameId));

describe("an auditor is told", () => {
  test("of a sealed frame", async () => {
    const team = await anotherSurvey(survey.team);
    const { frameId } = putSealedFrame(survey.server, team.surveyId, { draft: true });
    const draftSha256 = createHash("sha256").update(frameId).digest("hex");
    const params = { surveyId: team.surveyId, frameId };
    const reply = await team.planner.call(sealFrame, { params, body: { draftSha256, cells: 70 } });
    expect(reply.status).toBe(200);
    const mails = mailsTo(survey.server, "auditor@example.org").filter((mail) => mail.surveyId === team.surveyId);
    expect(mails.filter(({ kind }) => kind === "witness").map(({ subject }) => subject)).toEqual([
      "Hallow Moss: a frame was sealed",
    ]);
  });

  test("of a declaration, of the draw from it, and of its withdrawal; not of what lies between", async () => {
    const first = await survey.team.planner.call(declareDraw, {
      params: here(),
      body: declaring(survey.frame.frameId),
    });
    await survey.team.planner.call(abandonDeclaration, {
      params: { ...here(), declarationId: first.json.id },
      body: { reason: "the wrong n" },
    });
    const { id } = await drawn();
    await survey.team.planner.call(withdrawDraw, { params: { ...here(), drawId: id }, body: { reason: "tides" } });
    await expectTold([
      ["a draw was declared", "draw-declared"],
      ["a draw was declared", "draw-declared"],
      ["cells were drawn", "draw-made"],
      ["a draw was withdrawn", "draw-withdrawn"],
    ]);
  });

  test("of the first count and no other, and of each estimate that is put on record", async () => {
    await drawn();
    await countCells(survey, (unit) => unit % 4);
    const { resultSha256 } = (await survey.team.lead.call(readEstimate, { params: here() })).json;
    await survey.team.lead.call(keepEstimate, { params: here(), body: { resultSha256 } });
    await survey.team.lead.call(keepEstimate, { params: here(), body: { resultSha256 } });
    await expectTold([
      ["a draw was declared", "draw-declared"],
      ["cells were drawn", "draw-made"],
      ["the first count was entered", "count-entered"],
      ["an estimate was put on record", "estimate-kept"],
      ["an estimate was put on record", "estimate-kept"],
    ]);
  });

  test("with the survey, the time, the address of replay, and lines that replay takes as they are", async () => {
    await drawn();
    const mail = witnessMails("auditor@example.org")[1];
    expect(mail?.text).toContain("In the survey “Hallow Moss” cells were drawn at 2031-05-02 08:00 UTC.");
    expect(mail?.text.split("\n")).toContain(`${survey.server.url}/replay`);
    expect(mail?.html).toContain(`<a href="${survey.server.url}/replay">`);
    const [hash = "", fingerprint = ""] = told()[1]?.hashes ?? [];
    const record = await recordNow();
    const verdicts = (held: string) =>
      replay(record, { heldHashes: [held], fingerprint })
        .checks.filter(({ id }) => id === "held-hashes" || id === "signatures")
        .map(({ id, outcome }) => [id, outcome]);
    expect(verdicts(hash)).toEqual([
      ["signatures", "passed"],
      ["held-hashes", "passed"],
    ]);
    const strange = hash.replace(/^./, (first) => (first === "0" ? "1" : "0"));
    expect(verdicts(strange)).toContainEqual(["held-hashes", "failed"]);
  });

  test("in the transaction of the act: what is refused tells nobody", async () => {
    await drawn();
    const before = told().length;
    const reply = await survey.team.planner.call(declareDraw, {
      params: here(),
      body: declaring(survey.frame.frameId),
    });
    expect(reply.status).toBe(409);
    expect(told()).toHaveLength(before);
  });
});

describe("told are", () => {
  test("auditors and nobody else", async () => {
    await drawn();
    for (const role of ["owner", "planner", "lead", "counter", "stranger"]) {
      expect(witnessMails(`${role}@example.org`), role).toEqual([]);
    }
    expect(told()).toHaveLength(2);
  });

  test("all auditors of the survey, whatever else they do in it; none who was removed or whose account is closed", async () => {
    const { db } = survey.server.platform;
    for (const email of ["counter@example.org", "stranger@example.org", "lead@example.org"]) {
      await survey.team.planner.call(addPerson, { params: here(), body: { email, role: "auditor" } });
    }
    const declared = await survey.team.planner.call(declareDraw, {
      params: here(),
      body: declaring(survey.frame.frameId),
    });
    const removed = openHolders(db, here().surveyId, "auditor").find(({ email }) => email === "counter@example.org");
    db.$client
      .prepare("UPDATE memberships SET removed_at = ? WHERE member_id = ? AND role = 'auditor'")
      .run("2031-05-02T08:00:00.000Z", removed?.memberId);
    const close = db.$client.prepare("UPDATE accounts SET closed_at = ? WHERE email = 'lead@example.org'");
    close.run("2031-05-02T08:00:00.000Z");
    const params = { ...here(), declarationId: declared.json.id };
    await survey.team.planner.call(makeDraw, { params, body: { seed: "07391522864013975605" } });
    close.run(null);
    const counted = (name: string) => told(`${name}@example.org`).length;
    expect(["auditor", "stranger", "counter", "lead"].map(counted)).toEqual([2, 2, 1, 1]);
  });
});

describe("a day with counts", () => {
  const round = () => tellCountDays(survey.server.platform);
  const days = (address = "auditor@example.org") =>
    told(address).filter(({ subject }) => subject.startsWith("Hallow Moss: counts of"));
  const countSome = async (from: number, to: number) => {
    const { visits } = await survey.visits();
    await countCells(survey, () => 1, new Set(visits.slice(from, to).map(({ unit }) => unit)));
  };

  // Europe/Berlin in May is two hours before UTC: the second of May ends there at 22:00 UTC.
  test("is told once it is over on the survey's clock, with the hash that the record ended the day with, and once", async () => {
    await drawn();
    await countSome(0, 3);
    const { events } = await recordNow();
    survey.server.setNow("2031-05-02T21:59:59.000Z");
    round();
    expect(days()).toEqual([]);
    survey.server.setNow("2031-05-02T22:00:00.000Z");
    await survey.team.planner.call(addPerson, {
      params: here(),
      body: { email: "counter@example.org", role: "auditor" },
    });
    round();
    round();
    const last = events.at(-1);
    if (!last) throw new Error("there are events");
    expect(days()).toEqual([
      {
        subject: "Hallow Moss: counts of 2031-05-02",
        sequence: events.length,
        hashes: [envelopeSha256(last.envelope), FINGERPRINT()],
      },
    ]);
    expect(witnessMails("auditor@example.org").at(-1)?.text).toContain(
      "3 counts were entered or amended on 2031-05-02 (Europe/Berlin).",
    );
    // The counter became auditor in the first moment of the day after.
    expect(days("counter@example.org")).toEqual([]);
  });

  test("is told for each day that had some, also when no server ran for weeks; days without are not", async () => {
    await drawn();
    await countSome(0, 2);
    survey.server.setNow("2031-05-03T12:00:00.000Z");
    round();
    survey.server.setNow("2031-05-05T12:00:00.000Z");
    await countSome(2, 3);
    survey.server.setNow("2031-05-06T21:59:00.000Z");
    await countSome(3, 5);
    survey.server.setNow("2031-06-30T12:00:00.000Z");
    round();
    round();
    expect(days().map(({ subject }) => subject.slice(-10))).toEqual(["2031-05-02", "2031-05-05", "2031-05-06"]);
    expect(witnessMails("auditor@example.org").at(-1)?.text).toContain("2 counts were entered");
  });

  test("is told to nobody where there is no auditor any more", async () => {
    await drawn();
    await countSome(0, 1);
    survey.server.platform.db.$client
      .prepare("UPDATE memberships SET removed_at = added_at WHERE role = 'auditor'")
      .run();
    survey.server.setNow("2031-05-04T12:00:00.000Z");
    round();
    expect(days()).toEqual([]);
  });
});

describe("a survey's name", () => {
  test("stands in a mail as text: no tag, no line of its own, no turned direction", async () => {
    const name = 'Moss\r\n\r\nhttp://evil.example/ <img src=x> \u202Egnp.exe & "co"';
    survey.server.platform.db.$client.prepare("UPDATE surveys SET name = ? WHERE id = ?").run(name, here().surveyId);
    await drawn();
    const mail = witnessMails("auditor@example.org")[0];
    expect(mail?.subject).toBe('Moss http://evil.example/ <img src=x> gnp.exe & "co": a draw was declared');
    expect(mail?.text.split("\n").some((line) => line.startsWith("http://evil"))).toBe(false);
    expect(mail?.html).toContain("&lt;img src=x&gt;");
    expect(mail?.html).not.toContain("<img");
  });
});
