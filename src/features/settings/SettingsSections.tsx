import { useMemo } from "react";
import { SENSITIVITIES, type SurveySettings } from "#shared/api/settings.ts";
import { Field } from "../../components/ui/Field.tsx";
import { RadioCards } from "../../components/ui/RadioCards.tsx";
import { Section } from "../../components/ui/Section.tsx";
import { Select } from "../../components/ui/Select.tsx";
import { TextArea } from "../../components/ui/TextArea.tsx";
import { TextInput } from "../../components/ui/TextInput.tsx";
import { timeZones } from "../../components/ui/time-zones.ts";
import {
  COUNTS,
  fieldText,
  type FieldErrors,
  isSensitivity,
  SENSITIVITY_TEXTS,
  type SettingsFields,
  zoneText,
} from "./settings-form.ts";

interface SettingsSectionsProps {
  readonly settings: SurveySettings;
  readonly fields: SettingsFields;
  readonly errors: FieldErrors;
  readonly onSet: (name: string, text: string) => void;
}

/** Everything that a planner sets for a survey, by what it is about. */
export function SettingsSections(props: SettingsSectionsProps) {
  const { settings, fields, errors } = props;
  const bind = binder(props);
  return (
    <>
      <Section title="Name">
        <Field label="Name of the survey" help="The place is usually best: “Pellimere Fen”." error={errors["name"]}>
          <TextInput {...bind("name")} autoComplete="off" maxLength={200} />
        </Field>
      </Section>
      <PlaceInTime {...props} />
      {settings.targets.map(({ id, plural }) => (
        <Target
          key={id}
          id={id}
          title={settings.targets.length > 1 ? `What is counted: ${plural}` : "What is counted"}
          {...props}
        />
      ))}
      <Section title="How sure">
        <Field
          label="Confidence level"
          help="Of all surveys that are drawn like this one, so many have limits that hold the true number. 95 % is usual."
          error={errors["level"]}
        >
          <TextInput {...bind("level")} unit="%" inputMode="decimal" autoComplete="off" maxLength={10} />
        </Field>
      </Section>
      <Section
        title="Sensitivity"
        lead="How much harm could be done with the places. It tells everybody in the survey what to pass on; it hides nothing by itself."
      >
        <RadioCards
          legend="Sensitivity"
          hideLegend
          value={isSensitivity(fieldText(fields, "sensitivity")) ? fieldText(fields, "sensitivity") : null}
          onChange={(step) => props.onSet("sensitivity", step)}
          options={SENSITIVITIES.map((value) => ({ value, ...SENSITIVITY_TEXTS[value] }))}
        />
      </Section>
      <Section
        title="Safety notes"
        lead="They stand on the Field page, before the usual cautions: leave word where you go and when you call in, go in twos where nobody hears you, turn back from tides, cliffs, weather and weapons. Local rules and qualified people have the last word, over these notes too."
      >
        <Field label="What people must know before they go out" aside="may stay empty" error={errors["safetyNotes"]}>
          <TextArea {...bind("safetyNotes")} rows={4} maxLength={4000} />
        </Field>
      </Section>
    </>
  );
}

function PlaceInTime(props: SettingsSectionsProps) {
  const { fields, errors } = props;
  const bind = binder(props);
  const zone = fieldText(fields, "timeZone");
  const zones = useMemo(() => timeZones(zone), [zone]);
  return (
    <Section title="Place in time">
      <div className="grid gap-5">
        <Field label="Season" help="Often the year." error={errors["season"]}>
          <TextInput {...bind("season")} autoComplete="off" maxLength={200} />
        </Field>
        <div className="grid gap-5 md:grid-cols-2">
          <Field label="First day" aside="may stay empty" error={errors["startsOn"]}>
            <TextInput {...bind("startsOn")} type="date" />
          </Field>
          <Field label="Last day" aside="may stay empty" error={errors["endsOn"]}>
            <TextInput {...bind("endsOn")} type="date" />
          </Field>
        </div>
        <Field
          label="Time zone of the place"
          help="Days and times are those of the people there."
          error={errors["timeZone"]}
        >
          <Select {...bind("timeZone")} options={zones.map((value) => ({ value, label: zoneText(value) }))} />
        </Field>
      </div>
    </Section>
  );
}

function Target({ id, title, ...props }: SettingsSectionsProps & { readonly id: string; readonly title: string }) {
  const { errors } = props;
  const bind = binder(props);
  return (
    <Section title={title}>
      <div className="grid gap-5">
        <div className="grid gap-5 md:grid-cols-2">
          <Field label="One of what is counted" error={errors[`${id} singular`]}>
            <TextInput {...bind(`${id} singular`)} autoComplete="off" autoCapitalize="none" maxLength={200} />
          </Field>
          <Field label="Several of them" error={errors[`${id} plural`]}>
            <TextInput {...bind(`${id} plural`)} autoComplete="off" autoCapitalize="none" maxLength={200} />
          </Field>
        </div>
        <Field
          label="Counting rule"
          aside="may stay empty"
          help="What is one, and what is not: “A spike counts when its base is inside the cell; broken ones count, last year’s do not.” It stands on every sheet."
          error={errors[`${id} rule`]}
        >
          <TextArea {...bind(`${id} rule`)} rows={3} maxLength={4000} />
        </Field>
        <Field
          label="A count is"
          help="Measured counts can become whole ones once no count in force has decimals."
          error={errors[`${id} counts`]}
        >
          <Select
            {...bind(`${id} counts`)}
            options={[
              { value: "whole", label: COUNTS.whole },
              { value: "measured", label: COUNTS.measured },
            ]}
          />
        </Field>
      </div>
    </Section>
  );
}

/** Ties a control to the field of this name. */
function binder({ fields, onSet }: SettingsSectionsProps) {
  return (name: string) => ({
    value: fieldText(fields, name),
    onChange: (event: { readonly target: { readonly value: string } }) => onSet(name, event.target.value),
  });
}
