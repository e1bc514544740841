import { linkLine, write, type Written } from "../template.ts";

/** The kind of these mails: their links work for two hours. */
export const RESET = "reset";

/** A link to set a new password. */
export function resetMail({ link, expires }: { readonly link: string; readonly expires: string }): Written {
  return write("Set a new password", [
    "Somebody asked for a link to set a new password for your account. Press it to choose one:",
    linkLine(link),
    `It works once, until ${expires}. After that you are signed out everywhere else.`,
    "If it was not you, leave this mail alone: your password stays as it is.",
  ]);
}
