import { afterAll, afterEach, beforeAll, beforeEach, describe, expect, test } from "vitest";
import { findMail, type MailRow } from "#server/db/mails.ts";
import { closeDb, openDb, writeTx } from "#server/db/open.ts";
import { MailRefused, type MailServer } from "#server/mail/mail-server.ts";
import { queueMail } from "#server/mail/queue-mail.ts";
import { emptyMailsAbout, sendQueue, WAITS_MS } from "#server/mail/send-queue.ts";
import { openSmtp } from "#server/mail/smtp.ts";
import { linkLine, write } from "#server/mail/template.ts";
import { type FakeSmtp, startMute, startSmtp } from "../fixtures/smtp.ts";
import { startTestServer, type TestServer } from "../fixtures/server.ts";

// Real conversations with a real SMTP server on this computer. Codes and their meaning: RFC 5321, section 4.2.
const FROM = "Quillet <surveys@example.org>";
/** A server that works may be slow where much else runs; one that says nothing is waited for only briefly. */
const LONG_MS = 10_000;
const SHORT_MS = 300;
const START = "2031-05-02T08:00:00.000Z";

let server: TestServer;
let smtp: FakeSmtp;

beforeAll(async () => {
  server = await startTestServer();
  smtp = await startSmtp();
});
afterAll(async () => {
  await smtp.stop();
  await server.stop();
});
beforeEach(() => server.setNow(START));
afterEach(() => {
  smtp.forget();
  smtp.answer(() => null);
  server.platform.db.$client.exec("DELETE FROM mails");
});

const at = (milliseconds: number) => new Date(Date.parse(START) + milliseconds).toISOString();
const by = (url: string, silenceMs = LONG_MS) => openSmtp(url, FROM, silenceMs);
const row = (id: string): MailRow => {
  const found = findMail(server.platform.db, id);
  if (!found) throw new Error(`no mail ${id}`);
  return found.mail;
};

/** Puts a mail into the queue as with a server; what is sent by another server is the test's own choice. */
function queued(change: Partial<Parameters<typeof queueMail>[2]> = {}): string {
  const mail = {
    kind: "test",
    to: { name: "Åsa Öberg", address: "asa@example.org" },
    surveyId: null,
    secret: false,
    written: write("Zählung in der Heide", ["Grüße & <b>Zahlen</b>", linkLine("http://127.0.0.1/replay?a=1&b=2")]),
    ...change,
  };
  return writeTx(server.platform.db, (tx) => queueMail(tx, { ...server.platform, mail: by(smtp.url) }, mail));
}

async function round(mail: MailServer | null = by(smtp.url)): Promise<void> {
  await sendQueue({ ...server.platform, mail });
  mail?.close();
}

describe("a mail that the server takes", () => {
  test("arrives with its headers and both its parts, letters of all languages whole, and is marked sent", async () => {
    const id = queued();
    await round();
    const mail = smtp.mailTo("asa@example.org");
    expect(mail.recipients).toEqual(["asa@example.org"]);
    expect(mail.headers.get("from")).toBe(FROM);
    expect(mail.headers.get("to")).toBe("Åsa Öberg <asa@example.org>");
    expect(mail.headers.get("subject")).toBe("Zählung in der Heide");
    expect(mail.headers.get("auto-submitted")).toBe("auto-generated");
    expect(mail.headers.get("message-id")).toBe(`<${id}@example.org>`);
    expect(mail.headers.get("content-type")).toMatch(/^multipart\/alternative;/);
    expect(mail.text.trim()).toBe("Grüße & <b>Zahlen</b>\n\nhttp://127.0.0.1/replay?a=1&b=2");
    expect(mail.html).toContain("<p>Grüße &amp; &lt;b&gt;Zahlen&lt;/b&gt;</p>");
    expect(mail.html).toContain('<a href="http://127.0.0.1/replay?a=1&amp;b=2">');
    expect(row(id)).toMatchObject({ state: "sent", attempts: 1, nextAttemptAt: null, lastError: "", sentAt: START });
  });

  test("goes out once, however many rounds follow", async () => {
    queued();
    await round();
    await round();
    expect(smtp.mails).toHaveLength(1);
  });

  test("goes before one that was written after it, and a round sends twenty at most", async () => {
    for (let n = 0; n < 21; n += 1) {
      server.setNow(at(n * 1000));
      queued({ to: { name: "", address: `n${n}@example.org` } });
    }
    await round();
    const first = Array.from({ length: 20 }, (_, n) => `n${n}@example.org`);
    expect(smtp.mails.map(({ recipients }) => recipients[0])).toEqual(first);
    await round();
    expect(smtp.mails.at(-1)?.recipients).toEqual(["n20@example.org"]);
  });

  test("loses its link once it is sent", async () => {
    const id = queued({ secret: true, written: write("Your link", [linkLine("http://x.example/invitation/abc")]) });
    expect(row(id).text).toContain("/invitation/abc");
    await round();
    expect(smtp.mailTo("asa@example.org").text).toContain("/invitation/abc");
    expect(`${row(id).text}${row(id).html}`).not.toContain("abc");
  });
});

describe("what people type", () => {
  // RFC 5322: a header ends with a line break, so a name with one could begin a header of its own.
  test("line breaks in a name and a subject make no header, and no further recipient", async () => {
    const name = "Eve\r\nBcc: all@example.org\r\n\r\n<b>hello</b>";
    queued({ to: { name, address: "eve@example.org" }, written: write("Moss\r\nBcc: all@example.org", ["hello"]) });
    await round();
    expect(smtp.mails).toHaveLength(1);
    const mail = smtp.mailTo("eve@example.org");
    expect(mail.recipients).toEqual(["eve@example.org"]);
    expect(mail.headers.has("bcc")).toBe(false);
    expect(mail.headers.get("subject")).toBe("Moss Bcc: all@example.org");
    expect(mail.text.trim()).toBe("hello");
  });

  test("a comma and an address in a name are no second recipient", async () => {
    queued({ to: { name: "Eve, other@example.org <third@example.org>", address: "eve@example.org" } });
    await round();
    expect(smtp.mails.map(({ recipients }) => recipients)).toEqual([["eve@example.org"]]);
  });
});

describe("a mail that is not taken", () => {
  test("fails at once when the server refuses the recipient for ever, with the server's words; the next one goes", async () => {
    smtp.answer((to) => (to === "asa@example.org" ? { code: 550, words: "no such mailbox here" } : null));
    const refused = queued();
    server.setNow(at(1000));
    const next = queued({ to: { name: "Bo", address: "bo@example.org" } });
    await round();
    expect(row(refused)).toMatchObject({ state: "failed", attempts: 1, nextAttemptAt: null });
    expect(row(refused).lastError).toContain("550 no such mailbox here");
    expect(row(next).state).toBe("sent");
  });

  test("waits a minute after “for now not”, then is taken", async () => {
    smtp.answer(() => ({ code: 451, words: "greylisted, come again" }));
    const id = queued();
    await round();
    expect(row(id)).toMatchObject({ state: "waiting", attempts: 1, nextAttemptAt: at(60_000) });
    expect(row(id).lastError).toContain("451 greylisted, come again");
    smtp.answer(() => null);
    server.setNow(at(59_000));
    await round();
    expect(smtp.mails).toHaveLength(0);
    server.setNow(at(60_000));
    await round();
    expect(row(id)).toMatchObject({ state: "sent", attempts: 2, lastError: "" });
    expect(smtp.mails).toHaveLength(1);
  });

  // 1 + 5 + 30 min + 2 + 6 + 12 + 24 h: eight attempts in two days, less three hours.
  test("waits longer each time, and has failed after the eighth attempt", async () => {
    smtp.answer(() => ({ code: 451, words: "not now" }));
    const id = queued();
    const waited: number[] = [];
    for (let now = START; row(id).state === "waiting"; now = row(id).nextAttemptAt ?? now) {
      waited.push((Date.parse(now) - Date.parse(START)) / 60_000);
      server.setNow(now);
      await round();
    }
    expect(waited).toEqual([0, 1, 6, 36, 156, 516, 1236, 2676]);
    expect(row(id)).toMatchObject({ state: "failed", attempts: WAITS_MS.length + 1, nextAttemptAt: null });
  });

  const waits = async (url: string, silenceMs = LONG_MS) => {
    const first = queued();
    server.setNow(at(1000));
    const second = queued();
    await round(by(url, silenceMs));
    expect(row(first)).toMatchObject({ state: "waiting", attempts: 1, nextAttemptAt: at(61_000) });
    expect(row(second)).toMatchObject({ state: "waiting", attempts: 0 });
    return row(first).lastError;
  };

  test("waits while no server is there; those behind it are not tried in vain", async () => {
    const gone = await startMute("");
    await gone.stop();
    expect(await waits(gone.url)).toMatch(/ECONNREFUSED/);
  });

  test("waits when the server says nothing at all", async () => {
    const mute = await startMute("");
    expect(await waits(mute.url, SHORT_MS)).toMatch(/greeting|time/i);
    await mute.stop();
  });

  test("waits when the server greets and never answers", async () => {
    const mute = await startMute("220 mail.example.org ESMTP\r\n");
    expect(await waits(mute.url, SHORT_MS)).toMatch(/time/i);
    await mute.stop();
  });

  test("waits when the password is wrong, which an owner may put right, and the password is never told", async () => {
    const strict = await startSmtp({ password: "right one" });
    const said = await waits(strict.url.replace(encodeURIComponent("right one"), "wrong-one"));
    expect(said).toMatch(/535/);
    expect(said).not.toContain("wrong-one");
    server.setNow(at(61_000));
    await round(by(strict.url));
    expect(strict.mails).toHaveLength(2);
    await strict.stop();
  });
});

describe("the queue", () => {
  test("outlives the process: what waited is sent by the next one", async () => {
    const id = queued();
    const again = openDb(server.platform.db.$client.name);
    const mail = by(smtp.url);
    await sendQueue({ ...server.platform, db: again, mail });
    mail.close();
    closeDb(again);
    expect(smtp.mails).toHaveLength(1);
    expect(row(id).state).toBe("sent");
  });

  test("sends twice rather than never when the process ends between sending and marking, under the same Message-ID", async () => {
    const id = queued();
    const dying = openDb(server.platform.db.$client.name);
    const real = by(smtp.url);
    const mail: MailServer = {
      ...real,
      send: async (letter) => {
        await real.send(letter);
        closeDb(dying);
      },
    };
    await expect(sendQueue({ ...server.platform, db: dying, mail })).rejects.toThrow();
    real.close();
    expect(row(id).state).toBe("waiting");
    await round();
    const ids = smtp.mails.map(({ headers }) => headers.get("message-id"));
    expect(ids).toEqual([`<${id}@example.org>`, `<${id}@example.org>`]);
  });

  test("keeps what waits when no server is set up any more, and sends nothing of it by itself later", async () => {
    const id = queued();
    await round(null);
    expect(row(id)).toMatchObject({ state: "kept", nextAttemptAt: null });
    await round();
    expect(smtp.mails).toHaveLength(0);
  });

  test("takes the link out of a mail when it is used or replaced; one that waited is not sent any more", async () => {
    const link = {
      secret: true,
      about: "invitation abc",
      written: write("Come in", [linkLine("http://x/invitation/abc")]),
    };
    const id = queued(link);
    writeTx(server.platform.db, (tx) => emptyMailsAbout(tx, "invitation abc"));
    await round();
    expect(smtp.mails).toHaveLength(0);
    expect(row(id)).toMatchObject({ state: "failed", html: "" });
    expect(row(id).text).not.toContain("invitation/abc");
  });

  // Links of resets work for 2 hours, those of invitations for 14 days.
  // The invitation is withdrawn while the server thinks about it; then the server says "for now not" (RFC 5321: 4xx).
  test("a mail whose link ends while it is being refused for now is not tried again", async () => {
    const id = queued({ secret: true, about: "link slow" });
    const slow: MailServer = {
      name: "slow",
      from: FROM,
      send: async () => {
        writeTx(server.platform.db, (tx) => emptyMailsAbout(tx, "link slow"));
        return Promise.reject(new MailRefused("later", { forEver: false, others: true }));
      },
      close: () => undefined,
    };
    await round(slow);
    expect(row(id)).toMatchObject({ state: "failed", nextAttemptAt: null, html: "" });
    server.setNow(at(24 * 3600_000));
    await round();
    expect(row(id)).toMatchObject({ state: "failed" });
  });

  test("takes the link out of mails when it has expired", async () => {
    const reset = queued({ kind: "reset", secret: true });
    const invitation = queued({ kind: "invitation", secret: true });
    server.setNow(at(2 * 3600_000 - 1));
    await round(null);
    expect([row(reset).html, row(invitation).html]).not.toContain("");
    server.setNow(at(2 * 3600_000));
    await round(null);
    expect([row(reset).html, row(invitation).html === ""]).toEqual(["", false]);
    server.setNow(at(14 * 24 * 3600_000));
    await round(null);
    expect(row(invitation)).toMatchObject({ state: "kept", html: "" });
  });

  test("forgets what was sent half a year ago, but never a witness mail, and nothing that was not sent", async () => {
    const plain = queued();
    const witness = queued({ kind: "witness" });
    const day = queued({ kind: "witness-day" });
    await round();
    const kept = queued();
    server.setNow(at(181 * 24 * 3600_000));
    await round(null);
    expect(findMail(server.platform.db, plain)).toBeUndefined();
    expect([row(witness).state, row(day).state, row(kept).state]).toEqual(["sent", "sent", "kept"]);
  });
});
