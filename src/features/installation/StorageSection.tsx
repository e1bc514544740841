import type { Installation } from "#shared/api/installation.ts";
import { Banner } from "../../components/ui/Banner.tsx";
import { CodeBlock } from "../../components/ui/CodeBlock.tsx";
import { Fold } from "../../components/ui/Fold.tsx";
import { formatBytes, formatCount, formatNumber } from "../../components/ui/format.ts";
import { KeyValues } from "../../components/ui/KeyValues.tsx";
import { Section } from "../../components/ui/Section.tsx";
import { Table } from "../../components/ui/Table.tsx";
import { useTimes } from "../../components/ui/use-times.ts";

const BACK_UP = "npm run -s quillet -- backup quillet.backup";
const RESTORE = `npm run -s quillet -- restore quillet.backup
npm run -s quillet -- check`;

/** What is stored, which copies there are, and how one is put back. */
export function StorageSection({ installation }: { readonly installation: Installation }) {
  const { storage, backups, demo } = installation;
  const low = storage.freeBytes < 3 * storage.databaseBytes;
  return (
    <Section title="Storage and backups">
      <div className="grid gap-5">
        {backups.lastError !== null && (
          <Banner tone="ochre" title="The last daily copy was not made.">
            {backups.lastError} It is tried again by itself; make one yourself meanwhile.
          </Banner>
        )}
        {low && (
          <Banner tone="ochre" title="Room is short.">
            {formatBytes(storage.freeBytes)} are free; a copy of the database needs {formatBytes(storage.databaseBytes)}
            .
          </Banner>
        )}
        <KeyValues
          items={[
            { key: "Database", value: formatBytes(storage.databaseBytes) },
            { key: "Free beside it", value: formatBytes(storage.freeBytes) },
            { key: "Surveys, archived ones too", value: formatNumber(storage.surveys) },
            { key: "Accounts, closed ones too", value: formatNumber(storage.accounts) },
          ]}
        />
        <p>
          {backups.automatic
            ? `A copy is made each day. Those of the last ${formatCount(backups.keptDays, "day")} are kept, and the first of each month for a year.`
            : demo
              ? "The demo makes no copies of itself: it can be filled again at any time."
              : "No daily copies are made. Make them yourself."}
        </p>
        {backups.copies.length > 0 && <Copies copies={backups.copies} />}
        <Fold title="Make a copy, and put one back" quiet>
          <div className="grid gap-3">
            <p>On the computer of the server, in the folder of Quillet; also while it runs:</p>
            <CodeBlock code={BACK_UP} label="command for a backup" />
            <p>
              To put one back, stop the server first. The copy is checked before it replaces anything, and the database
              that was there is kept beside it.
            </p>
            <CodeBlock code={RESTORE} label="commands to restore" />
            <p>Keep copies on another computer too: one disk may fail as a whole.</p>
          </div>
        </Fold>
      </div>
    </Section>
  );
}

function Copies({ copies }: { readonly copies: Installation["backups"]["copies"] }) {
  const times = useTimes();
  return (
    <Table caption="Daily copies, newest first" dense>
      <thead>
        <tr>
          <th scope="col">Copy</th>
          <th scope="col">Made</th>
          <th scope="col" className="q-num">
            Size
          </th>
        </tr>
      </thead>
      <tbody>
        {copies.map(({ name, bytes, at }) => (
          <tr key={name}>
            <th scope="row" className="q-mono">
              {name}
            </th>
            <td>{times.time(at)}</td>
            <td className="q-num">{formatBytes(bytes)}</td>
          </tr>
        ))}
      </tbody>
    </Table>
  );
}
