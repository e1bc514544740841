import { useState } from "react";
import type { AreaAnswers, AreaQuestion } from "#shared/area/questions.ts";
import { CrsSearch } from "../../components/crs/CrsSearch.tsx";
import { Button } from "../../components/ui/Button.tsx";
import { Checkbox } from "../../components/ui/Checkbox.tsx";
import { Field } from "../../components/ui/Field.tsx";
import { Fold } from "../../components/ui/Fold.tsx";
import { formatCount } from "../../components/ui/format.ts";
import { RadioCards } from "../../components/ui/RadioCards.tsx";
import { TextArea } from "../../components/ui/TextArea.tsx";
import { AskBlock } from "./AskBlock.tsx";
import { placeText } from "./place-text.ts";

interface AreaQuestionFormProps {
  readonly question: AreaQuestion;
  /** What the refusal itself says, for questions that only another file answers. */
  readonly detail: string;
  readonly busy: boolean;
  readonly onAnswer: (answers: AreaAnswers) => void;
}

function CrsQuestion({
  question,
  busy,
  onAnswer,
}: AreaQuestionFormProps & { question: AreaQuestion & { kind: "crs" } }) {
  const [text, setText] = useState("");
  const asked =
    question.looksLike === "degrees"
      ? "Which degrees are these?"
      : question.looksLike === "metres"
        ? "Which grid and zone are these metres in?"
        : "Which coordinate reference system is this file in?";
  return (
    <AskBlock question={asked} why={question.why}>
      <CrsSearch suggestions={question.suggestions} onChoose={(choice) => onAnswer({ crs: `EPSG:${choice.epsg}` })} />
      <Fold quiet title="It has no EPSG code">
        <div className="grid gap-2 py-2">
          <Field label="PROJ text or WKT" help="As in a .prj file.">
            <TextArea rows={4} value={text} onChange={(event) => setText(event.target.value)} />
          </Field>
          <div>
            <Button
              size="small"
              busy={busy}
              disabled={text.trim() === ""}
              onClick={() => onAnswer({ crs: text.trim() })}
            >
              Read the file in this system
            </Button>
          </div>
        </div>
      </Fold>
      <p className="q-help">Your answer is kept in the record.</p>
    </AskBlock>
  );
}

function LayerQuestion({
  question,
  busy,
  onAnswer,
}: AreaQuestionFormProps & { question: AreaQuestion & { kind: "layer" } }) {
  const [layer, setLayer] = useState<string | null>(null);
  return (
    <AskBlock question="Which of these is the study area?" why={question.why}>
      <RadioCards
        legend="Layers in the file"
        hideLegend
        value={layer}
        onChange={setLayer}
        options={question.layers.map((name) => ({ value: name, title: name }))}
      />
      <div>
        <Button
          size="small"
          busy={busy}
          disabled={layer === null}
          onClick={() => {
            if (layer !== null) onAnswer({ layer });
          }}
        >
          {layer === null ? "Choose a layer first" : `Read “${layer}”`}
        </Button>
      </div>
    </AskBlock>
  );
}

function LinesQuestion({
  question,
  busy,
  onAnswer,
}: AreaQuestionFormProps & { question: AreaQuestion & { kind: "lines" } }) {
  const [chosen, setChosen] = useState<readonly number[]>(question.lines.length === 1 ? [0] : []);
  const toggle = (place: number) => {
    setChosen(
      chosen.includes(place) ? chosen.filter((one) => one !== place) : [...chosen, place].sort((a, b) => a - b),
    );
  };
  return (
    <AskBlock question="Close a line to a boundary?" why={question.why}>
      <div role="group" aria-label="Lines in the file">
        {question.lines.map(({ name, vertices, gap }, place) => (
          <Checkbox
            key={place}
            label={name}
            help={`${formatCount(vertices, "vertex", "vertices")}; ${gap}.`}
            checked={chosen.includes(place)}
            onChange={() => toggle(place)}
          />
        ))}
      </div>
      <p className="q-help">A straight edge is drawn from a line’s end to its beginning, and the report says so.</p>
      <div>
        <Button size="small" busy={busy} disabled={chosen.length === 0} onClick={() => onAnswer({ lines: chosen })}>
          {chosen.length === 0 ? "Choose a line first" : `Close ${formatCount(chosen.length, "line")}`}
        </Button>
      </div>
    </AskBlock>
  );
}

function AxesQuestion({
  question,
  detail,
  busy,
  onAnswer,
}: AreaQuestionFormProps & { question: AreaQuestion & { kind: "axes" } }) {
  return (
    <AskBlock question="Are longitude and latitude exchanged?" why={detail}>
      <dl className="q-places">
        <dt>As written</dt>
        <dd>{question.asWritten === null ? "no place on the Earth" : placeText(question.asWritten)}</dd>
        <dt>Exchanged</dt>
        <dd>{question.exchanged === null ? "no place on the Earth" : placeText(question.exchanged)}</dd>
      </dl>
      {question.exchanged !== null && (
        <div>
          <Button size="small" busy={busy} onClick={() => onAnswer({ axes: "exchanged" })}>
            Yes, it lies at the second place
          </Button>
        </div>
      )}
    </AskBlock>
  );
}

/** What the file leaves open. A question about one place is answered by a better file. */
export function AreaQuestionForm(props: AreaQuestionFormProps) {
  const { question, detail } = props;
  switch (question.kind) {
    case "crs":
      return <CrsQuestion {...props} question={question} />;
    case "layer":
      return <LayerQuestion {...props} question={question} />;
    case "lines":
      return <LinesQuestion {...props} question={question} />;
    case "axes":
      return <AxesQuestion {...props} question={question} />;
    case "place":
      return (
        <AskBlock question="One place has to be mended in the file." why={detail}>
          <dl className="q-places">
            <dt>Where</dt>
            <dd>{placeText(question.at)}</dd>
          </dl>
        </AskBlock>
      );
  }
}
