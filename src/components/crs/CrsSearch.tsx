import { useQuery } from "@tanstack/react-query";
import { useDeferredValue, useState } from "react";
import { searchCrs, type CrsChoice } from "#shared/api/area.ts";
import { call } from "../../api/call.ts";
import { Field } from "../ui/Field.tsx";
import { Refusal } from "../ui/Refusal.tsx";
import { RuledLoading } from "../ui/RuledLoading.tsx";
import { TextInput } from "../ui/TextInput.tsx";

interface CrsSearchProps {
  /** Only projected systems: a frame is measured in metres. */
  readonly projectedOnly?: boolean;
  readonly onChoose: (choice: CrsChoice) => void;
  /** Offered before anything is typed. */
  readonly suggestions?: readonly CrsChoice[];
  readonly chosen?: number | null;
}

/** A coordinate reference system by its EPSG code or a part of its name. */
export function CrsSearch({ projectedOnly = false, onChoose, suggestions = [], chosen = null }: CrsSearchProps) {
  const [typed, setTyped] = useState("");
  const text = useDeferredValue(typed.trim().replace(/^EPSG\s*:\s*/i, ""));
  const found = useQuery({
    queryKey: ["crs", text, projectedOnly],
    queryFn: ({ signal }) =>
      call(searchCrs, { query: { text, ...(projectedOnly && { projected: "yes" as const }) }, signal }),
    enabled: text.length >= 2,
    staleTime: Infinity,
    placeholderData: (before) => (text.length >= 2 ? before : undefined),
  });
  const shown = text.length >= 2 ? (found.data?.systems ?? []) : suggestions;
  return (
    <div className="grid gap-2">
      <Field label="EPSG code or name" help="“25831”, “UTM zone 31N”, “national grid”">
        <TextInput autoComplete="off" value={typed} onChange={(event) => setTyped(event.target.value)} />
      </Field>
      {found.isError && text.length >= 2 && <Refusal error={found.error} />}
      {found.isFetching && found.data === undefined && <RuledLoading label="Searching" lines={2} />}
      {text.length >= 2 && found.isSuccess && !found.isPlaceholderData && shown.length === 0 && (
        <p className="q-help" role="status">
          No {projectedOnly ? "projected " : ""}system has “{text}” in its code or name.
        </p>
      )}
      <ul className="q-crs-list" aria-label="Systems">
        {shown.map((choice) => (
          <li key={choice.epsg}>
            <button type="button" aria-pressed={choice.epsg === chosen} onClick={() => onChoose(choice)}>
              <span>
                {choice.name} <code>EPSG:{choice.epsg}</code>
              </span>
              {choice.note !== "" && <small>{choice.note}</small>}
            </button>
          </li>
        ))}
      </ul>
    </div>
  );
}
