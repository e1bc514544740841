import { zodResolver } from "@hookform/resolvers/zod";
import { useMemo } from "react";
import { useForm } from "react-hook-form";
import { Button } from "../../components/ui/Button.tsx";
import { Field } from "../../components/ui/Field.tsx";
import { Fold } from "../../components/ui/Fold.tsx";
import { Refusal } from "../../components/ui/Refusal.tsx";
import { Select } from "../../components/ui/Select.tsx";
import { TextArea } from "../../components/ui/TextArea.tsx";
import { TextInput } from "../../components/ui/TextInput.tsx";
import { ownTimeZone, timeZones } from "../../components/ui/time-zones.ts";
import { newSurveyDefaults, newSurveyForm, type NewSurveyFields } from "./new-survey-form.ts";
import { useCreateSurvey } from "./queries.ts";

interface NewSurveyFormProps {
  readonly now: Date;
  readonly onStarted: (surveyId: string) => void;
}

/** Everything that a survey starts with. Whoever starts it is its planner. */
export function NewSurveyForm({ now, onStarted }: NewSurveyFormProps) {
  const zone = useMemo(() => ownTimeZone(), []);
  const zones = useMemo(() => timeZones(zone), [zone]);
  const create = useCreateSurvey();
  const form = useForm<NewSurveyFields>({
    resolver: zodResolver(newSurveyForm),
    defaultValues: newSurveyDefaults(now, zone),
  });
  const { errors } = form.formState;
  const submit = form.handleSubmit(({ wholeNumbers, ...rest }) => {
    if (create.isPending) return;
    create.mutate({ ...rest, wholeNumbers: wholeNumbers === "whole" }, { onSuccess: (survey) => onStarted(survey.id) });
  });
  return (
    <form className="grid max-w-140 gap-5" onSubmit={(event) => void submit(event)} noValidate>
      <Field label="Name of the survey" help="The place is usually best: “Pellimere Fen”." error={errors.name?.message}>
        <TextInput {...form.register("name")} autoComplete="off" />
      </Field>
      <div className="grid gap-5 md:grid-cols-2">
        <Field label="One of what is counted" help="“spike”, “burrow entrance”" error={errors.targetSingular?.message}>
          <TextInput {...form.register("targetSingular")} autoComplete="off" autoCapitalize="none" />
        </Field>
        <Field label="Several of them" help="“spikes”, “burrow entrances”" error={errors.targetPlural?.message}>
          <TextInput {...form.register("targetPlural")} autoComplete="off" autoCapitalize="none" />
        </Field>
      </div>
      <Field
        label="Counting rule"
        aside="may stay empty"
        help="What is one, and what is not: “A spike counts when its base is inside the cell; broken ones count, last year’s do not.” It stands on every sheet."
        error={errors.countingRule?.message}
      >
        <TextArea {...form.register("countingRule")} rows={3} />
      </Field>
      <Field label="A count is" error={errors.wholeNumbers?.message}>
        <Select
          {...form.register("wholeNumbers")}
          options={[
            { value: "whole", label: "a whole number of things" },
            { value: "measured", label: "a measured amount, with decimals" },
          ]}
        />
      </Field>
      <div className="grid gap-5 md:grid-cols-2">
        <Field label="Season" help="Often the year." error={errors.seasonName?.message}>
          <TextInput {...form.register("seasonName")} autoComplete="off" />
        </Field>
        <Field
          label="Time zone of the place"
          help="Times in the field are shown in it."
          error={errors.timeZone?.message}
        >
          <Select
            {...form.register("timeZone")}
            options={zones.map((value) => ({ value, label: value.replaceAll("_", " ") }))}
          />
        </Field>
      </div>
      <Fold quiet title="Safety notes" aside="may stay empty">
        <div className="py-3">
          <Field
            label="What people must know before they go out"
            help="Tides, cliffs, working alone, the hunting season, whom to call. Local rules and qualified people come first."
            error={errors.safetyNotes?.message}
          >
            <TextArea {...form.register("safetyNotes")} rows={3} />
          </Field>
        </div>
      </Fold>
      {create.isError && <Refusal error={create.error} />}
      <div>
        <Button type="submit" variant="primary" busy={create.isPending} busyLabel="Starting…">
          Start the survey
        </Button>
        <p className="q-help">You become its planner. Nothing is fixed until a frame is sealed.</p>
      </div>
    </form>
  );
}
