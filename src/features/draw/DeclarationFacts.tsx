import type { Declaration } from "#shared/api/draw.ts";
import { levelPercent } from "#shared/estimate/level.ts";
import { formatCount, formatUnit } from "../../components/ui/format.ts";
import { Hash } from "../../components/ui/Hash.tsx";
import { KeyValues } from "../../components/ui/KeyValues.tsx";
import { useTimes } from "../../components/ui/use-times.ts";
import { DESIGN_TITLES, LIMITS_TITLES } from "./draw-words.ts";

/** All that was declared, by whom and when. */
export function DeclarationFacts({ declaration }: { readonly declaration: Declaration }) {
  const times = useTimes();
  const { design, limits, level, note } = declaration;
  return (
    <KeyValues
      items={[
        { key: "Design", value: DESIGN_TITLES[design.kind] },
        {
          key: "Picks",
          value: `${formatCount(design.n, "pick")} and ${formatCount(declaration.reserves, "reserve")}`,
        },
        { key: "Generator", value: declaration.generator },
        { key: "Limits", value: `${LIMITS_TITLES[limits]}, ${formatUnit(levelPercent(Number(level)), "%")}` },
        { key: "Frame", value: <Hash value={declaration.frameSha256} label="frame hash" /> },
        { key: "Declared", value: `${times.time(declaration.declaredAt)} by ${declaration.declaredBy}` },
        { key: "Declaration", value: <Hash value={declaration.sha256} label="declaration hash" /> },
        ...(note === "" ? [] : [{ key: "Note", value: note }]),
      ]}
    />
  );
}
