import Database from "better-sqlite3";

/** A table of features, as the GeoPackage's own tables of contents describe it. */
export interface FeatureLayer {
  readonly name: string;
  readonly geometryColumn: string;
  /** "EPSG" and 25833, or what else its makers say; null for the undefined systems −1 and 0. */
  readonly system: { readonly organization: string; readonly code: number; readonly definition: string } | null;
}

/** A GeoPackage (OGC 12-128) opened from its bytes: nothing is written, no code in it runs. */
export interface GeoPackageFile {
  readonly layers: readonly FeatureLayer[];
  /** The geometry blobs of a layer in the order of its rows; null where a feature has none. */
  geometries(layer: FeatureLayer): IterableIterator<Uint8Array | null>;
  close(): void;
}

/** @throws Error where the bytes are no SQLite database, are damaged, or have no GeoPackage tables. */
export function openGeoPackage(bytes: Uint8Array): GeoPackageFile {
  const file = Buffer.from(bytes);
  file.fill(1, 18, 20); // a database in memory has no write-ahead log, whatever the file was closed with
  const sqlite = new Database(file);
  try {
    sqlite.pragma("trusted_schema = OFF");
    sqlite.pragma("cell_size_check = ON");
    sqlite.pragma("query_only = ON");
    const [damage] = sqlite.pragma("quick_check(1)") as { quick_check: string }[];
    if (damage?.quick_check !== "ok") throw new Error(damage?.quick_check ?? "it cannot be checked");
    const layers = layersOf(sqlite);
    return {
      layers,
      geometries: ({ name, geometryColumn }) =>
        sqlite
          .prepare(`SELECT ${quoted(geometryColumn)} FROM ${quoted(name)} ORDER BY rowid`)
          .pluck()
          .iterate() as IterableIterator<Uint8Array | null>,
      close: () => sqlite.close(),
    };
  } catch (error) {
    sqlite.close();
    throw error;
  }
}

/** Plain tables only: a view or a virtual table would run what somebody wrote into the file. */
function layersOf(sqlite: Database.Database): FeatureLayer[] {
  const rows = sqlite
    .prepare(
      `SELECT g.table_name AS name, g.column_name AS geometryColumn, s.organization, s.organization_coordsys_id AS code,
              s.definition, g.srs_id AS srsId
       FROM gpkg_contents c
       JOIN gpkg_geometry_columns g ON g.table_name = c.table_name
       JOIN sqlite_master m ON m.name = c.table_name AND m.type = 'table' AND m.sql NOT LIKE 'CREATE VIRTUAL%'
       LEFT JOIN gpkg_spatial_ref_sys s ON s.srs_id = g.srs_id
       WHERE c.data_type = 'features' AND c.table_name <> 'ogr_empty_table'
       ORDER BY c.table_name`,
    )
    .all() as {
    name: string;
    geometryColumn: string;
    organization: string | null;
    code: number | null;
    definition: string | null;
    srsId: number;
  }[];
  return rows.map(({ name, geometryColumn, organization, code, definition, srsId }) => ({
    name,
    geometryColumn,
    system:
      srsId <= 0 || organization === null ? null : { organization, code: code ?? 0, definition: definition ?? "" },
  }));
}

const quoted = (name: string): string => `"${name.replaceAll('"', '""')}"`;
