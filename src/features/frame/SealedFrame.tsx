import { useState, type ReactNode } from "react";
import { readFrameList, readFrameStatement, type FrameVersion } from "#shared/api/frame.ts";
import type { CellAddress } from "#shared/frame/cell-spec.ts";
import { addressOf } from "../../api/call.ts";
import { Button } from "../../components/ui/Button.tsx";
import { ButtonLink } from "../../components/ui/ButtonLink.tsx";
import { formatCount, formatMillimetres, formatNumber, type Times } from "../../components/ui/format.ts";
import { Hash } from "../../components/ui/Hash.tsx";
import { KeyValues, type KeyValue } from "../../components/ui/KeyValues.tsx";
import { MapPage } from "../../components/ui/MapPage.tsx";
import { Refusal } from "../../components/ui/Refusal.tsx";
import { RuledLoading } from "../../components/ui/RuledLoading.tsx";
import { useTimes } from "../../components/ui/use-times.ts";
import { usePlane, useSealedCells } from "../../map/frame-ground.ts";
import type { PlaneReference } from "../../workers/frame-preview-work.ts";
import { FindCell } from "./FindCell.tsx";
import { FrameAreas } from "./FrameAreas.tsx";
import { presetOf } from "./frame-settings.ts";
import { FrameSheet } from "./FrameSheet.tsx";
import { PRESET_TEXTS, PRESET_TITLES, speaksFor } from "./frame-words.ts";

type Seal = NonNullable<FrameVersion["sealed"]>;

interface SealedFrameProps {
  readonly surveyId: string;
  readonly surveyName: string;
  readonly plural: string;
  readonly frame: FrameVersion;
  readonly seal: Seal;
  /** Choice of version, above the facts. */
  readonly versions: ReactNode;
  readonly mayReadFiles: boolean;
  /** Starts a new version from this one; absent where that may not be done. */
  readonly onNewVersion: (() => void) | undefined;
  readonly drawTo: string | undefined;
}

function factsOf(frame: FrameVersion, seal: Seal, times: Times): KeyValue[] {
  const { cells } = frame.spec;
  const preset = presetOf(frame.spec);
  const epsg = frame.crs.epsg;
  return [
    { key: "Cells", value: formatNumber(seal.units) },
    { key: "Square", value: formatMillimetres(cells.widthMm) },
    { key: "Edge rule", value: PRESET_TITLES[preset].toLowerCase() },
    { key: "CRS", value: epsg === null ? frame.crs.name : `${frame.crs.name}, EPSG:${epsg}` },
    { key: "Origin", value: `${formatMillimetres(cells.originEastMm)} E, ${formatMillimetres(cells.originNorthMm)} N` },
    { key: "Sealed", value: times.time(seal.at) },
    { key: "By", value: seal.by },
    { key: "Frame hash", value: <Hash value={seal.frameSha256} label="frame hash" /> },
    { key: "List hash", value: <Hash value={seal.listSha256} label="list hash" /> },
    { key: "Draws on it", value: formatNumber(frame.draws) },
  ];
}

/** A sealed frame's plane is there: it is only read. */
function planeOf(surveyId: string, { spec }: FrameVersion): PlaneReference {
  return { surveyId, areaId: spec.areaId, epsg: spec.epsg, mayMake: false };
}

/** The sheet of a sealed frame, once plane and cells are there. */
function SealedSheet({ surveyId, surveyName, frame, chosen, onChoose }: SealedFrameProps & Chosen) {
  const { spec } = frame;
  const plane = usePlane(planeOf(surveyId, frame));
  const cells = useSealedCells(surveyId, frame.id);
  const again = <Button onClick={() => void (plane.isError ? plane : cells).refetch()}>Try again</Button>;
  if (plane.data === undefined || plane.isPlaceholderData) {
    return (
      <div className="p-8">
        {plane.isError ? (
          <Refusal error={plane.error} next={again} />
        ) : (
          <RuledLoading label="Loading the sheet" lines={5} />
        )}
      </div>
    );
  }
  return (
    <>
      <FrameSheet
        surveyName={surveyName}
        plane={plane.data}
        cells={cells.data ?? null}
        spec={spec.cells}
        preset={presetOf(spec)}
        chosen={chosen}
        onChoose={onChoose}
      />
      {cells.isError && (
        <div className="absolute inset-x-8 top-16">
          <Refusal error={cells.error} next={again} />
        </div>
      )}
    </>
  );
}

interface Chosen {
  readonly chosen: CellAddress | null;
  readonly onChoose: (cell: CellAddress | null) => void;
}

function Files({ surveyId, frame }: { readonly surveyId: string; readonly frame: FrameVersion }) {
  const params = { surveyId, frameId: frame.id };
  return (
    <p className="q-downloads">
      <a href={addressOf(readFrameStatement, { params })} download="">
        Frame statement (JSON)
      </a>
      <a href={addressOf(readFrameList, { params })} download="">
        List of cells (text)
      </a>
    </p>
  );
}

/** A frame that never changes again: its facts, hashes, files and sheet. */
export function SealedFrame(props: SealedFrameProps) {
  const { surveyId, plural, frame, seal, mayReadFiles, onNewVersion, drawTo } = props;
  const times = useTimes();
  const [chosen, setChosen] = useState<CellAddress | null>(null);
  const cells = useSealedCells(surveyId, frame.id);
  const plane = usePlane(planeOf(surveyId, frame));
  const preset = presetOf(frame.spec);
  return (
    <MapPage
      title="Sampling frame"
      titleNote={`version ${frame.number}, sealed`}
      map={<SealedSheet {...props} chosen={chosen} onChoose={setChosen} />}
      action={
        drawTo === undefined ? undefined : (
          <ButtonLink variant="primary" size="wide" to={drawTo}>
            Draw from {formatCount(seal.units, "cell")}
          </ButtonLink>
        )
      }
      actionNote="Nothing is drawn yet by going there: design and seed come first."
    >
      {props.versions}
      <p className="q-speak">{speaksFor(preset, seal.summary, plural, plane.data?.holes ?? 0)}</p>
      <div className="my-3">
        <KeyValues items={factsOf(frame, seal, times)} />
      </div>
      <p className="q-help">{PRESET_TEXTS[preset]}</p>
      <div className="mt-3">
        <FrameAreas preset={preset} summary={seal.summary} />
      </div>
      {mayReadFiles && <Files surveyId={surveyId} frame={frame} />}
      {cells.data !== undefined && <FindCell cells={cells.data} chosen={chosen} onChoose={setChosen} />}
      {onNewVersion !== undefined && (
        <div className="mt-4">
          <Button onClick={onNewVersion}>Make a new version from this…</Button>
          <p className="q-help">Version {frame.number} stays as it is, with its draws.</p>
        </div>
      )}
    </MapPage>
  );
}
