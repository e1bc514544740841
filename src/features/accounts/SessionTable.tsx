import type { SignedInAt } from "#shared/api/people.ts";
import { Button } from "../../components/ui/Button.tsx";
import { Refusal } from "../../components/ui/Refusal.tsx";
import { RuledLoading } from "../../components/ui/RuledLoading.tsx";
import { showToast } from "../../components/ui/show-toast.tsx";
import { Table } from "../../components/ui/Table.tsx";
import { useTimes } from "../../components/ui/use-times.ts";
import { useEndSessions, useSessions } from "./account-queries.ts";
import { browserWords } from "./browser-words.ts";

/** Where this account is signed in, and the way to end it there. */
export function SessionTable() {
  const sessions = useSessions();
  if (sessions.isPending) return <RuledLoading label="Loading where you are signed in" />;
  if (sessions.isError) {
    return <Refusal error={sessions.error} next={<Button onClick={() => void sessions.refetch()}>Try again</Button>} />;
  }
  return <LoadedSessions sessions={sessions.data} />;
}

function LoadedSessions({ sessions }: { readonly sessions: readonly SignedInAt[] }) {
  const times = useTimes();
  const end = useEndSessions();
  const others = sessions.filter(({ isThis }) => !isThis);
  const endOne = ({ handle, userAgent }: SignedInAt) =>
    end.mutate(handle, { onSuccess: () => showToast(`${browserWords(userAgent)} is signed out.`) });
  return (
    <div className="grid gap-4">
      {end.isError && <Refusal error={end.error} />}
      <Table caption="Where you are signed in" sticky>
        <thead>
          <tr>
            <th scope="col">Browser</th>
            <th scope="col">Last seen</th>
            <th scope="col">Since</th>
            <th scope="col">
              <span className="sr-only">End it</span>
            </th>
          </tr>
        </thead>
        <tbody>
          {sessions.map((session) => (
            <tr key={session.handle} data-tone={session.isThis ? "strong" : undefined}>
              <th scope="row" title={session.userAgent}>
                {browserWords(session.userAgent)}
              </th>
              <td className="whitespace-nowrap">{session.isThis ? "now" : times.time(session.lastSeenAt)}</td>
              <td className="whitespace-nowrap">{times.day(session.startedAt)}</td>
              <td>
                {session.isThis ? (
                  "this browser"
                ) : (
                  <Button
                    size="small"
                    aria-label={`End the session of ${browserWords(session.userAgent)}, last seen ${times.time(session.lastSeenAt)}`}
                    busy={end.isPending && end.variables === session.handle}
                    busyLabel="Ending…"
                    onClick={() => endOne(session)}
                  >
                    End it
                  </Button>
                )}
              </td>
            </tr>
          ))}
        </tbody>
      </Table>
      {others.length > 1 && (
        <div>
          <Button
            busy={end.isPending && end.variables === null}
            busyLabel="Ending…"
            onClick={() => end.mutate(null, { onSuccess: () => showToast("You are signed in here only.") })}
          >
            End all the others
          </Button>
        </div>
      )}
      {others.length === 0 && <p className="q-help">You are signed in nowhere else.</p>}
    </div>
  );
}
