import { useState, type SyntheticEvent } from "react";
import { changeSettings, type SurveySettings } from "#shared/api/settings.ts";
import { type Versioned, versionNow } from "../../api/call.ts";
import { Button } from "../../components/ui/Button.tsx";
import { Refusal } from "../../components/ui/Refusal.tsx";
import { showToast } from "../../components/ui/show-toast.tsx";
import { TwoVersions } from "../../components/ui/TwoVersions.tsx";
import { focusFirstInvalid } from "../../components/ui/focus-first-invalid.ts";
import { useChangeSettings } from "./queries.ts";
import {
  comparedFields,
  errorsOf,
  fieldsOf,
  type FieldErrors,
  type SettingsFields,
  settingsOf,
} from "./settings-form.ts";
import { SettingsSections } from "./SettingsSections.tsx";

interface SettingsFormProps {
  readonly surveyId: string;
  /** What stands on the server, as it was last read. */
  readonly latest: Versioned<SurveySettings>;
}

const isSame = (one: SettingsFields, other: SettingsFields) =>
  Object.keys({ ...one, ...other }).every((key) => one[key] === other[key]);

/** What is typed, what it was typed over, and sending it on that version. */
function useSettingsForm({ surveyId, latest }: SettingsFormProps) {
  const [seen, setSeen] = useState(latest);
  const [fields, setFields] = useState(() => fieldsOf(latest.value));
  const [errors, setErrors] = useState<FieldErrors>({});
  const change = useChangeSettings(surveyId);
  const isClean = isSame(fields, fieldsOf(seen.value));
  // Nothing is typed: what somebody else kept meanwhile is simply shown.
  if (isClean && latest.version !== seen.version && !change.isPending) {
    setSeen(latest);
    setFields(fieldsOf(latest.value));
  }
  const send = (wanted: SettingsFields, over: Versioned<SurveySettings>): boolean => {
    const found = errorsOf(wanted, over.value);
    setErrors(found);
    if (Object.keys(found).length > 0) return false;
    if (change.isPending) return true;
    change.mutate(
      { settings: settingsOf(wanted, over.value), version: over.version },
      {
        onSuccess: (kept) => {
          setSeen(kept);
          setFields(fieldsOf(kept.value));
          showToast("The settings are kept.");
        },
      },
    );
    return true;
  };
  return {
    fields,
    errors,
    seen,
    isClean,
    isPending: change.isPending,
    error: change.error,
    theirs: change.isError ? versionNow(changeSettings, change.error) : null,
    set: (name: string, text: string) => setFields((before) => ({ ...before, [name]: text })),
    keep: () => send(fields, seen),
    decide: (merged: SettingsFields, theirs: Versioned<SurveySettings>) => {
      setSeen(theirs);
      setFields(merged);
      change.reset();
      send(merged, theirs);
    },
  };
}

/** The settings to be changed; what two planners changed at once is shown side by side. */
export function SettingsForm(props: SettingsFormProps) {
  const form = useSettingsForm(props);
  const { theirs, seen } = form;
  if (theirs !== null) {
    return (
      <TwoVersions
        key={theirs.version}
        fields={comparedFields(seen.value)}
        what="These settings"
        action="Keep what is chosen"
        seen={fieldsOf(seen.value)}
        mine={form.fields}
        theirs={fieldsOf(theirs.value)}
        onDecide={(merged) => form.decide(merged, theirs)}
      />
    );
  }
  const submit = (event: SyntheticEvent<HTMLFormElement>) => {
    event.preventDefault();
    const sheet = event.currentTarget;
    if (!form.keep()) requestAnimationFrame(() => focusFirstInvalid(sheet));
  };
  return (
    <form className="grid max-w-140 gap-8" onSubmit={submit} noValidate>
      <SettingsSections settings={seen.value} fields={form.fields} errors={form.errors} onSet={form.set} />
      {form.error !== null && <Refusal error={form.error} />}
      <div>
        <Button type="submit" variant="primary" busy={form.isPending} busyLabel="Keeping…">
          Keep the settings
        </Button>
        <p className="q-help">
          {form.isClean
            ? "Nothing is changed yet."
            : "The record tells what stood before, what stands now, who and when."}
        </p>
      </div>
    </form>
  );
}
