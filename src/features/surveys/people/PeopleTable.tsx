import { useState } from "react";
import type { Member } from "#shared/api/people.ts";
import { Button } from "../../../components/ui/Button.tsx";
import { formatList } from "../../../components/ui/format.ts";
import { Table } from "../../../components/ui/Table.tsx";
import { useTimes } from "../../../components/ui/use-times.ts";
import { ChangeRoles } from "./ChangeRoles.tsx";
import { RemovePerson } from "./RemovePerson.tsx";

interface PeopleTableProps {
  readonly surveyId: string;
  readonly members: readonly Member[];
  /** Whether roles can be changed here. */
  readonly mayChange: boolean;
}

interface Asked {
  readonly act: "roles" | "remove";
  readonly member: Member;
}

/** Whether nobody else plans the survey. */
export function isLastPlanner({ id, roles }: Member, members: readonly Member[]): boolean {
  return roles.includes("planner") && !members.some((other) => other.id !== id && other.roles.includes("planner"));
}

/** The people of a survey with their roles, and the ways to change them. */
export function PeopleTable({ surveyId, members, mayChange }: PeopleTableProps) {
  const times = useTimes();
  const [asked, setAsked] = useState<Asked | null>(null);
  const close = () => setAsked(null);
  return (
    <>
      <Table caption="People of this survey" sticky>
        <thead>
          <tr>
            <th scope="col">Name</th>
            <th scope="col">Role</th>
            <th scope="col">E-mail</th>
            <th scope="col">Since</th>
            {mayChange && (
              <th scope="col">
                <span className="sr-only">Change</span>
              </th>
            )}
          </tr>
        </thead>
        <tbody>
          {members.map((member) => (
            <tr key={member.id}>
              <th scope="row">
                {member.name}
                {member.isSelf && <span className="q-label-quiet"> (you)</span>}
                {member.isClosed && <span className="q-label-quiet"> (account closed)</span>}
              </th>
              <td>{formatList(member.roles)}</td>
              <td>{member.email}</td>
              <td className="whitespace-nowrap">{times.day(member.addedAt)}</td>
              {mayChange && (
                <td>
                  <RowActs
                    member={member}
                    isNeeded={isLastPlanner(member, members)}
                    onAsk={(act) => setAsked({ act, member })}
                  />
                </td>
              )}
            </tr>
          ))}
        </tbody>
      </Table>
      {asked?.act === "roles" && (
        <ChangeRoles
          surveyId={surveyId}
          member={asked.member}
          isLastPlanner={isLastPlanner(asked.member, members)}
          onClose={close}
        />
      )}
      {asked?.act === "remove" && <RemovePerson surveyId={surveyId} member={asked.member} onClose={close} />}
    </>
  );
}

interface RowActsProps {
  readonly member: Member;
  readonly isNeeded: boolean;
  readonly onAsk: (act: Asked["act"]) => void;
}

function RowActs({ member, isNeeded, onAsk }: RowActsProps) {
  return (
    <span className="flex gap-2 whitespace-nowrap">
      <Button size="small" aria-label={`Change the roles of ${member.name}…`} onClick={() => onAsk("roles")}>
        Roles…
      </Button>
      {isNeeded ? (
        <span className="q-help self-center">last planner</span>
      ) : (
        !member.isSelf && (
          <Button size="small" variant="danger" aria-label={`Remove ${member.name}…`} onClick={() => onAsk("remove")}>
            Remove…
          </Button>
        )
      )}
    </span>
  );
}
