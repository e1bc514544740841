import { useState } from "react";
import { Link } from "react-router-dom";
import { Button } from "../../components/ui/Button.tsx";
import { AskForResetForm } from "../../features/accounts/AskForResetForm.tsx";
import { DoorPage } from "../DoorPage.tsx";
import { paths } from "../paths.ts";

/** For whoever forgot the password. */
export function AskForResetPage() {
  const [asked, setAsked] = useState<string | null>(null);
  const back = (
    <p className="mt-4">
      <Link to={paths.signIn}>To the sign-in page</Link>
    </p>
  );
  if (asked !== null) {
    return (
      <DoorPage here="Forgotten password" title="Look into your mail.">
        <div role="status">
          <p className="q-sign-in-lead">{`If ${asked} has an account here, a link to set a new password is on its way to it.`}</p>
          <p className="q-help">
            It works once, for two hours; a newer link ends an older one. Nothing there after some minutes? Look among
            unwanted mail, or ask the owner of this installation, who sees whether the mail went out.
          </p>
        </div>
        <div className="mt-6">
          <Button onClick={() => setAsked(null)}>Ask for another address</Button>
        </div>
        {back}
      </DoorPage>
    );
  }
  return (
    <DoorPage here="Forgotten password" title="Set a new password by mail.">
      <p className="q-sign-in-lead">
        Write the address of your account. A link comes by mail; until you use it, your present password works.
      </p>
      <AskForResetForm onAsked={setAsked} />
      {back}
    </DoorPage>
  );
}
