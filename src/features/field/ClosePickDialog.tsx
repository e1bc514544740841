import { useId, useState } from "react";
import type { Visit } from "#shared/api/field.ts";
import { STATE_MEANINGS, STATE_WORDS } from "#shared/counts/count.ts";
import { CLOSING_STATES, type ClosingState } from "#shared/field/states.ts";
import { Banner } from "../../components/ui/Banner.tsx";
import { Button } from "../../components/ui/Button.tsx";
import { Dialog } from "../../components/ui/Dialog.tsx";
import { Field } from "../../components/ui/Field.tsx";
import { formatCount, formatList } from "../../components/ui/format.ts";
import { RadioCards } from "../../components/ui/RadioCards.tsx";
import { Refusal } from "../../components/ui/Refusal.tsx";
import { TextArea } from "../../components/ui/TextArea.tsx";
import { type Closed, type Closing, useClosePick } from "./queries.ts";

interface ClosePickDialogProps {
  readonly surveyId: string;
  readonly visit: Visit;
  readonly reservesLeft: number;
  readonly onClose: () => void;
}

/** Why a cell can't be counted. The next reserves open in draw order; nobody chooses one. */
export function ClosePickDialog({ surveyId, visit, reservesLeft, onClose }: ClosePickDialogProps) {
  const form = useId();
  const [id] = useState(() => crypto.randomUUID());
  const [state, setState] = useState<ClosingState | null>(
    CLOSING_STATES.find((one) => one === visit.count.state) ?? null,
  );
  const [reason, setReason] = useState("");
  const [shown, setShown] = useState(false);
  const close = useClosePick(surveyId);
  const ready: Closing | null =
    state === null || reason.trim().length < 3 ? null : { id, state, reason: reason.trim(), visitId: visit.id };
  return (
    <Dialog
      wide
      open
      onOpenChange={(open) => {
        if (!open && !close.isPending) onClose();
      }}
      title={close.isSuccess ? `${visit.label} is closed` : `Close cell ${visit.label}?`}
      lead={close.isSuccess ? undefined : openingText(visit.orders.length, reservesLeft)}
      actions={
        close.isSuccess ? (
          <Button variant="primary" onClick={onClose}>
            Back to the list
          </Button>
        ) : (
          <>
            <Button disabled={close.isPending} onClick={onClose}>
              Leave it open
            </Button>
            <Button variant="danger" type="submit" form={form} busy={close.isPending}>
              Close the pick
            </Button>
          </>
        )
      }
    >
      {close.isSuccess ? (
        <p role="status">{closedText(close.data)}</p>
      ) : (
        <form
          id={form}
          className="grid gap-4"
          noValidate
          onSubmit={(event) => {
            event.preventDefault();
            setShown(true);
            if (ready !== null && !close.isPending) close.mutate(ready);
          }}
        >
          <Banner tone="ochre" title="Never a nicer cell in its place.">
            A cell that is merely hard, wet or empty is counted. Nobody goes where it is unsafe.
          </Banner>
          <RadioCards
            legend="What happened"
            value={state}
            onChange={setState}
            {...(shown && state === null && { error: "Say what happened." })}
            options={CLOSING_STATES.map((one) => ({ value: one, title: STATE_WORDS[one], text: STATE_MEANINGS[one] }))}
          />
          <Field
            label="Reason"
            error={shown && reason.trim().length < 3 ? "Say why: it stands in the record." : undefined}
          >
            <TextArea value={reason} onChange={(event) => setReason(event.target.value)} />
          </Field>
          {close.isError && <Refusal error={close.error} />}
        </form>
      )}
    </Dialog>
  );
}

function openingText(picks: number, reservesLeft: number): string {
  const next =
    picks === 1
      ? "The next reserve in draw order opens in its place."
      : `It was picked ${picks} times: the next ${picks} reserves in draw order open in its place.`;
  if (reservesLeft >= picks) return next;
  const left = reservesLeft === 0 ? "No reserve is" : `Only ${formatCount(reservesLeft, "reserve is", "reserves are")}`;
  return `${next} ${left} left: the list goes on from the same seed, as long as the frame has cells for it.`;
}

function closedText({ opened, passedOver, unreplaced, reservesLeft }: Closed): string {
  const parts = [
    opened.length === 0
      ? "No reserve was left to open."
      : `Opened in draw order: ${formatList(opened.map(({ label, position }) => `${label} (pick ${position})`))}.`,
    ...opened
      .filter(({ repeatsCountedCell }) => repeatsCountedCell)
      .map(({ label }) => `${label} was counted before: its count enters again, nobody has to go.`),
    passedOver.length === 0
      ? ""
      : `Passed over, because their cells are closed: ${formatList(passedOver.map((position) => `pick ${position}`))}.`,
    unreplaced === 0
      ? ""
      : `${formatCount(unreplaced, "pick")} found no reserve: the frame has no further cell for it.`,
    `${formatCount(reservesLeft, "reserve")} left.`,
  ];
  return parts.filter((part) => part !== "").join(" ");
}
