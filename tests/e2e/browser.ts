import { type Browser, type BrowserContext, chromium, type Page } from "playwright-core";

/** Debian's Chromium, without a sandbox (CI runs as root) and without a GPU. */
export function launch(): Promise<Browser> {
  return chromium.launch({
    executablePath: process.env["CHROMIUM_PATH"] ?? "/usr/bin/chromium",
    chromiumSandbox: false,
    args: [
      "--disable-gpu",
      "--disable-quic",
      "--no-first-run",
      "--disable-background-networking",
      "--disable-component-update",
      "--disable-sync",
    ],
  });
}

/** A person's own browser profile; page errors and console errors end up in `errors`. */
export async function person(
  browser: Browser,
  width = 1280,
): Promise<{ page: Page; context: BrowserContext; errors: string[] }> {
  const context = await browser.newContext({
    viewport: { width, height: 800 },
    acceptDownloads: true,
    serviceWorkers: "block",
  });
  const page = await context.newPage();
  page.setDefaultTimeout(20_000);
  const errors: string[] = [];
  page.on("pageerror", (error) => errors.push(error.message));
  page.on("console", (message) => {
    if (message.type() === "error" && !/status of 4\d\d/.test(message.text())) errors.push(message.text());
  });
  return { page, context, errors };
}
