import { useState } from "react";
import { ROLES, type Role } from "#shared/access/table.ts";
import type { Member } from "#shared/api/people.ts";
import { ROLE_DOES, ROLE_NAMES } from "../../../api/role-words.ts";
import { Button } from "../../../components/ui/Button.tsx";
import { Checkbox } from "../../../components/ui/Checkbox.tsx";
import { Dialog } from "../../../components/ui/Dialog.tsx";
import { formatList } from "../../../components/ui/format.ts";
import { Refusal } from "../../../components/ui/Refusal.tsx";
import { showToast } from "../../../components/ui/show-toast.tsx";
import { useSetRoles } from "./queries.ts";

interface ChangeRolesProps {
  readonly surveyId: string;
  readonly member: Member;
  /** The survey needs them as its planner. */
  readonly isLastPlanner: boolean;
  readonly onClose: () => void;
}

/** What follows from the choice, beside the button. */
function consequence({ isSelf, name, roles: held }: Member, roles: readonly Role[]): string {
  if (roles.length === 0) return "Choose at least one role; to take all of them, remove the person.";
  if (isSelf && held.includes("planner") && !roles.includes("planner")) {
    return "You can’t change people here any more after this.";
  }
  return `${isSelf ? "You are" : `${name} is`} ${formatList(roles)} from then on; the record says so.`;
}

/** The roles that somebody holds, to be changed together. */
export function ChangeRoles({ surveyId, member, isLastPlanner, onClose }: ChangeRolesProps) {
  const [roles, setRoles] = useState<readonly Role[]>(member.roles);
  const change = useSetRoles(surveyId, member);
  const toggle = (role: Role, on: boolean) =>
    setRoles(ROLES.filter((one) => (one === role ? on : roles.includes(one))));
  const isSame = ROLES.every((role) => roles.includes(role) === member.roles.includes(role));
  const keep = () => {
    if (isSame || roles.length === 0) return;
    change.mutate([...roles], {
      onSuccess: () => {
        showToast(`${member.name} is ${formatList(roles)} of this survey now.`);
        onClose();
      },
    });
  };
  return (
    <Dialog
      open
      onOpenChange={(open) => !open && onClose()}
      title={`Roles of ${member.name}`}
      lead="Who holds two roles may do what either may."
      actions={
        <>
          <Button onClick={onClose}>Leave them as they are</Button>
          <Button
            variant="primary"
            disabled={isSame || roles.length === 0}
            busy={change.isPending}
            busyLabel="Changing…"
            onClick={keep}
          >
            Change the roles
          </Button>
        </>
      }
    >
      <div className="grid gap-3">
        {ROLES.map((role) => {
          const isNeeded = role === "planner" && isLastPlanner;
          return (
            <Checkbox
              key={role}
              label={ROLE_NAMES[role]}
              help={isNeeded ? "The last planner stays one: a survey needs a planner." : ROLE_DOES[role]}
              checked={roles.includes(role)}
              disabled={isNeeded}
              onChange={(event) => toggle(role, event.target.checked)}
            />
          );
        })}
        {change.isError && <Refusal error={change.error} />}
        <p className="q-help" role="status">
          {isSame ? "Nothing is changed yet." : consequence(member, roles)}
        </p>
      </div>
    </Dialog>
  );
}
