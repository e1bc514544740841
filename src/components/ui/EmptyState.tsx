import type { ReactNode } from "react";

interface EmptyStateProps {
  readonly title: string;
  /** What to do next and why. */
  readonly children: ReactNode;
  readonly action?: ReactNode;
  readonly picture?: ReactNode;
}

/** Nothing here yet: says so, what comes next, and offers it. */
export function EmptyState({ title, children, action, picture }: EmptyStateProps) {
  return (
    <div className="q-empty">
      {picture}
      <h3 className={picture === undefined ? undefined : "mt-2"}>{title}</h3>
      <p>{children}</p>
      {action}
    </div>
  );
}
