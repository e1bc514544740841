import type { Design } from "#shared/draw/design.ts";
import { Banner } from "../../components/ui/Banner.tsx";
import { Button } from "../../components/ui/Button.tsx";
import { formatList } from "../../components/ui/format.ts";
import { useTimes } from "../../components/ui/use-times.ts";
import { pastAnchor, type PastDeclaration } from "./past-declarations.ts";

interface SameSeedWarningProps {
  /** Those that had this seed on this frame with this generator. */
  readonly same: readonly PastDeclaration[];
  /** The design that is declared now. */
  readonly kind: Design["kind"];
}

/** A seed that was used before gives the same cells: told while it is typed, with the way to the earlier draw. Nothing is refused. */
export function SameSeedWarning({ same, kind }: SameSeedWarningProps) {
  const times = useTimes();
  const nameOf = ({ declaration, draw }: PastDeclaration) =>
    draw === null ? `the declaration of ${times.time(declaration.declaredAt)}` : `draw ${draw.number}`;
  const otherKind = same.some(({ declaration }) => declaration.design.kind !== kind);
  return (
    <div role="status" className="contents">
      {same.length > 0 && (
        <Banner
          tone="ochre"
          title="This will give the same cells."
          next={
            <span className="flex flex-wrap gap-4">
              {same.map((past) => (
                <Button key={past.declaration.id} variant="link" onClick={() => show(pastAnchor(past))}>
                  {`See ${nameOf(past)}`}
                </Button>
              ))}
            </span>
          }
        >
          {`The seed was used on this frame with this generator: ${formatList(same.map(nameOf))}. The cells come in the same order${otherKind ? ", repeats aside" : ""}, in a longer or shorter list.`}
        </Banner>
      )}
    </div>
  );
}

function show(anchor: string): void {
  const row = document.getElementById(anchor);
  row?.scrollIntoView({ block: "center" });
  row?.focus({ preventScroll: true });
}
