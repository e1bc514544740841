/** Grid north is up. */
export function NorthArrow() {
  return (
    <svg className="q-sheet-north" width="16" height="46" viewBox="-8 -22 16 46" role="img" aria-label="North is up">
      <path d="M0-20 5.5 8 0 4.2-5.5 8z" fill="var(--color-paper)" stroke="var(--color-ink)" strokeWidth="1" />
      <path d="M0-20V4.2L-5.5 8z" fill="var(--color-ink)" />
      <text y="21">N</text>
    </svg>
  );
}
