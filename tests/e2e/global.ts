import { spawn } from "node:child_process";
import { mkdtempSync, rmSync } from "node:fs";
import { createServer as createHttpServer } from "node:http";
import { createServer, type AddressInfo } from "node:net";
import { tmpdir } from "node:os";
import { join } from "node:path";
import type { TestProject } from "vitest/node";
import { type FakeSmtp, startSmtp } from "../fixtures/smtp.ts";

declare module "vitest" {
  interface ProvidedContext {
    /** Address of the built product in real mode, with one owner. */
    base: string;
    ownerEmail: string;
    ownerPassword: string;
    /** Address that answers with the text of the newest mail `?to=` somebody, or 404 while none has arrived. */
    mailbox: string;
  }
}

/** Starts the product as it is delivered, on a port of its own with an empty database, and stops it at the end. */
export default async function setup(project: TestProject): Promise<() => Promise<void>> {
  const folder = mkdtempSync(join(tmpdir(), "quillet-e2e-"));
  const port = await freePort();
  const owner = { email: "owner@example.org", password: "the owner's first sentence" };
  const smtp = await startSmtp();
  const mailbox = await openMailbox(smtp);
  const server = spawn(process.execPath, [join("dist", "server", "main.js")], {
    stdio: ["ignore", "inherit", "inherit"],
    env: {
      ...process.env,
      NODE_ENV: "production",
      QUILLET_DATA: folder,
      QUILLET_PORT: String(port),
      QUILLET_OWNER_EMAIL: owner.email,
      QUILLET_OWNER_NAME: "Orla Owner",
      QUILLET_OWNER_PASSWORD: owner.password,
      QUILLET_LOG: "error",
      QUILLET_SMTP_URL: smtp.url,
      QUILLET_MAIL_FROM: "Quillet <quillet@example.org>",
    },
  });
  const base = `http://127.0.0.1:${port}`;
  await untilReady(base, () => server.exitCode);
  project.provide("base", base);
  project.provide("ownerEmail", owner.email);
  project.provide("ownerPassword", owner.password);
  project.provide("mailbox", mailbox.address);
  return async () => {
    const ended = new Promise((resolve) => server.once("exit", resolve));
    server.kill("SIGTERM");
    await ended;
    await smtp.stop();
    await mailbox.close();
    rmSync(folder, { recursive: true, force: true });
  };
}

/** Tests run in processes of their own: they ask over HTTP what the SMTP server was given. */
async function openMailbox(smtp: FakeSmtp): Promise<{ address: string; close: () => Promise<unknown> }> {
  const server = createHttpServer((request, response) => {
    const to = new URL(request.url ?? "/", "http://mailbox").searchParams.get("to") ?? "";
    const mail = smtp.mails.findLast(({ recipients }) => recipients.includes(to));
    response.statusCode = mail === undefined ? 404 : 200;
    response.end(mail?.text);
  });
  await new Promise<void>((resolve) => server.listen(0, "127.0.0.1", resolve));
  return {
    address: `http://127.0.0.1:${(server.address() as AddressInfo).port}`,
    close: () => new Promise((resolve) => server.close(resolve)),
  };
}

async function untilReady(base: string, exitCode: () => number | null): Promise<void> {
  for (let tries = 0; tries < 150; tries += 1) {
    if (exitCode() !== null) throw new Error(`the server ended with ${exitCode() ?? ""} before it was ready`);
    const ready = await fetch(`${base}/ready`).catch(() => undefined);
    if (ready?.ok) return;
    await new Promise((resolve) => setTimeout(resolve, 100));
  }
  throw new Error("the server was not ready within 15 seconds");
}

async function freePort(): Promise<number> {
  const probe = createServer();
  await new Promise<void>((resolve) => probe.listen(0, "127.0.0.1", resolve));
  const { port } = probe.address() as AddressInfo;
  await new Promise((resolve) => probe.close(resolve));
  return port;
}
