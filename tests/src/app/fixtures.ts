import type { Role } from "#shared/access/table.ts";
import type { Session } from "#shared/api/accounts.ts";
import type { AreaVersion, PlaneRings } from "#shared/api/area.ts";
import type { FrameSpec, FrameVersion } from "#shared/api/frame.ts";
import { type ListedSurvey, STAGES, type StageState, type Survey } from "#shared/api/surveys.ts";

export function session(part: Partial<Session> = {}): Session {
  return {
    account: { id: "a1", name: "Ines Marrow", email: "ines@example.org", isOwner: false },
    demo: false,
    version: "0.1.0",
    baseMap: null,
    ...part,
  };
}

export function stages(states: Partial<Record<StageState["stage"], Omit<StageState, "stage">>> = {}): StageState[] {
  return STAGES.map((stage) => ({ stage, ...(states[stage] ?? { state: "not-started", note: "not started" }) }));
}

export function survey(roles: Role[] = ["planner"], part: Partial<Survey> = {}): Survey {
  return {
    id: "s1",
    name: "Pellimere Fen",
    target: "marsh-orchid spikes",
    season: "2031",
    roles,
    stages: stages(),
    outline: null,
    createdAt: "2031-05-02T08:00:00Z",
    archivedAt: null,
    timeZone: "Europe/Paris",
    level: "0.95",
    safetyNotes: "",
    seasons: [{ id: "y1", name: "2031", position: 1 }],
    targets: [{ id: "t1", singular: "spike", plural: "spikes", countingRule: "", wholeNumbers: true }],
    memberId: "m1",
    ...part,
  };
}

/** As the list of surveys has it. */
export function listed(roles: Role[] = ["planner"], part: Partial<ListedSurvey> = {}): ListedSurvey {
  const { id, name, target, season, stages: states, outline, createdAt, archivedAt } = survey(roles);
  const head = { id, name, target, season, roles, stages: states, outline, createdAt, archivedAt };
  return { ...head, newestEvent: { sequence: 7, at: "2031-05-03T09:30:00Z" }, waiting: [], ...part };
}

/** 100 m × 100 m, as imported. */
export function area(part: Partial<AreaVersion> = {}): AreaVersion {
  return {
    id: "ar1",
    number: 1,
    importedAt: "2031-05-02T09:00:00Z",
    importedBy: "Ines Marrow",
    report: {
      format: "GeoJSON",
      fileName: "fen.geojson",
      bytes: 612,
      sha256: "ab".repeat(32),
      crs: { name: "WGS 84", epsg: 4326, text: "+proj=longlat", howKnown: "GeoJSON is in WGS 84 (RFC 7946)." },
      features: 1,
      parts: 1,
      rings: 1,
      holes: 0,
      vertices: 4,
      geodesicAreaM2: 10_000,
      bounds: [2, 51, 2.001, 51.001],
      mended: [],
      ignored: ["3 features without a shape were passed over."],
      notes: [],
    },
    outline: [
      [
        [
          [2, 51],
          [2.001, 51],
          [2.001, 51.001],
          [2, 51.001],
        ],
      ],
    ],
    outlineSimplified: false,
    suggestedCrs: [{ epsg: 25831, name: "ETRS89 / UTM zone 31N", note: "" }],
    ...part,
  };
}

/** The same 100 m square on its plane, its corner in the grid's origin. */
export const plane: PlaneRings = {
  areaId: "ar1",
  crs: { text: "+proj=utm +zone=31", epsg: 25831, name: "ETRS89 / UTM zone 31N" },
  rings: [
    [
      [
        [0, 0],
        [100_000, 0],
        [100_000, 100_000],
        [0, 100_000],
      ],
    ],
  ],
  ringsSha256: "cd".repeat(32),
  planeAreaM2: 10_000,
  geodesicAreaM2: 10_000,
  notes: [],
  net: [0, 50, 100].flatMap((east) =>
    [0, 50, 100].map((north): [number, number, number, number] => [east, north, 2 + east / 1e5, 51 + north / 1e5]),
  ),
};

export const spec: FrameSpec = {
  areaId: "ar1",
  epsg: 25831,
  cells: {
    shape: "rectangle",
    widthMm: 20_000,
    heightMm: 20_000,
    originEastMm: 0,
    originNorthMm: 0,
    rotationMicroDegrees: 0,
  },
  membership: { rule: "touch" },
  countIn: "inside",
  leftOut: [],
};

export function draft(part: Partial<FrameVersion> = {}): FrameVersion {
  return {
    id: "f1",
    number: 1,
    state: "draft",
    spec,
    draftSha256: "12".repeat(32),
    crs: plane.crs,
    sealed: null,
    draws: 0,
    createdAt: "2031-05-02T10:00:00Z",
    ...part,
  };
}

export function sealed(part: Partial<FrameVersion> = {}): FrameVersion {
  return draft({
    state: "sealed",
    sealed: {
      at: "2031-05-02T11:02:00Z",
      by: "Ines Marrow",
      units: 25,
      listSha256: "34".repeat(32),
      frameSha256: "56".repeat(32),
      summary: {
        cells: 25,
        wholeCells: 25,
        edgeCells: 0,
        frameAreaM2: 10_000,
        areaM2: 10_000,
        uncoveredM2: 0,
        outsideM2: 0,
      },
    },
    ...part,
  });
}
