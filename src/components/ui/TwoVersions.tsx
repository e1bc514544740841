import { useEffect, useId, useRef, useState, type ReactNode } from "react";
import { Banner } from "./Banner.tsx";
import { Button } from "./Button.tsx";
import { RadioCards } from "./RadioCards.tsx";
import { type Choice, type ComparedField, differencesOf, mergedBy, type TwoOf } from "./two-versions.ts";

interface TwoVersionsProps<T> extends TwoOf<T> {
  /** Every field that is compared: its key in T, its label, and how a version's value reads. */
  readonly fields: readonly ComparedField<T>[];
  /** What it is that was changed: "These settings". */
  readonly what: string;
  /** The button that keeps what was chosen: "Keep these settings". */
  readonly action: string;
  readonly busy?: boolean;
  /** A refusal of what was chosen, shown beside the button. */
  readonly refusal?: ReactNode;
  /** Is given the whole: theirs, with mine in the fields where that was chosen. Send it with the version of theirs. */
  readonly onDecide: (merged: T) => void;
}

/**
 * Somebody else changed meanwhile what is being written here: both versions side by side, field by field where they differ,
 * with "take theirs" and "keep mine" for each. What only one of the two changed is chosen already; what both changed has to
 * be said. `seen` is what was there when the writing began, `mine` what is written here, `theirs` what stands on the server;
 * all three are of one shape T with a key for each field. Show it above the form and leave the form mounted or keep its
 * values: nothing that was typed is lost. Give it a `key` made of the version of theirs, so that a second change starts anew.
 */
export function TwoVersions<T>({
  fields,
  what,
  action,
  busy = false,
  refusal,
  onDecide,
  ...versions
}: TwoVersionsProps<T>) {
  const differences = differencesOf(fields, versions);
  const [said, setSaid] = useState<Readonly<Partial<Record<string, Choice>>>>({});
  const heading = useRef<HTMLHeadingElement>(null);
  const id = useId();
  useEffect(() => heading.current?.focus(), []);
  const choiceOf = (key: string, obvious: Choice | null) => said[key] ?? obvious;
  const open = differences.filter(({ key, obvious }) => choiceOf(key, obvious) === null);
  const decide = () => {
    const choices = Object.fromEntries(
      differences.map(({ key, obvious }) => [key, choiceOf(key, obvious) ?? "theirs"]),
    );
    onDecide(mergedBy(fields, versions, choices));
  };
  return (
    <section className="grid gap-4" aria-labelledby={id}>
      <h2 id={id} ref={heading} tabIndex={-1} className="outline-none">
        Both versions
      </h2>
      <Banner tone="ochre" title={`${what} were changed by somebody else while you were writing.`}>
        {differences.length === 0
          ? "Both versions say the same."
          : "Say for each field what is to stand. What you wrote is still here."}
      </Banner>
      {differences.map(({ key, label, theirs, mine, obvious }) => (
        <RadioCards<Choice>
          key={key}
          legend={label}
          value={choiceOf(key, obvious)}
          onChange={(choice) => setSaid({ ...said, [key]: choice })}
          options={[
            { value: "theirs", title: "Take theirs", text: <Said text={theirs} /> },
            { value: "mine", title: "Keep mine", text: <Said text={mine} /> },
          ]}
        />
      ))}
      {refusal}
      <div>
        <Button variant="primary" busy={busy} disabled={open.length > 0} onClick={decide}>
          {action}
        </Button>
        {open.length > 0 && (
          <p className="q-help">Still to be said: {open.map(({ label }) => label.toLowerCase()).join(", ")}.</p>
        )}
      </div>
    </section>
  );
}

function Said({ text }: { readonly text: string }) {
  return <span className="block whitespace-pre-wrap break-words">{text === "" ? "empty" : text}</span>;
}
