import { useState } from "react";
import type { FrameVersion } from "#shared/api/frame.ts";
import { GENERATORS } from "#shared/draw/generator.ts";
import { Button } from "../../components/ui/Button.tsx";
import { Field } from "../../components/ui/Field.tsx";
import { Fold } from "../../components/ui/Fold.tsx";
import { NumberInput } from "../../components/ui/NumberInput.tsx";
import { RadioCards } from "../../components/ui/RadioCards.tsx";
import { Refusal } from "../../components/ui/Refusal.tsx";
import { Select } from "../../components/ui/Select.tsx";
import { TextArea } from "../../components/ui/TextArea.tsx";
import { type DeclareReading, type DeclareTexts, FIRST_TEXTS, readDeclareForm, usualReserves } from "./declare-form.ts";
import { DESIGN_TEXTS, DESIGN_TITLES, LIMITS_TEXTS, LIMITS_TITLES, shareSentence } from "./draw-words.ts";
import { useDeclare } from "./queries.ts";

type Sealed = NonNullable<FrameVersion["sealed"]>;

interface DeclareFormProps {
  readonly surveyId: string;
  readonly frameId: string;
  readonly sealed: Sealed;
  readonly reasonNeeded: boolean;
}

/** All that a draw is, said before its seed exists. What was typed stays when the server refuses. */
export function DeclareForm({ surveyId, frameId, sealed, reasonNeeded }: DeclareFormProps) {
  const [texts, setTexts] = useState(FIRST_TEXTS);
  const [shown, setShown] = useState(false);
  const declare = useDeclare(surveyId);
  const reading = readDeclareForm(texts, { frameId, units: sealed.units, reasonNeeded });
  const set = (part: Partial<DeclareTexts>) => setTexts((before) => ({ ...before, ...part }));
  const errorOf = (field: keyof typeof reading.errors) =>
    shown || (field === "n" && texts.n !== "") ? reading.errors[field] : undefined;
  return (
    <form
      className="grid max-w-(--size-measure) gap-6"
      noValidate
      onSubmit={(event) => {
        event.preventDefault();
        setShown(true);
        if (reading.body !== null) declare.mutate(reading.body);
      }}
    >
      <DesignFields texts={texts} set={set} errorOf={errorOf} reading={reading} units={sealed.units} />
      {reading.notes.map((note) => (
        <p key={note} className="q-help">
          {note}
        </p>
      ))}
      <LimitsAndSeed texts={texts} set={set} />
      <LevelAndGenerator texts={texts} set={set} error={errorOf("level")} />
      <Field
        label={reasonNeeded ? "Why there is a new draw" : "Note"}
        aside={reasonNeeded ? undefined : "may stay empty"}
        error={errorOf("note")}
        help="Stands in the declaration, for whoever reads it in years."
      >
        <TextArea value={texts.note} onChange={(event) => set({ note: event.target.value })} />
      </Field>
      {declare.isError && <Refusal error={declare.error} />}
      <div className="grid gap-2">
        <div>
          <Button type="submit" variant="primary" busy={declare.isPending} busyLabel="Declaring…">
            Declare the draw
          </Button>
        </div>
        <p className="q-help">Nothing is drawn yet. The declaration is sealed and stays on record, however it ends.</p>
      </div>
    </form>
  );
}

interface PartProps {
  readonly texts: DeclareTexts;
  readonly set: (part: Partial<DeclareTexts>) => void;
}

interface DesignFieldsProps extends PartProps {
  readonly errorOf: (field: "n" | "reserves") => string | undefined;
  readonly reading: DeclareReading;
  readonly units: number;
}

function DesignFields({ texts, set, errorOf, reading, units }: DesignFieldsProps) {
  const usual = usualReserves(texts, units);
  return (
    <>
      <RadioCards
        legend="Design"
        value={texts.kind}
        onChange={(kind) => set({ kind })}
        options={(["srs-wr", "srs-wor"] as const).map((kind) => ({
          value: kind,
          title: DESIGN_TITLES[kind],
          text: DESIGN_TEXTS[kind],
        }))}
      />
      <div className="grid gap-4 md:grid-cols-2">
        <Field
          label="Picks, n"
          error={errorOf("n")}
          help={reading.body === null ? `The frame holds ${units} cells.` : shareSentence(reading.body.design.n, units)}
        >
          <NumberInput value={texts.n} onChange={(event) => set({ n: event.target.value })} />
        </Field>
        <Field
          label="Reserves"
          aside="may stay empty"
          error={errorOf("reserves")}
          help={
            texts.reserves.trim() === "" && usual !== null
              ? `Empty means ${usual}: a fifth of the picks, at least 5. Opened in order, only when a pick is closed.`
              : "Opened strictly in draw order, only when a pick is closed."
          }
        >
          <NumberInput value={texts.reserves} onChange={(event) => set({ reserves: event.target.value })} />
        </Field>
      </div>
    </>
  );
}

function LimitsAndSeed({ texts, set }: PartProps) {
  return (
    <>
      <RadioCards
        legend="Limits to be printed large"
        value={texts.limits}
        onChange={(limits) => set({ limits })}
        options={(["log-normal", "t"] as const).map((limits) => ({
          value: limits,
          title: LIMITS_TITLES[limits],
          text: LIMITS_TEXTS[limits],
        }))}
      />
      <RadioCards
        legend="Where the seed comes from"
        value={texts.seedSource}
        onChange={(seedSource) => set({ seedSource })}
        options={[
          {
            value: "made-here",
            title: "Made here",
            text: "20 digits from this server’s random source, once, after the declaration is sealed.",
          },
          {
            value: "typed",
            title: "Typed",
            text: "Any text, given after the declaration. It proves that the draw can be repeated, not that only one seed was tried; the record says so.",
          },
        ]}
      />
    </>
  );
}

function LevelAndGenerator({ texts, set, error }: PartProps & { readonly error: string | undefined }) {
  return (
    <Fold quiet title="Confidence level and generator">
      <div className="grid gap-4 py-3 md:grid-cols-2">
        <Field label="Confidence level" error={error} help="Of the limits, in per cent.">
          <NumberInput unit="%" value={texts.level} onChange={(event) => set({ level: event.target.value })} />
        </Field>
        <Field label="Generator" help="Both can be repeated with ordinary tools.">
          <Select
            value={texts.generator}
            onChange={(event) => set({ generator: event.target.value as DeclareTexts["generator"] })}
            options={GENERATORS.map((name) => ({ value: name, label: name }))}
          />
        </Field>
      </div>
    </Fold>
  );
}
