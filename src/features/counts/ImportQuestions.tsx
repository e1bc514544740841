import type { TableQuestion } from "#shared/api/counts.ts";
import { AttentionMark } from "../../components/ui/AttentionMark.tsx";
import { Checkbox } from "../../components/ui/Checkbox.tsx";
import { DoneMark } from "../../components/ui/DoneMark.tsx";
import { formatCount, formatList } from "../../components/ui/format.ts";
import { type Segment, SegmentedControl } from "../../components/ui/SegmentedControl.tsx";
import { type DateOrder, type ImportChoice, isAnswered, keyOf, withObserver, withZeroWord } from "./import-choice.ts";

interface ImportQuestionsProps {
  readonly choice: ImportChoice;
  readonly onChoice: (choice: ImportChoice) => void;
}

/** What the table leaves open. Rows that wait for an answer are not written; an answer can be changed until they are. */
export function ImportQuestions({ choice, onChoice }: ImportQuestionsProps) {
  const words = choice.asked.filter((question) => question.kind === "zero-word");
  const open = choice.asked.filter((question) => !isAnswered(choice, question)).length;
  if (choice.asked.length === 0) return null;
  return (
    <section className="q-ask" role="group" aria-label="What the table leaves open">
      <h3 className="flex gap-2 text-[14px] leading-5 font-semibold">
        {open === 0 ? <DoneMark size={16} /> : <AttentionMark size={16} />}
        <span>
          {open === 0 ? "Answered; it can be changed until it is written" : "The table leaves something open"}
        </span>
      </h3>
      {choice.asked.map((question) => {
        const [key, shared] = [keyOf(question), { choice, onChoice }];
        if (question.kind === "date-order") return <DateOrderForm key={key} {...shared} question={question} />;
        return question.kind === "observer" ? <ObserverForm key={key} {...shared} question={question} /> : null;
      })}
      {words.length > 0 && (
        <fieldset className="q-fieldset">
          <legend className="q-label">Which of these mean: searched, none found?</legend>
          {words.map(({ word, rows }) => (
            <Checkbox
              key={word}
              label={`“${word}” means 0 (${formatCount(rows, "row")})`}
              checked={choice.zeroWords.includes(word)}
              onChange={(event) => onChoice(withZeroWord(choice, word, event.target.checked))}
            />
          ))}
        </fieldset>
      )}
    </section>
  );
}

type Asked<K extends TableQuestion["kind"]> = ImportQuestionsProps & {
  readonly question: Extract<TableQuestion, { kind: K }>;
};

function DateOrderForm({ question, choice, onChoice }: Asked<"date-order">) {
  const { written, dayFirst, monthFirst, rows, why } = question;
  const options: Segment<DateOrder>[] = [
    { value: "day-first", label: `day first: ${dayFirst}` },
    { value: "month-first", label: `month first: ${monthFirst}` },
  ];
  return (
    <SegmentedControl
      legend={`Which comes first in dates such as ${written}?`}
      help={`${why} ${formatCount(rows, "row waits", "rows wait")} for it.`}
      value={choice.dateOrder}
      onChange={(dateOrder) => onChoice({ ...choice, dateOrder })}
      options={options}
    />
  );
}

/** Place among the candidates, or "other" for somebody else. */
function ObserverForm({ question, choice, onChoice }: Asked<"observer">) {
  const { written, rows, candidates } = question;
  const answer = choice.observers.find((one) => one.written === written);
  const chosen =
    answer === undefined
      ? -1
      : candidates.findIndex((one) =>
          "member" in answer ? one.kind === "member" && one.member === answer.member : one.name === answer.name,
        );
  const value = answer === undefined ? null : chosen === -1 ? "other" : String(chosen);
  const answers = candidates.map((one) =>
    one.kind === "member" ? { written, member: one.member } : { written, name: one.name },
  );
  return (
    <SegmentedControl
      legend={
        <span className="whitespace-pre-wrap">
          {`Is “${written}” ${formatList(candidates.map(({ name }) => `“${name}”`)).replaceAll(" and ", " or ")}?`}
        </span>
      }
      help={`${formatCount(rows, "row")}. They differ only by case, accents or spaces${candidates[0]?.kind === "member" ? "; the other is a member of the survey" : "; more rows have the other"}.`}
      value={value}
      onChange={(place) => onChoice(withObserver(choice, answers[Number(place)] ?? { written, name: written }))}
      options={[
        ...candidates.map((one, place) => ({ value: String(place), label: `Yes, ${one.name}` })),
        { value: "other", label: "No, somebody else" },
      ]}
    />
  );
}
