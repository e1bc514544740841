import type { Page } from "playwright-core";
import { expect, inject } from "vitest";

/** The link in the newest mail to an address, as soon as it has come over SMTP. Mails go out every 15 seconds. */
export async function linkTo(address: string, path: "/invitation/" | "/reset/"): Promise<string> {
  const link = new RegExp(`http://\\S+${path}[\\w-]{43}`);
  let found: string | undefined;
  await expect
    .poll(
      async () => {
        const response = await fetch(`${inject("mailbox")}/?to=${encodeURIComponent(address)}`);
        found = response.ok ? link.exec(await response.text())?.[0] : undefined;
        return found;
      },
      { timeout: 40_000, interval: 250 },
    )
    .toBeDefined();
  return found ?? "";
}

/** Follows the link of an invitation and sets name and password; the page is then where the invitation led. */
export async function accept(page: Page, address: string, by: { name: string; password: string }): Promise<void> {
  await page.goto(await linkTo(address, "/invitation/"));
  await page.getByLabel("Your name").fill(by.name);
  await page.getByLabel("Password", { exact: true }).fill(by.password);
  await page.getByRole("button", { name: /^(Take part as|Accept)/ }).click();
  await page.waitForURL(/\/surveys\/[^/]+\/\w+$/);
}
