import type { Member } from "#shared/api/people.ts";
import { Button } from "../../../components/ui/Button.tsx";
import { Dialog } from "../../../components/ui/Dialog.tsx";
import { Refusal } from "../../../components/ui/Refusal.tsx";
import { showToast } from "../../../components/ui/show-toast.tsx";
import { useSetRoles } from "./queries.ts";

interface RemovePersonProps {
  readonly surveyId: string;
  readonly member: Member;
  readonly onClose: () => void;
}

/** Takes all roles of somebody, after saying what that ends and what it leaves. */
export function RemovePerson({ surveyId, member, onClose }: RemovePersonProps) {
  const { name } = member;
  const remove = useSetRoles(surveyId, member);
  const confirm = () =>
    remove.mutate([], {
      onSuccess: () => {
        showToast(`${name} is no longer in this survey.`);
        onClose();
      },
    });
  return (
    <Dialog
      open
      onOpenChange={(open) => !open && onClose()}
      title={`Remove ${name}?`}
      lead={`It takes effect at once: ${name} is signed out everywhere, and pages of this survey that are open answer no more.`}
      actions={
        <>
          <Button onClick={onClose}>Keep {name}</Button>
          <Button variant="danger" busy={remove.isPending} busyLabel="Removing…" onClick={confirm}>
            Remove {name}
          </Button>
        </>
      }
    >
      <p>
        What {name} did stays on record under this name: acts, counts and amendments. Cells that are in their list stay
        there until somebody shares them out anew. Their account and their other surveys stay as well.
      </p>
      {remove.isError && (
        <div className="mt-3">
          <Refusal error={remove.error} />
        </div>
      )}
    </Dialog>
  );
}
