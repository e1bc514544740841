import { useState, type SyntheticEvent } from "react";
import { readRecordFile } from "#shared/api/record.ts";
import { addressOf } from "../../api/call.ts";
import { Button } from "../../components/ui/Button.tsx";
import { ButtonLink } from "../../components/ui/ButtonLink.tsx";
import { Dialog } from "../../components/ui/Dialog.tsx";
import { Field } from "../../components/ui/Field.tsx";
import { Refusal } from "../../components/ui/Refusal.tsx";
import { Section } from "../../components/ui/Section.tsx";
import { TextInput } from "../../components/ui/TextInput.tsx";
import { useDeleteSurvey } from "./queries.ts";

interface DeleteSurveyProps {
  readonly surveyId: string;
  readonly surveyName: string;
  readonly onDeleted: () => void;
}

/** Deletes a survey: the record file is offered first, and its name has to be typed. */
export function DeleteSurvey(props: DeleteSurveyProps) {
  const [open, setOpen] = useState(false);
  return (
    <Section
      title="Delete"
      lead="Everything goes: boundary, frames, draws, counts, estimates and the record. What stays here is the newest hash, so that a record file that somebody saved can still be told from a made-up one."
    >
      <div>
        <Button variant="danger" onClick={() => setOpen(true)}>
          Delete the survey…
        </Button>
      </div>
      {open && <DeleteDialog {...props} onClose={() => setOpen(false)} />}
    </Section>
  );
}

function DeleteDialog({
  surveyId,
  surveyName,
  onDeleted,
  onClose,
}: DeleteSurveyProps & { readonly onClose: () => void }) {
  const [typed, setTyped] = useState("");
  const remove = useDeleteSurvey(surveyId);
  const submit = (event: SyntheticEvent) => {
    event.preventDefault();
    if (!remove.isPending) remove.mutate(typed, { onSuccess: onDeleted });
  };
  return (
    <Dialog
      open
      onOpenChange={(next) => {
        if (!next) onClose();
      }}
      title={`Delete ${surveyName}`}
      lead="This cannot be taken back. Save the record file first: with it anybody can check the survey again."
    >
      <form className="grid gap-5" onSubmit={submit} noValidate>
        <div>
          <ButtonLink href={addressOf(readRecordFile, { params: { surveyId } })} download="">
            Save the record file
          </ButtonLink>
        </div>
        <Field label="Name of the survey" help={`Type it as it stands: ${surveyName}`}>
          <TextInput value={typed} autoComplete="off" onChange={(event) => setTyped(event.target.value)} />
        </Field>
        {remove.isError && <Refusal error={remove.error} />}
        <div className="q-dialog-acts">
          <Button onClick={onClose}>Keep the survey</Button>
          <Button type="submit" variant="danger" busy={remove.isPending} busyLabel="Deleting…">
            Delete for good
          </Button>
        </div>
      </form>
    </Dialog>
  );
}
