import { Link, Outlet, useLocation, useMatch, useParams } from "react-router-dom";
import { ownerMay, reach } from "#shared/access/table.ts";
import { STAGES, type Survey } from "#shared/api/surveys.ts";
import { problemOf } from "../api/problem-of.ts";
import { AppShell } from "../components/ui/AppShell.tsx";
import { Button } from "../components/ui/Button.tsx";
import { ButtonLink } from "../components/ui/ButtonLink.tsx";
import { formatList, timesIn } from "../components/ui/format.ts";
import { Refusal } from "../components/ui/Refusal.tsx";
import { RuledLoading } from "../components/ui/RuledLoading.tsx";
import { TimeZoneContext } from "../components/ui/use-times.ts";
import { useSurvey } from "../features/surveys/queries.ts";
import { CurrentSurveyContext } from "./current-survey.ts";
import { DemoNotice } from "./DemoNotice.tsx";
import { HeaderEnd } from "./HeaderEnd.tsx";
import { NotForRole } from "./NotForRole.tsx";
import { paths, patterns } from "./paths.ts";
import { PlainShell } from "./PlainShell.tsx";
import { STAGE_NAMES, stations } from "./stages.ts";
import { useAccount } from "./use-account.ts";
import { useDemo } from "./use-demo.ts";

/** The survey is not there for this person; any other failure leaves the page, and what is typed on it, as it is. */
function isGone(error: Error | null): boolean {
  return error !== null && [403, 404].includes(problemOf(error).status);
}

/** Header, rail and page of one survey; its pages find the survey with useCurrentSurvey. */
export function SurveyLayout() {
  const { surveyId = "" } = useParams();
  const survey = useSurvey(surveyId);
  const account = useAccount();
  const { pathname } = useLocation();
  const onPeople = pathname === paths.people(surveyId);
  if (survey.data !== undefined && !isGone(survey.error)) {
    return <LoadedSurvey survey={survey.data} onPeople={onPeople} />;
  }
  if (survey.isPending) {
    return (
      <PlainShell here="Survey" crumbs={[{ label: "Surveys", to: paths.surveys }]}>
        <div className="p-8">
          <RuledLoading label="Loading the survey" />
        </div>
      </PlainShell>
    );
  }
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

/** What is counted and when; since when it is archived, where it is. */
function noteOf({ target, season, archivedAt, timeZone }: Survey): string {
  const note = `${target}, season ${season}`;
  return archivedAt === null ? note : `${note} · archived on ${timesIn(timeZone).day(archivedAt)}`;
}

function LoadedSurvey({ survey, onPeople }: { readonly survey: Survey; readonly onPeople: boolean }) {
  const demo = useDemo();
  const part = useMatch(patterns.stage)?.params.stage ?? "";
  const stage = STAGES.find((name) => name === part);
  const seen = stations(survey.id, survey.roles, survey.stages);
  const mayRead = stage === undefined || seen.some((station) => station.id === stage);
  const onSettings = useLocation().pathname === paths.settings(survey.id);
  const pageName = onPeople ? "People" : onSettings ? "Settings" : stage === undefined ? "" : STAGE_NAMES[stage];
  return (
    <CurrentSurveyContext value={survey}>
      <TimeZoneContext value={survey.timeZone}>
        <title>{`${pageName === "" ? "" : `${pageName}, `}${survey.name} · Quillet`}</title>
        <AppShell
          home={paths.home}
          crumbs={[{ label: "Surveys", to: paths.surveys }]}
          here={survey.name}
          hereNote={noteOf(survey)}
          end={<HeaderEnd roles={formatList(survey.roles)} />}
          notice={demo ? <DemoNotice /> : undefined}
          stages={seen}
          {...(stage !== undefined && { currentStage: stage })}
          railFoot={
            <>
              <Link to={paths.people(survey.id)} aria-current={onPeople ? "page" : undefined}>
                {reach(survey.roles, "people.see") === "none" ? "Your part" : "People"}
              </Link>
              <Link to={paths.settings(survey.id)} aria-current={onSettings ? "page" : undefined}>
                Settings
              </Link>
            </>
          }
        >
          {mayRead ? <Outlet /> : <NotForRole survey={survey} stage={pageName} first={seen[0]?.to ?? paths.surveys} />}
        </AppShell>
      </TimeZoneContext>
    </CurrentSurveyContext>
  );
}
