import { Dialog as Radix } from "radix-ui";
import { useState, type ReactNode } from "react";
import { Link } from "react-router-dom";
import { ProductMark } from "./ProductMark.tsx";
import type { Stage } from "./stage-state.ts";
import { StageMark } from "./StageMark.tsx";
import { StageRail } from "./StageRail.tsx";

export interface Crumb {
  readonly label: string;
  readonly to: string;
}

interface AppShellProps {
  /** Where the product's name leads. */
  readonly home: string;
  /** Pages above this one: Surveys. */
  readonly crumbs?: readonly Crumb[];
  /** The name of the survey or of the page. */
  readonly here?: string;
  /** After it, in a quiet voice: "marsh-orchid spikes, season 2031". */
  readonly hereNote?: string;
  /** At the right of the header: what was kept when, who is signed in, links. */
  readonly end?: ReactNode;
  /** A line below the header on every page: "This is the demo …". */
  readonly notice?: ReactNode;
  readonly stages?: readonly Stage[];
  readonly currentStage?: string;
  /** Links below the stations. */
  readonly railFoot?: ReactNode;
  readonly children: ReactNode;
}

function StagesOnAPhone({
  stages,
  current,
  foot,
  here,
}: {
  stages: readonly Stage[];
  /** Undefined on a page beside the stages. */
  current: Stage | undefined;
  foot: ReactNode;
  here: string;
}) {
  const [open, setOpen] = useState(false);
  return (
    <Radix.Root open={open} onOpenChange={setOpen}>
      <Radix.Trigger
        className="q-stage-button"
        aria-label={
          current === undefined
            ? "Show all stages"
            : `${current.name}, stage ${stages.indexOf(current) + 1} of ${stages.length}: show all stages`
        }
      >
        {current === undefined ? (
          "Stages"
        ) : (
          <>
            <StageMark state={current.state} />
            {current.name}
            <span>
              {stages.indexOf(current) + 1} of {stages.length}
            </span>
          </>
        )}
        <i aria-hidden="true" />
      </Radix.Trigger>
      <Radix.Portal>
        <Radix.Content className="q-stages-page" aria-describedby={undefined}>
          <div className="q-header">
            <Radix.Title className="flex-1 px-4 text-h3">{here}</Radix.Title>
            <Radix.Close className="q-stage-button">Close</Radix.Close>
          </div>
          <StageRail
            stages={stages}
            current={current?.id ?? null}
            layout="page"
            foot={foot}
            onGo={() => setOpen(false)}
          />
        </Radix.Content>
      </Radix.Portal>
    </Radix.Root>
  );
}

/** Header, rail of stages where there are any, and the page. */
export function AppShell({
  home,
  crumbs = [],
  here,
  hereNote,
  end,
  notice,
  stages,
  currentStage,
  railFoot,
  children,
}: AppShellProps) {
  const current = stages?.find((stage) => stage.id === currentStage);
  return (
    <div className="q-shell" data-stages={stages === undefined ? undefined : ""}>
      <a className="q-skip" href="#main">
        To the content
      </a>
      <header className="q-header">
        <Link className="q-brand" to={home} aria-label="Quillet, to the surveys">
          <ProductMark />
          <span>Quillet</span>
        </Link>
        {here !== undefined && <span className="q-header-rule" aria-hidden="true" />}
        <nav className="q-crumbs" aria-label="Where you are">
          {crumbs.map((crumb) => (
            <span key={crumb.to} className="q-crumb">
              <Link to={crumb.to}>{crumb.label}</Link>
              <span aria-hidden="true">/</span>
            </span>
          ))}
          {here !== undefined && <b className="q-crumb-here">{here}</b>}
          {hereNote !== undefined && <span className="q-crumb-note">{hereNote}</span>}
        </nav>
        {end !== undefined && <div className="q-header-end">{end}</div>}
        {stages !== undefined && (
          <StagesOnAPhone stages={stages} current={current} foot={railFoot} here={here ?? "Stages"} />
        )}
      </header>
      {notice === undefined ? (
        <div />
      ) : (
        <aside className="q-notice" aria-label="About this installation">
          {notice}
        </aside>
      )}
      <div className={stages === undefined ? "q-shell-columns q-shell-columns-plain" : "q-shell-columns"}>
        {stages !== undefined && <StageRail stages={stages} current={currentStage ?? null} foot={railFoot} />}
        <main id="main" tabIndex={-1} className="min-w-0 outline-none">
          {children}
        </main>
      </div>
    </div>
  );
}
