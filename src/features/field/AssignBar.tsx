import { useState } from "react";
import type { Member } from "#shared/api/surveys.ts";
import { Button } from "../../components/ui/Button.tsx";
import { Field } from "../../components/ui/Field.tsx";
import { formatCount } from "../../components/ui/format.ts";
import { Refusal } from "../../components/ui/Refusal.tsx";
import { Select } from "../../components/ui/Select.tsx";
import { showToast } from "../../components/ui/show-toast.tsx";
import { TextInput } from "../../components/ui/TextInput.tsx";
import { useAssign } from "./queries.ts";

interface AssignBarProps {
  readonly surveyId: string;
  readonly members: readonly Member[];
  readonly selected: ReadonlySet<string>;
  readonly onDone: () => void;
}

/** Gives the selected cells to somebody for a day, or takes them back. */
export function AssignBar({ surveyId, members, selected, onDone }: AssignBarProps) {
  const [memberId, setMemberId] = useState("");
  const [day, setDay] = useState("");
  const assign = useAssign(surveyId);
  const send = (to: string | null) => {
    const visitIds = [...selected];
    assign.mutate(
      { visitIds, memberId: to, day: to === null ? "" : day },
      {
        onSuccess: () => {
          showToast(
            to === null
              ? `${formatCount(visitIds.length, "cell")} taken back.`
              : `${formatCount(visitIds.length, "cell")} shared out.`,
          );
          onDone();
        },
      },
    );
  };
  return (
    <section aria-label="Share out" className="grid gap-3">
      <p>
        {selected.size === 0
          ? "Select cells in the list, then say who goes."
          : `${formatCount(selected.size, "cell")} selected.`}
      </p>
      <div className="grid items-end gap-3 md:grid-cols-[minmax(0,1fr)_minmax(0,1fr)_auto_auto]">
        <Field label="Give to">
          <Select value={memberId} onChange={(event) => setMemberId(event.target.value)}>
            <option value="">Choose a person</option>
            {members.map((member) => (
              <option key={member.id} value={member.id}>
                {`${member.name} (${member.roles.join(", ")})`}
              </option>
            ))}
          </Select>
        </Field>
        <Field label="Day" aside="may stay empty">
          <TextInput value={day} placeholder="Tuesday 3 June" onChange={(event) => setDay(event.target.value)} />
        </Field>
        <Button
          variant="primary"
          disabled={selected.size === 0 || memberId === ""}
          busy={assign.isPending}
          onClick={() => send(memberId)}
        >
          Share out
        </Button>
        <Button disabled={selected.size === 0} onClick={() => send(null)}>
          Take back
        </Button>
      </div>
      {assign.isError && <Refusal error={assign.error} />}
    </section>
  );
}
