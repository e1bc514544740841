import { reach } from "#shared/access/table.ts";
import { Button } from "../../components/ui/Button.tsx";
import { Refusal } from "../../components/ui/Refusal.tsx";
import { RuledLoading } from "../../components/ui/RuledLoading.tsx";
import { useAreas } from "../../features/area/queries.ts";
import { FrameStage } from "../../features/frame/FrameStage.tsx";
import { useCurrentSurvey } from "../current-survey.ts";
import { paths } from "../paths.ts";

export function FramePage() {
  const survey = useCurrentSurvey();
  const areas = useAreas(survey.id);
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
  return (
    <FrameStage
      surveyId={survey.id}
      surveyName={survey.name}
      plural={survey.targets[0]?.plural ?? survey.target}
      areas={areas.data}
      mayChange={reach(survey.roles, "frame.change") !== "none"}
      mayReadFiles={reach(survey.roles, "record.read") !== "none"}
      areaTo={paths.stage(survey.id, "area")}
      drawTo={reach(survey.roles, "draw.make") === "none" ? undefined : paths.stage(survey.id, "draw")}
    />
  );
}
