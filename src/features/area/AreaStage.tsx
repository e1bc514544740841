import { useState } from "react";
import type { AreaVersion } from "#shared/api/area.ts";
import { Button } from "../../components/ui/Button.tsx";
import { ButtonLink } from "../../components/ui/ButtonLink.tsx";
import { formatArea } from "../../components/ui/format.ts";
import { MapPage } from "../../components/ui/MapPage.tsx";
import { Refusal } from "../../components/ui/Refusal.tsx";
import { RuledLoading } from "../../components/ui/RuledLoading.tsx";
import { showToast } from "../../components/ui/show-toast.tsx";
import { AreaPanel } from "./AreaPanel.tsx";
import { AreaSheet } from "./AreaSheet.tsx";
import { BoundaryImport } from "./BoundaryImport.tsx";
import { EmptySheet } from "./EmptySheet.tsx";
import { useAreas } from "./queries.ts";
import { useBoundaryFile } from "./use-boundary-file.ts";

interface AreaStageProps {
  readonly surveyId: string;
  readonly surveyName: string;
  /** May import a boundary. */
  readonly mayChange: boolean;
  /** May fetch the original file. */
  readonly mayReadFiles: boolean;
  readonly frameTo: string;
}

/** The Area stage: boundary in, what was found in it, and the sheet. */
export function AreaStage(props: AreaStageProps) {
  const areas = useAreas(props.surveyId);
  // Asked again now and then: when only that fails, the page stays, with the file that is chosen on it.
  if (areas.data === undefined) {
    return (
      <div className="max-w-160 p-8">
        {areas.isError ? (
          <Refusal error={areas.error} next={<Button onClick={() => void areas.refetch()}>Try again</Button>} />
        ) : (
          <RuledLoading label="Loading the study area" lines={5} />
        )}
      </div>
    );
  }
  return <LoadedArea {...props} areas={areas.data} />;
}

function titleNote(shown: AreaVersion | undefined, newest: AreaVersion | undefined): string {
  if (shown === undefined) return "not imported yet";
  return shown.id === newest?.id ? `version ${shown.number}` : `version ${shown.number}, not the newest`;
}

function LoadedArea(props: AreaStageProps & { readonly areas: readonly AreaVersion[] }) {
  const { surveyId, surveyName, mayChange, mayReadFiles, frameTo, areas } = props;
  const [chosen, setChosen] = useState<string | null>(null);
  const [replacing, setReplacing] = useState(false);
  const boundary = useBoundaryFile(surveyId, (area) => {
    setChosen(null);
    setReplacing(false);
    showToast(`Version ${area.number} of the study area is kept: ${formatArea(area.report.geodesicAreaM2)}.`);
  });
  const newest = areas[0];
  const shown = areas.find((area) => area.id === chosen) ?? newest;
  const importing = mayChange && (newest === undefined || replacing || boundary.file !== null);
  const asked = boundary.question?.kind === "place" ? boundary.question.at : null;
  const leave = () => {
    boundary.leave();
    setReplacing(false);
  };
  return (
    <MapPage
      title="Study area"
      titleNote={importing && newest !== undefined ? "another boundary" : titleNote(shown, newest)}
      map={
        shown === undefined ? (
          <EmptySheet text="No boundary yet" />
        ) : (
          <AreaSheet surveyName={surveyName} area={shown} asked={asked} />
        )
      }
      action={
        importing || shown === undefined || !mayChange ? undefined : (
          <ButtonLink variant="primary" size="wide" to={frameTo}>
            Lay cells over {formatArea(shown.report.geodesicAreaM2)}
          </ButtonLink>
        )
      }
      actionNote="The file stays on record byte for byte, with what was mended. Another boundary makes a new version; sealed frames stay with theirs."
    >
      {importing && <BoundaryImport boundary={boundary} onLeave={newest === undefined ? undefined : leave} />}
      {!importing && shown === undefined && <p>There is no study area yet. A planner of the survey imports it.</p>}
      {!importing && shown !== undefined && (
        <AreaPanel
          surveyId={surveyId}
          areas={areas}
          shown={shown}
          onShow={setChosen}
          onReplace={mayChange ? () => setReplacing(true) : undefined}
          mayReadFiles={mayReadFiles}
        />
      )}
    </MapPage>
  );
}
