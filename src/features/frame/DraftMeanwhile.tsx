import { useQueryClient } from "@tanstack/react-query";
import type { AreaVersion } from "#shared/api/area.ts";
import { surveyKey } from "../../api/keys.ts";
import { Banner } from "../../components/ui/Banner.tsx";
import { Button } from "../../components/ui/Button.tsx";
import { TwoVersions } from "../../components/ui/TwoVersions.tsx";
import type { ComparedField } from "../../components/ui/two-versions.ts";
import { startSettings, type FrameSettings } from "./frame-settings.ts";
import { PRESET_TITLES } from "./frame-words.ts";
import type { DraftNow } from "./queries.ts";

interface DraftMeanwhileProps {
  readonly surveyId: string;
  readonly area: AreaVersion;
  /** What another planner keeps now; null where the draft was sealed. */
  readonly now: DraftNow | null;
  /** What the settings on the page began with. */
  readonly before: FrameSettings;
  readonly mine: FrameSettings;
  /** Of the version that was being set. */
  readonly number: number;
  readonly onDecide: (wanted: FrameSettings) => void;
}

/** Another planner has changed, or sealed, the draft that is being set here. */
export function DraftMeanwhile({ surveyId, area, now, before, mine, number, onDecide }: DraftMeanwhileProps) {
  const queries = useQueryClient();
  if (now === null) {
    return (
      <Banner
        tone="ochre"
        title={`Version ${number} was sealed by somebody else meanwhile.`}
        next={
          <>
            <Button onClick={() => void queries.invalidateQueries({ queryKey: surveyKey(surveyId) })}>
              Look at the sealed frame
            </Button>
            <Button onClick={() => onDecide(mine)}>Begin the next version with what is set here</Button>
          </>
        }
      >
        A sealed frame never changes. What you set is still here.
      </Banner>
    );
  }
  return (
    <TwoVersions
      key={now.draftSha256}
      fields={comparedFields(area)}
      what="The cells"
      action="Go on with what is chosen"
      seen={before}
      mine={mine}
      theirs={startSettings(area, now.spec)}
      onDecide={onDecide}
    />
  );
}

function comparedFields(area: AreaVersion): ComparedField<FrameSettings>[] {
  const system = (epsg: number | null) =>
    epsg === null ? "" : `${area.suggestedCrs.find((choice) => choice.epsg === epsg)?.name ?? "System"}, EPSG:${epsg}`;
  return [
    { key: "epsg", label: "Projected CRS", text: ({ epsg }) => system(epsg) },
    { key: "side", label: "Square, side", text: ({ side }) => side.trim() },
    { key: "originEast", label: "Origin east", text: ({ originEast }) => originEast.trim() },
    { key: "originNorth", label: "Origin north", text: ({ originNorth }) => originNorth.trim() },
    { key: "preset", label: "Edge rule", text: ({ preset }) => PRESET_TITLES[preset] },
  ];
}
