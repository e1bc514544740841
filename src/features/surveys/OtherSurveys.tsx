import { Link } from "react-router-dom";
import { Button } from "../../components/ui/Button.tsx";
import { Refusal } from "../../components/ui/Refusal.tsx";
import { Section } from "../../components/ui/Section.tsx";
import { useTimes } from "../../components/ui/use-times.ts";
import { useOtherSurveys } from "./queries.ts";

interface OtherSurveysProps {
  /** Address of the people of a survey. */
  readonly peopleOf: (surveyId: string) => string;
}

/** For an owner: the surveys in which they hold no role, each with the way to its people. Nothing where there are none. */
export function OtherSurveys({ peopleOf }: OtherSurveysProps) {
  const times = useTimes();
  const others = useOtherSurveys();
  if (others.isError) {
    return <Refusal error={others.error} next={<Button onClick={() => void others.refetch()}>Try again</Button>} />;
  }
  if (!others.isSuccess || others.data.length === 0) return null;
  return (
    <div className="mt-11">
      <Section
        title="Other surveys of this installation"
        lead="An owner sees the people of a survey and may add a member, also themself; that is an event in its record."
      >
        <ul className="grid gap-2">
          {others.data.map(({ id, name, createdAt }) => (
            <li key={id}>
              <Link to={peopleOf(id)}>{`People of ${name}`}</Link>
              <span className="text-ink-3">{` · started ${times.day(createdAt)}`}</span>
            </li>
          ))}
        </ul>
      </Section>
    </div>
  );
}
