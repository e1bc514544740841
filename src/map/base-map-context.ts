import { createContext } from "react";

/** Pictures that lie below every sheet: an XYZ template in Web Mercator, and whom it names. */
export interface BaseMap {
  readonly url: string;
  readonly attribution: string;
}

/** Null: no base map, and nothing is fetched from anywhere. */
export const BaseMapContext = createContext<BaseMap | null>(null);
