import { useRouteError } from "react-router-dom";
import { problemOf } from "../../api/problem-of.ts";
import { Button } from "../../components/ui/Button.tsx";
import { ButtonLink } from "../../components/ui/ButtonLink.tsx";
import { Refusal } from "../../components/ui/Refusal.tsx";
import { paths } from "../paths.ts";

/** A page's code that could not be fetched: the server was restarted with a newer version, or cannot be reached. */
function isLostPage(error: unknown): boolean {
  return (
    error instanceof TypeError && /dynamically imported module|module script|importing a module/i.test(error.message)
  );
}

/** What a page could not cope with: the fact, and what to do next. */
export function ErrorPage() {
  const error = useRouteError();
  const lost = isLostPage(error);
  return (
    <main className="grid max-w-160 gap-4 p-8">
      <title>Quillet</title>
      <h1>{lost ? "This page could not be fetched." : "This page cannot go on."}</h1>
      {lost ? (
        <p>Quillet may have been renewed meanwhile, or the server cannot be reached. Reload to get the page again.</p>
      ) : (
        <Refusal error={problemOf(error)} />
      )}
      <div className="flex flex-wrap gap-3">
        <Button variant="primary" onClick={() => window.location.reload()}>
          Reload the page
        </Button>
        <ButtonLink href={paths.surveys}>To the surveys</ButtonLink>
      </div>
    </main>
  );
}
