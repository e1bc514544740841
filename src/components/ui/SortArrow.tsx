/** The arrow of a sorted column, drawn because the typeface has none. */
export function SortArrow({ down }: { readonly down: boolean }) {
  return (
    <svg
      width="8"
      height="10"
      viewBox="0 0 8 10"
      aria-hidden="true"
      className="flex-none"
      style={{ transform: down ? "rotate(180deg)" : undefined }}
    >
      <path d="M4 9.5V1M1 4l3-3 3 3" fill="none" stroke="currentColor" strokeWidth="1.4" />
    </svg>
  );
}
