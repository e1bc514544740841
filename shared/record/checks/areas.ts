import { type Check, differ, type Difference, firstDifference, notChecked, type ReplayRun, verdict } from "./check.ts";

const TITLE = "The study area is the one that was imported";

/** Each area's file name, hash and system are those of its event, and each frame names the file of its area. */
export function checkAreas(run: ReplayRun): Check[] {
  const broken = run.events.brokenAmong(["area-imported"]);
  if (broken !== null) return [notChecked("areas", TITLE, `Not compared: ${broken} is not whole.`)];
  const { areas } = run.record;
  if (areas.length === 0) return [notChecked("areas", TITLE, "There is no study area yet.")];
  const difference = firstDifference([
    ...areas.map((area) => () => areaDifference(run, area)),
    ...[...run.frames.values()].map((frame) => () => {
      const area = areas.find(({ id }) => id === frame.stored.areaId);
      if (!frame.isTheSealed || frame.statement === null) return null;
      return differ(
        `frame ${frame.stored.number}, hash of its source`,
        frame.statement.source?.sha256,
        area?.fileSha256,
      );
    }),
  ]);
  const files = areas.map(({ fileName, fileSha256 }) => `${fileName}, SHA-256 ${fileSha256}`);
  return [verdict("areas", TITLE, difference, files.join("; "))];
}

function areaDifference(run: ReplayRun, area: ReplayRun["record"]["areas"][number]): Difference | null {
  const event = run.events.of("area-imported").find(({ payload }) => payload.areaId === area.id);
  const name = `area ${area.number}`;
  return firstDifference([
    () => differ(`${name}, its number`, area.number, event?.payload.number),
    () => differ(`${name}, file name`, area.fileName, event?.payload.fileName),
    () => differ(`${name}, hash of the file`, area.fileSha256, event?.payload.fileSha256),
    () => differ(`${name}, its system`, area.sourceCrs, event?.payload.sourceCrs),
    () => differ(`${name}, file name in its report`, area.report["fileName"], event?.payload.fileName),
    () => differ(`${name}, hash in its report`, area.report["sha256"], event?.payload.fileSha256),
    () => differ(`${name}, vertices`, area.report["vertices"], event?.payload.vertices),
    () => differ(`${name}, geodesic area`, area.report["geodesicAreaM2"], event?.payload.geodesicAreaM2),
    () => differ(`${name}, imported at`, area.importedAt, event?.at),
    () => differ(`${name}, imported by`, area.member, event?.member),
  ]);
}
