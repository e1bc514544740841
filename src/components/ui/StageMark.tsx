import { AttentionMark } from "./AttentionMark.tsx";
import { DoneMark } from "./DoneMark.tsx";
import type { MarkProps } from "./mark-props.ts";
import type { StageState } from "./stage-state.ts";

/** A station: open, half filled, triangle with a stroke, filled with a tick. Always beside words. */
export function StageMark({ state, size = 16 }: MarkProps & { readonly state: StageState }) {
  switch (state) {
    case "done":
      return <DoneMark size={size} />;
    case "attention":
      return <AttentionMark size={size} />;
    case "in-work":
      return (
        <svg width={size} height={size} viewBox="0 0 16 16" aria-hidden="true" className="flex-none">
          <circle cx="8" cy="8" r="6" fill="var(--color-paper)" stroke="var(--color-ink)" strokeWidth="1.5" />
          <path d="M8 2a6 6 0 0 1 0 12z" fill="var(--color-ink)" />
        </svg>
      );
    case "not-started":
      return (
        <svg width={size} height={size} viewBox="0 0 16 16" aria-hidden="true" className="flex-none">
          <circle cx="8" cy="8" r="6" fill="var(--color-paper)" stroke="var(--color-rule-2)" strokeWidth="1.5" />
        </svg>
      );
  }
}
