import { useState } from "react";
import type { Visit } from "#shared/api/field.ts";
import {
  NAME_LENGTHS,
  NAME_SCHEMES,
  type NameScheme,
  type WaypointNames,
  waypointNames,
} from "#shared/field/waypoint-names.ts";
import { Banner } from "../../components/ui/Banner.tsx";
import { Button } from "../../components/ui/Button.tsx";
import { Field } from "../../components/ui/Field.tsx";
import { formatCount, formatList } from "../../components/ui/format.ts";
import { Refusal } from "../../components/ui/Refusal.tsx";
import { SegmentedControl } from "../../components/ui/SegmentedControl.tsx";
import { Select } from "../../components/ui/Select.tsx";
import { TextInput } from "../../components/ui/TextInput.tsx";
import { useExportWaypoints } from "./queries.ts";

interface WaypointPanelProps {
  readonly surveyId: string;
  readonly surveyName: string;
  readonly visits: readonly Visit[];
  /** People who hold cells; without them the export is of one's own cells. */
  readonly people: readonly { readonly id: string; readonly name: string }[];
}

interface Settings {
  readonly length: number;
  readonly scheme: NameScheme;
  readonly prefix: string;
}

const SCHEME_WORDS: Readonly<Record<NameScheme, string>> = {
  label: "Cell label",
  unit: "Unit number",
  order: "Draw order",
};

/** Names as the GPS unit will show them, checked for clashes before anything is written; one waypoint a cell. */
export function WaypointPanel({ surveyId, surveyName, visits, people }: WaypointPanelProps) {
  const [settings, setSettings] = useState<Settings>({ length: 10, scheme: "label", prefix: "" });
  const { length, scheme, prefix } = settings;
  const [chosen, setChosen] = useState("");
  const memberId = people.some(({ id }) => id === chosen) ? chosen : "";
  const exporting = useExportWaypoints(surveyId);
  const going = visits.filter(
    (visit) => visit.state === "in-use" && (memberId === "" || visit.assignedTo?.memberId === memberId),
  );
  const prefixFits = /^[A-Za-z0-9]{0,8}$/.test(prefix.trim());
  const named = waypointNames(
    going.map(({ label, unit, orders }) => ({ label, unit, order: orders[0] ?? 0 })),
    { length, scheme, prefix: prefixFits ? prefix.trim() : "" },
  );
  const ready = going.length > 0 && named.clashes.length === 0 && prefixFits;
  const save = (format: "gpx" | "csv") => {
    const who = people.find(({ id }) => id === memberId)?.name ?? "";
    const name = [surveyName, who, "waypoints"]
      .filter((part) => part !== "")
      .join(" ")
      .replace(/[^\p{L}\p{N}]+/gu, "-")
      .toLowerCase();
    const body = {
      format,
      nameLength: length,
      scheme,
      prefix: prefix.trim(),
      memberId: memberId === "" ? null : memberId,
    };
    if (exporting.isPending) return;
    exporting.mutate({ body, fileName: `${name}.${format}` });
  };
  return (
    <div className="grid gap-4">
      {people.length > 0 && (
        <Field label="Cells of">
          <Select
            value={memberId}
            onChange={(event) => setChosen(event.target.value)}
            options={[{ value: "", label: "everybody" }, ...people.map(({ id, name }) => ({ value: id, label: name }))]}
          />
        </Field>
      )}
      <NameSettings settings={settings} onSettings={setSettings} prefixFits={prefixFits} />
      <NamesPreview named={named} />
      {exporting.isError && <Refusal error={exporting.error} />}
      <div className="flex flex-wrap gap-3">
        <Button
          disabled={!ready}
          busy={exporting.isPending && exporting.variables.body.format === "gpx"}
          onClick={() => save("gpx")}
        >
          Save as GPX
        </Button>
        <Button
          disabled={!ready}
          busy={exporting.isPending && exporting.variables.body.format === "csv"}
          onClick={() => save("csv")}
        >
          Save as CSV
        </Button>
      </div>
      <p className="q-help">
        Each export is written down in the record; a new draw needs a reason from then on. The CSV holds centres and
        corners, in degrees and in the frame’s metres.
      </p>
    </div>
  );
}

/** The first names as the unit will show them, and what stands for several cells. */
function NamesPreview({ named }: { readonly named: WaypointNames }) {
  const { names, clashes, nextStep, notes } = named;
  return (
    <>
      {notes.map((note) => (
        <p key={note} className="q-help">
          {note}
        </p>
      ))}
      <p>
        {names.length === 0 ? "There is no cell to go to." : `${formatCount(names.length, "waypoint")}, one a cell: `}
        <span className="q-mono">{names.slice(0, 4).join(" ")}</span>
        {names.length > 4 && " …"}
      </p>
      <div role="status" className="contents">
        {clashes.length > 0 && (
          <Banner tone="ochre" title={`${formatCount(clashes.length, "name")} would stand for several cells.`}>
            {`${clashes
              .slice(0, 3)
              .map(({ name, labels }) => `${name}: ${formatList(labels)}`)
              .join("; ")}. ${nextStep ?? ""}`}
          </Banner>
        )}
      </div>
    </>
  );
}

interface NameSettingsProps {
  readonly settings: Settings;
  readonly onSettings: (settings: Settings) => void;
  readonly prefixFits: boolean;
}

/** What a waypoint is called, within what the GPS unit takes. */
function NameSettings({ settings, onSettings, prefixFits }: NameSettingsProps) {
  return (
    <>
      <SegmentedControl
        legend="Longest name that the unit takes"
        value={String(settings.length)}
        onChange={(value) => onSettings({ ...settings, length: Number(value) })}
        options={NAME_LENGTHS.map((value) => ({ value: String(value), label: String(value) }))}
        help="Characters. The oldest units take 6."
      />
      <div className="grid gap-3 md:grid-cols-2">
        <Field label="Named by">
          <Select
            value={settings.scheme}
            onChange={(event) => onSettings({ ...settings, scheme: event.target.value as NameScheme })}
            options={NAME_SCHEMES.map((one) => ({ value: one, label: SCHEME_WORDS[one] }))}
          />
        </Field>
        <Field
          label="Prefix"
          aside="may stay empty"
          error={prefixFits ? undefined : "Use at most 8 letters and digits."}
        >
          <TextInput
            mono
            value={settings.prefix}
            onChange={(event) => onSettings({ ...settings, prefix: event.target.value })}
          />
        </Field>
      </div>
    </>
  );
}
