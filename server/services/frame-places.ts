import { cellCentre, cellCorners, labelOf, unitAt } from "#shared/frame/list.ts";
import { unpackCells } from "#shared/frame/pack.ts";
import { crsFromText } from "#shared/projection/crs.ts";
import { toWgs84 } from "#shared/projection/transformer.ts";
import type { GridPoint } from "#shared/units/metric.ts";
import { findPlane } from "../db/areas.ts";
import { findFrame, specOf } from "../db/frames.ts";
import type { Reader } from "../db/open.ts";

/** A place on the frame's plane in metres, and on the globe in WGS 84 degrees. */
export interface Place {
  readonly eastM: number;
  readonly northM: number;
  readonly lng: number;
  readonly lat: number;
}

/** Where the cells of one sealed frame are. */
export interface FramePlaces {
  readonly crsName: string;
  /** Share of the cell inside the study area, in billionths. */
  shareOf(unit: number): number;
  labelOf(column: number, row: number): string;
  centreOf(column: number, row: number): Place;
  /** South-west, south-east, north-east, north-west. */
  cornersOf(column: number, row: number): readonly Place[];
}

const MILLIMETRES_PER_METRE = 1000;

/** Reads a sealed frame's cells, spec and plane once; each question is answered from there. */
export function framePlaces(reader: Reader, frameId: string): FramePlaces {
  const frame = findFrame(reader, frameId);
  if (!frame?.cells) throw new Error(`frame ${frameId} is not sealed`);
  const { cells: spec, epsg } = specOf(frame);
  const plane = findPlane(reader, frame.areaVersionId, epsg);
  if (!plane) throw new Error(`frame ${frameId} has no plane EPSG:${epsg}`);
  const cells = unpackCells(new Uint8Array(frame.cells));
  const onGlobe = toWgs84(crsFromText(plane.crsText));
  const placeOf = ({ eastMm, northMm }: GridPoint): Place => {
    const [eastM, northM] = [eastMm / MILLIMETRES_PER_METRE, northMm / MILLIMETRES_PER_METRE];
    const [lng, lat] = onGlobe([eastM, northM]);
    return { eastM, northM, lng, lat };
  };
  return {
    crsName: plane.crsName,
    shareOf: (unit) => unitAt(cells, unit).share,
    labelOf: (column, row) => labelOf(cells, column, row),
    centreOf: (column, row) => placeOf(cellCentre(spec, { column, row })),
    cornersOf: (column, row) => cellCorners(spec, { column, row }).map(placeOf),
  };
}
