import type { Declaration } from "#shared/api/draw.ts";
import { formatCount, formatTime } from "../../components/ui/format.ts";
import { Section } from "../../components/ui/Section.tsx";
import { Seed } from "../../components/ui/Seed.tsx";
import { Table } from "../../components/ui/Table.tsx";
import { DESIGN_TITLES } from "./draw-words.ts";
import type { useDraws } from "./queries.ts";

type Draws = NonNullable<ReturnType<typeof useDraws>["data"]>;

/** Every declaration and draw that was made here and is not in use: nothing of it goes away. */
export function DrawHistory({ draws }: { readonly draws: Draws }) {
  const ended = draws.declarations.filter(
    (declaration) =>
      declaration.state !== "open" && (declaration.drawId === null || declaration.drawId !== draws.liveDrawId),
  );
  if (ended.length === 0) return null;
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
          </tr>
        </thead>
        <tbody>
          {ended.map((declaration) => (
            <tr key={declaration.id}>
              <th scope="row">{nameOf(declaration, draws)}</th>
              <td>{`${formatTime(declaration.declaredAt)} by ${declaration.declaredBy}`}</td>
              <td>{`${DESIGN_TITLES[declaration.design.kind]}, ${formatCount(declaration.design.n, "pick")}`}</td>
              <td>{declaration.seed === null ? "none was made" : <Seed value={declaration.seed.text} />}</td>
              <td>{endOf(declaration, draws)}</td>
            </tr>
          ))}
        </tbody>
      </Table>
    </Section>
  );
}

function nameOf(declaration: Declaration, draws: Draws): string {
  const draw = draws.draws.find(({ declarationId }) => declarationId === declaration.id);
  return draw === undefined ? "Declaration" : `Draw ${draw.number}`;
}

function endOf(declaration: Declaration, draws: Draws): string {
  const { abandoned } = declaration;
  if (abandoned !== null) return `Abandoned ${formatTime(abandoned.at)} by ${abandoned.by}: “${abandoned.reason}”`;
  const withdrawn = draws.draws.find(({ declarationId }) => declarationId === declaration.id)?.withdrawn ?? null;
  return withdrawn === null
    ? "In use in another season"
    : `Withdrawn ${formatTime(withdrawn.at)} by ${withdrawn.by}: “${withdrawn.reason}”`;
}
