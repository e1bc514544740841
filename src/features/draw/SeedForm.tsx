import { useState } from "react";
import type { Declaration } from "#shared/api/draw.ts";
import { seedUsedBefore } from "#shared/draw/seed-used-before.ts";
import { checkSeed, seedNotes } from "#shared/draw/seed.ts";
import { Problem } from "#shared/problem.ts";
import { Button } from "../../components/ui/Button.tsx";
import { Field } from "../../components/ui/Field.tsx";
import { Refusal } from "../../components/ui/Refusal.tsx";
import { Seed } from "../../components/ui/Seed.tsx";
import { TextInput } from "../../components/ui/TextInput.tsx";
import { asEarlier, type PastDeclaration } from "./past-declarations.ts";
import { useMakeDraw } from "./queries.ts";
import { SameSeedWarning } from "./SameSeedWarning.tsx";

interface SeedFormProps {
  readonly surveyId: string;
  readonly declaration: Declaration;
  readonly past: readonly PastDeclaration[];
}

/** The seed of an open declaration, made here or typed, and the draw at once. Where a draw was broken off its seed is there already. */
export function SeedForm({ surveyId, declaration, past }: SeedFormProps) {
  const given = declaration.seed;
  const typed = given === null && declaration.seedSource === "typed";
  const [seed, setSeed] = useState("");
  const [shown, setShown] = useState(false);
  const draw = useMakeDraw(surveyId);
  const problem = typed ? seedProblem(seed) : null;
  const { frameSha256, generator } = declaration;
  const same = typed && problem === null ? seedUsedBefore(past.map(asEarlier), frameSha256, generator, seed) : [];
  return (
    <form
      className="grid gap-3"
      noValidate
      onSubmit={(event) => {
        event.preventDefault();
        setShown(true);
        if (problem !== null || draw.isPending) return;
        draw.mutate({ declarationId: declaration.id, seed: typed ? seed : null });
      }}
    >
      {given !== null && (
        <p>
          The seed is on record: <Seed value={given.text} />. Only the draw is missing.
        </p>
      )}
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
            autoCapitalize="none"
            spellCheck={false}
            onChange={(event) => setSeed(event.target.value)}
          />
        </Field>
      )}
      {typed && <SameSeedWarning same={same} kind={declaration.design.kind} />}
      {draw.isError && <Refusal error={draw.error} />}
      <div>
        <Button type="submit" variant="primary" busy={draw.isPending} busyLabel="Drawing…">
          {given !== null ? "Draw with the seed on record" : typed ? "Draw with this seed" : "Make the seed and draw"}
        </Button>
      </div>
      <p className="q-help">
        {declaration.seedSource === "typed"
          ? "One seed a declaration. The record will say by whom it was chosen."
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
