import type { MarkProps } from "./mark-props.ts";

/** The product's mark: a small plot in four, one of them drawn. */
export function ProductMark({ size = 22 }: MarkProps) {
  return (
    <svg width={size} height={size} viewBox="0 0 22 22" aria-hidden="true" className="flex-none">
      <path d="M2.5 19.5V7.5L9 2.5l10.5 3.2v9.1l-6.2 4.7z" fill="none" stroke="var(--color-ink)" strokeWidth="1.5" />
      <path d="M2.5 13.2h17M10.8 3v16.5" stroke="var(--color-ink)" strokeWidth=".8" />
      <path d="M10.8 13.2h8.7v1.6l-6.2 4.7h-2.5z" fill="var(--color-flag)" />
    </svg>
  );
}
