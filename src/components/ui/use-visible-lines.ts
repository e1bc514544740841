import { useVirtualizer } from "@tanstack/react-virtual";
import type { RefObject } from "react";

/** A table holds all its lines up to this many; above, only those in sight. */
const ALL_UP_TO = 200;

interface VisibleLines {
  readonly virtual: boolean;
  readonly indices: readonly number[];
  /** Room in px of the lines above and below those in the page. */
  readonly before: number;
  readonly after: number;
  readonly measure: ((row: HTMLTableRowElement | null) => void) | undefined;
  readonly scrollTo: (index: number) => void;
}

/** Which lines of a long table are in the page. Keys keep a line's measured height when the order changes. */
export function useVisibleLines(keys: readonly string[], frame: RefObject<HTMLDivElement | null>): VisibleLines {
  "use no memo";
  const virtual = keys.length > ALL_UP_TO;
  const virtualizer = useVirtualizer({
    count: keys.length,
    getScrollElement: () => frame.current,
    estimateSize: () => 33,
    overscan: 12,
    enabled: virtual,
    getItemKey: (index) => keys[index] ?? index,
  });
  if (!virtual)
    return {
      virtual,
      indices: keys.map((_, index) => index),
      before: 0,
      after: 0,
      measure: undefined,
      scrollTo: () => undefined,
    };
  const items = virtualizer.getVirtualItems();
  return {
    virtual,
    indices: items.map((item) => item.index),
    before: items[0]?.start ?? 0,
    after: virtualizer.getTotalSize() - (items.at(-1)?.end ?? 0),
    measure: virtualizer.measureElement,
    scrollTo: (index) => virtualizer.scrollToIndex(index),
  };
}
