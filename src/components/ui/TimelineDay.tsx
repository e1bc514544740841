/** A day on the line, with what it was about. */
export function TimelineDay({ day, note }: { readonly day: string; readonly note?: string }) {
  return (
    <li className="q-timeline-day">
      <h3>{day}</h3>
      {note !== undefined && <span>{note}</span>}
    </li>
  );
}
