import { useEffect } from "react";
import { useLocation } from "react-router-dom";
import { Banner } from "../../components/ui/Banner.tsx";
import { Button } from "../../components/ui/Button.tsx";
import { ButtonLink } from "../../components/ui/ButtonLink.tsx";
import { MarginNote } from "../../components/ui/MarginNote.tsx";
import { ReadingPage } from "../../components/ui/ReadingPage.tsx";
import { Refusal } from "../../components/ui/Refusal.tsx";
import { RuledLoading } from "../../components/ui/RuledLoading.tsx";
import { AboutSection } from "../../features/installation/AboutSection.tsx";
import { AccountsSection } from "../../features/installation/AccountsSection.tsx";
import { HttpsNotice } from "../../features/installation/HttpsNotice.tsx";
import { MailsSection } from "../../features/installation/MailsSection.tsx";
import { useInstallation } from "../../features/installation/queries.ts";
import { SettingsForm } from "../../features/installation/SettingsForm.tsx";
import { StorageSection } from "../../features/installation/StorageSection.tsx";
import { useSurveys } from "../../features/surveys/queries.ts";
import { paths } from "../paths.ts";
import { PlainShell } from "../PlainShell.tsx";
import { useAccount } from "../use-account.ts";

const PARTS = [
  ["accounts", "Accounts"],
  ["mails", "Mails"],
  ["storage", "Storage and backups"],
  ["map", "Map"],
  ["address", "Address"],
  ["about", "Version and key"],
] as const;

/** Goes to the part that the address names, once it is there. */
function useShownPart(isLoaded: boolean) {
  const { hash } = useLocation();
  useEffect(() => {
    if (isLoaded && hash !== "") document.getElementById(hash.slice(1))?.scrollIntoView();
  }, [isLoaded, hash]);
}

function LoadedInstallation() {
  const installation = useInstallation();
  const surveys = useSurveys();
  useShownPart(installation.data !== undefined);
  if (installation.isPending) return <RuledLoading label="Loading the installation" lines={6} />;
  if (installation.data === undefined) {
    return (
      <Refusal
        error={installation.error}
        next={<Button onClick={() => void installation.refetch()}>Try again</Button>}
      />
    );
  }
  const outline = surveys.data?.surveys.find((survey) => survey.outline !== null)?.outline ?? null;
  const { mail, demo } = installation.data;
  return (
    <>
      <HttpsNotice address={globalThis.location} />
      <div id="accounts" className="min-w-0">
        <AccountsSection mailsAreKept={mail.server === null} />
      </div>
      <div id="mails" className="min-w-0">
        <MailsSection mail={mail} demo={demo} />
      </div>
      <div id="storage" className="min-w-0">
        <StorageSection installation={installation.data} />
      </div>
      <SettingsForm outline={outline} />
      <div id="about" className="min-w-0">
        <AboutSection installation={installation.data} />
      </div>
    </>
  );
}

/** What an owner sees and sets for everybody. */
export function InstallationPage() {
  const account = useAccount();
  const contents = (
    <MarginNote title="On this page">
      <ul className="grid gap-1">
        {PARTS.map(([id, name]) => (
          <li key={id}>
            <a href={`#${id}`}>{name}</a>
          </li>
        ))}
      </ul>
    </MarginNote>
  );
  return (
    <PlainShell here="Installation" crumbs={[{ label: "Surveys", to: paths.surveys }]}>
      {account.isOwner ? (
        <ReadingPage
          title="Installation"
          lead="Accounts, mails, copies and what holds for everybody. Only owners see this page."
          margin={contents}
        >
          <LoadedInstallation />
        </ReadingPage>
      ) : (
        <div className="grid max-w-160 gap-4 p-8">
          <Banner title="This page is for owners of the installation.">
            Ask one of them; your surveys are where they were.
          </Banner>
          <div>
            <ButtonLink to={paths.surveys}>To the surveys</ButtonLink>
          </div>
        </div>
      )}
    </PlainShell>
  );
}
