import type { MailSummary } from "#shared/api/installation.ts";
import { formatCount, type Times } from "../../components/ui/format.ts";
import type { MailState } from "./queries.ts";

export const MAIL_STATES: Readonly<Record<MailState, { readonly none: string }>> = {
  waiting: { none: "No mail waits." },
  failed: { none: "No mail has failed." },
  kept: { none: "No mail is kept to be forwarded." },
  sent: { none: "No mail was sent yet." },
};

/** How a mail stands: "failed after 5 attempts", "waits, tried again today, 11:20". */
export function mailState(
  { state, attempts, nextAttemptAt, sentAt }: MailSummary,
  times: Pick<Times, "recent">,
): string {
  switch (state) {
    case "sent":
      return sentAt === null ? "sent" : `sent ${times.recent(sentAt)}`;
    case "kept":
      return "kept here";
    case "failed":
      return attempts === 0 ? "failed" : `failed after ${formatCount(attempts, "attempt")}`;
    case "waiting":
      if (attempts === 0) return "goes out soon";
      return nextAttemptAt === null ? "waits" : `waits, next attempt ${times.recent(nextAttemptAt)}`;
  }
}

/** An address that opens the reader's own mail program with the mail in it. */
export function forwardAddress({ to, subject, text }: { to: string; subject: string; text: string }): string {
  const address = /<([^<>]+)>$/.exec(to)?.[1] ?? to;
  return `mailto:${encodeURIComponent(address).replaceAll("%40", "@")}?subject=${encodeURIComponent(subject)}&body=${encodeURIComponent(text)}`;
}
