import type { MarkProps } from "./mark-props.ts";

/** Open disc with an i: for information. */
export function InfoMark({ size = 16 }: MarkProps) {
  return (
    <svg width={size} height={size} viewBox="0 0 16 16" aria-hidden="true" className="flex-none">
      <circle cx="8" cy="8" r="6.6" fill="none" stroke="var(--color-ink-2)" strokeWidth="1.5" />
      <path d="M8 7v4.4M8 4.2v1.5" stroke="var(--color-ink-2)" strokeWidth="1.7" />
    </svg>
  );
}
