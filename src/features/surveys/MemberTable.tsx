import type { Member } from "#shared/api/surveys.ts";
import { formatDay, formatList } from "../../components/ui/format.ts";
import { Table } from "../../components/ui/Table.tsx";

/** The people of a survey and what each may do. */
export function MemberTable({ members }: { readonly members: readonly Member[] }) {
  return (
    <Table caption="People of this survey" sticky>
      <thead>
        <tr>
          <th>Name</th>
          <th>Role</th>
          <th>E-mail</th>
          <th>Since</th>
        </tr>
      </thead>
      <tbody>
        {members.map((member) => (
          <tr key={member.id}>
            <td>{member.name}</td>
            <td>{formatList(member.roles)}</td>
            <td>{member.email}</td>
            <td className="whitespace-nowrap">{formatDay(member.addedAt)}</td>
          </tr>
        ))}
      </tbody>
    </Table>
  );
}
