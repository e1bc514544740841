import { useState } from "react";
import { flushSync } from "react-dom";
import { GENERATORS } from "#shared/draw/generator.ts";
import { Banner } from "../../components/ui/Banner.tsx";
import { Button } from "../../components/ui/Button.tsx";
import { Field } from "../../components/ui/Field.tsx";
import { focusFirstInvalid } from "../../components/ui/focus-first-invalid.ts";
import { Fold } from "../../components/ui/Fold.tsx";
import { formatCount, formatNumber } from "../../components/ui/format.ts";
import { NumberInput } from "../../components/ui/NumberInput.tsx";
import { RadioCards } from "../../components/ui/RadioCards.tsx";
import { Refusal } from "../../components/ui/Refusal.tsx";
import { Select } from "../../components/ui/Select.tsx";
import { TextArea } from "../../components/ui/TextArea.tsx";
import { type DeclareReading, type DeclareTexts, FIRST_TEXTS, readDeclareForm, usualReserves } from "./declare-form.ts";
import {
  DESIGN_TEXTS,
  DESIGN_TITLES,
  LIMITS_TEXTS,
  LIMITS_TITLES,
  redrawLead,
  type RedrawReason,
  shareSentence,
} from "./draw-words.ts";
import { useDeclare } from "./queries.ts";

interface DeclareFormProps {
  readonly surveyId: string;
  readonly frameId: string;
  readonly units: number;
  /** What was typed; kept by the page. */
  readonly texts: DeclareTexts;
  readonly onTexts: (change: (before: DeclareTexts) => DeclareTexts) => void;
  readonly reasonNeeded: RedrawReason | null;
  /** Draws that were made on this frame version before. */
  readonly drawsOnFrame: number;
}

/** All that a draw is, said before its seed exists. What was typed stays when the server refuses. */
export function DeclareForm(props: DeclareFormProps) {
  const { surveyId, frameId, units, texts, onTexts, reasonNeeded, drawsOnFrame } = props;
  const [shown, setShown] = useState(false);
  const declare = useDeclare(surveyId, () => onTexts(() => FIRST_TEXTS));
  const reading = readDeclareForm(texts, { frameId, units, reasonNeeded: reasonNeeded !== null });
  const set = (part: Partial<DeclareTexts>) => onTexts((before) => ({ ...before, ...part }));
  const errorOf = (field: keyof typeof reading.errors) =>
    shown || (field !== "note" && texts[field] !== "") ? reading.errors[field] : undefined;
  return (
    <form
      className="grid max-w-(--size-measure) gap-6"
      noValidate
      onSubmit={(event) => {
        event.preventDefault();
        flushSync(() => setShown(true));
        if (reading.body === null) focusFirstInvalid(event.currentTarget);
        else if (!declare.isPending) declare.mutate(reading.body);
      }}
    >
      {reasonNeeded !== null && <RedrawBanner {...redrawLead(reasonNeeded, drawsOnFrame)} />}
      <DesignFields texts={texts} set={set} errorOf={errorOf} reading={reading} units={units} />
      {reading.notes.map((note) => (
        <p key={note} className="q-help">
          {note}
        </p>
      ))}
      <LimitsAndSeed texts={texts} set={set} />
      <LevelAndGenerator texts={texts} set={set} error={errorOf("level")} />
      <Field
        label={reasonNeeded === null ? "Note" : "Why there is a new draw"}
        aside={reasonNeeded === null ? "may stay empty" : undefined}
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

function RedrawBanner({ title, text }: { readonly title: string; readonly text: string }) {
  return (
    <Banner tone="ochre" title={title}>
      {text}
    </Banner>
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
          help={
            reading.body === null
              ? `The frame holds ${formatCount(units, "cell")}.`
              : shareSentence(reading.body.design.n, units)
          }
        >
          <NumberInput value={texts.n} onChange={(event) => set({ n: event.target.value })} />
        </Field>
        <Field
          label="Reserves"
          aside="may stay empty"
          error={errorOf("reserves")}
          help={
            texts.reserves.trim() === "" && usual !== null
              ? `Empty means ${formatNumber(usual)}: a fifth of the picks, at least 5. Opened in order, only when a pick is closed.`
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
  // What is wrong must be in sight; once opened for that it stays open, or it would close over what is being typed.
  const [open, setOpen] = useState(false);
  if (error !== undefined && !open) setOpen(true);
  return (
    <Fold quiet title="Confidence level and generator" open={open}>
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
