import type { Check } from "#shared/record/checks/check.ts";
import { DoneMark } from "../../components/ui/DoneMark.tsx";
import { InfoMark } from "../../components/ui/InfoMark.tsx";
import { RefusedMark } from "../../components/ui/RefusedMark.tsx";

const OUTCOME_WORDS = { passed: "passes", failed: "differs", "not-checked": "not checked" } as const;

/** Every check in order, each with what it compared; one that differs names the first difference. */
export function CheckList({ checks }: { readonly checks: readonly Check[] }) {
  return (
    <ol className="q-checks" aria-label="Checks">
      {checks.map((check, index) => (
        <li key={check.id} data-outcome={check.outcome}>
          <span className="q-checks-number">{index + 1}</span>
          <OutcomeMark outcome={check.outcome} />
          <div className="min-w-0">
            <b>{check.title}</b>
            <FirstDifference check={check} />
          </div>
          <span className="q-checks-outcome">{OUTCOME_WORDS[check.outcome]}</span>
        </li>
      ))}
    </ol>
  );
}

function OutcomeMark({ outcome }: Pick<Check, "outcome">) {
  if (outcome === "passed") return <DoneMark />;
  return outcome === "failed" ? <RefusedMark /> : <InfoMark />;
}

function FirstDifference({ check }: { readonly check: Check }) {
  if (check.difference === null) return <p>{check.detail}</p>;
  const { where, found, expected } = check.difference;
  return (
    <>
      <table className="q-checks-difference">
        <thead>
          <tr>
            <th scope="col">First difference</th>
            <th scope="col">Record says</th>
            <th scope="col">Replay gets</th>
          </tr>
        </thead>
        <tbody>
          <tr>
            <th scope="row">{where}</th>
            <td>{found}</td>
            <td>{expected}</td>
          </tr>
        </tbody>
      </table>
      <p>{check.detail}</p>
    </>
  );
}
