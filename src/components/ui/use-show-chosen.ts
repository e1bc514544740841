import { useEffect, useEffectEvent, type RefObject } from "react";

/** Brings a row that was chosen elsewhere, on a map, into sight in the table's own frame; nothing around the frame moves. */
export function useShowChosen(
  frame: RefObject<HTMLElement | null>,
  chosen: string | null,
  placeOf: () => number,
  /** Of a table that holds only the rows in sight. */
  scrollTo: ((index: number) => void) | undefined,
): void {
  const show = useEffectEvent(() => {
    const index = placeOf();
    if (index < 0) return;
    if (scrollTo === undefined) showInFrame(frame.current, index);
    else scrollTo(index);
  });
  useEffect(() => {
    if (chosen !== null) show();
  }, [chosen]);
}

function showInFrame(frame: HTMLElement | null, index: number): void {
  const row = frame?.querySelector(`tr[data-row="${index}"]`)?.getBoundingClientRect();
  const head = frame?.querySelector("thead")?.getBoundingClientRect();
  const seen = frame?.getBoundingClientRect();
  if (!frame || !row || !head || !seen) return;
  if (row.top < seen.top + head.height) frame.scrollTop += row.top - seen.top - head.height;
  else if (row.bottom > seen.bottom) frame.scrollTop += row.bottom - seen.bottom;
}
