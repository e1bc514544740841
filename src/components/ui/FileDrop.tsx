import { useId, useRef, useState, type DragEvent, type ReactNode } from "react";
import { Button } from "./Button.tsx";

interface FileDropProps {
  /** What is wanted: "Drop the boundary file here". */
  readonly label: string;
  /** Kinds and limits in words. */
  readonly help?: ReactNode;
  /** For the picker: ".geojson,.json,.zip,.kml". Dropped files are not judged here. */
  readonly accept?: string;
  readonly onFile: (file: File) => void;
  readonly buttonLabel?: string;
  readonly busy?: boolean;
  /** The one filled button of the screen. */
  readonly primary?: boolean;
  readonly disabled?: boolean;
}

/** A file by drop or by picker; the picker's button is what the keyboard reaches. */
export function FileDrop({
  label,
  help,
  accept,
  onFile,
  buttonLabel = "Choose a file",
  busy = false,
  primary = false,
  disabled = false,
}: FileDropProps) {
  const id = useId();
  const input = useRef<HTMLInputElement>(null);
  const [over, setOver] = useState(false);
  const take = (files: FileList | null) => {
    const file = files?.[0];
    if (file !== undefined && !busy && !disabled) onFile(file);
  };
  const onDrop = (event: DragEvent) => {
    event.preventDefault();
    setOver(false);
    take(event.dataTransfer.files);
  };
  return (
    <div
      className="q-drop"
      data-over={over}
      role="group"
      aria-labelledby={`${id}-label`}
      onDragOver={(event) => {
        event.preventDefault();
        setOver(true);
      }}
      onDragLeave={() => setOver(false)}
      onDrop={onDrop}
    >
      <b id={`${id}-label`} className="text-ink">
        {label}
      </b>
      {help !== undefined && <span id={`${id}-help`}>{help}</span>}
      <div className="mt-2">
        <Button
          variant={primary ? "primary" : "quiet"}
          busy={busy}
          busyLabel="Reading…"
          disabled={disabled}
          aria-describedby={help === undefined ? undefined : `${id}-help`}
          onClick={() => input.current?.click()}
        >
          {buttonLabel}
        </Button>
      </div>
      <input
        ref={input}
        type="file"
        className="sr-only"
        tabIndex={-1}
        aria-label={label}
        accept={accept}
        disabled={disabled}
        onChange={(event) => {
          take(event.target.files);
          event.target.value = "";
        }}
      />
    </div>
  );
}
