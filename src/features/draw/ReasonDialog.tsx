import { useId, useState } from "react";
import { Button } from "../../components/ui/Button.tsx";
import { Dialog } from "../../components/ui/Dialog.tsx";
import { Field } from "../../components/ui/Field.tsx";
import { Refusal } from "../../components/ui/Refusal.tsx";
import { TextArea } from "../../components/ui/TextArea.tsx";

interface ReasonDialogProps {
  readonly open: boolean;
  readonly onOpenChange: (open: boolean) => void;
  readonly title: string;
  readonly lead: string;
  /** The act, as on its button. */
  readonly act: string;
  readonly busy: boolean;
  readonly error: unknown;
  readonly onReason: (reason: string) => void;
}

/** An act that stays on record needs a reason; what was typed stays when it is refused, and the dialog while the act is under way. */
export function ReasonDialog({ open, onOpenChange, title, lead, act, busy, error, onReason }: ReasonDialogProps) {
  const form = useId();
  const [reason, setReason] = useState("");
  const [shown, setShown] = useState(false);
  const tooShort = reason.trim().length < 3;
  return (
    <Dialog
      open={open}
      onOpenChange={(next) => {
        if (!busy) onOpenChange(next);
      }}
      title={title}
      lead={lead}
      actions={
        <>
          <Button disabled={busy} onClick={() => onOpenChange(false)}>
            Leave it as it is
          </Button>
          <Button variant="danger" type="submit" form={form} busy={busy}>
            {act}
          </Button>
        </>
      }
    >
      <form
        id={form}
        className="grid gap-3"
        noValidate
        onSubmit={(event) => {
          event.preventDefault();
          setShown(true);
          if (!tooShort && !busy) onReason(reason.trim());
        }}
      >
        <Field label="Reason" error={shown && tooShort ? "Say why: it stands in the record." : undefined}>
          <TextArea value={reason} onChange={(event) => setReason(event.target.value)} />
        </Field>
        {error !== null && error !== undefined && <Refusal error={error} />}
      </form>
    </Dialog>
  );
}
