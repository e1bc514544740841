import { useEffect, useRef, type KeyboardEvent } from "react";
import { Field } from "../../components/ui/Field.tsx";
import { TextInput } from "../../components/ui/TextInput.tsx";

interface SurveySearchProps {
  readonly text: string;
  readonly onChange: (text: string) => void;
  /** "3 of 12 surveys". */
  readonly found: string;
  /** Opens the first survey that is found. */
  readonly onFirst: () => void;
  /** Goes to the first survey on the list. */
  readonly onDown: () => void;
}

function isTyping(target: EventTarget | null): boolean {
  return target instanceof HTMLElement && target.closest("input, textarea, select, [contenteditable]") !== null;
}

/** Looks through the surveys as one types. The slash key comes here, Enter opens the first found, Arrow Down goes to the list, Escape empties it. */
export function SurveySearch({ text, onChange, found, onFirst, onDown }: SurveySearchProps) {
  const input = useRef<HTMLInputElement>(null);
  useEffect(() => {
    const onKey = (event: globalThis.KeyboardEvent) => {
      if (event.key !== "/" || event.ctrlKey || event.metaKey || event.altKey || isTyping(event.target)) return;
      event.preventDefault();
      input.current?.focus();
    };
    document.addEventListener("keydown", onKey);
    return () => document.removeEventListener("keydown", onKey);
  }, []);
  const onKeyDown = (event: KeyboardEvent<HTMLInputElement>) => {
    if (event.key === "Escape" && text !== "") onChange("");
    else if (event.key === "Enter") onFirst();
    else if (event.key === "ArrowDown") onDown();
    else return;
    event.preventDefault();
  };
  return (
    <div className="q-survey-search" role="search">
      <Field label="Find a survey" aside="or press /">
        <TextInput
          ref={input}
          type="search"
          autoComplete="off"
          placeholder="name, what is counted, season"
          value={text}
          onChange={(event) => onChange(event.target.value)}
          onKeyDown={onKeyDown}
        />
      </Field>
      <p role="status">{found}</p>
    </div>
  );
}
