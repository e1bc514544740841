import { use, useMemo, useState } from "react";
import { BaseMapContext } from "./base-map-context.ts";
import { baseMapTiles } from "./base-map.ts";
import type { LngLatOf } from "./planes.ts";
import type { SheetView } from "./sheet-context.ts";

interface BaseMapTilesProps {
  readonly view: SheetView;
  /** From the view's anchor to where the sheet lies now: "translate(…)". */
  readonly shift: string;
  readonly lngLatOf: LngLatOf;
}

/** The owner's base map below all that the sheet shows, pale and without colour. A picture that does not come is simply paper. */
export function BaseMapTiles({ view, shift, lngLatOf }: BaseMapTilesProps) {
  const baseMap = use(BaseMapContext);
  const url = baseMap?.url;
  const [failed, setFailed] = useState<ReadonlySet<string>>(new Set());
  const tiles = useMemo(() => (url === undefined ? [] : baseMapTiles(url, view, lngLatOf)), [url, view, lngLatOf]);
  if (url === undefined) return null;
  const isIncomplete = tiles.some(({ src }) => failed.has(src));
  return (
    <div
      className="q-base-map"
      data-incomplete={isIncomplete ? "" : undefined}
      aria-hidden="true"
      style={{ transform: shift }}
    >
      {tiles.map(({ key, src, transform }) =>
        failed.has(src) ? null : (
          <img
            key={key}
            src={src}
            alt=""
            draggable={false}
            style={{ transform }}
            onError={() => setFailed((before) => new Set(before).add(src))}
          />
        ),
      )}
    </div>
  );
}
