import type { ReactNode } from "react";

interface FileRowProps {
  readonly name: string;
  readonly children: ReactNode;
  /** At the right: "Replace…", a download. */
  readonly act?: ReactNode;
}

/** A boundary file: its name, what it is, and what can be done with it. */
export function FileRow({ name, children, act }: FileRowProps) {
  return (
    <div className="q-file-row">
      <svg width="28" height="32" viewBox="0 0 28 32" aria-hidden="true">
        <path d="M2 1.5h16l8 8v21H2z" fill="var(--color-paper)" stroke="var(--color-ink)" strokeWidth="1.25" />
        <path d="M18 1.5v8h8" fill="none" stroke="var(--color-ink)" strokeWidth="1.25" />
        <path d="M7 24v-7l5-3 9 2v6l-5 3z" fill="var(--color-land)" stroke="var(--color-ink)" />
      </svg>
      <div>
        <b>{name}</b>
        {children}
      </div>
      {act !== undefined && <div>{act}</div>}
    </div>
  );
}
