import type { Map as LeafletMap } from "leaflet";
import type { SheetMargins } from "./sheet-margins.ts";

interface SheetToolsProps {
  readonly map: LeafletMap;
  readonly onWhole: () => void;
  readonly margins: SheetMargins;
  readonly compact: boolean;
}

/** Nearer, farther, whole area: three squares in one ruled block. On a phone two fingers and a double tap zoom, and one square is left. */
export function SheetTools({ map, onWhole, margins, compact }: SheetToolsProps) {
  return (
    <div
      className="q-sheet-tools"
      role="group"
      aria-label="Map"
      style={{ right: margins.right + (compact ? 8 : 12), top: margins.top + (compact ? 8 : 14) }}
    >
      {!compact && (
        <>
          <button type="button" aria-label="Zoom in" onClick={() => map.zoomIn()}>
            +
          </button>
          <button type="button" aria-label="Zoom out" onClick={() => map.zoomOut()}>
            −
          </button>
        </>
      )}
      <button type="button" aria-label="Whole area" onClick={onWhole}>
        <svg width="16" height="16" viewBox="0 0 16 16" aria-hidden="true">
          <path d="M1 5V1h4M11 1h4v4M15 11v4h-4M5 15H1v-4" fill="none" stroke="currentColor" strokeWidth="1.5" />
        </svg>
      </button>
    </div>
  );
}
