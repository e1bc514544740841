import { useState } from "react";
import { Button } from "../../components/ui/Button.tsx";
import { formatCount, type Times } from "../../components/ui/format.ts";
import { Section } from "../../components/ui/Section.tsx";
import { Seed } from "../../components/ui/Seed.tsx";
import { Table } from "../../components/ui/Table.tsx";
import { useTimes } from "../../components/ui/use-times.ts";
import { DESIGN_TITLES } from "./draw-words.ts";
import { pastAnchor, type PastDeclaration, pastName } from "./past-declarations.ts";
import { PastPicksDialog } from "./PastPicksDialog.tsx";

interface DrawHistoryProps {
  readonly surveyId: string;
  readonly past: readonly PastDeclaration[];
}

/** Every declaration and draw that was made here and is not in use: nothing of it goes away. */
export function DrawHistory({ surveyId, past }: DrawHistoryProps) {
  const times = useTimes();
  const [shown, setShown] = useState<PastDeclaration["draw"]>(null);
  if (past.length === 0) return null;
  return (
    <Section title="Before" lead="Declarations that were abandoned and draws that were withdrawn stay on record.">
      <Table sticky caption="Declarations and draws that are not in use">
        <thead>
          <tr>
            <th scope="col">What</th>
            <th scope="col">Declared</th>
            <th scope="col">Design</th>
            <th scope="col">Seed</th>
            <th scope="col">How it ended</th>
            <th scope="col">Picks</th>
          </tr>
        </thead>
        <tbody>
          {past.map((one) => (
            <tr key={one.declaration.id} id={pastAnchor(one)} tabIndex={-1}>
              <th scope="row">{pastName(one)}</th>
              <td>{`${times.time(one.declaration.declaredAt)} by ${one.declaration.declaredBy}`}</td>
              <td>{`${DESIGN_TITLES[one.declaration.design.kind]}, ${formatCount(one.declaration.design.n, "pick")}`}</td>
              <td>{one.declaration.seed === null ? "none was made" : <Seed value={one.declaration.seed.text} />}</td>
              <td>{endOf(one, times)}</td>
              <td>
                {one.draw === null ? (
                  "none drawn"
                ) : (
                  <Button variant="link" size="small" onClick={() => setShown(one.draw)}>
                    {`Show those of draw ${one.draw.number}`}
                  </Button>
                )}
              </td>
            </tr>
          ))}
        </tbody>
      </Table>
      {shown !== null && <PastPicksDialog surveyId={surveyId} draw={shown} onClose={() => setShown(null)} />}
    </Section>
  );
}

function endOf({ declaration: { abandoned }, draw }: PastDeclaration, times: Times): string {
  if (abandoned !== null) return `Abandoned ${times.time(abandoned.at)} by ${abandoned.by}: “${abandoned.reason}”`;
  const withdrawn = draw?.withdrawn ?? null;
  return withdrawn === null
    ? "In use in another season"
    : `Withdrawn ${times.time(withdrawn.at)} by ${withdrawn.by}: “${withdrawn.reason}”`;
}
