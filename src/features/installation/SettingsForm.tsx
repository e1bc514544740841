import { useRef, useState, type SubmitEvent } from "react";
import { flushSync } from "react-dom";
import { changeInstallationSettings, type InstallationSettings } from "#shared/api/installation.ts";
import { type Versioned, versionNow } from "../../api/call.ts";
import { Button } from "../../components/ui/Button.tsx";
import { focusFirstInvalid } from "../../components/ui/focus-first-invalid.ts";
import { Refusal } from "../../components/ui/Refusal.tsx";
import { RuledLoading } from "../../components/ui/RuledLoading.tsx";
import { showToast } from "../../components/ui/show-toast.tsx";
import { TwoVersions } from "../../components/ui/TwoVersions.tsx";
import { AddressFields } from "./AddressFields.tsx";
import { MapFields, type PreviewOutline } from "./MapFields.tsx";
import { useChangeInstallationSettings, useInstallationSettings } from "./queries.ts";
import { COMPARED, lacksOf, settingsOf, type TypedSettings, typedOf } from "./settings-form.ts";

interface SettingsFormProps {
  /** What the small preview of the map shows. */
  readonly outline: PreviewOutline;
}

/** Map and address: what an owner sets for everybody. */
export function SettingsForm({ outline }: SettingsFormProps) {
  const settings = useInstallationSettings();
  if (settings.isPending) return <RuledLoading label="Loading the settings" />;
  if (settings.data === undefined) {
    return <Refusal error={settings.error} next={<Button onClick={() => void settings.refetch()}>Try again</Button>} />;
  }
  return <LoadedSettings current={settings.data} outline={outline} />;
}

/** What is typed, and what was there when the typing began: asked again meanwhile, it may be another. */
interface Writing {
  readonly seen: Versioned<InstallationSettings>;
  readonly typed: TypedSettings;
}

function LoadedSettings({
  current,
  outline,
}: {
  readonly current: Versioned<InstallationSettings>;
  readonly outline: PreviewOutline;
}) {
  const [writing, setWriting] = useState<Writing | null>(null);
  const [tried, setTried] = useState(false);
  const sent = useRef<Writing | null>(null);
  const keep = useChangeInstallationSettings();
  const typed = writing?.typed ?? typedOf(current.value);
  const lacks = tried ? lacksOf(typed) : {};
  const change = (part: Partial<TypedSettings>) =>
    setWriting((before) => ({
      seen: before?.seen ?? current,
      typed: { ...(before?.typed ?? typedOf(current.value)), ...part },
    }));
  const send = (settings: Versioned<InstallationSettings>) => {
    sent.current = writing;
    keep.mutate(settings, {
      onSuccess: () => {
        showToast("Map and address are kept.");
        // Unless somebody went on typing meanwhile.
        setWriting((now) => (now === sent.current ? null : now));
        setTried(false);
      },
    });
  };
  const submit = (event: SubmitEvent<HTMLFormElement>) => {
    event.preventDefault();
    if (keep.isPending) return;
    flushSync(() => setTried(true));
    if (Object.keys(lacksOf(typed)).length > 0) {
      focusFirstInvalid(event.currentTarget);
      return;
    }
    send({ value: settingsOf(typed), version: (writing?.seen ?? current).version });
  };
  const theirs = versionNow(changeInstallationSettings, keep.error);
  return (
    <div className="grid gap-8">
      {theirs !== null && writing !== null && (
        <TwoVersions<InstallationSettings>
          key={theirs.version}
          seen={writing.seen.value}
          mine={settingsOf(writing.typed)}
          theirs={theirs.value}
          fields={COMPARED}
          what="Map and address"
          action="Keep these settings"
          busy={keep.isPending}
          onDecide={(merged) => send({ value: merged, version: theirs.version })}
        />
      )}
      <form className="grid gap-10" onSubmit={submit} noValidate hidden={theirs !== null}>
        <MapFields typed={typed} lacks={lacks} onChange={change} outline={outline} isKept={writing === null} />
        <AddressFields typed={typed} lacks={lacks} onChange={change} />
        {keep.isError && theirs === null && <Refusal error={keep.error} />}
        <div>
          <Button
            type="submit"
            variant="primary"
            disabled={writing === null}
            busy={keep.isPending}
            busyLabel="Keeping…"
          >
            Keep map and address
          </Button>
          <p className="q-help">
            {writing === null ? "Nothing is changed." : "It holds for everybody here from their next page on."}
          </p>
        </div>
      </form>
    </div>
  );
}
