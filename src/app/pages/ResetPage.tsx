import { useNavigate, useParams } from "react-router-dom";
import { problemOf } from "../../api/problem-of.ts";
import { Button } from "../../components/ui/Button.tsx";
import { ButtonLink } from "../../components/ui/ButtonLink.tsx";
import { Refusal } from "../../components/ui/Refusal.tsx";
import { RuledLoading } from "../../components/ui/RuledLoading.tsx";
import { showToast } from "../../components/ui/show-toast.tsx";
import { useTimes } from "../../components/ui/use-times.ts";
import { useResetLink } from "../../features/accounts/link-queries.ts";
import { NewPasswordForm } from "../../features/accounts/NewPasswordForm.tsx";
import { DoorPage } from "../DoorPage.tsx";
import { paths } from "../paths.ts";

/** Where the link for a forgotten password leads. */
export function ResetPage() {
  const { secret = "" } = useParams();
  const link = useResetLink(secret);
  const navigate = useNavigate();
  const times = useTimes();
  if (link.data !== undefined) {
    return (
      <DoorPage here="New password" title="Choose a new password.">
        <p className="q-sign-in-lead">
          It ends every session of this account, also on other devices, and signs you in here.
        </p>
        <p className="q-help">{`The link works once, until ${times.time(link.data.expiresAt)}.`}</p>
        <NewPasswordForm
          secret={secret}
          email={link.data.email}
          onSet={() => {
            showToast("The new password is set; all other sessions have ended.");
            void navigate(paths.home, { replace: true });
          }}
        />
      </DoorPage>
    );
  }
  if (link.isPending) {
    return (
      <DoorPage here="New password" title="A new password">
        <RuledLoading label="Loading the link" />
      </DoorPage>
    );
  }
  const hasEnded = problemOf(link.error).code === "link-ended";
  return (
    <DoorPage here="New password" title={hasEnded ? "This link has ended." : "The link cannot be read now."}>
      <div className="mt-6 grid gap-4">
        <Refusal
          error={link.error}
          next={hasEnded ? undefined : <Button onClick={() => void link.refetch()}>Try again</Button>}
        />
        {hasEnded && (
          <div>
            <ButtonLink variant="primary" to={paths.askForReset}>
              Ask for a new link
            </ButtonLink>
          </div>
        )}
      </div>
    </DoorPage>
  );
}
