/** Ruled lines that wait for writing; shown after 300 ms, said to screen readers as "loading". */
export function RuledLoading({ label = "Loading", lines = 3 }: { readonly label?: string; readonly lines?: number }) {
  return (
    <div className="q-ruled" role="status" aria-label={label}>
      {Array.from({ length: lines }, (_, line) => (
        <i key={line} style={{ width: `${[42, 88, 74, 81, 60][line % 5] ?? 60}%` }} />
      ))}
    </div>
  );
}
