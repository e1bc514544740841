import { readAreaFile, type AreaVersion } from "#shared/api/area.ts";
import { addressOf } from "../../api/call.ts";
import { Fold } from "../../components/ui/Fold.tsx";
import { formatArea } from "../../components/ui/format.ts";
import { useTimes } from "../../components/ui/use-times.ts";

interface AreaVersionsProps {
  readonly surveyId: string;
  readonly areas: readonly AreaVersion[];
  readonly shown: string;
  readonly onShow: (areaId: string) => void;
  readonly mayRead: boolean;
}

/** Every boundary that was ever imported; frames stay with the one they were made on. */
export function AreaVersions({ surveyId, areas, shown, onShow, mayRead }: AreaVersionsProps) {
  const times = useTimes();
  return (
    <div className="mt-4">
      <Fold quiet title="Versions" aside={`${areas.length}`} open={areas.length > 1}>
        <ul className="q-versions">
          {areas.map((area) => (
            <li key={area.id}>
              <span>
                <b>Version {area.number}</b>, {formatArea(area.report.geodesicAreaM2)}
                <br />
                {area.report.fileName}, {times.day(area.importedAt)}, {area.importedBy}
              </span>
              <span>
                {area.id === shown ? (
                  "shown"
                ) : (
                  <button type="button" className="q-text-button" onClick={() => onShow(area.id)}>
                    Show
                  </button>
                )}
                {mayRead && (
                  <a
                    href={addressOf(readAreaFile, { params: { surveyId, areaId: area.id } })}
                    download=""
                    aria-label={`Download the original file of version ${area.number}`}
                  >
                    Original
                  </a>
                )}
              </span>
            </li>
          ))}
        </ul>
      </Fold>
    </div>
  );
}
