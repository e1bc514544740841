import type { MarkProps } from "./mark-props.ts";

/** Brick-red octagon with a cross: refused. Always beside words. */
export function RefusedMark({ size = 16 }: MarkProps) {
  return (
    <svg width={size} height={size} viewBox="0 0 16 16" aria-hidden="true" className="flex-none">
      <path d="M5 1.5h6L14.5 5v6L11 14.5H5L1.5 11V5z" fill="none" stroke="var(--color-refuse)" strokeWidth="1.6" />
      <path d="M5.3 5.3l5.4 5.4M10.7 5.3l-5.4 5.4" stroke="var(--color-refuse)" strokeWidth="1.6" />
    </svg>
  );
}
