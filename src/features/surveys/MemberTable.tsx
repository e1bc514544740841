import type { Member } from "#shared/api/surveys.ts";
import { formatList } from "../../components/ui/format.ts";
import { Table } from "../../components/ui/Table.tsx";
import { useTimes } from "../../components/ui/use-times.ts";

/** The people of a survey and what each may do. */
export function MemberTable({ members }: { readonly members: readonly Member[] }) {
  const times = useTimes();
  return (
    <Table caption="People of this survey" sticky>
      <thead>
        <tr>
          <th scope="col">Name</th>
          <th scope="col">Role</th>
          <th scope="col">E-mail</th>
          <th scope="col">Since</th>
        </tr>
      </thead>
      <tbody>
        {members.map((member) => (
          <tr key={member.id}>
            <th scope="row">{member.name}</th>
            <td>{formatList(member.roles)}</td>
            <td>{member.email}</td>
            <td className="whitespace-nowrap">{times.day(member.addedAt)}</td>
          </tr>
        ))}
      </tbody>
    </Table>
  );
}
