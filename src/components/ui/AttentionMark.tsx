import type { MarkProps } from "./mark-props.ts";

/** Ochre triangle with a stroke: look here. Always beside words. */
export function AttentionMark({ size = 16 }: MarkProps) {
  return (
    <svg width={size} height={size} viewBox="0 0 16 16" aria-hidden="true" className="flex-none">
      <path
        d="M8 1 15.2 14.2H.8z"
        fill="var(--color-ochre-tint)"
        stroke="var(--color-ochre)"
        strokeWidth="1.6"
        strokeLinejoin="round"
      />
      <path d="M8 6v3.6M8 11.3v1.2" stroke="var(--color-ochre)" strokeWidth="1.7" />
    </svg>
  );
}
