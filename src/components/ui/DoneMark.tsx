import type { MarkProps } from "./mark-props.ts";

/** Green disc with a tick: done, passes. Always beside words. */
export function DoneMark({ size = 16 }: MarkProps) {
  return (
    <svg width={size} height={size} viewBox="0 0 16 16" aria-hidden="true" className="flex-none">
      <circle cx="8" cy="8" r="7" fill="var(--color-act)" />
      <path d="m4.6 8.2 2.4 2.4 4.5-5" fill="none" stroke="var(--color-on-act)" strokeWidth="1.8" />
    </svg>
  );
}
