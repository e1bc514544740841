import { useState, type SyntheticEvent } from "react";
import { Button } from "../../components/ui/Button.tsx";
import { Checkbox } from "../../components/ui/Checkbox.tsx";
import { Field } from "../../components/ui/Field.tsx";
import { Refusal } from "../../components/ui/Refusal.tsx";
import { Section } from "../../components/ui/Section.tsx";
import { TextInput } from "../../components/ui/TextInput.tsx";
import { useCopySurvey } from "./queries.ts";

interface CopySurveyProps {
  readonly surveyId: string;
  readonly surveyName: string;
  readonly onCopied: (surveyId: string) => void;
}

/** Begins a survey for a next season with what can be used again. */
export function CopySurvey({ surveyId, surveyName, onCopied }: CopySurveyProps) {
  const [name, setName] = useState(surveyName);
  const [season, setSeason] = useState("");
  const [withPeople, setWithPeople] = useState(true);
  const [asked, setAsked] = useState(false);
  const copy = useCopySurvey(surveyId);
  const submit = (event: SyntheticEvent) => {
    event.preventDefault();
    setAsked(true);
    if (name.trim() === "" || season.trim() === "" || copy.isPending) return;
    copy.mutate({ name, seasonName: season, withPeople }, { onSuccess: (made) => onCopied(made.id) });
  };
  const lacks = (text: string, message: string) => (asked && text.trim() === "" ? message : undefined);
  return (
    <Section
      title="A next season"
      lead="A copy begins with these settings, the newest boundary and its cells as a draft. Nothing that was sealed, drawn or counted goes along; this survey stays as it is."
    >
      <form className="grid max-w-140 gap-5" onSubmit={submit} noValidate>
        <div className="grid gap-5 md:grid-cols-2">
          <Field label="Name of the copy" error={lacks(name, "Give the copy a name.")}>
            <TextInput
              value={name}
              maxLength={200}
              autoComplete="off"
              onChange={(event) => setName(event.target.value)}
            />
          </Field>
          <Field label="Its season" error={lacks(season, "Name the season, for example by its year.")}>
            <TextInput
              value={season}
              maxLength={200}
              autoComplete="off"
              onChange={(event) => setSeason(event.target.value)}
            />
          </Field>
        </div>
        <Checkbox
          label="With the people of this survey, in their roles"
          checked={withPeople}
          onChange={(event) => setWithPeople(event.target.checked)}
        />
        {copy.isError && <Refusal error={copy.error} />}
        <div>
          <Button type="submit" busy={copy.isPending} busyLabel="Copying…">
            Copy for a next season
          </Button>
        </div>
      </form>
    </Section>
  );
}
