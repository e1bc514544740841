import type { Map as LeafletMap } from "leaflet";
import { useCallback, useEffect, useRef } from "react";
import type { PressListener, Sheet } from "./sheet-context.ts";

/** Hands a press on the map to the layers: the one that came last and takes it wins. */
export function usePress(map: LeafletMap | undefined): Sheet["onPress"] {
  const listeners = useRef<readonly PressListener[]>([]);
  useEffect(() => {
    if (map === undefined) return undefined;
    const press = (event: { latlng: { lat: number; lng: number } }) => {
      for (const listener of listeners.current.toReversed()) if (listener(event.latlng.lng, event.latlng.lat)) return;
    };
    map.on("click", press);
    return () => {
      map.off("click", press);
    };
  }, [map]);
  return useCallback((listener: PressListener) => {
    listeners.current = [...listeners.current, listener];
    return () => {
      listeners.current = listeners.current.filter((one) => one !== listener);
    };
  }, []);
}
