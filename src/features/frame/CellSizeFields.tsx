import { useState } from "react";
import { Field } from "../../components/ui/Field.tsx";
import { TextInput } from "../../components/ui/TextInput.tsx";
import type { FrameSettings, ReadSettings } from "./frame-settings.ts";
import type { LengthReading } from "./read-length.ts";

interface CellSizeFieldsProps {
  readonly settings: FrameSettings;
  readonly read: ReadSettings;
  /** What the size would lead to, where that cannot be. */
  readonly sideError: string | null;
  readonly onChange: (part: Partial<FrameSettings>) => void;
}

const messageOf = (reading: LengthReading) => (reading.ok ? null : reading.message);

/** The side of the squares and the origin of their grid. */
export function CellSizeFields({ settings, read, sideError, onChange }: CellSizeFieldsProps) {
  const [moving, setMoving] = useState(settings.originEast !== "0" || settings.originNorth !== "0");
  return (
    <div className="q-cell-size">
      <Field label="Square, side" error={messageOf(read.side) ?? sideError}>
        <TextInput
          unit="m"
          inputMode="decimal"
          autoComplete="off"
          value={settings.side}
          onChange={(event) => onChange({ side: event.target.value })}
        />
      </Field>
      {moving ? (
        <fieldset className="q-fieldset q-origin">
          <legend className="sr-only">Origin of the grid</legend>
          <Field label="Origin east" error={messageOf(read.originEast)}>
            <TextInput
              unit="m"
              mono
              autoComplete="off"
              value={settings.originEast}
              onChange={(event) => onChange({ originEast: event.target.value })}
            />
          </Field>
          <Field label="Origin north" error={messageOf(read.originNorth)}>
            <TextInput
              unit="m"
              mono
              autoComplete="off"
              value={settings.originNorth}
              onChange={(event) => onChange({ originNorth: event.target.value })}
            />
          </Field>
          <p className="q-help">
            With 0, 0 two people get the same grid.{" "}
            <button
              type="button"
              className="q-text-button"
              onClick={() => {
                onChange({ originEast: "0", originNorth: "0" });
                setMoving(false);
              }}
            >
              Back to 0, 0
            </button>
          </p>
        </fieldset>
      ) : (
        <p className="q-help q-origin-line">
          Origin 0, 0, not rotated
          <button
            type="button"
            className="q-text-button"
            aria-label="Change the origin of the grid"
            onClick={() => setMoving(true)}
          >
            Change
          </button>
        </p>
      )}
    </div>
  );
}
