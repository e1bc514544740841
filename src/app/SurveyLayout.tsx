import { Link, Outlet, useLocation, useParams } from "react-router-dom";
import { ownerMay, reach } from "#shared/access/table.ts";
import type { Survey } from "#shared/api/surveys.ts";
import { AppShell } from "../components/ui/AppShell.tsx";
import { Button } from "../components/ui/Button.tsx";
import { ButtonLink } from "../components/ui/ButtonLink.tsx";
import { formatList } from "../components/ui/format.ts";
import { Refusal } from "../components/ui/Refusal.tsx";
import { RuledLoading } from "../components/ui/RuledLoading.tsx";
import { useSurvey } from "../features/surveys/queries.ts";
import { CurrentSurveyContext } from "./current-survey.ts";
import { DemoNotice } from "./DemoNotice.tsx";
import { HeaderEnd } from "./HeaderEnd.tsx";
import { NotForRole } from "./NotForRole.tsx";
import { paths } from "./paths.ts";
import { PlainShell } from "./PlainShell.tsx";
import { STAGE_NAMES, stations } from "./stages.ts";
import { useAccount } from "./use-account.ts";
import { useDemo } from "./use-demo.ts";

/** Header, rail and page of one survey; its pages find the survey with useCurrentSurvey. */
export function SurveyLayout() {
  const { surveyId = "" } = useParams();
  const survey = useSurvey(surveyId);
  const account = useAccount();
  const { pathname } = useLocation();
  const onPeople = pathname === paths.people(surveyId);
  if (survey.isPending) {
    return (
      <PlainShell here="Survey" crumbs={[{ label: "Surveys", to: paths.surveys }]}>
        <div className="p-8">
          <RuledLoading label="Loading the survey" />
        </div>
      </PlainShell>
    );
  }
  if (survey.isError) {
    const asOwner = onPeople && account.isOwner && ownerMay("people.change");
    return (
      <PlainShell here="Survey" crumbs={[{ label: "Surveys", to: paths.surveys }]}>
        {asOwner ? (
          <Outlet />
        ) : (
          <div className="grid max-w-160 gap-4 p-8">
            <Refusal error={survey.error} next={<Button onClick={() => void survey.refetch()}>Try again</Button>} />
            <ButtonLink to={paths.surveys}>To the surveys</ButtonLink>
          </div>
        )}
      </PlainShell>
    );
  }
  return <LoadedSurvey survey={survey.data} onPeople={onPeople} />;
}

function LoadedSurvey({ survey, onPeople }: { readonly survey: Survey; readonly onPeople: boolean }) {
  const { pathname } = useLocation();
  const demo = useDemo();
  const stage = Object.keys(STAGE_NAMES).find((name) => pathname === `${paths.survey(survey.id)}/${name}`);
  const seen = stations(survey.id, survey.roles, survey.stages);
  const mayRead = stage === undefined || seen.some((station) => station.id === stage);
  const pageName = onPeople ? "People" : stage === undefined ? "" : STAGE_NAMES[stage as keyof typeof STAGE_NAMES];
  return (
    <CurrentSurveyContext value={survey}>
      <title>{`${pageName === "" ? "" : `${pageName}, `}${survey.name} · Quillet`}</title>
      <AppShell
        home={paths.home}
        crumbs={[{ label: "Surveys", to: paths.surveys }]}
        here={survey.name}
        hereNote={`${survey.target}, season ${survey.season}`}
        end={<HeaderEnd roles={formatList(survey.roles)} />}
        notice={demo ? <DemoNotice /> : undefined}
        stages={seen}
        {...(stage !== undefined && { currentStage: stage })}
        railFoot={
          reach(survey.roles, "people.see") === "none" ? undefined : (
            <Link to={paths.people(survey.id)} aria-current={onPeople ? "page" : undefined}>
              People
            </Link>
          )
        }
      >
        {mayRead ? <Outlet /> : <NotForRole survey={survey} stage={pageName} first={seen[0]?.to ?? paths.surveys} />}
      </AppShell>
    </CurrentSurveyContext>
  );
}
