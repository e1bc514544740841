import { Banner } from "../../components/ui/Banner.tsx";
import { Button } from "../../components/ui/Button.tsx";
import { ButtonLink } from "../../components/ui/ButtonLink.tsx";
import { CodeBlock } from "../../components/ui/CodeBlock.tsx";
import { Dialog } from "../../components/ui/Dialog.tsx";
import { KeyValues } from "../../components/ui/KeyValues.tsx";
import { Refusal } from "../../components/ui/Refusal.tsx";
import { RuledLoading } from "../../components/ui/RuledLoading.tsx";
import { showToast } from "../../components/ui/show-toast.tsx";
import { useTimes } from "../../components/ui/use-times.ts";
import { forwardAddress, mailState } from "./mail-words.ts";
import { useMail, useSendMailAgain } from "./queries.ts";

interface MailDialogProps {
  readonly mailId: string;
  /** A mail server is set up. */
  readonly canSend: boolean;
  readonly onClose: () => void;
}

/** One mail as it was written: to be read, copied, forwarded, or sent again. */
export function MailDialog({ mailId, canSend, onClose }: MailDialogProps) {
  const mail = useMail(mailId);
  const again = useSendMailAgain();
  const times = useTimes();
  const isSendable = canSend && mail.data !== undefined && !mail.data.emptied && mail.data.state !== "sent";
  const send = () =>
    again.mutate(mailId, {
      onSuccess: () => {
        showToast("The mail goes out again.");
        onClose();
      },
    });
  return (
    <Dialog
      open
      wide
      onOpenChange={(open) => !open && onClose()}
      title={mail.data?.subject ?? "Mail"}
      actions={
        <>
          <Button onClick={onClose}>Close</Button>
          {mail.data !== undefined && !mail.data.emptied && (
            <ButtonLink href={forwardAddress(mail.data)}>Open in your mail program</ButtonLink>
          )}
          {isSendable && (
            <Button variant="primary" busy={again.isPending} busyLabel="Sending…" onClick={send}>
              Try to send it again
            </Button>
          )}
        </>
      }
    >
      {mail.isPending && <RuledLoading label="Loading the mail" />}
      {mail.isError && <Refusal error={mail.error} />}
      {mail.data !== undefined && (
        <div className="grid gap-4">
          <KeyValues
            items={[
              { key: "To", value: mail.data.to },
              { key: "State", value: mailState(mail.data, times) },
              { key: "Written", value: times.time(mail.data.createdAt) },
            ]}
          />
          {mail.data.lastError !== "" && (
            <Banner tone="ochre" title="The last attempt failed.">
              {mail.data.lastError}
            </Banner>
          )}
          {mail.data.emptied ? (
            <p>Its text is gone: it held a link that was sent or has ended. Send a new link instead.</p>
          ) : (
            <div className="q-mail-text">
              <CodeBlock code={mail.data.text} label="text of the mail" />
            </div>
          )}
          {again.isError && <Refusal error={again.error} />}
        </div>
      )}
    </Dialog>
  );
}
