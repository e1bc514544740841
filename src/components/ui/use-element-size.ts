import { useLayoutEffect, useState, type RefObject } from "react";

export interface ElementSize {
  readonly width: number;
  readonly height: number;
}

/** The size of an element's content box in px, followed while it changes. */
export function useElementSize(element: RefObject<HTMLElement | null>): ElementSize {
  const [size, setSize] = useState<ElementSize>({ width: 0, height: 0 });
  useLayoutEffect(() => {
    const node = element.current;
    if (node === null) return undefined;
    const measure = () =>
      setSize((before) =>
        before.width === node.clientWidth && before.height === node.clientHeight
          ? before
          : { width: node.clientWidth, height: node.clientHeight },
      );
    measure();
    const observer = new ResizeObserver(measure);
    observer.observe(node);
    return () => observer.disconnect();
  }, [element]);
  return size;
}
