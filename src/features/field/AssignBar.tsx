import { useState } from "react";
import type { AssignmentsNow, Visit } from "#shared/api/field.ts";
import { Button } from "../../components/ui/Button.tsx";
import { Field } from "../../components/ui/Field.tsx";
import { formatCount, formatNumber } from "../../components/ui/format.ts";
import { Refusal } from "../../components/ui/Refusal.tsx";
import { Select } from "../../components/ui/Select.tsx";
import { showToast } from "../../components/ui/show-toast.tsx";
import { TextInput } from "../../components/ui/TextInput.tsx";
import { AssignedMeanwhile } from "./AssignedMeanwhile.tsx";
import { assignedMeanwhile, type Sharing, useAssign, useFieldMembers } from "./queries.ts";

interface AssignBarProps {
  readonly surveyId: string;
  readonly selected: readonly Visit[];
  /** How many of them the list does not show at the moment. */
  readonly hidden: number;
  readonly onDone: () => void;
  readonly onUnselect: (visitIds: readonly string[]) => void;
}

/** Gives the selected cells to somebody for a day, or takes them back. */
export function AssignBar({ surveyId, selected, hidden, onDone, onUnselect }: AssignBarProps) {
  const [memberId, setMemberId] = useState("");
  const [day, setDay] = useState("");
  const members = useFieldMembers(surveyId);
  const assign = useAssign(surveyId);
  const takingBack = assign.isPending && assign.variables.memberId === null;
  const meanwhile = assignedMeanwhile(assign.error);
  const send = (sharing: Sharing) => {
    if (assign.isPending) return;
    assign.mutate(sharing, {
      onSuccess: ({ assigned }) => {
        showToast(`${formatCount(assigned, "cell")} ${sharing.memberId === null ? "taken back" : "shared out"}.`);
        onDone();
      },
    });
  };
  const share = (to: string | null) => send({ visits: selected, memberId: to, day: to === null ? "" : day });
  return (
    <section aria-label="Share out" className="grid gap-3">
      <p role="status">{selectedText(selected.length, hidden)}</p>
      <div className="grid items-end gap-3 md:grid-cols-[minmax(0,1fr)_minmax(0,1fr)_auto_auto]">
        <Field label="Give to">
          <Select value={memberId} onChange={(event) => setMemberId(event.target.value)}>
            <option value="">Choose a person</option>
            {members.data?.map((member) => (
              <option key={member.id} value={member.id}>
                {`${member.name} (${member.roles.join(", ")})`}
              </option>
            ))}
          </Select>
        </Field>
        <Field label="Day" aside="may stay empty">
          <TextInput
            value={day}
            maxLength={60}
            placeholder="Tuesday 3 June"
            onChange={(event) => setDay(event.target.value)}
          />
        </Field>
        <Button
          variant="primary"
          disabled={selected.length === 0 || memberId === ""}
          busy={assign.isPending && !takingBack}
          onClick={() => share(memberId)}
        >
          Share out
        </Button>
        <Button disabled={selected.length === 0} busy={takingBack} onClick={() => share(null)}>
          Take back
        </Button>
      </div>
      {members.data === undefined && members.isError && <Refusal error={members.error} />}
      {meanwhile === null && assign.isError && <Refusal error={assign.error} />}
      {meanwhile !== null && assign.variables !== undefined && (
        <AssignedMeanwhile
          now={meanwhile}
          anyway={anywayText(
            members.data?.find(({ id }) => id === assign.variables.memberId)?.name ?? null,
            meanwhile.length,
          )}
          busy={assign.isPending}
          onAnyway={() => send(over(assign.variables, meanwhile))}
          onLeave={() => {
            assign.reset();
            onUnselect(meanwhile.map(({ visitId }) => visitId));
          }}
        />
      )}
    </section>
  );
}

/** The same act on the cells as they are now. */
function over(sharing: Sharing, now: AssignmentsNow): Sharing {
  const current = new Map(now.map(({ visitId, assignedTo }) => [visitId, assignedTo]));
  const visits = sharing.visits.map(({ id, assignedTo }) => ({
    id,
    assignedTo: current.has(id) ? (current.get(id) ?? null) : assignedTo,
  }));
  return { ...sharing, visits };
}

function anywayText(name: string | null, cells: number): string {
  const them = cells === 1 ? "it" : "them";
  return name === null ? `Take ${them} back anyway` : `Give ${them} to ${name} anyway`;
}

function selectedText(selected: number, hidden: number): string {
  if (selected === 0) return "Select cells in the list, then say who goes.";
  const text = `${formatCount(selected, "cell")} selected`;
  return hidden === 0 ? `${text}.` : `${text}, ${formatNumber(hidden)} of them hidden by the filter.`;
}
