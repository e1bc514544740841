import { EDGE_PRESET_NAMES, type EdgePresetName } from "#shared/frame/cell-spec.ts";
import type { FrameSummary } from "#shared/api/frame.ts";
import { formatNumber } from "../../components/ui/format.ts";
import { RadioCards } from "../../components/ui/RadioCards.tsx";
import { EdgeRulePicture } from "../../map/EdgeRulePicture.tsx";
import { PRESET_TEXTS, PRESET_TITLES } from "./frame-words.ts";

interface EdgeRulesProps {
  readonly value: EdgePresetName;
  readonly onChange: (value: EdgePresetName) => void;
  /** What each comes to; null until it is known. */
  readonly summaries: Readonly<Record<EdgePresetName, Pick<FrameSummary, "cells">>> | null;
}

/** Three rules for the edge side by side, each with the number of its cells. */
export function EdgeRules({ value, onChange, summaries }: EdgeRulesProps) {
  return (
    <RadioCards
      legend="Edge rule"
      value={value}
      onChange={onChange}
      options={EDGE_PRESET_NAMES.map((name) => ({
        value: name,
        title: PRESET_TITLES[name],
        text: PRESET_TEXTS[name],
        picture: <EdgeRulePicture rule={name} />,
        figure: summaries === null ? "…" : formatNumber(summaries[name].cells),
        figureUnit: summaries?.[name].cells === 1 ? "cell" : "cells",
      }))}
    />
  );
}
