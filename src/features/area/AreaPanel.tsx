import { readAreaFile, type AreaVersion } from "#shared/api/area.ts";
import { addressOf } from "../../api/call.ts";
import { formatBytes } from "../../components/ui/format.ts";
import { Hash } from "../../components/ui/Hash.tsx";
import { useTimes } from "../../components/ui/use-times.ts";
import { AreaVersions } from "./AreaVersions.tsx";
import { FileRow } from "./FileRow.tsx";
import { ImportReportList } from "./ImportReportList.tsx";

interface AreaPanelProps {
  readonly surveyId: string;
  readonly areas: readonly AreaVersion[];
  readonly shown: AreaVersion;
  readonly onShow: (areaId: string) => void;
  readonly onReplace: (() => void) | undefined;
  readonly mayReadFiles: boolean;
}

/** One version of the study area: its file, the import report, and the other versions. */
export function AreaPanel({ surveyId, areas, shown, onShow, onReplace, mayReadFiles }: AreaPanelProps) {
  const times = useTimes();
  const { report } = shown;
  return (
    <>
      <FileRow
        name={report.fileName}
        act={
          onReplace === undefined ? undefined : (
            <button type="button" className="q-text-button" onClick={onReplace}>
              Replace…
            </button>
          )
        }
      >
        {report.format}, {formatBytes(report.bytes)}
        <br />
        <Hash value={report.sha256} label="hash of the file" />
      </FileRow>
      <p className="q-help">
        Imported {times.time(shown.importedAt)} by {shown.importedBy}.{" "}
        {mayReadFiles && (
          <a href={addressOf(readAreaFile, { params: { surveyId, areaId: shown.id } })} download="">
            Original file
          </a>
        )}
      </p>
      <ImportReportList report={report} />
      {shown.outlineSimplified && (
        <p className="q-help">The sheet shows a simpler outline; areas and cells come from the whole of it.</p>
      )}
      <AreaVersions surveyId={surveyId} areas={areas} shown={shown.id} onShow={onShow} mayRead={mayReadFiles} />
    </>
  );
}
