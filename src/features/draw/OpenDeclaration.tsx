import { useState } from "react";
import type { Declaration } from "#shared/api/draw.ts";
import { Button } from "../../components/ui/Button.tsx";
import { DeclarationFacts } from "./DeclarationFacts.tsx";
import type { PastDeclaration } from "./past-declarations.ts";
import { useAbandon } from "./queries.ts";
import { ReasonDialog } from "./ReasonDialog.tsx";
import { SeedForm } from "./SeedForm.tsx";

interface OpenDeclarationProps {
  readonly surveyId: string;
  readonly declaration: Declaration;
  readonly past: readonly PastDeclaration[];
  readonly mayDraw: boolean;
}

/** A declaration that waits for its seed and its draw, and the way to end it without. */
export function OpenDeclaration({ surveyId, declaration, past, mayDraw }: OpenDeclarationProps) {
  const [asking, setAsking] = useState(false);
  const abandon = useAbandon(surveyId);
  return (
    <div className="grid max-w-(--size-measure) gap-6">
      <DeclarationFacts declaration={declaration} />
      {mayDraw && <SeedForm surveyId={surveyId} declaration={declaration} past={past} />}
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
