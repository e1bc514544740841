/** "×2": picked that often, visited once. Filled for the pick that repeats, open for the one that is repeated. */
export function RepeatBadge({ times, open = false }: { readonly times: number; readonly open?: boolean }) {
  return <span className={open ? "q-badge q-badge-open" : "q-badge"}>×{times}</span>;
}
