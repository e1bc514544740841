import type { SurveySettings } from "#shared/api/settings.ts";
import { KeyValues } from "../../components/ui/KeyValues.tsx";
import { comparedFields, fieldsOf, isSensitivity, SENSITIVITY_TEXTS } from "./settings-form.ts";

/** The settings to be read, for everybody who may not change them and while the survey is archived. */
export function SettingsFacts({ settings }: { readonly settings: SurveySettings }) {
  const fields = fieldsOf(settings);
  const items = comparedFields(settings).map(({ key, label, text }) => ({
    key: label,
    value: <span className="whitespace-pre-wrap">{said(key, text(fields))}</span>,
  }));
  return <KeyValues items={items} />;
}

/** A missing setting is a word; the sensitivity comes with what it asks of people. */
function said(key: string, text: string): string {
  if (text === "") return "not said";
  const step = text.toLowerCase();
  return key === "sensitivity" && isSensitivity(step) ? `${text}. ${SENSITIVITY_TEXTS[step].text}` : text;
}
