import type { ReactNode } from "react";
import { AppShell, type Crumb } from "../components/ui/AppShell.tsx";
import { DemoNotice } from "./DemoNotice.tsx";
import { HeaderEnd } from "./HeaderEnd.tsx";
import { paths } from "./paths.ts";
import { useDemo } from "./use-demo.ts";

interface PlainShellProps {
  readonly here: string;
  readonly crumbs?: readonly Crumb[];
  readonly children: ReactNode;
}

/** Header and page without stages. */
export function PlainShell({ here, crumbs, children }: PlainShellProps) {
  const demo = useDemo();
  return (
    <AppShell
      home={paths.home}
      here={here}
      crumbs={crumbs ?? []}
      end={<HeaderEnd links />}
      notice={demo ? <DemoNotice /> : undefined}
    >
      <title>{`${here} · Quillet`}</title>
      {children}
    </AppShell>
  );
}
