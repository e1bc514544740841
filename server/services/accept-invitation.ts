import { Problem } from "#shared/problem.ts";
import type { Platform } from "../context.ts";
import { type AccountRow, updateAccount } from "../db/accounts.ts";
import { standingOf } from "../db/members.ts";
import { type Tx, writeTx } from "../db/open.ts";
import { expectOpenAccount } from "./add-person.ts";
import { checkPassword } from "./check-password.ts";
import { addAccount } from "./create-account.ts";
import { giveRole } from "./give-role.ts";
import { endInvitation } from "./invite.ts";
import { hashNewPassword } from "./passwords.ts";
import { type InvitationFound, readInvitation } from "./read-invitation.ts";

interface Accepting {
  readonly secret: string;
  readonly name: string | undefined;
  readonly password: string;
  /** Network address of whoever accepts. */
  readonly source: string;
}

/** Who is signed in then, and where to go first. */
interface Accepted {
  readonly account: AccountRow;
  readonly surveyId: string | null;
}

/**
 * Takes an invitation: with the account's password where the address has an account, else with a name and a password for a
 * new one. What was read is read again in the transaction, since passwords take their time.
 * @throws Problem `link-ended`, `sign-in-refused`, `account-closed`, `survey-archived`, `account-exists`
 */
export async function acceptInvitation(platform: Platform, accepting: Accepting): Promise<Accepted> {
  const before = readInvitation(platform, platform.db, accepting.secret);
  expectAcceptable(before);
  const proven = before.account
    ? await checkPassword(platform, { ...accepting, email: before.account.email })
    : await newcomer(before.invitation.email, accepting);
  return writeTx(platform.db, (tx) => {
    const found = readInvitation(platform, tx, accepting.secret);
    expectAcceptable(found);
    if (found.account && !("id" in proven)) {
      throw new Problem("account-exists", "It was made meanwhile. Reload the page and enter its password.");
    }
    const account = found.account ?? addAccount(tx, platform, { ...proven, isOwner: false });
    return accept(tx, platform, found, account);
  });
}

function expectAcceptable({ account, survey }: InvitationFound): void {
  if (account) expectOpenAccount(account);
  if (survey && survey.archivedAt !== null) {
    throw new Problem("survey-archived", "It takes nobody new while it is. Ask whoever invited you.");
  }
}

async function newcomer(email: string, { name, password }: Accepting) {
  if (name === undefined) throw new Problem("input-invalid", "body.name: write the name that others will see");
  return { email, name, passwordHash: await hashNewPassword(password, { name, email }) };
}

function accept(tx: Tx, platform: Platform, { invitation }: InvitationFound, account: AccountRow): Accepted {
  const { surveyId, role } = invitation;
  endInvitation(tx, invitation, "acceptedAt", platform.now().toISOString());
  if (invitation.makesOwner) updateAccount(tx, account.id, { isOwner: true });
  if (surveyId !== null && role !== null && !standingOf(tx, surveyId, account.id).roles.includes(role)) {
    giveRole(tx, platform, { surveyId, account, role, by: null });
  }
  return { account: { ...account, isOwner: account.isOwner || invitation.makesOwner }, surveyId };
}
