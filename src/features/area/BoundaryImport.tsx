import { MAX_AREA_FILE_BYTES } from "#shared/api/area.ts";
import { Button } from "../../components/ui/Button.tsx";
import { FileDrop } from "../../components/ui/FileDrop.tsx";
import { formatBytes, formatNumber, formatUnit } from "../../components/ui/format.ts";
import { Progress } from "../../components/ui/Progress.tsx";
import { Refusal } from "../../components/ui/Refusal.tsx";
import { AreaQuestionForm } from "./AreaQuestionForm.tsx";
import { FileRow } from "./FileRow.tsx";
import type { BoundaryFile } from "./use-boundary-file.ts";

interface BoundaryImportProps {
  readonly boundary: BoundaryFile;
  /** Back to the boundary that is there, where one is. */
  readonly onLeave: (() => void) | undefined;
}

/** Choosing a boundary file, and answering what it leaves open. A refused file stays chosen. */
export function BoundaryImport({ boundary, onLeave }: BoundaryImportProps) {
  const { file, reading, refusal, question } = boundary;
  const canAnswer = question !== null && question.kind !== "place";
  // The question itself tells what is refused with it.
  const apart = refusal !== null && refusal.question === undefined;
  return (
    <div className="grid gap-3">
      {file !== null && (
        <FileRow name={file.name}>
          {formatBytes(file.size)}
          {!reading && (canAnswer ? ", an answer is open" : refusal !== null && ", refused")}
        </FileRow>
      )}
      {reading && <Progress label="Reading the file" value={null} onCancel={boundary.cancel} />}
      {!reading && apart && (
        <Refusal
          error={refusal}
          next={
            refusal.code === "unreachable" || refusal.code === "internal" ? (
              <Button onClick={boundary.again}>Send it again</Button>
            ) : undefined
          }
        />
      )}
      {question !== null && (
        // Hidden while it is read, not taken away: an answer that is refused is still there to be mended.
        <div hidden={reading}>
          <AreaQuestionForm
            key={question.kind}
            question={question}
            detail={refusal?.message ?? ""}
            busy={reading}
            onAnswer={boundary.answer}
          />
        </div>
      )}
      {!reading && (
        <FileDrop
          label={file === null ? "Drop the boundary file here" : "Another file"}
          help={`GeoJSON, zipped shapefile, KML, KMZ, GeoPackage, GPX or WKT, at most ${formatUnit(formatNumber(MAX_AREA_FILE_BYTES / 1_000_000), "MB")}.`}
          accept=".geojson,.json,.zip,.kml,.kmz,.gpkg,.gpx,.wkt,.txt"
          primary={file === null}
          onFile={boundary.take}
          buttonLabel={file === null ? "Choose a file" : "Choose another file"}
        />
      )}
      {file === null && (
        <p className="q-help">
          The file is kept byte for byte. What it does not say, such as its coordinate reference system, is asked and
          never assumed.
        </p>
      )}
      {onLeave !== undefined && !reading && (
        <div>
          <Button variant="link" size="small" onClick={onLeave}>
            Keep the boundary that is there
          </Button>
        </div>
      )}
    </div>
  );
}
