import { useState } from "react";
import type { Declaration } from "#shared/api/draw.ts";
import { checkSeed, seedNotes } from "#shared/draw/seed.ts";
import { Problem } from "#shared/problem.ts";
import { Button } from "../../components/ui/Button.tsx";
import { Field } from "../../components/ui/Field.tsx";
import { formatCount, formatTime } from "../../components/ui/format.ts";
import { Hash } from "../../components/ui/Hash.tsx";
import { KeyValues } from "../../components/ui/KeyValues.tsx";
import { Refusal } from "../../components/ui/Refusal.tsx";
import { TextInput } from "../../components/ui/TextInput.tsx";
import { DESIGN_TITLES, LIMITS_TITLES } from "./draw-words.ts";
import { useAbandon, useMakeDraw } from "./queries.ts";
import { ReasonDialog } from "./ReasonDialog.tsx";

interface OpenDeclarationProps {
  readonly surveyId: string;
  readonly declaration: Declaration;
  readonly mayDraw: boolean;
}

/** A declaration that waits for its seed: made here or typed now, and the draw follows at once. */
export function OpenDeclaration({ surveyId, declaration, mayDraw }: OpenDeclarationProps) {
  const [asking, setAsking] = useState(false);
  const abandon = useAbandon(surveyId);
  return (
    <div className="grid max-w-(--size-measure) gap-6">
      <KeyValues items={factsOf(declaration)} />
      {mayDraw && <SeedForm surveyId={surveyId} declaration={declaration} />}
      {mayDraw && (
        <p>
          <Button variant="link" size="small" onClick={() => setAsking(true)}>
            Abandon this declaration…
          </Button>
        </p>
      )}
      <ReasonDialog
        open={asking}
        onOpenChange={setAsking}
        title="Abandon this declaration?"
        lead="It ends without a draw and stays on record with your reason."
        act="Abandon the declaration"
        busy={abandon.isPending}
        error={abandon.error}
        onReason={(reason) => abandon.mutate({ id: declaration.id, reason })}
      />
    </div>
  );
}

function factsOf(declaration: Declaration) {
  return [
    { key: "Design", value: DESIGN_TITLES[declaration.design.kind] },
    {
      key: "Picks",
      value: `${formatCount(declaration.design.n, "pick")} and ${formatCount(declaration.reserves, "reserve")}`,
    },
    { key: "Generator", value: declaration.generator },
    { key: "Limits", value: LIMITS_TITLES[declaration.limits] },
    { key: "Frame", value: <Hash value={declaration.frameSha256} label="frame hash" /> },
    { key: "Declared", value: `${formatTime(declaration.declaredAt)} by ${declaration.declaredBy}` },
    { key: "Declaration", value: <Hash value={declaration.sha256} label="declaration hash" /> },
    ...(declaration.note === "" ? [] : [{ key: "Note", value: declaration.note }]),
  ];
}

function SeedForm({ surveyId, declaration }: Omit<OpenDeclarationProps, "mayDraw">) {
  const typed = declaration.seedSource === "typed";
  const [seed, setSeed] = useState("");
  const [shown, setShown] = useState(false);
  const draw = useMakeDraw(surveyId);
  const problem = typed ? seedProblem(seed) : null;
  return (
    <form
      className="grid gap-3"
      noValidate
      onSubmit={(event) => {
        event.preventDefault();
        setShown(true);
        if (problem === null) draw.mutate({ declarationId: declaration.id, seed: typed ? seed : null });
      }}
    >
      {typed && (
        <Field
          label="Seed"
          error={(shown || seed !== "") && problem !== null ? problem : undefined}
          help={[`Kept as text, exactly: "${seed}"`, ...(problem === null ? seedNotes(seed) : [])].join(" ")}
        >
          <TextInput
            mono
            value={seed}
            autoComplete="off"
            spellCheck={false}
            onChange={(event) => setSeed(event.target.value)}
          />
        </Field>
      )}
      {draw.isError && <Refusal error={draw.error} />}
      <div>
        <Button type="submit" variant="primary" busy={draw.isPending} busyLabel="Drawing…">
          {typed ? "Draw with this seed" : "Make the seed and draw"}
        </Button>
      </div>
      <p className="q-help">
        {typed
          ? "One seed a declaration. The record will say that it was chosen by you."
          : "One seed a declaration: the server makes it once, writes it down, and draws."}
      </p>
    </form>
  );
}

function seedProblem(seed: string): string | null {
  try {
    checkSeed(seed);
    return null;
  } catch (error) {
    if (error instanceof Problem) return error.message;
    throw error;
  }
}
