import { Button } from "../../components/ui/Button.tsx";
import { Dialog } from "../../components/ui/Dialog.tsx";
import { Refusal } from "../../components/ui/Refusal.tsx";
import { RuledLoading } from "../../components/ui/RuledLoading.tsx";
import type { PastDeclaration } from "./past-declarations.ts";
import { PicksTable } from "./PicksTable.tsx";
import { useDraw } from "./queries.ts";

interface PastPicksDialogProps {
  readonly surveyId: string;
  readonly draw: NonNullable<PastDeclaration["draw"]>;
  readonly onClose: () => void;
}

/** The list of a draw that is not in use here any more: picks, then reserves. */
export function PastPicksDialog({ surveyId, draw, onClose }: PastPicksDialogProps) {
  const detail = useDraw(surveyId, draw.id);
  return (
    <Dialog
      wide
      open
      onOpenChange={onClose}
      title={`Picks of draw ${draw.number}`}
      lead="As they were drawn. Nothing is estimated from them while the draw is not in use."
      actions={<Button onClick={onClose}>Close</Button>}
    >
      {detail.data === undefined ? (
        detail.error === null ? (
          <RuledLoading label="Loading the picks" />
        ) : (
          <Refusal error={detail.error} />
        )
      ) : (
        <PicksTable
          caption={`Picks of draw ${draw.number} in draw order`}
          entries={detail.data.entries}
          maxHeight={360}
        />
      )}
    </Dialog>
  );
}
